using GeoCulvert.Design.Basis;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Design.Crossings;

/// <summary>A point of a given road profile.</summary>
/// <param name="StationM">Distance along the road, m.</param>
/// <param name="ElevationM">Road level there, m.</param>
public sealed record ProfilePoint(double StationM, double ElevationM);

/// <summary>A place along a road.</summary>
/// <param name="StationM">Distance along the road, m.</param>
/// <param name="OffsetM">Distance from the centreline, m; positive to the right looking up-station, negative to the left.</param>
/// <param name="Point">The nearest point of the centreline, m.</param>
/// <param name="AzimuthDeg">Direction of the centreline there, degrees clockwise from grid north, up-station.</param>
public sealed record RoadPlace(double StationM, double OffsetM, Coordinate Point, double AzimuthDeg);

/// <summary>
/// A road in plan with its stations, in the metric projected frame of the terrain. Parts that touch end to end are chained (turned round where
/// needed, the first part keeps its sense); parts that do not touch follow each other without counting the gap (<see cref="GapCount"/>).
/// </summary>
public sealed class RoadAlignment
{
    private readonly Coordinate[][] _chains;
    private readonly double[][] _stations;

    /// <summary>Makes an alignment from the parts of its line.</summary>
    /// <param name="name">Name of the road, first part of a crossing's id.</param>
    /// <param name="parts">LineStrings of the road, m; empty and zero-length ones are passed over.</param>
    /// <param name="startStationM">Station of the beginning, m.</param>
    /// <param name="chainToleranceM">Ends closer than this are one point, m.</param>
    /// <exception cref="InputException">No part has any length.</exception>
    public RoadAlignment(string name, IEnumerable<LineString> parts, double startStationM = 0, double chainToleranceM = 0.5)
    {
        ArgumentNullException.ThrowIfNull(name);
        ArgumentNullException.ThrowIfNull(parts);
        Name = name;
        StartStationM = startStationM;
        _chains = [.. RoadChain.Join([.. parts.Where(p => p.Length > 0).Select(p => p.Coordinates)], chainToleranceM)];
        if (_chains.Length == 0) throw new InputException($"road {name}", "no line with any length", "one or more lines");
        _stations = new double[_chains.Length][];
        var station = startStationM;
        for (var i = 0; i < _chains.Length; i++)
        {
            var chain = _chains[i];
            var along = _stations[i] = new double[chain.Length];
            along[0] = station;
            for (var k = 1; k < chain.Length; k++) along[k] = station += chain[k].Distance(chain[k - 1]);
        }

        EndStationM = station;
    }

    /// <summary>Name of the road.</summary>
    public string Name { get; }

    /// <summary>Road class as the project names it; null when not given.</summary>
    public string? RoadClass { get; init; }

    /// <summary>Width from shoulder to shoulder, m. Default 9 m: two lanes with shoulders (common practice).</summary>
    public double WidthM { get; init; } = 9;

    /// <summary>Embankment slope, horizontal per one vertical. Default 2 (common practice).</summary>
    public double SideSlope { get; init; } = 2;

    /// <summary>Surface: "paved" or "gravel".</summary>
    public string Surface { get; init; } = "paved";

    /// <summary>Given profile by rising station; null when the line's z or the DEM must serve.</summary>
    public IReadOnlyList<ProfilePoint>? Profile { get; init; }

    /// <summary>Station of the beginning, m.</summary>
    public double StartStationM { get; }

    /// <summary>Station of the end, m.</summary>
    public double EndStationM { get; }

    /// <summary>Length of the road, m, gaps not counted.</summary>
    public double LengthM => EndStationM - StartStationM;

    /// <summary>Number of gaps between parts that do not touch.</summary>
    public int GapCount => _chains.Length - 1;

    /// <summary>Whether every vertex carries an elevation.</summary>
    public bool HasElevation => _chains.All(c => c.All(p => !double.IsNaN(p.Z)));

    /// <summary>The chained line: a LineString, or a MultiLineString where there are gaps.</summary>
    public Geometry Line => _chains.Length == 1 ? new LineString(_chains[0]) : new MultiLineString([.. _chains.Select(c => new LineString(c))]);

    /// <summary>Segments by rising station: chain, index of the first vertex in it, ends and the station of the first end.</summary>
    internal IEnumerable<RoadSegment> Segments()
    {
        for (var i = 0; i < _chains.Length; i++)
            for (var k = 1; k < _chains[i].Length; k++)
                if (_stations[i][k] > _stations[i][k - 1]) yield return new(_chains[i][k - 1], _chains[i][k], _stations[i][k - 1], _stations[i][k]);
    }

    /// <summary>The place of the road nearest to a point; the lowest station wins a tie.</summary>
    public RoadPlace StationOf(Coordinate point)
    {
        ArgumentNullException.ThrowIfNull(point);
        RoadPlace? best = null;
        var least = double.PositiveInfinity;
        foreach (var s in Segments())
        {
            var t = s.Nearest(point);
            var foot = s.At(t);
            var distance = foot.Distance(point);
            if (distance >= least) continue;
            least = distance;
            var side = ((s.To.X - s.From.X) * (point.Y - s.From.Y)) - ((s.To.Y - s.From.Y) * (point.X - s.From.X));
            best = new(s.StationAt(t), side > 0 ? -distance : distance, foot, s.AzimuthDeg);
        }

        return best!;
    }

    /// <summary>The point of the centreline at a station, with z where the line has it; stations beyond the ends give the ends.</summary>
    public Coordinate PointAt(double stationM)
    {
        var (segment, t) = Find(stationM);
        return segment.At(t);
    }

    /// <summary>Direction of the centreline at a station, degrees clockwise from grid north, up-station.</summary>
    public double AzimuthAt(double stationM) => Find(stationM).Segment.AzimuthDeg;

    /// <summary>"RD9 12+340".</summary>
    public string IdAt(double stationM, UnitSystem system = UnitSystem.Si) => $"{Name} {StationText.Of(stationM, system)}";

    private (RoadSegment Segment, double T) Find(double stationM)
    {
        var i = 0;
        while (i < _chains.Length - 1 && stationM > _stations[i][^1]) i++;
        var along = _stations[i];
        var k = Array.BinarySearch(along, stationM);
        k = Math.Clamp(k < 0 ? ~k : k, 1, along.Length - 1);
        while (k < along.Length - 1 && along[k] <= along[k - 1]) k++;
        while (k > 1 && along[k] <= along[k - 1]) k--;
        var s = new RoadSegment(_chains[i][k - 1], _chains[i][k], along[k - 1], along[k]);
        return (s, Math.Clamp((stationM - s.FromStationM) / (s.ToStationM - s.FromStationM), 0, 1));
    }
}

/// <summary>A straight piece of a road between two vertices.</summary>
internal readonly record struct RoadSegment(Coordinate From, Coordinate To, double FromStationM, double ToStationM)
{
    public double AzimuthDeg => Bearings.AzimuthDeg(From, To);

    public double StationAt(double t) => FromStationM + (t * (ToStationM - FromStationM));

    public double Nearest(Coordinate p)
    {
        double dx = To.X - From.X, dy = To.Y - From.Y;
        return Math.Clamp((((p.X - From.X) * dx) + ((p.Y - From.Y) * dy)) / ((dx * dx) + (dy * dy)), 0, 1);
    }

    public Coordinate At(double t)
    {
        double x = From.X + (t * (To.X - From.X)), y = From.Y + (t * (To.Y - From.Y)), z = From.Z + (t * (To.Z - From.Z));
        return double.IsNaN(z) ? new Coordinate(x, y) : new CoordinateZ(x, y, z);
    }
}
