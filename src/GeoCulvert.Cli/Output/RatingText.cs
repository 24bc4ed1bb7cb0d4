using System.Globalization;
using System.Text;
using System.Text.Json;
using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Hydraulics;

namespace GeoCulvert.Cli.Output;

/// <summary>Ratings as JSON, and as a table with the calculation of each flow.</summary>
internal static class RatingText
{
    /// <summary>Writes the JSON of <c>rate --json</c>.</summary>
    public static void Json(TextWriter output, IReadOnlyList<CulvertRating> ratings, UnitSystem units)
    {
        using var buffer = new MemoryStream();
        using (var json = new Utf8JsonWriter(buffer, new JsonWriterOptions { Indented = true }))
        {
            json.WriteStartObject();
            json.WriteStartArray("results");
            foreach (var r in ratings)
            {
                json.WriteStartObject();
                Write(json, r, units);
                json.WriteEndObject();
            }

            json.WriteEndArray();
            json.WriteEndObject();
        }

        output.WriteLine(Encoding.UTF8.GetString(buffer.ToArray()));
    }

    /// <summary>Writes the members of one rating.</summary>
    public static void Write(Utf8JsonWriter json, CulvertRating r, UnitSystem units)
    {
        void Number(string name, QuantityKind kind, double? si)
        {
            var key = name + DisplayUnits.FieldSuffix(kind, units);
            if (si is { } v && double.IsFinite(v)) json.WriteNumber(key, DisplayUnits.FromSi(v, kind, units));
            else json.WriteNull(key);
        }

        Number("flow", QuantityKind.Flow, r.FlowM3PerS);
        Number("inlet_control_headwater", QuantityKind.Length, r.InletControlHeadwaterM);
        Number("outlet_control_headwater", QuantityKind.Length, r.OutletControlHeadwaterM);
        json.WriteString("control", r.Control);
        Number("headwater", QuantityKind.Length, r.HeadwaterM);
        Number("headwater_elevation", QuantityKind.Length, r.HeadwaterElevationM);
        json.WriteNumber("hw_over_d", r.HeadwaterOverRise);
        Number("critical_depth", QuantityKind.Length, r.Profile.CriticalDepthM);
        Number("normal_depth", QuantityKind.Length, r.Profile.NormalDepthM);
        Number("outlet_depth", QuantityKind.Length, r.Profile.OutletDepthM);
        Number("outlet_velocity", QuantityKind.Velocity, r.OutletVelocityMPerS);
        json.WriteString("profile", r.Profile.Name);
        Number("barrel_flow", QuantityKind.Flow, r.BarrelFlowM3PerS);
        Number("road_flow", QuantityKind.Flow, r.RoadFlowM3PerS);
        Number("tailwater_elevation", QuantityKind.Length, r.TailwaterElevationM);
        Number("shorthand_outlet_headwater", QuantityKind.Length, r.Shorthand.HeadwaterM);
        json.WriteStartArray("findings");
        foreach (var f in r.Findings)
        {
            json.WriteStartObject();
            json.WriteString("code", f.Code);
            json.WriteString("severity", f.Severity.ToString().ToLowerInvariant());
            json.WriteString("text", f.Sentence);
            json.WriteEndObject();
        }

        json.WriteEndArray();
    }

    /// <summary>Writes a table of all flows, then the calculation of each when there are few.</summary>
    public static void Table(TextWriter output, IReadOnlyList<CulvertRating> ratings, UnitSystem units)
    {
        string L(double si) => DisplayUnits.FromSi(si, QuantityKind.Length, units).ToString("0.00", CultureInfo.InvariantCulture);
        string U(QuantityKind kind) => DisplayUnits.Symbol(kind, units);
        var b = ratings[0].Site.Barrels;
        output.WriteLine($"{Size(b.Section, units)}{(b.Count > 1 ? $", {b.Count} barrels" : "")}, {b.Inlet.Id} ({b.Inlet.Description})");
        output.WriteLine($"length {L(b.LengthM)} {U(QuantityKind.Length)}, inverts {L(b.InletElevationM)} / {L(b.OutletElevationM)}, slope {b.SlopeMPerM:0.00000}, n {b.RoughnessN:0.####}, ke {b.EntranceLossCoefficient:0.##}");
        output.WriteLine();
        output.WriteLine($"{"flow",10} {"inlet",8} {"outlet",8} {"HW",8} {"HW elev.",9} {"HW/D",6} {"control",8} {"outlet v",9} {"over road",10}  profile");
        output.WriteLine($"{U(QuantityKind.Flow),10} {U(QuantityKind.Length),8} {U(QuantityKind.Length),8} {U(QuantityKind.Length),8} {U(QuantityKind.Length),9} {"",6} {"",8} {U(QuantityKind.Velocity),9} {U(QuantityKind.Flow),10}");
        foreach (var r in ratings)
        {
            var q = DisplayUnits.FromSi(r.FlowM3PerS, QuantityKind.Flow, units);
            var road = DisplayUnits.FromSi(r.RoadFlowM3PerS, QuantityKind.Flow, units);
            output.WriteLine(string.Create(CultureInfo.InvariantCulture,
                $"{q,10:G4} {L(r.InletControlHeadwaterM),8} {L(r.OutletControlHeadwaterM),8} {L(r.HeadwaterM),8} {L(r.HeadwaterElevationM),9} {r.HeadwaterOverRise,6:0.00} {r.Control,8} {DisplayUnits.FromSi(r.OutletVelocityMPerS, QuantityKind.Velocity, units),9:0.00} {road,10:G3}  {r.Profile.Name}"));
        }

        if (ratings.Count <= 3) foreach (var r in ratings) Calculation(output, r);
        foreach (var f in ratings.SelectMany(r => r.Findings).DistinctBy(f => (f.Code, f.Text)).Take(12))
            output.WriteLine($"{f.Severity.ToString().ToLowerInvariant()}: {f.Sentence}. {f.Action} [{f.Code}]");
        output.WriteLine();
        output.WriteLine(GeoCulvert.Report.ReportCaution.Short);
    }

    /// <summary>The calculation of one flow, line by line, in SI.</summary>
    public static void Calculation(TextWriter output, CulvertRating rating)
    {
        output.WriteLine();
        output.WriteLine($"Calculation for {rating.FlowM3PerS:G4} m3/s (SI)");
        foreach (var s in RatingSteps.Of(rating))
        {
            output.WriteLine(string.Create(CultureInfo.InvariantCulture, $"  {s.Name,-30} {s.Value,10:0.0000} {s.Unit,-5} {s.Formula}").TrimEnd());
            if (s.Source.Length > 0) output.WriteLine($"  {"",-47} [{s.Source}]");
        }

        output.WriteLine();
    }

    /// <summary>"circle 1.22 m" or "box 1.5 x 1.5 m".</summary>
    public static string Size(ISection section, UnitSystem units)
    {
        string L(double si) => DisplayUnits.FromSi(si, QuantityKind.Length, units).ToString("0.###", CultureInfo.InvariantCulture);
        var unit = DisplayUnits.Symbol(QuantityKind.Length, units);
        return section is CircleSection ? $"circle {L(section.RiseM)} {unit}" : $"box {L(section.SpanM)} x {L(section.RiseM)} {unit}";
    }
}
