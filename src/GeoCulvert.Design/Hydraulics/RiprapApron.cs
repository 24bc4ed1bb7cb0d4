using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydraulics;

/// <summary>A class of riprap with the apron that goes with it.</summary>
/// <param name="Name">Class.</param>
/// <param name="D50M">Median size, m.</param>
/// <param name="LengthRatio">Length of the apron over the diameter.</param>
/// <param name="ThicknessRatio">Thickness over the median size.</param>
/// <param name="Source">Where it comes from, with its status.</param>
public sealed record RiprapClass(string Name, double D50M, double LengthRatio, double ThicknessRatio, Source Source)
{
    /// <summary>The classes shipped, smallest first.</summary>
    public static IReadOnlyList<RiprapClass> Published { get; } = From(PublishedTable.Embedded("Hydraulics/Tables/riprap_classes.csv"));

    /// <summary>Reads classes from a table with the same heading.</summary>
    /// <exception cref="InputException">A figure is not above 0 or the sizes do not rise.</exception>
    public static IReadOnlyList<RiprapClass> From(PublishedTable table)
    {
        ArgumentNullException.ThrowIfNull(table);
        var classes = new List<RiprapClass>();
        foreach (var row in table.Rows)
        {
            double Positive(string column) => row.Number(column) is > 0 and var v ? v
                : throw new InputException($"{table.Name} line {row.Line}, column {column}", row.Text(column), "a number above 0");
            var size = Positive("d50_mm") / 1000;
            if (classes.Count > 0 && size <= classes[^1].D50M)
                throw new InputException($"{table.Name} line {row.Line}, column d50_mm", row.Text("d50_mm"), "a size above that of the line before");
            classes.Add(new(row.Text("class"), size, Positive("length_in_diameters"), Positive("thickness_in_d50"), row.Source));
        }

        return classes;
    }
}

/// <summary>A riprap apron below an outlet; SI. <see cref="Class"/> and the dimensions are null where no class is large enough.</summary>
/// <param name="RequiredD50M">Median size the equation asks for, m.</param>
/// <param name="DiameterM">Diameter D put into the equation, m.</param>
/// <param name="TailwaterM">Tailwater depth put into the equation, m, between 0.4 D and D.</param>
/// <param name="Class">The smallest class that is large enough.</param>
/// <param name="LengthM">Length along the flow, m.</param>
/// <param name="WidthAtOutletM">Width at the outlet, m.</param>
/// <param name="WidthAtEndM">Width at the end, m.</param>
/// <param name="ThicknessM">Thickness, m.</param>
/// <param name="Steps">The calculation line by line.</param>
/// <param name="Findings">Doubts.</param>
public sealed record RiprapApron(
    double RequiredD50M, double DiameterM, double TailwaterM, RiprapClass? Class, double? LengthM, double? WidthAtOutletM, double? WidthAtEndM, double? ThicknessM,
    IReadOnlyList<Step> Steps, IReadOnlyList<Finding> Findings)
{
    /// <summary>Diameter above which the handbook does not mean its aprons, m.</summary>
    public const double LargestDiameterM = 1.5;

    private const string Handbook = "FHWA HEC-14, 3rd ed., ch. 10";

    /// <summary>
    /// Apron to FHWA HEC-14, 3rd ed., sec. 10.2 (Fletcher and Grace 1972), for the flow of one barrel:
    /// <code>
    /// D50 = 0.2 D (Q / (g^0.5 D^2.5))^(4/3) (D / TW)     eq. 10.4, TW within 0.4 D and D, 0.4 D where it is not known
    /// D'  = (D + yn) / 2 in place of D                    eq. 10.5, supercritical flow, yn normal depth
    /// width 3 D at the outlet, 3 D + 2/3 length at the end (sides flare 1 in 3)
    /// </code>
    /// Other shapes than circles are taken as the circle of the same area, with a finding (own rule). Several barrels lie half a span apart and share the apron (own rule).
    /// </summary>
    /// <param name="rating">A rating, best with the low tailwater.</param>
    /// <param name="isTailwaterKnown">Whether its tailwater counts; false takes 0.4 D.</param>
    /// <param name="classes">Classes, smallest first; null for the shipped ones.</param>
    /// <returns>Null where the barrels carry nothing.</returns>
    public static RiprapApron? For(CulvertRating rating, bool isTailwaterKnown = true, IReadOnlyList<RiprapClass>? classes = null)
    {
        ArgumentNullException.ThrowIfNull(rating);
        if (rating.BarrelFlowM3PerS <= 0) return null;
        var b = rating.Site.Barrels;
        var section = b.Section;
        var Q = rating.BarrelFlowM3PerS / b.Count;
        var steps = new List<Step> { new("barrel_flow_m3_s", Q, "m3/s", $"{rating.BarrelFlowM3PerS:G4} / {b.Count} barrel(s)") };
        var findings = new List<Finding>();
        double full;
        if (section is CircleSection circle)
        {
            full = circle.DiameterM;
            steps.Add(new("diameter_m", full, "m"));
        }
        else
        {
            full = Math.Sqrt(4 * section.FullAreaM2 / Math.PI);
            steps.Add(new("diameter_m", full, "m", $"(4 A / pi)^0.5 = (4 x {section.FullAreaM2:G4} / pi)^0.5", "own rule: the circle of the same area"));
            findings.Add(HydraulicsFindings.ApronShape.With($"equal-area diameter {full:0.00} m in place of {section.SpanM:0.00} x {section.RiseM:0.00} m"));
        }

        if (full > LargestDiameterM) findings.Add(HydraulicsFindings.ApronLarge.With($"diameter {full:0.00} m", full, LargestDiameterM));
        var D = full;
        if (rating.Profile.NormalDepthM is { } yn && yn < rating.Profile.CriticalDepthM && rating.OutletFroudeNumber > 1)
        {
            D = full * (1 + (yn / section.RiseM)) / 2;
            steps.Add(new("adjusted_diameter_m", D, "m", $"(D + yn) / 2 with yn = {yn / section.RiseM:0.000} of the rise", $"{Handbook}, eq. 10.5"));
        }

        var depth = rating.TailwaterElevationM - b.OutletElevationM;
        var TW = isTailwaterKnown ? Math.Clamp(depth, 0.4 * D, D) : 0.4 * D;
        steps.Add(new("apron_tailwater_m", TW, "m", isTailwaterKnown ? $"{depth:0.000} m within 0.4 D = {0.4 * D:0.000} and D = {D:0.000}" : "not known: 0.4 D", $"{Handbook}, sec. 10.2"));
        var d50 = 0.2 * D * Math.Pow(Q / (Math.Sqrt(OpenChannelFlow.GravityMPerS2) * Math.Pow(D, 2.5)), 4.0 / 3) * (D / TW);
        steps.Add(new("required_d50_m", d50, "m", $"0.2 x {D:0.000} x ({Q:G4} / ({OpenChannelFlow.GravityMPerS2}^0.5 x {D:0.000}^2.5))^(4/3) x ({D:0.000} / {TW:0.000})", $"{Handbook}, eq. 10.4"));
        return Choose(classes ?? RiprapClass.Published, d50, full, D, TW, b, steps, findings);
    }

    private static RiprapApron Choose(
        IReadOnlyList<RiprapClass> classes, double d50, double full, double D, double TW, CulvertBarrels b, List<Step> steps, List<Finding> findings)
    {
        if (classes.FirstOrDefault(c => c.D50M >= d50) is not { } rock)
        {
            findings.Add(HydraulicsFindings.ApronBeyondClasses.With($"needed {1000 * d50:0} mm, largest {(classes.Count == 0 ? 0 : 1000 * classes[^1].D50M):0} mm", d50, classes.Count == 0 ? 0 : classes[^1].D50M));
            return new(d50, D, TW, null, null, null, null, null, steps, findings);
        }

        var length = rock.LengthRatio * full;
        var outlet = (3 * full) + (1.5 * b.Section.SpanM * (b.Count - 1));
        var end = outlet + (2 * length / 3);
        var thickness = rock.ThicknessRatio * rock.D50M;
        var source = rock.Source.ToString();
        steps.Add(new("apron_d50_m", rock.D50M, "m", $"class {rock.Name}, the smallest that is large enough", source));
        steps.Add(new("apron_length_m", length, "m", $"{rock.LengthRatio} x {full:0.000}", source));
        steps.Add(new("apron_width_outlet_m", outlet, "m", $"3 x {full:0.000}" + (b.Count > 1 ? $" + {b.Count - 1} x 1.5 x {b.Section.SpanM:0.000}" : ""), $"{Handbook}, fig. 10.4 (MEMORY)"));
        steps.Add(new("apron_width_end_m", end, "m", $"{outlet:0.000} + 2/3 x {length:0.000}", $"{Handbook}, fig. 10.4 (MEMORY)"));
        steps.Add(new("apron_thickness_m", thickness, "m", $"{rock.ThicknessRatio} x {rock.D50M:0.000}", source));
        return new(d50, D, TW, rock, length, outlet, end, thickness, steps, findings);
    }
}
