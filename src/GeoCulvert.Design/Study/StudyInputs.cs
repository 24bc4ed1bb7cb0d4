using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Crossings;
using GeoCulvert.Design.Hydrology;
using GeoCulvert.Design.Sizing;
using GeoCulvert.Design.Terrain;

namespace GeoCulvert.Design.Study;

/// <summary>A road of the study.</summary>
/// <param name="Alignment">Line, width, surface, profile.</param>
/// <param name="Class">Its class.</param>
/// <param name="DesignReturnPeriodYr">Design flood, years; null to take the study's, else the class's.</param>
/// <param name="CheckReturnPeriodYr">Check flood, years; null to take the study's, else the class's.</param>
public sealed record StudyRoad(RoadAlignment Alignment, RoadClass Class, double? DesignReturnPeriodYr, double? CheckReturnPeriodYr);

/// <summary>What a study is made from, already in one plane and in SI.</summary>
public sealed record StudyInputs
{
    /// <summary>Terrain, m; NaN is nodata.</summary>
    public required Grid<float> Elevation { get; init; }

    /// <summary>How true to size the terrain's plane is; areas of watersheds, perimeters and flow paths are corrected by it.</summary>
    public PlaneScale PlaneScale { get; init; } = PlaneScale.None;

    /// <summary>Roads; may be empty when points are given.</summary>
    public required IReadOnlyList<StudyRoad> Roads { get; init; }

    /// <summary>Given crossings, or null to find them along the roads.</summary>
    public IReadOnlyList<GivenPoint>? Points { get; init; }

    /// <summary>Culverts known to be there; embankments are opened along them.</summary>
    public IReadOnlyList<KnownCulvert> KnownCulverts { get; init; } = [];

    /// <summary>Streams from a map, to be enforced; empty for none.</summary>
    public IReadOnlyList<MappedCourse> MappedStreams { get; init; } = [];

    /// <summary>Closed basins to keep as sinks, each named by a point in it.</summary>
    public IReadOnlyList<BasinPoint> BasinPoints { get; init; } = [];

    /// <summary>Existing culverts by crossing id; they are rated instead of sized.</summary>
    public IReadOnlyDictionary<string, ExistingBarrels> Inventory { get; init; } = new Dictionary<string, ExistingBarrels>();

    /// <summary>Crossings of the run before, whose ids are kept; empty for a first run.</summary>
    public IReadOnlyList<FormerCrossing> Former { get; init; } = [];

    /// <summary>Land-cover codes on a grid of their own in the plane of the terrain, or null.</summary>
    public Grid<int>? LandCover { get; init; }

    /// <summary>Soil groups on a grid of their own (1-4 = A-D, 5-7 = A/D, B/D, C/D), or null.</summary>
    public Grid<int>? SoilGroup { get; init; }

    /// <summary>Rasters whose means over every watershed are wanted.</summary>
    public IReadOnlyList<StudyRaster> Rasters { get; init; } = [];

    /// <summary>Names, impervious shares and storage of the land covers.</summary>
    public CoverClasses CoverClasses { get; init; } = CoverClasses.Published;

    /// <summary>Runoff coefficients by cover and soil group.</summary>
    public RunoffCoefficientTable Coefficients { get; init; } = RunoffCoefficientTable.Published;

    /// <summary>Curve numbers by cover and soil group.</summary>
    public CurveNumberTable CurveNumbers { get; init; } = CurveNumberTable.Published;

    /// <summary>Values set for single crossings.</summary>
    public Overrides Overrides { get; init; } = Overrides.None;
}

/// <summary>Settings of a study; SI.</summary>
public sealed record StudySettings
{
    /// <summary>System of units of the results.</summary>
    public UnitSystem Units { get; init; } = UnitSystem.Si;

    /// <summary>Whether outlines of watersheds are smoothed for drawing; areas and perimeters stay those of the cells.</summary>
    public bool SmoothOutlines { get; init; }

    /// <summary>Drainage area at which a stream begins, m2.</summary>
    public double StreamAreaM2 { get; init; } = 1e5;

    /// <summary>Drainage area from which water let through an embankment, or met at a low point of the road, is a crossing, m2.</summary>
    public double CrossDrainAreaM2 { get; init; } = 1e4;

    /// <summary>Roads whose shoulders follow each other within this distance have one culvert under all, m.</summary>
    public double RoadsTogetherM { get; init; } = 30;

    /// <summary>Mapped streams, depressions and closed basins.</summary>
    public ConditioningSettings Conditioning { get; init; } = new();

    /// <summary>Opening of embankments; its areas and distance between roads are those of the study.</summary>
    public OpeningSettings Openings { get; init; } = new();

    /// <summary>How far a given point may be moved, m; null for the larger of 60 m and five cells (own rule, measured on published drainage areas).</summary>
    public double? SnapM { get; init; }

    /// <summary>Largest edge contact for which a size is still issued, 0-1.</summary>
    public double AcceptedEdgeContactShare { get; init; }

    /// <summary>How flows are computed.</summary>
    public required FlowSettings Flow { get; init; }

    /// <summary>Rational C where no land cover is given.</summary>
    public double? RunoffCoefficient { get; init; }

    /// <summary>Curve number where no land cover is given.</summary>
    public double? CurveNumber { get; init; }

    /// <summary>Whether a method works with curve numbers.</summary>
    public bool NeedsCurveNumber => Flow.Methods.Any(m => m.Name.StartsWith("nrcs-", StringComparison.Ordinal)) || Flow.Times.Any(t => t.Name == "nrcs-lag");

    /// <summary>Design flood of every road, years; null to take each class's.</summary>
    public double? DesignReturnPeriodYr { get; init; }

    /// <summary>Check flood of every road, years; null to take each class's.</summary>
    public double? CheckReturnPeriodYr { get; init; }

    /// <summary>What may be built.</summary>
    public required CulvertCatalogue Catalogue { get; init; }

    /// <summary>Unit prices; null to seek the least barrel area.</summary>
    public UnitPrices? Prices { get; init; }

    /// <summary>What a culvert must meet.</summary>
    public required SizingCriteria Criteria { get; init; }

    /// <summary>Smallest rise of every road, m; null to take each class's.</summary>
    public double? SmallestRiseM { get; init; }

    /// <summary>Water level at the outlet.</summary>
    public TailwaterSettings Tailwater { get; init; } = new();
}

/// <summary>Runs the stages of a study one after another; the shell times them and shows their progress.</summary>
public interface IStages
{
    /// <summary>Runs one stage.</summary>
    /// <param name="name">Name, as in <c>run.json</c>.</param>
    /// <param name="cells">Cells it works on, or null.</param>
    /// <param name="work">The work; reports the share done, 0-1.</param>
    T Run<T>(string name, long? cells, Func<IProgress<double>, T> work);
}

/// <summary>The outcome of a study.</summary>
/// <param name="Terrain">The drained terrain.</param>
/// <param name="Crossings">Crossings in order of road and station, or as given.</param>
/// <param name="Streams">Streams.</param>
/// <param name="Roads">Roads.</param>
/// <param name="Findings">All findings, those of crossings included.</param>
public sealed record StudyResult(
    DrainedTerrain Terrain,
    IReadOnlyList<CrossingResult> Crossings,
    IReadOnlyList<StreamResult> Streams,
    IReadOnlyList<RoadResult> Roads,
    IReadOnlyList<Finding> Findings)
{
    /// <summary>Openings of embankments.</summary>
    public IReadOnlyList<OpeningResult> Openings { get; init; } = [];

    /// <summary>Mapped streams, cuts and closed basins.</summary>
    public Conditioning Conditioning { get; init; } = Conditioning.None;

    /// <summary>Outlines in the untouched terrain, where openings change the area.</summary>
    public IReadOnlyList<UntouchedWatershed> Untouched { get; init; } = [];

    /// <summary>What differs from the run before; empty for a first run.</summary>
    public IReadOnlyList<CrossingChange> Changes { get; init; } = [];

    /// <summary>Every layer and table, in output units.</summary>
    /// <param name="units">System of units.</param>
    /// <param name="run">Keys and values of the run table.</param>
    public IReadOnlyList<ResultLayer> Layers(UnitSystem units, IEnumerable<(string Key, string Value)> run) =>
    [
        ResultLayers.Crossings.Build(Crossings, units),
        ResultLayers.Watersheds.Build(Crossings, units),
        ResultLayers.LocalWatersheds.Build(Crossings, units),
        ResultLayers.FlowPaths.Build(Crossings.Where(c => c.Watershed.FlowPath is not null), units),
        ResultLayers.Streams.Build(Streams, units),
        ResultLayers.Roads.Build(Roads, units),
        ResultLayers.Culverts.Build(Crossings.Where(c => c.Barrel?.Line is not null), units),
        TerrainLayers.Openings.Build(Openings, units),
        TerrainLayers.Untouched.Build(Untouched, units),
        LandLayers.CoverAreas.Build(Crossings.SelectMany(c => (c.Watershed.Total.Cover?.Areas ?? []).Select(a => (c.CrossingId, a))), units),
        LandLayers.RasterMeans.Build(Crossings.SelectMany(c => c.Watershed.Total.Means.Zip(c.Watershed.Local.Means, (t, l) => (c.CrossingId, t, l))), units),
        ResultLayers.Flows.Build(Crossings.SelectMany(c => c.Sheet.Flows.Select(f => (c.CrossingId, f))), units),
        ResultLayers.Options.Build(Crossings.SelectMany(c => c.Options.Select((o, i) => (c.CrossingId, i + 1, o))), units),
        ResultLayers.Ratings.Build(Crossings.SelectMany(c => c.Rating.Select(p => (c.CrossingId, p))), units),
        TerrainLayers.Breaches.Build(Conditioning.Breaches.Select(b => (b, Terrain.Elevation.Frame)), units),
        TerrainLayers.MappedStreams.Build(Conditioning.Streams.Select(s => (s, Terrain.Elevation.Frame)), units),
        TerrainLayers.ClosedBasins.Build(Conditioning.Basins.Select(b => (b, Terrain.Elevation.Frame)), units),
        TerrainLayers.Capacities.Build(Crossings.SelectMany(c => (c.Existing?.Capacities ?? []).Select(k => (c.CrossingId, k))), units),
        TerrainLayers.Changes.Build(Changes, units),
        ResultLayers.Findings.Build(Findings, units),
        ResultLayers.Run.Build(run, units),
    ];
}
