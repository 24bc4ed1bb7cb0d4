using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Hydrology;
using GeoCulvert.Design.Terrain;
using GeoCulvert.Design.Watersheds;

namespace GeoCulvert.Design.Study;

/// <summary>Where a watershed becomes a catchment: numbers for the hydrology, with where each came from.</summary>
public sealed class CatchmentStage
{
    // A class of the combined grid: land cover x soil group x slope class, so that one sweep counts all three.
    private static readonly (double BelowMPerM, double MiddleMPerM)[] SlopeClasses = [(0.02, 0.01), (0.06, 0.04), (double.PositiveInfinity, 0.10)];
    private static readonly string?[] SoilGroups = [null, "A", "B", "C", "D", "A/D", "B/D", "C/D"];
    private readonly StudyInputs _inputs;
    private readonly StudySettings _settings;
    private readonly DrainedTerrain _terrain;
    private readonly ByOutlet<ClassCells>? _classes;

    /// <summary>Counts cover classes of all watersheds in one sweep.</summary>
    public CatchmentStage(StudyInputs inputs, StudySettings settings, DrainedTerrain terrain, CrossingWatersheds watersheds)
    {
        ArgumentNullException.ThrowIfNull(inputs);
        ArgumentNullException.ThrowIfNull(watersheds);
        (_inputs, _settings, _terrain) = (inputs, settings, terrain);
        if (inputs.LandCover is { } cover) _classes = ZonalSums.Classes(watersheds.Labels, watersheds.Tree, Combine(inputs, cover, watersheds.Labels));
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
            FlowPath = path is null ? [] : [.. path.Profile.Where(p => !double.IsNaN(p.ElevationM)).Select(Point)],
        };
    }

    private static Grid<int> Combine(StudyInputs inputs, Grid<int> cover, Grid<int> labels)
    {
        var combined = new Grid<int>(cover.Frame);
        for (var i = 0; i < combined.Cells.Length; i++)
        {
            var land = cover.Cells[i];
            if (labels.Cells[i] == 0) continue;
            if (land is < 0 or > 100_000)
            {
                combined.Cells[i] = ZonalSums.NoClass;
                continue;
            }

            var soil = inputs.SoilGroup?.Cells[i] is > 0 and < 8 and var s ? s : 0;
            var slope = GroundSlope.At(inputs.Elevation, i);
            combined.Cells[i] = (land * 100) + (soil * 10) + Array.FindIndex(SlopeClasses, c => !(slope >= c.BelowMPerM));
        }

        return combined;
    }

    private RunoffCoefficient? Coefficient(string crossingId, int outlet, List<Finding> findings)
    {
        if (_inputs.Overrides.Of(crossingId, "runoff_coefficient") is { } given) return new RunoffCoefficient(given, _inputs.Overrides.Origin);
        if (_classes is not null)
        {
            var classes = _classes.Total[outlet];
            var cellM2 = _terrain.Elevation.Frame.CellAreaM2;
            var parts = classes.CellsByClass.OrderBy(c => c.Key)
                .Select(c => new CoverArea((c.Key / 100).ToString(), SoilGroups[c.Key / 10 % 10], c.Value * cellM2, SlopeClasses[c.Key % 10].MiddleMPerM))
                .Append(new CoverArea(null, null, classes.MissingCells * cellM2))
                .ToArray();
            var composite = _inputs.Coefficients.Composite(parts);
            findings.AddRange(composite.Findings);
            if (composite.Coefficient is not null) return composite.Coefficient;
        }

        return _settings.RunoffCoefficient is { } c ? new RunoffCoefficient(c, "[flow] runoff_coefficient") : null;
    }

    private double? CurveNumber(string crossingId, int outlet, List<Finding> findings)
    {
        if (_inputs.Overrides.Of(crossingId, "curve_number") is { } given) return given;
        if (!_settings.NeedsCurveNumber) return null;
        if (_classes is not null)
        {
            var classes = _classes.Total[outlet];
            var cellM2 = _terrain.Elevation.Frame.CellAreaM2;
            var parts = classes.CellsByClass.GroupBy(c => c.Key / 10).OrderBy(g => g.Key)
                .Select(g => new CurveNumberArea((g.Key / 10).ToString(), SoilGroups[g.Key % 10], g.Sum(c => c.Value) * cellM2))
                .Append(new CurveNumberArea(null, null, classes.MissingCells * cellM2))
                .ToArray();
            var composite = _inputs.CurveNumbers.Composite(parts);
            findings.AddRange(composite.Findings);
            if (composite.CurveNumber is not null) return composite.CurveNumber;
        }

        return _settings.CurveNumber;
    }

    private FlowPathPoint Point(FlowPathStation p) => new(
        p.DistanceM,
        p.ElevationM,
        _inputs.LandCover?.Cells[p.Cell] is >= 0 and var code ? code.ToString() : null,
        _terrain.Accumulation.Cells[p.Cell] * _terrain.Elevation.Frame.CellAreaM2);
}
