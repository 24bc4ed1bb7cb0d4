using GeoCulvert.Design.Terrain;
using NetTopologySuite.Geometries;
using NetTopologySuite.Geometries.Implementation;

namespace GeoCulvert.Design.Watersheds;

/// <summary>A point of a flow path.</summary>
/// <param name="DistanceM">Distance from the divide along the path, m.</param>
/// <param name="ElevationM">Elevation of the ground, m; NaN where the terrain has none.</param>
/// <param name="Cell">Row-major index of the cell.</param>
public readonly record struct FlowPathStation(double DistanceM, double ElevationM, int Cell);

/// <summary>
/// The longest flow path of a watershed, from the divide to the outlet, through cell centres, with its profile on the untouched terrain.
/// Paths that begin at the same cell share their stations: one down a chain of crossings is kept once, however many end on it.
/// </summary>
public sealed class FlowPath
{
    private static readonly GeometryFactory Factory = new(PackedCoordinateSequenceFactory.DoubleFactory);
    private readonly GridFrame _frame;
    private readonly ArraySegment<FlowPathStation> _profile;

    // Area under the profile above elevation 0, from the divide to each station, m2.
    private readonly double[] _areaM2;
    private LineString? _line;

    private FlowPath(GridFrame frame, ArraySegment<FlowPathStation> profile, double[] areaM2) => (_frame, _profile, _areaM2) = (frame, profile, areaM2);

    /// <summary>The line with z, from the divide down; two equal points when the path is one cell.</summary>
    public LineString Line => _line ??= MakeLine();

    /// <summary>Distance and elevation at each cell.</summary>
    public IReadOnlyList<FlowPathStation> Profile => _profile;

    /// <summary>Length between the first and the last cell's centre, m.</summary>
    public double LengthM => _profile[^1].DistanceM;

    /// <summary>
    /// Slope between the points 10 % and 85 % of the length above the outlet: (E85 - E10) / (0.75 L), m/m (USGS practice); null for a path of
    /// one cell or without elevations. May be zero or negative where the terrain is not conditioned.
    /// </summary>
    public double? Slope1085MPerM => SlopeBetween(0.10, 0.85);

    /// <summary>Fall from end to end by length, m/m; null for a path of one cell or without elevations.</summary>
    public double? EndToEndSlopeMPerM => SlopeBetween(0, 1);

    /// <summary>
    /// Slope of the straight line from the outlet that has as much area under it as the profile has above the outlet's elevation: 2 A / L^2,
    /// A by trapezoids between cells, m/m; null for a path of one cell or without elevations.
    /// </summary>
    public double? EqualAreaSlopeMPerM
    {
        get
        {
            if (!(LengthM > 0)) return null;
            var area = _areaM2[_profile.Count - 1] - (_profile[^1].ElevationM * LengthM);
            return double.IsNaN(area) ? null : 2 * area / (LengthM * LengthM);
        }
    }

    /// <summary>Elevation at a share of the length above the outlet, m; linear between cells.</summary>
    public double ElevationAboveOutletM(double share)
    {
        if (_profile.Count == 1) return _profile[0].ElevationM;
        var at = LengthM * (1 - share);
        int low = 1, high = _profile.Count - 1; // the first station at or beyond the place
        while (low < high)
        {
            var middle = (low + high) / 2;
            if (_profile[middle].DistanceM < at) low = middle + 1;
            else high = middle;
        }

        FlowPathStation a = _profile[low - 1], b = _profile[low];
        return a.ElevationM + ((b.ElevationM - a.ElevationM) * Math.Clamp((at - a.DistanceM) / (b.DistanceM - a.DistanceM), 0, 1));
    }

    /// <summary>Makes the path of cells from the divide to the outlet.</summary>
    /// <param name="cells">Row-major indices, divide first; at least one.</param>
    /// <param name="elevation">The untouched terrain.</param>
    /// <param name="scale">Scale of the plane, for true distances; null for those of the plane.</param>
    public static FlowPath Of(IReadOnlyList<int> cells, Grid<float> elevation, PlaneScale? scale = null)
    {
        ArgumentNullException.ThrowIfNull(cells);
        ArgumentNullException.ThrowIfNull(elevation);
        if (cells.Count == 0) throw new ArgumentException("A flow path needs a cell.", nameof(cells));
        var frame = elevation.Frame;
        scale ??= PlaneScale.None;
        var profile = new FlowPathStation[cells.Count];
        var area = new double[cells.Count];
        profile[0] = new(0, elevation.Cells[cells[0]], cells[0]);
        for (var i = 1; i < profile.Length; i++)
        {
            int from = cells[i - 1], to = cells[i], width = frame.Columns;
            double dx = ((to % width) - (from % width)) * frame.CellWidthM, dy = ((to / width) - (from / width)) * frame.CellHeightM;
            var step = scale.IsNone
                ? Math.Sqrt((dx * dx) + (dy * dy))
                : scale.LengthM((frame.CentreX(from % width) + frame.CentreX(to % width)) / 2, (frame.CentreY(from / width) + frame.CentreY(to / width)) / 2, dx, -dy);
            profile[i] = new(profile[i - 1].DistanceM + step, elevation.Cells[to], to);
            area[i] = area[i - 1] + (step * (profile[i].ElevationM + profile[i - 1].ElevationM) / 2);
        }

        return new(frame, profile, area);
    }

    /// <summary>The path's first cells as a path of their own, on the same stations.</summary>
    /// <param name="cellCount">Number of cells, at least one.</param>
    internal FlowPath Upper(int cellCount) => cellCount == _profile.Count ? this : new(_frame, _profile[..cellCount], _areaM2);

    private LineString MakeLine()
    {
        var count = Math.Max(2, _profile.Count);
        var xyz = new double[3 * count];
        for (var i = 0; i < count; i++)
        {
            var station = _profile[Math.Min(i, _profile.Count - 1)];
            (xyz[3 * i], xyz[(3 * i) + 1], xyz[(3 * i) + 2]) = (_frame.CentreX(station.Cell % _frame.Columns), _frame.CentreY(station.Cell / _frame.Columns), station.ElevationM);
        }

        return Factory.CreateLineString(new PackedDoubleCoordinateSequence(xyz, 3, 0));
    }

    private double? SlopeBetween(double low, double high)
    {
        if (!(LengthM > 0)) return null;
        var slope = (ElevationAboveOutletM(high) - ElevationAboveOutletM(low)) / ((high - low) * LengthM);
        return double.IsNaN(slope) ? null : slope;
    }
}
