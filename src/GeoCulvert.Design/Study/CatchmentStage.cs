using System.Globalization;
using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Hydrology;
using GeoCulvert.Design.Terrain;
using GeoCulvert.Design.Watersheds;

namespace GeoCulvert.Design.Study;

/// <summary>Where a watershed becomes a catchment: numbers for the hydrology, with where each came from.</summary>
public sealed class CatchmentStage
{
    // A class of the overlay: land cover x soil group x slope class x filled or not, so that one sweep counts all.
    private static readonly (double BelowMPerM, double MiddleMPerM)[] SlopeClasses = [(0.02, 0.01), (0.06, 0.04), (double.PositiveInfinity, 0.10)];
    private readonly StudyInputs _inputs;
    private readonly StudySettings _settings;
    private readonly DrainedTerrain _terrain;
    private readonly ByOutlet<ClassCells>? _classes;
    private readonly IReadOnlyList<(string Name, ByOutlet<ZoneMean> Means)> _means;

    /// <summary>Counts cover classes of all watersheds in one sweep, and takes the mean of each raster in one.</summary>
    public CatchmentStage(StudyInputs inputs, StudySettings settings, DrainedTerrain terrain, CrossingWatersheds watersheds)
    {
        ArgumentNullException.ThrowIfNull(inputs);
        ArgumentNullException.ThrowIfNull(watersheds);
        (_inputs, _settings, _terrain) = (inputs, settings, terrain);
        if (inputs.LandCover is not null || inputs.SoilGroup is not null) _classes = Classes(inputs, terrain, watersheds);
        _means = [.. inputs.Rasters.Select(r => (r.Name, ZonalOverlay.Means(watersheds.Labels, watersheds.Tree, r.Values)))];
    }

    /// <summary>The catchment of one crossing.</summary>
    /// <param name="crossingId">Crossing id.</param>
    /// <param name="watershed">Its watershed.</param>
    /// <param name="findings">Doubts are added here.</param>
    public Catchment For(string crossingId, Watershed watershed, List<Finding> findings)
    {
        ArgumentNullException.ThrowIfNull(watershed);
        ArgumentNullException.ThrowIfNull(findings);
        var total = watershed.Total;
        var path = total.LongestFlowPath;
        return new Catchment(crossingId, total.AreaM2)
        {
            LongestFlowPathM = path?.LengthM,
            FlowPathSlope1085MPerM = path?.Slope1085MPerM,
            FlowPathEndToEndSlopeMPerM = path?.EndToEndSlopeMPerM,
            ReliefM = total.ReliefM,
            MeanBasinSlopeMPerM = total.MeanBasinSlopeMPerM,
            MeanElevationM = total.MeanElevationM,
            RunoffCoefficient = Coefficient(crossingId, watershed.Outlet, findings),
            CurveNumber = CurveNumber(crossingId, watershed.Outlet, findings),
            FlowPath = path is null ? [] : ListView.WithElevation(path.Profile, Point),
        };
    }

    /// <summary>All that is known of the land of a watershed, total and local.</summary>
    public (LandFigures Total, LandFigures Local) Land(Watershed watershed)
    {
        ArgumentNullException.ThrowIfNull(watershed);
        var k = watershed.Outlet;
        return (
            new(watershed.Total, Cover(_classes?.Total[k], watershed.Total.AreaM2), Means(m => m.Total[k])),
            new(watershed.Local, Cover(_classes?.Local[k], watershed.Local.AreaM2), Means(m => m.Local[k])));

        List<RasterMean> Means(Func<ByOutlet<ZoneMean>, ZoneMean> of) => [.. _means.Select(m => new RasterMean(m.Name, of(m.Means).MeanOrNull, of(m.Means).MissingShare))];
    }

    private static ByOutlet<ClassCells> Classes(StudyInputs inputs, DrainedTerrain terrain, CrossingWatersheds watersheds)
    {
        var nothing = new Grid<int>(new GridFrame(0, 0, 0, 0, 1, 1));
        Grid<int> cover = inputs.LandCover ?? nothing, soil = inputs.SoilGroup ?? nothing;
        float[] filled = terrain.Filled.Surface.Cells, ground = terrain.Elevation.Cells;
        int last = -1, lastSlope = 0;
        return ZonalOverlay.Classes(watersheds.Labels, watersheds.Tree, cover.Frame, soil.Frame, (cell, c, s) =>
        {
            if (cell != last) (last, lastSlope) = (cell, SlopeClass(GroundSlope.At(terrain.Elevation, cell)));
            return CoverPiece.ClassOf(c < 0 ? -1 : cover.Cells[c], s < 0 ? 0 : soil.Cells[s], lastSlope, filled[cell] > ground[cell]);
        });
    }

    private static int SlopeClass(double slope) => Array.FindIndex(SlopeClasses, c => !(slope >= c.BelowMPerM));

    private CoverSummary? Cover(ClassCells? classes, double areaM2)
    {
        if (classes is null || !(classes.CellCount > 0)) return null;
        var summary = CoverSummary.Of(classes, areaM2, _inputs.CoverClasses, _inputs.LandCover is not null, _inputs.SoilGroup is not null);
        return _inputs.LandCover is not null && Composite(classes).Coefficient is { } c ? summary with { RunoffCoefficient = (c.For(2), c.For(25)) } : summary;
    }

    private CompositeRunoffCoefficient Composite(ClassCells classes) => _inputs.Coefficients.Composite([.. classes.CellsByClass
        .Select(c => (Piece: CoverPiece.Of(c.Key), Cells: c.Value))
        .GroupBy(c => (c.Piece.Code, c.Piece.SoilGroup, c.Piece.SlopeClass))
        .Select(g => new CoverArea(
            g.Key.Code?.ToString(CultureInfo.InvariantCulture), g.Key.SoilGroup, g.Sum(c => c.Cells) * _terrain.Elevation.Frame.CellAreaM2, SlopeClasses[g.Key.SlopeClass].MiddleMPerM))]);

    private RunoffCoefficient? Coefficient(string crossingId, int outlet, List<Finding> findings)
    {
        if (_inputs.Overrides.Of(crossingId, "runoff_coefficient") is { } given) return new RunoffCoefficient(given, _inputs.Overrides.Origin);
        if (_classes is not null && _inputs.LandCover is not null)
        {
            var composite = Composite(_classes.Total[outlet]);
            findings.AddRange(composite.Findings);
            if (composite.Coefficient is not null) return composite.Coefficient;
        }

        return _settings.RunoffCoefficient is { } c ? new RunoffCoefficient(c, "[flow] runoff_coefficient") : null;
    }

    private double? CurveNumber(string crossingId, int outlet, List<Finding> findings)
    {
        if (_inputs.Overrides.Of(crossingId, "curve_number") is { } given) return given;
        if (!_settings.NeedsCurveNumber) return null;
        if (_classes is not null && _inputs.LandCover is not null)
        {
            var composite = CompositeCurveNumber(_classes.Total[outlet]);
            findings.AddRange(composite.Findings);
            if (composite.CurveNumber is not null) return composite.CurveNumber;
        }

        return _settings.CurveNumber;
    }

    private CompositeCurveNumber CompositeCurveNumber(ClassCells classes) => _inputs.CurveNumbers.Composite([.. classes.CellsByClass
        .Select(c => (Piece: CoverPiece.Of(c.Key), Cells: c.Value))
        .GroupBy(c => (c.Piece.Code, c.Piece.SoilGroup))
        .Select(g => new CurveNumberArea(g.Key.Code?.ToString(CultureInfo.InvariantCulture), g.Key.SoilGroup, g.Sum(c => c.Cells) * _terrain.Elevation.Frame.CellAreaM2))]);

    private FlowPathPoint Point(FlowPathStation p) => new(
        p.DistanceM,
        p.ElevationM,
        CoverAt(p.Cell) is >= 0 and var code ? code.ToString(CultureInfo.InvariantCulture) : null,
        _terrain.Accumulation.Cells[p.Cell] * _terrain.Elevation.Frame.CellAreaM2);

    /// <summary>The land cover at the centre of a cell of the terrain.</summary>
    private int CoverAt(int cell)
    {
        if (_inputs.LandCover is not { } cover) return -1;
        var frame = _terrain.Elevation.Frame;
        int row = cover.Frame.RowAt(frame.CentreY(cell / frame.Columns)), column = cover.Frame.ColumnAt(frame.CentreX(cell % frame.Columns));
        return cover.Frame.Contains(row, column) ? cover[row, column] : -1;
    }
}
