using System.Globalization;
using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Hydraulics;
using GeoCulvert.Design.Sizing;

namespace GeoCulvert.Design.Study;

/// <summary>Names of an inventory's fields and the units of its bare numbers; null where it has none.</summary>
public sealed record InventoryFields
{
    /// <summary>Shape.</summary>
    public string? Shape { get; init; }

    /// <summary>Diameter or size ("48 in", "2x36", "8 x 6 ft").</summary>
    public string? Size { get; init; }

    /// <summary>Span.</summary>
    public string? Span { get; init; }

    /// <summary>Rise.</summary>
    public string? Rise { get; init; }

    /// <summary>Number of barrels.</summary>
    public string? Barrels { get; init; }

    /// <summary>Material.</summary>
    public string? Material { get; init; }

    /// <summary>Inlet type, hds5-CHART-SCALE.</summary>
    public string? Inlet { get; init; }

    /// <summary>Length.</summary>
    public string? Length { get; init; }

    /// <summary>Inlet invert.</summary>
    public string? InletElevation { get; init; }

    /// <summary>Outlet invert.</summary>
    public string? OutletElevation { get; init; }

    /// <summary>Unit of bare sizes.</summary>
    public string? SizeUnit { get; init; }

    /// <summary>Unit of bare lengths.</summary>
    public string? LengthUnit { get; init; }

    /// <summary>Unit of bare elevations.</summary>
    public string? ElevationUnit { get; init; }
}

/// <summary>An existing culvert as the inventory has it.</summary>
/// <param name="Id">Its id, which is that of its crossing.</param>
/// <param name="Choice">Barrel; null when its size or shape cannot be read.</param>
/// <param name="Barrels">Number of barrels.</param>
/// <param name="LengthM">Length, m; null to measure it on the terrain.</param>
/// <param name="InletElevationM">Inlet invert, m; null to measure it.</param>
/// <param name="OutletElevationM">Outlet invert, m; null to measure it.</param>
/// <param name="Findings">What could not be read, and what was assumed.</param>
public sealed record ExistingBarrels(
    string Id, BarrelChoice? Choice, int Barrels, double? LengthM, double? InletElevationM, double? OutletElevationM, IReadOnlyList<Finding> Findings);

/// <summary>Reads existing culverts out of an inventory, dirty as inventories are. Every row gives a culvert; what cannot be read is a finding on it.</summary>
public static class Inventory
{
    /// <summary>Materials: Manning's n (HDS-5 2nd ed. table 4: concrete design practice 0.012; corrugated metal 0.022-0.027; smooth plastic 0.009-0.015) and inlet where none is given.</summary>
    private static readonly Dictionary<string, (double RoughnessN, string CircleInlet, string BoxInlet)> Materials = new(StringComparer.Ordinal)
    {
        ["concrete"] = (0.012, "hds5-1-1", "hds5-8-1"),
        ["corrugated metal"] = (0.024, "hds5-2-1", "hds5-8-1"),
        ["plastic"] = (0.012, "hds5-1-1", "hds5-8-1"),
    };

    /// <summary>Reads one row.</summary>
    /// <param name="id">Its id.</param>
    /// <param name="row">Fields of the row.</param>
    /// <param name="fields">Names of the fields.</param>
    public static ExistingBarrels Read(string id, IReadOnlyDictionary<string, object?> row, InventoryFields fields)
    {
        ArgumentNullException.ThrowIfNull(row);
        ArgumentNullException.ThrowIfNull(fields);
        var findings = new List<Finding>();
        string? Text(string? field) => field is not null && row.TryGetValue(field, out var v) && v is not null ? Convert.ToString(v, CultureInfo.InvariantCulture) : null;
        void Bad(string? field, string trouble)
        {
            if (trouble.Length > 0) findings.Add(InventoryFindings.Unreadable.With($"{field}: {trouble}").At(id));
        }

        void Assumed(string what) => findings.Add(InventoryFindings.Assumed.With(what).At(id));

        var sizeText = Text(fields.Size);
        var count = InventoryText.Count(Text(fields.Barrels), out var countTrouble);
        Bad(fields.Barrels, countTrouble);
        var shape = InventoryText.Shape(Text(fields.Shape), out var shapeTrouble);
        Bad(fields.Shape, shapeTrouble);
        var material = InventoryText.Material(Text(fields.Material)) ?? InventoryText.Material(Text(fields.Shape));
        if (fields.Material is not null && material is null && !InventoryText.IsBlank(Text(fields.Material))) Bad(fields.Material, $"'{Text(fields.Material)}' is no material");
        double? Length(string? text, string? field, string? unit)
        {
            var value = InventoryText.LengthM(text, unit, out var trouble);
            Bad(field, trouble);
            return value;
        }

        double? span = Length(Text(fields.Span), fields.Span, fields.SizeUnit), rise = Length(Text(fields.Rise), fields.Rise, fields.SizeUnit), diameter = null;
        if (!InventoryText.IsBlank(sizeText) && TwoSizes(sizeText!, fields.SizeUnit) is var (b, d) && (shape == "box" || (shape is null && InventoryText.CountAndSize(sizeText) is null)))
        {
            (span, rise, shape) = (span ?? b, rise ?? d, "box");
        }
        else if (!InventoryText.IsBlank(sizeText))
        {
            if (InventoryText.CountAndSize(sizeText) is var (several, rest)) (sizeText, count) = (rest, count ?? several);
            diameter = Length(sizeText, fields.Size, fields.SizeUnit);
        }

        if (shape is null && (diameter is not null || span is not null))
        {
            shape = diameter is not null || rise is null || rise == span ? "circle" : "box";
            Assumed($"shape {shape}, from the size");
        }

        if (count is null && fields.Barrels is not null) Assumed("one barrel");
        if (material is null)
        {
            material = "concrete";
            Assumed("material concrete, n = 0.012");
        }

        var choice = Choice(id, shape, diameter, span, rise, material, Text(fields.Inlet), findings, Assumed);
        return new(
            id, choice, count ?? 1, Length(Text(fields.Length), fields.Length, fields.LengthUnit), Elevation(Text(fields.InletElevation), fields.InletElevation), Elevation(Text(fields.OutletElevation), fields.OutletElevation), findings);

        double? Elevation(string? text, string? field)
        {
            if (InventoryText.IsBlank(text)) return null;
            // Elevations may be zero or negative; 0 in inventories mostly means nothing was written.
            if (double.TryParse(text, NumberStyles.Float, CultureInfo.InvariantCulture, out var bare))
            {
                if (bare == 0) { Bad(field, "'0' is taken as not written"); return null; }
                if (fields.ElevationUnit is null) { Bad(field, $"'{text}' without a unit, and none is stated"); return null; }
                return bare * Units.Get(fields.ElevationUnit).InSi;
            }

            return Length(text, field, fields.ElevationUnit);
        }
    }

    private static BarrelChoice? Choice(
        string id, string? shape, double? diameter, double? span, double? rise, string material, string? inletText, List<Finding> findings, Action<string> assumed)
    {
        ISection? section = null;
        var text = "";
        switch (shape)
        {
            case "circle" when (diameter ?? span ?? rise) is { } D:
                section = new CircleSection(D);
                text = FormattableString.Invariant($"{D * 1000:0} mm");
                break;
            case "box" when span is { } B && rise is { } H:
                section = new BoxSection(B, H);
                text = FormattableString.Invariant($"{B * 1000:0} x {H * 1000:0} mm");
                break;
            case "circle" or "box":
                findings.Add(InventoryFindings.NoSize.With($"{shape} without {(shape == "box" ? "span and rise" : "a diameter")}").At(id));
                return null;
            case null:
                findings.Add(InventoryFindings.NoSize.With("neither a shape nor a size that can be read").At(id));
                return null;
            default:
                findings.Add(InventoryFindings.ShapeNotRated.With(shape).At(id));
                return null;
        }

        var (n, circleInlet, boxInlet) = Materials[material];
        var usual = shape == "circle" ? circleInlet : boxInlet;
        InletType? inlet = null;
        if (!InventoryText.IsBlank(inletText))
        {
            try
            {
                inlet = InletCatalogue.Find(inletText!.Trim(), id);
                if (inlet.Shape != shape)
                {
                    findings.Add(InventoryFindings.Unreadable.With($"inlet '{inletText}' belongs to another shape").At(id));
                    inlet = null;
                }
            }
            catch (InputException)
            {
                findings.Add(InventoryFindings.Unreadable.With($"'{inletText}' is no inlet type hds5-CHART-SCALE").At(id));
            }
        }

        if (inlet is null) assumed($"inlet {usual}");
        inlet ??= InletCatalogue.Find(usual, id);
        return new BarrelChoice(section, inlet, n, inlet.EntranceLossCoefficient, text);
    }

    /// <summary>"8 x 6 ft", "8' x 6'", "8x6" with a stated unit: span and rise; null for anything else.</summary>
    private static (double Span, double Rise)? TwoSizes(string text, string? unit)
    {
        var parts = text.Split(['x', 'X', '\u00d7'], StringSplitOptions.TrimEntries);
        if (parts.Length != 2) return null;
        var rise = InventoryText.LengthM(parts[1], unit, out _);
        // "8 x 6 ft": the unit stands once, behind both.
        var suffix = new string([.. parts[1].SkipWhile(c => char.IsDigit(c) || c is '.' or ' ' or '/' or '-')]).Trim();
        var span = InventoryText.LengthM(parts[0], suffix.Length > 0 && Units.Find(suffix) is { Dimension: "length" } u ? u.Symbol : unit, out _);
        return span is { } s && rise is { } r ? (s, r) : null;
    }
}

/// <summary>Codes of reading an inventory.</summary>
public static class InventoryFindings
{
    /// <summary>A field cannot be read.</summary>
    public static readonly FindingCode Unreadable = new(
        "inventory-field-unreadable", Severity.Warning,
        "A field of the inventory cannot be read and was left out.",
        "Correct it in the inventory, or state the unit of the field.");

    /// <summary>Something was assumed.</summary>
    public static readonly FindingCode Assumed = new(
        "inventory-value-assumed", Severity.Warning,
        "The inventory does not say, so a usual value was assumed.",
        "Complete the inventory.");

    /// <summary>No size.</summary>
    public static readonly FindingCode NoSize = new(
        "inventory-size-missing", Severity.Error,
        "The existing culvert has no size that can be read, so it was not rated.",
        "Complete the inventory.");

    /// <summary>A shape that is not rated.</summary>
    public static readonly FindingCode ShapeNotRated = new(
        "inventory-shape-not-rated", Severity.Error,
        "The shape of the existing culvert is not rated from an inventory.",
        "Rate it by itself with geoculvert rate.");

    /// <summary>It fails at a flood.</summary>
    public static readonly FindingCode Fails = new(
        "existing-culvert-fails", Severity.Warning,
        "The existing culvert breaks a criterion at a flood that was asked for.",
        "Compare the cost of a larger culvert with the risk; check the figures on site first.");
}
