using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Study;

namespace GeoCulvert.Report;

/// <summary>Reads a result layer by field name; a field or layer that is absent gives null, never an error.</summary>
public sealed class LayerTable
{
    private readonly Dictionary<string, int> places = new(StringComparer.Ordinal);
    private readonly UnitSystem units;

    /// <summary>Opens a layer.</summary>
    /// <param name="layer">The layer, or null when the run has none.</param>
    /// <param name="units">System in which its values are.</param>
    public LayerTable(ResultLayer? layer, UnitSystem units)
    {
        (Layer, this.units) = (layer, units);
        for (var i = 0; i < (layer?.Fields.Count ?? 0); i++) places.TryAdd(layer!.Fields[i].Name, i);
    }

    /// <summary>The layer, or null.</summary>
    public ResultLayer? Layer { get; }

    /// <summary>Its rows.</summary>
    public IReadOnlyList<ResultRow> Rows => Layer?.Rows ?? [];

    /// <summary>Opens a layer of a study by name.</summary>
    public static LayerTable Open(StudyReport report, string name)
    {
        ArgumentNullException.ThrowIfNull(report);
        return new LayerTable(report.Layers.FirstOrDefault(l => string.Equals(l.Name, name, StringComparison.Ordinal)), report.Units);
    }

    /// <summary>The field of a quantity, whose name ends in the unit suffix of the system; null when there is none.</summary>
    public ResultField? Field(string name, QuantityKind kind) => Find(name, kind) is { } i ? Layer!.Fields[i] : null;

    /// <summary>A figure of a row in output units, or null.</summary>
    public double? Number(ResultRow row, string name, QuantityKind kind)
    {
        ArgumentNullException.ThrowIfNull(row);
        return Find(name, kind) is not { } i ? null : row.Values[i] switch
        {
            double d when double.IsFinite(d) => d,
            long l => l,
            int n => n,
            _ => null,
        };
    }

    /// <summary>A text of a row; "" when there is none.</summary>
    public string Text(ResultRow row, string name)
    {
        ArgumentNullException.ThrowIfNull(row);
        return Find(name, QuantityKind.None) is { } i ? row.Values[i] switch
        {
            string s => s,
            double d => FigureText.Full(d),
            null => "",
            var other => other.ToString() ?? "",
        }
        : "";
    }

    private int? Find(string name, QuantityKind kind) => places.TryGetValue(name + DisplayUnits.FieldSuffix(kind, units), out var i) ? i : null;
}
