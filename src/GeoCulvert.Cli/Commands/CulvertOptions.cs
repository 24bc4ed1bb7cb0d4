using System.CommandLine;

namespace GeoCulvert.Cli.Commands;

/// <summary>Options that <c>rate</c> and <c>size</c> share: one culvert without a map.</summary>
internal sealed class CulvertOptions
{
    /// <summary>Shape of the barrel.</summary>
    public Option<string> Shape { get; } = new("--shape") { Description = "Shape of the barrel.", DefaultValueFactory = _ => "circle" };

    /// <summary>Barrels side by side.</summary>
    public Option<string?> Barrels { get; } = Text("--barrels", "Equal barrels side by side (rate: default 1; size: the largest number allowed, default 4).");

    /// <summary>Inlet type.</summary>
    public Option<string?> Inlet { get; } = Text(
        "--inlet", "Inlet type as hds5-CHART-SCALE, the numbering of HDS-5 (default: hds5-1-1 for a circle, hds5-8-1 for a box).", "hds5-8-1");

    /// <summary>Roughness.</summary>
    public Option<string?> Roughness { get; } = Text("--roughness", "Manning n of the barrel (default 0.012, concrete).", "0.012");

    /// <summary>Entrance loss.</summary>
    public Option<string?> EntranceLoss { get; } = Text("--entrance-loss", "Entrance loss coefficient (default: the inlet's own).", "0.4");

    /// <summary>Barrel length.</summary>
    public Option<string?> Length { get; } = Text("--length", "Length of the barrel.", "36 m");

    /// <summary>Inlet invert elevation.</summary>
    public Option<string?> InletElevation { get; } = Text("--inlet-elevation", "Elevation of the inlet invert.", "100 m");

    /// <summary>Outlet invert elevation.</summary>
    public Option<string?> OutletElevation { get; } = Text("--outlet-elevation", "Elevation of the outlet invert.", "99.5 m");

    /// <summary>Tailwater depth.</summary>
    public Option<string?> Tailwater { get; } = Text("--tailwater", "Tailwater depth above the outlet invert (default 0: free outfall).", "0.8 m");

    /// <summary>Flows.</summary>
    public Option<string[]> Flow { get; } = new("--flow")
    {
        Description = "Flow to rate, with its unit; may be repeated.",
        HelpName = "4.8 m3/s",
        Arity = ArgumentArity.ZeroOrMore,
    };

    /// <summary>Road elevation.</summary>
    public Option<string?> RoadElevation { get; } = Text("--road-elevation", "Level of the road; with it, flow over the road is computed.", "104 m");

    /// <summary>Road length.</summary>
    public Option<string?> RoadLength { get; } = Text("--road-length", "Length of road that can be overtopped.", "60 m");

    /// <summary>Road surface.</summary>
    public Option<string> RoadSurface { get; } = new("--road-surface") { Description = "Road surface.", DefaultValueFactory = _ => "paved" };

    /// <summary>Road width.</summary>
    public Option<string?> RoadWidth { get; } = Text("--road-width", "Width of the road along the flow (default 10 m).", "9 m");

    /// <summary>JSON output.</summary>
    public Option<bool> Json { get; } = new("--json") { Description = "Print JSON instead of a table." };

    /// <summary>Units of the output.</summary>
    public Option<string> UnitsOption { get; } = new("--units") { Description = "Units of what is printed: si or us.", DefaultValueFactory = _ => "si" };

    /// <summary>Adds all options to a command.</summary>
    public void AddTo(Command command)
    {
        Shape.AcceptOnlyFromAmong("circle", "box");
        RoadSurface.AcceptOnlyFromAmong("paved", "gravel");
        UnitsOption.AcceptOnlyFromAmong("si", "us");
        foreach (var option in (Option[])[Shape, Barrels, Inlet, Roughness, EntranceLoss, Length, InletElevation, OutletElevation, Tailwater, Flow, RoadElevation, RoadLength, RoadSurface, RoadWidth, Json, UnitsOption])
            command.Add(option);
    }

    internal static Option<string?> Text(string name, string description, string example = "N") =>
        new(name) { Description = description, HelpName = example };
}
