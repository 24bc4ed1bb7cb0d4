using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Crossings;
using GeoCulvert.Design.Terrain;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Design.Study;

/// <summary>How the terrain is made to drain, besides opening embankments.</summary>
public sealed record ConditioningSettings
{
    /// <summary>Cuts of depressions; null to fill all.</summary>
    public BreachSettings? Breaching { get; init; }

    /// <summary>How mapped streams are enforced.</summary>
    public StreamSettings Streams { get; init; } = new();

    /// <summary>Size from which closed basins are kept; null for none but the named.</summary>
    public BasinLimits? KeepBasins { get; init; }
}

/// <summary>What conditioning did besides opening embankments.</summary>
/// <param name="Streams">Mapped streams, as enforced.</param>
/// <param name="Breaches">Cuts of depressions.</param>
/// <param name="Basins">Closed basins kept, with the land that drains to each.</param>
/// <param name="Findings">Doubts.</param>
public sealed record Conditioning(
    IReadOnlyList<EnforcedCourse> Streams, IReadOnlyList<Breach> Breaches, IReadOnlyList<NonContributingArea> Basins, IReadOnlyList<Finding> Findings)
{
    /// <summary>Nothing.</summary>
    public static Conditioning None { get; } = new([], [], [], []);
}

/// <summary>
/// Makes the terrain drain, in this order: mapped streams enforced, embankments opened, closed basins kept as sinks, other depressions cut or filled. The untouched elevations stay beside.
/// </summary>
public static class ConditioningStage
{
    /// <summary>Drains the terrain.</summary>
    public static (OpenedTerrain Opened, Conditioning Conditioning) Drain(StudyInputs inputs, StudySettings settings, IProgress<double> progress, CancellationToken cancel)
    {
        ArgumentNullException.ThrowIfNull(inputs);
        ArgumentNullException.ThrowIfNull(settings);
        var findings = new List<Finding>();
        var how = settings.Conditioning;
        EnforcedStreams? streams = null;
        if (inputs.MappedStreams.Count > 0)
        {
            var own = Drainage.Solve(inputs.Elevation, null, progress, cancel);
            streams = StreamEnforcement.Enforce(inputs.Elevation, inputs.MappedStreams, how.Streams with { ThresholdCells = Threshold(inputs, settings) }, own.Accumulation);
            findings.AddRange(streams.Streams.SelectMany(s => s.Findings));
        }

        var surface = streams?.Surface ?? inputs.Elevation;
        BreachedSurface? cut = null;
        BasinChoice? basins = null;
        DrainedTerrain Solve(Grid<float> z, IReadOnlyList<int[]> paths)
        {
            cut = how.Breaching is null ? null : DepressionBreaching.Breach(z, how.Breaching, cancel);
            var breached = cut?.Surface ?? z;
            basins = inputs.BasinPoints.Count == 0 && how.KeepBasins is null ? null
                : ClosedBasins.Choose(breached, Depressions.Find(breached, DepressionFilling.Fill(breached, cancel).Surface, cancel), inputs.BasinPoints, how.KeepBasins);
            return Drainage.Solve(basins?.Elevation ?? breached, paths, progress, cancel);
        }

        var opened = CrossingStage.Open(inputs, settings, surface, Solve, cancel);
        // Levels, inverts and ponds are measured on what was surveyed, not on what was cut.
        opened = opened with { Terrain = opened.Terrain with { Elevation = inputs.Elevation } };
        if (cut is not null) findings.AddRange(cut.Findings);
        if (basins is not null) findings.AddRange(basins.Findings);
        var kept = basins is { Kept.Count: > 0 } ? ClosedBasins.NonContributing(opened.Terrain.Direction, basins.Kept) : [];
        return (opened, new Conditioning(streams?.Streams ?? [], cut?.Breaches ?? [], kept, findings));
    }

    private static long Threshold(StudyInputs inputs, StudySettings settings) => Math.Max(1, (long)Math.Ceiling(settings.StreamAreaM2 / inputs.Elevation.Frame.CellAreaM2));
}
