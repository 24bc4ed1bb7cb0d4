using GeoCulvert.Design.Terrain;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Design.Watersheds;

/// <summary>A point of a flow path.</summary>
/// <param name="DistanceM">Distance from the divide along the path, m.</param>
/// <param name="ElevationM">Elevation of the ground, m; NaN where the terrain has none.</param>
/// <param name="Cell">Row-major index of the cell.</param>
public readonly record struct FlowPathStation(double DistanceM, double ElevationM, int Cell);

/// <summary>
/// The longest flow path of a watershed, from the divide to the outlet, through cell centres, with its profile on the untouched terrain.
/// </summary>
public sealed class FlowPath
{
    private FlowPath(LineString line, IReadOnlyList<FlowPathStation> profile) => (Line, Profile) = (line, profile);

    /// <summary>The line with z, from the divide down; two equal points when the path is one cell.</summary>
    public LineString Line { get; }

    /// <summary>Distance and elevation at each cell.</summary>
    public IReadOnlyList<FlowPathStation> Profile { get; }

    /// <summary>Length between the first and the last cell's centre, m.</summary>
    public double LengthM => Profile[^1].DistanceM;

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
            double area = 0, outlet = Profile[^1].ElevationM;
            for (var i = 1; i < Profile.Count; i++)
                area += (Profile[i].DistanceM - Profile[i - 1].DistanceM) * (((Profile[i].ElevationM + Profile[i - 1].ElevationM) / 2) - outlet);
            return double.IsNaN(area) ? null : 2 * area / (LengthM * LengthM);
        }
    }

    /// <summary>Elevation at a share of the length above the outlet, m; linear between cells.</summary>
    public double ElevationAboveOutletM(double share)
    {
        var at = LengthM * (1 - share);
        var i = 1;
        while (i < Profile.Count - 1 && Profile[i].DistanceM < at) i++;
        if (Profile.Count == 1) return Profile[0].ElevationM;
        FlowPathStation a = Profile[i - 1], b = Profile[i];
        return a.ElevationM + ((b.ElevationM - a.ElevationM) * Math.Clamp((at - a.DistanceM) / (b.DistanceM - a.DistanceM), 0, 1));
    }

    /// <summary>Makes the path of cells from the divide to the outlet.</summary>
    /// <param name="cells">Row-major indices, divide first; at least one.</param>
    /// <param name="elevation">The untouched terrain.</param>
    public static FlowPath Of(IReadOnlyList<int> cells, Grid<float> elevation)
    {
        ArgumentNullException.ThrowIfNull(cells);
        ArgumentNullException.ThrowIfNull(elevation);
        if (cells.Count == 0) throw new ArgumentException("A flow path needs a cell.", nameof(cells));
        var frame = elevation.Frame;
        var profile = new FlowPathStation[cells.Count];
        var points = new List<Coordinate>(cells.Count + 1);
        for (var i = 0; i < cells.Count; i++)
        {
            var z = elevation.Cells[cells[i]];
            var p = new CoordinateZ(frame.CentreX(cells[i] % frame.Columns), frame.CentreY(cells[i] / frame.Columns), z);
            profile[i] = new(i == 0 ? 0 : profile[i - 1].DistanceM + points[^1].Distance(p), z, cells[i]);
            points.Add(p);
        }

        if (points.Count == 1) points.Add(points[0].Copy());
        return new(new LineString([.. points]), profile);
    }

    private double? SlopeBetween(double low, double high)
    {
        if (!(LengthM > 0)) return null;
        var slope = (ElevationAboveOutletM(high) - ElevationAboveOutletM(low)) / ((high - low) * LengthM);
        return double.IsNaN(slope) ? null : slope;
    }
}
