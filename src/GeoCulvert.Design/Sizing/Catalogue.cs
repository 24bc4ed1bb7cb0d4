using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Hydraulics;

namespace GeoCulvert.Design.Sizing;

/// <summary>A barrel that may be built: shape, size, inlet, roughness.</summary>
/// <param name="Section">Cross-section.</param>
/// <param name="Inlet">Inlet.</param>
/// <param name="RoughnessN">Manning's n.</param>
/// <param name="EntranceLossCoefficient">ke.</param>
/// <param name="SizeText">Size as a drawing writes it: "48 in", "8 x 6 ft".</param>
public sealed record BarrelChoice(ISection Section, InletType Inlet, double RoughnessN, double EntranceLossCoefficient, string SizeText)
{
    /// <summary>circle or box.</summary>
    public string Shape => Section is CircleSection ? "circle" : "box";
}

/// <summary>Standard sizes and how many barrels may lie side by side.</summary>
/// <param name="Barrels">Every barrel allowed.</param>
/// <param name="LargestNumberOfBarrels">Barrels side by side.</param>
public sealed record CulvertCatalogue(IReadOnlyList<BarrelChoice> Barrels, int LargestNumberOfBarrels)
{
    private (BarrelChoice Choice, int Count)[]? _byArea;

    /// <summary>Every barrel in every number, by total area, then number, then order of the catalogue.</summary>
    public IReadOnlyList<(BarrelChoice Choice, int Count)> ByArea => _byArea ??=
    [
        .. Barrels.SelectMany((b, i) => Enumerable.Range(1, LargestNumberOfBarrels).Select(n => (Choice: b, Count: n, Index: i)))
            .OrderBy(o => Math.Round(o.Count * o.Choice.Section.FullAreaM2, 9)).ThenBy(o => o.Count).ThenBy(o => o.Index)
            .Select(o => (o.Choice, o.Count)),
    ];

    /// <summary>Builds a catalogue from tables of sizes.</summary>
    /// <param name="inlets">Inlets allowed; each gives the barrels of its own shape.</param>
    /// <param name="shapes">circle, box.</param>
    /// <param name="roughnessN">Manning's n of every barrel.</param>
    /// <param name="entranceLoss">ke of every barrel; null for each inlet's own.</param>
    /// <param name="largestNumberOfBarrels">Barrels side by side.</param>
    /// <param name="circles">Table with diameter_in or diameter_mm; null for the shipped one.</param>
    /// <param name="boxes">Table with span_ft and rise_ft, or span_mm and rise_mm; null for the shipped one.</param>
    /// <exception cref="InputException">A table cannot be used.</exception>
    public static CulvertCatalogue Build(
        IReadOnlyList<InletType> inlets, IReadOnlyList<string> shapes, double roughnessN, double? entranceLoss, int largestNumberOfBarrels,
        PublishedTable? circles = null, PublishedTable? boxes = null)
    {
        ArgumentNullException.ThrowIfNull(inlets);
        ArgumentNullException.ThrowIfNull(shapes);
        var sections = new List<(string Shape, ISection Section, string Text)>();
        if (shapes.Contains("circle")) sections.AddRange(Circles(circles ?? PublishedTable.Embedded("Sizing/Tables/sizes_circle.csv")));
        if (shapes.Contains("box")) sections.AddRange(Boxes(boxes ?? PublishedTable.Embedded("Sizing/Tables/sizes_box.csv")));
        return new CulvertCatalogue(
            [.. from s in sections from i in inlets where i.Shape == s.Shape select new BarrelChoice(s.Section, i, roughnessN, entranceLoss ?? i.EntranceLossCoefficient, s.Text)],
            largestNumberOfBarrels);
    }

    private static IEnumerable<(string, ISection, string)> Circles(PublishedTable table)
    {
        var (column, unit, name) = table.Has("diameter_mm") ? ("diameter_mm", 1e-3, "mm") : ("diameter_in", Units.Foot / 12, "in");
        return table.Rows.Select(r => (Size: Positive(table, r, column), r)).Select(d => ("circle", (ISection)new CircleSection(d.Size * unit), $"{d.Size:0.##} {name}"));
    }

    private static IEnumerable<(string, ISection, string)> Boxes(PublishedTable table)
    {
        var (suffix, unit, name) = table.Has("span_mm") ? ("_mm", 1e-3, "mm") : ("_ft", Units.Foot, "ft");
        return table.Rows.Select(r => (B: Positive(table, r, "span" + suffix), D: Positive(table, r, "rise" + suffix)))
            .Select(s => ("box", (ISection)new BoxSection(s.B * unit, s.D * unit), $"{s.B:0.##} x {s.D:0.##} {name}"));
    }

    private static double Positive(PublishedTable table, TableRow row, string column) => row.Number(column) is > 0 and var v
        ? v
        : throw new InputException($"{table.Name} line {row.Line}, column {column}", row.Text(column), "a positive size");
}
