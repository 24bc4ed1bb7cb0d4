using System.CommandLine;
using System.Globalization;
using GeoCulvert.Cli.Project;
using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Hydrology;

namespace GeoCulvert.Cli.Commands;

/// <summary>What <c>flow</c> is asked, read from its options.</summary>
internal sealed class FlowQuestion(ParseResult parse, FlowOptions options, CommandValues values)
{
    // The methods take a return period even where nothing depends on it.
    private const double AnyPeriodYr = 10;

    private static readonly string[] CustomaryAreas = ["ac", "acre", "acres", "mi2", "ft2"];

    /// <summary>Methods that take a watershed.</summary>
    public static readonly IReadOnlyList<string> Methods = ["rational", "nrcs-graphical", "nrcs-unit-hydrograph", "regression"];

    /// <summary>Computes all flows asked for; the return period is null where none was given.</summary>
    public IReadOnlyList<(double? ReturnPeriodYr, PeakFlow Flow)> Compute()
    {
        var name = parse.GetValue(options.Method)!;
        var rainfall = Rainfall();
        var periods = Periods();
        var catchment = Catchment(name);
        var method = Method(name);
        if (values.Problems.Count > 0 || method is null) throw new InputException(values.Problems);
        var given = parse.GetValue(options.Intensity) is null ? null : values.Quantity(options.Intensity, "intensity") * 3.6e6;
        var times = Time(catchment, rainfall, out var timeSteps, out var timeFindings);
        if (values.Problems.Count > 0) throw new InputException(values.Problems);
        if (periods.Count == 0 && method is RegressionMethod regression) periods = [.. regression.Set.Of(regression.Region).Select(e => e.ReturnPeriodYr)];
        var context = new PeakFlowContext(rainfall, times, given);
        return [.. (periods.Count == 0 ? [null] : periods.Select(p => (double?)p)).Select(p =>
        {
            var flow = method.Compute(catchment, p ?? AnyPeriodYr, context);
            return (p, flow with { Steps = [.. timeSteps, .. flow.Steps], Findings = [.. timeFindings, .. flow.Findings] });
        })];
    }

    private List<double> Periods()
    {
        var periods = new List<double>();
        foreach (var text in parse.GetValue(options.Periods) ?? [])
        {
            if (double.TryParse(text, NumberStyles.Float, CultureInfo.InvariantCulture, out var years) && years is > 1 and <= 10000) periods.Add(years);
            else values.Wrong("--return-period", $"'{text}'", "years, more than 1 and at most 10000, without a unit");
        }

        return periods;
    }

    private RainfallTable? Rainfall()
    {
        if (parse.GetValue(options.Table) is not { } file) return null;
        if (parse.GetValue(options.Periods) is not { Length: > 0 }) values.Wrong("--return-period", "nothing", "the return period to read from the table, for example --return-period 25");
        return values.Try(() => RainfallTable.Read(Path.GetFileName(file), TextOf("--rainfall-table", file)));
    }

    private Catchment Catchment(string method)
    {
        var area = method == "regression" ? values.Quantity(options.Area, "area") ?? 1 : values.Needed(options.Area, "area", "43.3 ac");
        if (area <= 0) values.Wrong("--area", $"'{parse.GetValue(options.Area)}'", "a positive area");
        var c = values.Number(options.Coefficient, 0, 1);
        var cn = values.Number(options.CurveNumber, 1, 100);
        if (method == "rational" && c is null) values.Wrong("--runoff-coefficient", "nothing", "the rational C, for example --runoff-coefficient 0.35");
        if (method.StartsWith("nrcs", StringComparison.Ordinal) && cn is null) values.Wrong("--curve-number", "nothing", "the curve number, for example --curve-number 75");
        var (length, slope) = (values.Quantity(options.Path, "length"), values.Quantity(options.Slope, "slope"));
        return new Catchment("", area)
        {
            RunoffCoefficient = c is { } v ? new RunoffCoefficient(v, "given") : null,
            CurveNumber = cn,
            LongestFlowPathM = length,
            FlowPathEndToEndSlopeMPerM = slope,
            FlowPathSlope1085MPerM = slope,
            MeanBasinSlopeMPerM = slope,
            Characteristics = Variables(),
        };
    }

    private Dictionary<string, Characteristic> Variables()
    {
        var found = new Dictionary<string, Characteristic>(StringComparer.Ordinal);
        foreach (var text in parse.GetValue(options.Variables) ?? [])
        {
            var at = text.IndexOf('=', StringComparison.Ordinal);
            var name = at > 0 ? text[..at].Trim() : "";
            var words = at > 0 ? text[(at + 1)..].Trim().Split(' ', 2, StringSplitOptions.RemoveEmptyEntries | StringSplitOptions.TrimEntries) : [];
            if (name.Length == 0 || words.Length == 0 || !double.TryParse(words[0], NumberStyles.Float, CultureInfo.InvariantCulture, out var value) || !double.IsFinite(value))
                values.Wrong("--variable", $"'{text}'", "NAME=VALUE UNIT, for example \"A=60.9 mi2\"");
            else if (words.Length > 1 && Units.Find(words[1]) is null)
                values.Wrong("--variable", $"the unit '{words[1]}' in '{text}'", "a unit such as mi2, km2, ft, m, in, mm, %, or none for a pure number");
            else found[name] = new Characteristic(value, words.Length > 1 ? words[1] : "");
        }

        return found;
    }

    private IPeakFlowMethod? Method(string name)
    {
        switch (name)
        {
            case "rational":
                if (parse.GetValue(options.Intensity) is null && parse.GetValue(options.Table) is null) values.Wrong("--intensity", "nothing", "an intensity, or --rainfall-table with --time-of-concentration");
                // Q = C i A with the constant 1 is how acres are multiplied by hand; 1/360 belongs to hectares.
                return new RationalMethod { CustomaryConstant = parse.GetValue(options.Area) is { } area && CustomaryAreas.Any(u => area.TrimEnd().EndsWith(u, StringComparison.OrdinalIgnoreCase)) };
            case "nrcs-graphical":
                NeedDepth();
                return Storm() is { } type ? new NrcsGraphicalMethod(type) { PondShare = values.Number(options.PondShare, 0, 1) ?? 0, InitialAbstractionRatio = Ratio(), GivenDepthMm = DepthMm() } : null;
            case "nrcs-unit-hydrograph":
                return AnyStorm() is { } storm
                    ? new NrcsUnitHydrographMethod(storm) { InitialAbstractionRatio = Ratio(), PeakFactor = values.Number(options.PeakFactor, 50, 1000) ?? DimensionlessUnitHydrograph.StandardPeakFactor }
                    : null;
            default:
                return values.Try(Regression);
        }
    }

    private RegressionMethod Regression()
    {
        var sets = parse.GetValue(options.Equations) is not { } file ? RegressionEquationCsv.Published
            : file.EndsWith(".toml", StringComparison.OrdinalIgnoreCase) ? RegressionToml.Read(Path.GetFileName(file), TextOf("--equations", file)) : RegressionEquationCsv.Read(Path.GetFileName(file), TextOf("--equations", file));
        var regions = sets.SelectMany(s => s.Regions.Select(r => (Set: s, Region: r))).ToList();
        var wanted = parse.GetValue(options.Region) ?? (regions.Count == 1 ? regions[0].Region : null);
        var match = regions.Where(r => string.Equals(r.Region, wanted, StringComparison.OrdinalIgnoreCase) || string.Equals($"{r.Set.Id}:{r.Region}", wanted, StringComparison.OrdinalIgnoreCase)).ToList();
        return match.Count == 1
            ? new RegressionMethod(match[0].Set, match[0].Region)
            : throw new InputException("--region", wanted is null ? "no region" : match.Count > 1 ? $"'{wanted}', which several sets have" : $"'{wanted}'", $"one of {string.Join(", ", regions.Select(r => $"{r.Set.Id}:{r.Region}"))}");
    }

    private double Ratio() => values.Number(options.Ratio, 0.05, 0.2) switch
    {
        null => CurveNumberRunoff.CustomaryRatio,
        { } r when CurveNumberRunoff.HasRatio(r) => r,
        { } r => Bad(r),
    };

    private double Bad(double ratio)
    {
        values.Wrong("--abstraction-ratio", FormattableString.Invariant($"'{ratio}'"), "0.2 or 0.05");
        return CurveNumberRunoff.CustomaryRatio;
    }

    private double? DepthMm() => values.Quantity(options.Rainfall, "length") * 1000;

    private void NeedDepth()
    {
        if (parse.GetValue(options.Rainfall) is null && parse.GetValue(options.Table) is null) values.Wrong("--rainfall", "nothing", "the 24-hour rainfall, for example --rainfall \"6.0 in\", or --rainfall-table");
    }

    private NrcsStormType? Storm()
    {
        if (Enum.TryParse<NrcsStormType>(parse.GetValue(options.Storm) ?? "", out var type) && Enum.IsDefined(type)) return type;
        values.Wrong("--storm", parse.GetValue(options.Storm) is { } s ? $"'{s}'" : "nothing", "I, IA, II or III");
        return null;
    }

    private IDesignStorm? AnyStorm()
    {
        var word = parse.GetValue(options.Storm);
        if (word == "nested")
        {
            if (parse.GetValue(options.Table) is null) values.Wrong("--storm", "'nested' without a rainfall table", "--rainfall-table FILE, from which the blocks are taken");
            return new NestedStorm();
        }

        if (word is not null && File.Exists(word)) return values.Try(() => GivenStorm.Read(Path.GetFileName(word), TextOf("--storm", word)).WithDepthMm(DepthMm()));
        NeedDepth();
        return Storm() is { } type ? new NrcsStorm(type) { GivenDepthMm = DepthMm() } : null;
    }

    private double? Time(Catchment catchment, RainfallTable? rainfall, out IReadOnlyList<Step> steps, out IReadOnlyList<Finding> findings)
    {
        (steps, findings) = ([], []);
        var given = values.Quantity(options.Time, "time") / 60;
        if (given <= 0) values.Wrong("--time-of-concentration", $"'{parse.GetValue(options.Time)}'", "a positive time");
        if (parse.GetValue(options.TimeMethod) is not { } word) return given;
        if (given is not null) values.Wrong("--time-method", $"'{word}' beside --time-of-concentration", "one of the two");
        ITimeOfConcentration? method = word switch
        {
            "kirpich" => new Kirpich(),
            "faa" => new FaaTime(),
            "nrcs-lag" => new NrcsLag(),
            "bransby-williams" => new BransbyWilliams(),
            _ => null,
        };
        if (method is null)
        {
            values.Wrong("--time-method", $"'{word}'", "kirpich, faa, nrcs-lag or bransby-williams");
            return null;
        }

        var time = method.Compute(catchment, new TimeOfConcentrationContext(rainfall));
        if (time.TimeMin is null) values.Wrong("--time-method", time.Findings.Count > 0 ? time.Findings[0].Text : word, "--flow-path and --slope, and what the method needs besides");
        (steps, findings) = (time.Steps, time.Findings);
        return time.TimeMin;
    }

    private static string TextOf(string option, string file)
    {
        try
        {
            return File.ReadAllText(file);
        }
        catch (Exception e) when (e is IOException or UnauthorizedAccessException)
        {
            throw new InputException(option, $"'{file}', which cannot be read ({e.Message})", "a file that is there");
        }
    }
}
