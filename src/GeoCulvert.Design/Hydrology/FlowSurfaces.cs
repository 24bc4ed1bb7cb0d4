using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydrology;

/// <summary>How water runs over a surface before it reaches a channel.</summary>
/// <param name="Id">Cover id, as along the flow path.</param>
/// <param name="Name">Plain name.</param>
/// <param name="SheetN">Roughness n for sheet flow (not for channels).</param>
/// <param name="ShallowVelocityMPerS">Velocity of shallow concentrated flow at a slope of 1 m/m, m/s.</param>
/// <param name="Source">Where the two come from.</param>
public sealed record FlowSurface(string Id, string Name, double SheetN, double ShallowVelocityMPerS, Source Source);

/// <summary>Surfaces by cover id; embedded tables or the user's own with the same heading.</summary>
public sealed class FlowSurfaces
{
    private readonly Dictionary<string, FlowSurface> _byId = new(StringComparer.OrdinalIgnoreCase);

    private FlowSurfaces(PublishedTable cover, PublishedTable shallow)
    {
        var velocity = shallow.Rows.ToDictionary(r => r.Text("id"), r => r, StringComparer.OrdinalIgnoreCase);
        // A table of the user may hold runoff coefficients only.
        foreach (var row in cover.Has("n_overland") && cover.Has("shallow_flow") ? cover.Rows : [])
        {
            var (id, n, regime) = (row.Text("cover_id"), row.NumberOrNull("n_overland"), row.Text("shallow_flow"));
            if (n is not { } roughness || !(roughness > 0) || regime.Length == 0) continue;
            if (!velocity.TryGetValue(regime, out var v))
                throw new InputException($"{cover.Name} line {row.Line}, column shallow_flow", $"'{regime}'", $"one of {string.Join(", ", velocity.Keys)}");
            Add(cover, row.Line, new(id, row.Text("name"), roughness, v.Number("velocity_coefficient_ft_per_s") * Units.Foot, row.Source));
        }
        foreach (var row in shallow.Rows)
        {
            // The shallow-flow rows stand by themselves too; their n is that of sheet flow over the like surface.
            if (!_byId.ContainsKey(row.Text("id")) && row.NumberOrNull("sheet_n") is { } n)
                Add(shallow, row.Line, new(row.Text("id"), row.Text("name"), n, row.Number("velocity_coefficient_ft_per_s") * Units.Foot, row.Source));
        }
    }

    /// <summary>The program's own: land-cover classes and the eight surfaces of NEH-630.</summary>
    public static FlowSurfaces Published { get; } = From(
        PublishedTable.Embedded("Hydrology/Tables/land_cover.csv"), PublishedTable.Embedded("Hydrology/Tables/shallow_flow.csv"));

    /// <summary>Ids that have both a roughness and a velocity.</summary>
    public IReadOnlyCollection<string> Ids => _byId.Keys;

    /// <summary>Builds the lookup from a land-cover table and a shallow-flow table.</summary>
    /// <exception cref="InputException">A row cannot be used.</exception>
    public static FlowSurfaces From(PublishedTable landCover, PublishedTable shallowFlow) => new(landCover, shallowFlow);

    /// <summary>The surface with an id, or null.</summary>
    public FlowSurface? Find(string? id) => id is null ? null : _byId.GetValueOrDefault(id);

    private void Add(PublishedTable table, int line, FlowSurface surface)
    {
        if (!_byId.TryAdd(surface.Id, surface))
            throw new InputException($"{table.Name} line {line}", $"'{surface.Id}' a second time", "each id once");
    }
}
