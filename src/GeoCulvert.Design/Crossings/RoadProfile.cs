using GeoCulvert.Design.Terrain;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Design.Crossings;

/// <summary>Where a road level comes from.</summary>
public enum RoadLevelOrigin
{
    /// <summary>A given table of stations and elevations.</summary>
    Table,

    /// <summary>The elevations of the line's vertices.</summary>
    Line,

    /// <summary>The untouched terrain across the road's width.</summary>
    Terrain,
}

/// <summary>Road levels along a stretch of road, by rising station.</summary>
/// <param name="Points">Stations and levels; stations without a level are left out.</param>
/// <param name="Origin">Where the levels come from.</param>
public sealed record RoadProfile(IReadOnlyList<ProfilePoint> Points, RoadLevelOrigin Origin)
{
    /// <summary>The lowest point; null when there is none. The lowest station wins a tie.</summary>
    public ProfilePoint? Lowest => Points.MinBy(p => p.ElevationM);

    /// <summary>
    /// Samples a stretch of road, ends included. A given table goes before the line's elevations, and those before the terrain. From the
    /// terrain the level at a station is the highest value across the road's width (bilinear, at most half a cell apart): the crown stands
    /// above its ditches, and a line drawn a little off still finds it.
    /// </summary>
    /// <param name="road">The road.</param>
    /// <param name="fromStationM">Beginning, m; cut to the road.</param>
    /// <param name="toStationM">End, m; cut to the road.</param>
    /// <param name="stepM">Spacing, m, positive; vertices of a table between are kept too.</param>
    /// <param name="elevation">The untouched terrain.</param>
    public static RoadProfile Sample(RoadAlignment road, double fromStationM, double toStationM, double stepM, Grid<float> elevation)
    {
        ArgumentNullException.ThrowIfNull(road);
        ArgumentNullException.ThrowIfNull(elevation);
        if (!(stepM > 0)) throw new ArgumentOutOfRangeException(nameof(stepM), stepM, "The spacing must be positive.");
        double from = Math.Max(fromStationM, road.StartStationM), to = Math.Min(toStationM, road.EndStationM);
        var origin = road.Profile is { Count: > 0 } ? RoadLevelOrigin.Table : road.HasElevation ? RoadLevelOrigin.Line : RoadLevelOrigin.Terrain;
        var stations = new SortedSet<double>();
        if (to >= from)
        {
            var pieces = Math.Max(1, (int)Math.Ceiling((to - from) / stepM));
            for (var i = 0; i <= pieces; i++) stations.Add(from + ((to - from) * i / pieces));
            if (origin == RoadLevelOrigin.Table) stations.UnionWith(road.Profile!.Select(p => p.StationM).Where(s => s > from && s < to));
            if (origin == RoadLevelOrigin.Line) stations.UnionWith(road.Segments().Select(s => s.FromStationM).Where(s => s > from && s < to));
        }

        return new([.. stations.Select(s => new ProfilePoint(s, LevelM(road, s, origin, elevation))).Where(p => !double.IsNaN(p.ElevationM))], origin);
    }

    private static double LevelM(RoadAlignment road, double stationM, RoadLevelOrigin origin, Grid<float> elevation) => origin switch
    {
        RoadLevelOrigin.Table => FromTable(road.Profile!, stationM),
        RoadLevelOrigin.Line => road.PointAt(stationM).Z,
        _ => AcrossM(road, stationM, elevation),
    };

    /// <summary>Linear between the table's points; NaN beyond its ends: a road level is not extrapolated.</summary>
    private static double FromTable(IReadOnlyList<ProfilePoint> table, double stationM)
    {
        for (var i = 0; i < table.Count; i++)
        {
            if (table[i].StationM < stationM) continue;
            if (table[i].StationM == stationM) return table[i].ElevationM;
            if (i == 0) return double.NaN;
            ProfilePoint a = table[i - 1], b = table[i];
            return a.ElevationM + ((b.ElevationM - a.ElevationM) * (stationM - a.StationM) / (b.StationM - a.StationM));
        }

        return double.NaN;
    }

    private static double AcrossM(RoadAlignment road, double stationM, Grid<float> elevation)
    {
        var p = road.PointAt(stationM);
        var across = (road.AzimuthAt(stationM) + 90) * Math.PI / 180;
        var half = road.WidthM / 2;
        var pieces = Math.Max(2, (int)Math.Ceiling(road.WidthM / (0.5 * Math.Min(elevation.Frame.CellWidthM, elevation.Frame.CellHeightM))));
        var highest = double.NaN;
        for (var i = 0; i <= pieces; i++)
        {
            var offset = -half + (road.WidthM * i / pieces);
            var z = Bilinear(elevation, p.X + (offset * Math.Sin(across)), p.Y + (offset * Math.Cos(across)));
            if (!double.IsNaN(z) && !(z <= highest)) highest = z;
        }

        return highest;
    }

    /// <summary>Elevation between the four nearest cell centres; cells without terrain are left out and the weights of the others scaled up.</summary>
    internal static double Bilinear(Grid<float> elevation, double x, double y)
    {
        var frame = elevation.Frame;
        if (!frame.Contains(frame.RowAt(y), frame.ColumnAt(x))) return double.NaN;
        double c = ((x - frame.West) / frame.CellWidthM) - 0.5, r = ((frame.North - y) / frame.CellHeightM) - 0.5;
        int column = (int)Math.Floor(c), row = (int)Math.Floor(r);
        double fc = c - column, fr = r - row, sum = 0, weight = 0;
        for (var i = 0; i <= 1; i++)
            for (var j = 0; j <= 1; j++)
            {
                if (!frame.Contains(row + i, column + j) || float.IsNaN(elevation[row + i, column + j])) continue;
                var w = (i == 0 ? 1 - fr : fr) * (j == 0 ? 1 - fc : fc);
                (sum, weight) = (sum + (w * elevation[row + i, column + j]), weight + w);
            }

        return weight > 0 ? sum / weight : double.NaN;
    }
}
