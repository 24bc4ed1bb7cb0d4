using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydraulics;

/// <summary>An inlet of HDS-5 with the coefficients of its inlet-control equations.</summary>
/// <param name="Id">"hds5-CHART-SCALE".</param>
/// <param name="Shape">circle or box.</param>
/// <param name="Material">concrete, corrugated metal or any.</param>
/// <param name="Description">Shape, material and edge in words.</param>
/// <param name="Form">1 or 2: form of the unsubmerged equation.</param>
/// <param name="K">Coefficient K.</param>
/// <param name="M">Exponent M.</param>
/// <param name="C">Coefficient c.</param>
/// <param name="Y">Constant Y.</param>
/// <param name="Ks">Slope factor: -0.5, +0.7 for an inlet mitred to the slope.</param>
/// <param name="EntranceLossCoefficient">Default entrance loss coefficient ke for outlet control.</param>
/// <param name="EntranceLossRow">Row of the entrance-loss table it is from.</param>
/// <param name="Source">Source of the coefficients.</param>
/// <param name="Note">Remark of the table.</param>
public sealed record InletType(
    string Id, string Shape, string Material, string Description, int Form, double K, double M, double C, double Y, double Ks,
    double EntranceLossCoefficient, string EntranceLossRow, Source Source, string Note)
{
    /// <summary>Whether these are coefficients of the throat of a tapered inlet, whose face must be checked as well.</summary>
    public bool IsThroat => Note.Contains("throat", StringComparison.Ordinal);
}

/// <summary>The inlets of circles and boxes.</summary>
public static class InletCatalogue
{
    /// <summary>All inlets of the shipped table.</summary>
    public static IReadOnlyList<InletType> All { get; } = Read(PublishedTable.Embedded("Hydraulics/Tables/inlets.csv"));

    /// <summary>Reads inlets from a table with the heading of the shipped one.</summary>
    /// <exception cref="InputException">A row cannot be used.</exception>
    public static IReadOnlyList<InletType> Read(PublishedTable table)
    {
        ArgumentNullException.ThrowIfNull(table);
        return [.. table.Rows.SelectMany(r => Charts(r.Text("chart")).Select(chart => new InletType(
            $"hds5-{chart}-{r.Text("scale").ToLowerInvariant()}", r.Text("shape"), r.Text("material"), r.Text("inlet"), (int)r.Number("form"),
            r.Number("K"), r.Number("M"), r.Number("c"), r.Number("Y"), r.Number("Ks"), r.Number("ke"), r.Text("ke_entrance"), r.Source, r.Text("note"))))];
    }

    /// <summary>The inlet with an id.</summary>
    /// <param name="id">"hds5-8-1".</param>
    /// <param name="place">Key or option, for the error.</param>
    /// <exception cref="InputException">There is none; the near ones are named.</exception>
    public static InletType Find(string id, string place)
    {
        ArgumentNullException.ThrowIfNull(id);
        var wanted = id.Trim().ToLowerInvariant();
        var found = All.FirstOrDefault(i => i.Id == wanted);
        if (found is not null) return found;
        var chart = wanted.Split('-') is ["hds5", var c, ..] ? c : "";
        var near = All.Where(i => i.Id.Split('-')[1] == chart).Select(i => $"{i.Id} ({i.Description})").ToArray();
        throw new InputException(place, $"'{id}'", near.Length > 0 ? $"one of {string.Join("; ", near)}" : $"hds5-CHART-SCALE, one of {string.Join(", ", All.Select(i => i.Id))}");
    }

    /// <summary>A row for charts 16-19 serves each of the four charts.</summary>
    private static IEnumerable<string> Charts(string text) => text.Split('-') is [var first, var last]
        ? Enumerable.Range(int.Parse(first), int.Parse(last) - int.Parse(first) + 1).Select(c => c.ToString())
        : [text];
}
