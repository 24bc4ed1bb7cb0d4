using System.CommandLine;
using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Hydraulics;

namespace GeoCulvert.Cli.Commands;

/// <summary>What the options shared by rate and size say; SI.</summary>
internal sealed record CulvertQuestion(
    int Barrels, InletType? Inlet, double RoughnessN, double? EntranceLoss, double LengthM, double InletElevationM, double OutletElevationM, double TailwaterDepthM,
    RoadCrest? Road, UnitSystem Units)
{
    /// <summary>Reads the options; everything wrong is gathered in the values.</summary>
    public static CulvertQuestion Read(ParseResult parse, CulvertOptions options, CommandValues values)
    {
        var inletId = parse.GetValue(options.Inlet) ?? (parse.GetValue(options.Shape) == "box" ? "hds5-8-1" : "hds5-1-1");
        var inlet = values.Try(() => InletCatalogue.Find(inletId, "--inlet"));
        if (inlet is not null && inlet.Shape != parse.GetValue(options.Shape))
            values.Wrong("--inlet", $"{inlet.Id}, an inlet of a {inlet.Shape}", $"an inlet of a {parse.GetValue(options.Shape)}, for example {(inlet.Shape == "box" ? "hds5-1-1" : "hds5-8-1")}");
        var barrels = values.Number(options.Barrels, 1, 100) ?? 1;
        if (barrels != Math.Floor(barrels)) values.Wrong("--barrels", $"{barrels}", "a whole number");
        var roadLevel = values.Quantity(options.RoadElevation, "length");
        var roadLength = values.Quantity(options.RoadLength, "length");
        if (roadLevel is null != roadLength is null)
            values.Wrong(roadLevel is null ? "--road-elevation" : "--road-length", "nothing", "both --road-elevation and --road-length, or neither");
        var width = values.Quantity(options.RoadWidth, "length") ?? 10;
        return new CulvertQuestion(
            (int)barrels,
            inlet,
            values.Number(options.Roughness, 0.005, 0.1) ?? 0.012,
            values.Number(options.EntranceLoss, 0, 2),
            values.Needed(options.Length, "length", "36 m", 0.1),
            values.Needed(options.InletElevation, "length", "100 m", -500),
            values.Needed(options.OutletElevation, "length", "99.5 m", -500),
            values.Quantity(options.Tailwater, "length") ?? 0,
            roadLevel is { } level && roadLength is > 0 and var length && width > 0
                ? RoadCrest.Level(level, length, width, parse.GetValue(options.RoadSurface) == "gravel" ? RoadSurface.Gravel : RoadSurface.Paved)
                : null,
            parse.GetValue(options.UnitsOption) == "us" ? UnitSystem.Us : UnitSystem.Si);
    }

    /// <summary>Tailwater level, m.</summary>
    public ITailwater Tailwater => new FixedTailwater(OutletElevationM + TailwaterDepthM);

    /// <summary>The culvert with a section.</summary>
    public CulvertSite Site(ISection section) => new(
        new CulvertBarrels(section, Barrels, Inlet!, RoughnessN, EntranceLoss ?? Inlet!.EntranceLossCoefficient, LengthM, InletElevationM, OutletElevationM), Tailwater, Road);
}
