using System.CommandLine;

namespace GeoCulvert.Cli.Commands;

/// <summary>Options of <c>flow</c>: one watershed without a map.</summary>
internal sealed class FlowOptions
{
    /// <summary>Method.</summary>
    public Option<string> Method { get; } = new("--method") { Description = "Method of the peak flow.", Required = true };

    /// <summary>Drainage area.</summary>
    public Option<string?> Area { get; } = CulvertOptions.Text("--area", "Drainage area.", "43.3 ac");

    /// <summary>Runoff coefficient.</summary>
    public Option<string?> Coefficient { get; } = CulvertOptions.Text("--runoff-coefficient", "Rational C, 0-1.", "0.35");

    /// <summary>Intensity.</summary>
    public Option<string?> Intensity { get; } = CulvertOptions.Text("--intensity", "Rainfall intensity for the rational method, instead of a table.", "1.9 in/h");

    /// <summary>Rainfall table.</summary>
    public Option<string?> Table { get; } = CulvertOptions.Text("--rainfall-table", "Rainfall by duration and return period: a NOAA Atlas 14 file or a plain table.", "FILE");

    /// <summary>Return periods.</summary>
    public Option<string[]> Periods { get; } = new("--return-period") { Description = "Return period in years; may be repeated. Needed with a table and with equations that cover several.", HelpName = "25", Arity = ArgumentArity.ZeroOrMore };

    /// <summary>Time of concentration.</summary>
    public Option<string?> Time { get; } = CulvertOptions.Text("--time-of-concentration", "Time of concentration.", "30 min");

    /// <summary>Method for the time of concentration.</summary>
    public Option<string?> TimeMethod { get; } = CulvertOptions.Text("--time-method", "Computes the time of concentration instead, from --flow-path and --slope: kirpich, faa, nrcs-lag or bransby-williams.", "kirpich");

    /// <summary>Length of the flow path.</summary>
    public Option<string?> Path { get; } = CulvertOptions.Text("--flow-path", "Length of the longest flow path.", "1200 m");

    /// <summary>Slope.</summary>
    public Option<string?> Slope { get; } = CulvertOptions.Text("--slope", "Slope of the flow path (of the land for nrcs-lag).", "2 %");

    /// <summary>Curve number.</summary>
    public Option<string?> CurveNumber { get; } = CulvertOptions.Text("--curve-number", "Runoff curve number.", "75");

    /// <summary>24-hour rainfall.</summary>
    public Option<string?> Rainfall { get; } = CulvertOptions.Text("--rainfall", "24-hour rainfall depth, instead of a table.", "6.0 in");

    /// <summary>Storm.</summary>
    public Option<string?> Storm { get; } = CulvertOptions.Text("--storm", "Storm: I, IA, II, III (24 h), nested (from the table), or a file of a given storm (unit hydrograph only).", "II");

    /// <summary>Pond share.</summary>
    public Option<string?> PondShare { get; } = CulvertOptions.Text("--pond-share", "Share of the area in ponds and swamps away from the flow path, 0-1.", "0.01");

    /// <summary>Peak factor.</summary>
    public Option<string?> PeakFactor { get; } = CulvertOptions.Text("--peak-factor", "Peak factor of the unit hydrograph (default 484).", "484");

    /// <summary>Ratio of initial abstraction.</summary>
    public Option<string?> Ratio { get; } = CulvertOptions.Text("--abstraction-ratio", "Initial abstraction over retention: 0.2 (default) or 0.05.", "0.2");

    /// <summary>Equations.</summary>
    public Option<string?> Equations { get; } = CulvertOptions.Text("--equations", "Regression equations (TOML or CSV); default: those shipped.", "FILE");

    /// <summary>Region.</summary>
    public Option<string?> Region { get; } = CulvertOptions.Text("--region", "Region of the equations.", "NAME");

    /// <summary>Variables.</summary>
    public Option<string[]> Variables { get; } = new("--variable") { Description = "A variable of the equations with its unit; may be repeated.", HelpName = "\"A=60.9 mi2\"", Arity = ArgumentArity.ZeroOrMore };

    /// <summary>JSON.</summary>
    public Option<bool> Json { get; } = new("--json") { Description = "Print JSON instead of a calculation." };

    /// <summary>Units.</summary>
    public Option<string> UnitsOption { get; } = new("--units") { Description = "Units of what is printed: si or us.", DefaultValueFactory = _ => "si" };

    /// <summary>Adds all options to a command.</summary>
    public void AddTo(Command command, IReadOnlyList<string> methods)
    {
        Method.AcceptOnlyFromAmong([.. methods]);
        UnitsOption.AcceptOnlyFromAmong("si", "us");
        foreach (var option in (Option[])[Method, Area, Coefficient, Intensity, Table, Periods, Time, TimeMethod, Path, Slope, CurveNumber, Rainfall, Storm, PondShare, PeakFactor, Ratio, Equations, Region, Variables, Json, UnitsOption])
            command.Add(option);
    }
}
