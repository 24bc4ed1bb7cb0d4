using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Crossings;
using GeoCulvert.Design.Hydraulics;
using GeoCulvert.Design.Hydrology;
using GeoCulvert.Design.Sizing;
using GeoCulvert.Design.Study;
using GeoCulvert.Design.Terrain;
using GeoCulvert.Layers;

namespace GeoCulvert.Cli.Project;

/// <summary>Rainfall, flow methods, catalogue and criteria of a project.</summary>
internal sealed partial class StudyLoader
{
    private FlowSettings? Flow()
    {
        var flow = _project["flow"];
        var names = flow.Texts("methods");
        var rainfall = Rainfall(names);
        var climate = Climate();
        var methods = names.Distinct(StringComparer.Ordinal).Select(n => Try(() => Method(n))).OfType<IPeakFlowMethod>().Select(m => climate?.On(m) ?? m).ToList();
        var chosen = flow.Text("choose") ?? names[0];
        if (!names.Contains(chosen)) _problems.Add(new InputProblem(_project.Place(flow, "choose"), $"\"{chosen}\"", $"one of the methods asked for: {string.Join(", ", names)}"));
        var needsTime = names.Any(NeedsRain);
        var times = needsTime ? flow.Texts("time_of_concentration").Distinct(StringComparer.Ordinal).Select(t => Try(() => TimeMethod(t))).OfType<ITimeOfConcentration>().ToArray() : [];
        var rule = TimeRule(flow, times);
        return methods.Count < names.Distinct(StringComparer.Ordinal).Count() || (rainfall is null && needsTime) || rule is null
            ? null
            : new FlowSettings(methods, chosen, flow.Numbers("return_periods"), times, rule, rainfall);
    }

    private TimeOfConcentrationRule? TimeRule(ProjectTable flow, ITimeOfConcentration[] times)
    {
        var least = flow.Needed("smallest_time_of_concentration") / 60;
        var choice = flow.Text("time_of_concentration_choose") ?? (times.Length > 0 ? times[0].Name : "smallest");
        if (choice == "median") return new TimeOfConcentrationRule(TimeOfConcentrationChoice.Median, null, least);
        if (choice == "smallest") return new TimeOfConcentrationRule(TimeOfConcentrationChoice.Smallest, null, least);
        if (times.Length == 0 || times.Any(t => t.Name == choice)) return new TimeOfConcentrationRule(TimeOfConcentrationChoice.Named, choice, least);
        _problems.Add(new InputProblem(_project.Place(flow, "time_of_concentration_choose"), $"\"{choice}\"", $"median, smallest, or one of those computed: {string.Join(", ", times.Select(t => t.Name))}"));
        return null;
    }

    private static bool NeedsRain(string method) => method is "rational" or "modified-rational" or "nrcs-graphical" or "nrcs-unit-hydrograph";

    private IPeakFlowMethod Method(string name)
    {
        var flow = _project["flow"];
        var rational = new RationalMethod
        {
            CustomaryConstant = _project["study"].Text("units") == "us",
            FrequencyFactors = flow.Text("frequency_factors") == "common" ? RationalMethod.CommonFrequencyFactors : [],
        };
        return name switch
        {
            "rational" => rational,
            "modified-rational" => new ModifiedRational { Rational = rational },
            "nrcs-graphical" => Enum.TryParse<NrcsStormType>(flow.Text("storm") ?? "", out var type)
                ? new NrcsGraphicalMethod(type) { PondShare = flow.Needed("pond_share"), InitialAbstractionRatio = AbstractionRatio() }
                : throw new InputException($"{_shownName}, [flow] storm", flow.Text("storm") is { } s ? $"\"{s}\"" : "no storm", "storm = \"I\", \"IA\", \"II\" or \"III\", since methods names \"nrcs-graphical\""),
            "nrcs-unit-hydrograph" => new NrcsUnitHydrographMethod(Storm()) { PeakFactor = flow.Needed("peak_factor"), InitialAbstractionRatio = AbstractionRatio() },
            "regression" => Regression(),
            _ => Given(),
        };
    }

    private double AbstractionRatio()
    {
        var ratio = _project["flow"].Needed("abstraction_ratio");
        return CurveNumberRunoff.HasRatio(ratio) ? ratio
            : throw new InputException(_project.Place(_project["flow"], "abstraction_ratio"), FormattableString.Invariant($"{ratio}"), "0.2 or 0.05");
    }

    private IDesignStorm Storm()
    {
        var flow = _project["flow"];
        var word = flow.Text("storm") ?? "nested";
        if (word == "nested") return new NestedStorm();
        if (Enum.TryParse<NrcsStormType>(word, out var type) && Enum.IsDefined(type)) return new NrcsStorm(type);
        var path = Path.Combine(_project.Folder, word);
        if (!File.Exists(path)) throw new InputException(_project.Place(flow, "storm"), $"\"{word}\"", "I, IA, II, III, nested, or a file of a given storm that is there");
        _files.Add(InputFacts.Of(word, path, "storm", ""));
        return GivenStorm.Read(word, File.ReadAllText(path));
    }

    private ITimeOfConcentration TimeMethod(string name)
    {
        var retardance = _project["flow"].Number("kerby_retardance");
        if (retardance is null && (name is "kerby" or "kerby-kirpich"))
            throw new InputException($"{_shownName}, [flow] kerby_retardance", "no retardance", $"kerby_retardance = 0.4 or the like, since time_of_concentration names \"{name}\"");
        return name switch
        {
            "kirpich" => new Kirpich(),
            "kerby" => new Kerby(retardance),
            "kerby-kirpich" => new KerbyKirpich(retardance),
            "faa" => new FaaTime(),
            "nrcs-lag" => new NrcsLag(),
            "bransby-williams" => new BransbyWilliams(),
            "papadakis-kazan" => new PapadakisKazan(),
            "kinematic-wave" => new KinematicWave { Path = Velocity() },
            _ => Velocity(),
        };
    }

    private NrcsVelocityMethod Velocity() => new() { ChannelAreaM2 = _project["terrain"].Needed("stream_area") };

    private ClimateFactors? Climate() => !_project["rainfall"].Has("climate_factors") ? null : Try(() =>
    {
        var t = TextFile("rainfall", "climate_factors", "climate factors")!.Value;
        var table = PublishedTable.Parse(t.Name, t.Text, "return_period_yr", "factor");
        var factors = table.Rows.Select(r =>
        {
            var (period, factor) = (r.Number("return_period_yr"), r.Number("factor"));
            return period >= 1 && factor is > 0 and < 10 ? new ClimateFactor(period, factor)
                : throw new InputException($"{t.Name} line {r.Line}", FormattableString.Invariant($"return period {period}, factor {factor}"), "a return period of at least 1 year and a factor above 0");
        }).ToList();
        return new ClimateFactors(_project["rainfall"].Text("climate_on") == "flow" ? ClimateTarget.Flow : ClimateTarget.Intensity, factors);
    });

    private IRainfall? Rainfall(IReadOnlyList<string> methods)
    {
        var table = _project["rainfall"];
        if (table.Has("equation") && table.Has("table"))
            _problems.Add(new InputProblem(_project.Place(table, "equation"), "an equation beside a table", "one of the two"));
        if (table.Has("equation")) return Try(() =>
        {
            var e = TextFile("rainfall", "equation", "rainfall equation")!.Value;
            return RainfallEquation.Read(e.Name, e.Text);
        });
        if (!table.Has("table"))
        {
            if (methods.FirstOrDefault(NeedsRain) is { } needing)
                _problems.Add(new InputProblem($"{_shownName}, [rainfall] table", "no rainfall", $"a NOAA Atlas 14 file or a plain table, for example table = \"rain.csv\"; or an equation; methods names \"{needing}\""));
            return null;
        }

        var stated = (table.Text("quantity"), table.Text("unit")) switch
        {
            ("depth", "mm") => RainfallMeasure.DepthMm,
            ("depth", "in") => RainfallMeasure.DepthIn,
            ("intensity", "mm/h") => RainfallMeasure.IntensityMmPerH,
            ("intensity", "in/h") => RainfallMeasure.IntensityInPerH,
            _ => (RainfallMeasure?)null,
        };
        if (stated is null && (table.Has("quantity") || table.Has("unit")))
            _problems.Add(new InputProblem(_project.Place(table, table.Has("unit") ? "unit" : "quantity"), "a quantity and a unit that do not go together", "depth with mm or in, intensity with mm/h or in/h"));
        return Try(() =>
        {
            var (name, text) = TextFile("rainfall", "table", "rainfall")!.Value;
            var rain = RainfallTable.Read(name, text, stated);
            if (rain.SeriesFinding(_project["flow"].Numbers("return_periods").Min()) is { } note) _findings.Add(note);
            return rain;
        });
    }

    private GivenFlows Given() => TextFile("flow", "given", "given flows") is { } t
        ? GivenFlows.Read(t.Name, t.Text)
        : throw new InputException($"{_shownName}, [flow] given", "no table of given flows", "given = \"flows.csv\", since methods names \"given\"");

    private RegressionMethod Regression()
    {
        var flow = _project["flow"];
        if (TextFile("flow", "regression", "regression equations") is not { } t)
            throw new InputException($"{_shownName}, [flow] regression", "no equations", "regression = \"equations.csv\", since methods names \"regression\"");
        var sets = t.Name.EndsWith(".toml", StringComparison.OrdinalIgnoreCase) ? RegressionToml.Read(t.Name, t.Text) : RegressionEquationCsv.Read(t.Name, t.Text);
        var regions = sets.SelectMany(s => s.Regions.Select(r => (Set: s, Region: r))).ToList();
        var wanted = flow.Text("region") ?? (regions.Count == 1 ? regions[0].Region : null);
        var match = regions.Where(r => string.Equals(r.Region, wanted, StringComparison.OrdinalIgnoreCase)).ToList();
        return match.Count == 1
            ? new RegressionMethod(match[0].Set, match[0].Region)
            : throw new InputException(_project.Place(flow, "region"), wanted is null ? "no region" : $"'{wanted}'", $"one of the regions {string.Join(", ", regions.Select(r => r.Region))}");
    }

    private CulvertCatalogue? Catalogue()
    {
        var culvert = _project["culvert"];
        var shapes = culvert.Texts("shapes");
        var inlets = culvert.Texts("inlets").Select(i => Try(() => InletCatalogue.Find(i, _project.Place(culvert, "inlets")))).OfType<InletType>().ToArray();
        foreach (var shape in shapes.Where(s => inlets.Length > 0 && inlets.All(i => i.Shape != s)))
            _problems.Add(new InputProblem(_project.Place(culvert, "inlets"), $"no inlet for the shape {shape}", "an inlet for each shape, or fewer shapes"));
        return Try(() => CulvertCatalogue.Build(
            inlets, shapes, culvert.Needed("roughness"), culvert.Number("entrance_loss"), (int)culvert.Needed("largest_number_of_barrels"), Sizes("sizes_circle"), Sizes("sizes_box")));
    }

    private UnitPrices? Prices()
    {
        if (_project["culvert"].Has("unit_prices"))
            return Try(() =>
            {
                var t = TextFile("culvert", "unit_prices", "unit prices")!.Value;
                return UnitPrices.Read(PublishedTable.Parse(t.Name, t.Text));
            });
        if (_project["culvert"].Text("example_prices") != "yes") return null;
        _findings.Add(StudyFindings.PricesInvented.With(UnitPrices.Example.Name));
        return UnitPrices.Example;
    }

    private PublishedTable? Sizes(string key) => TextFile("culvert", key, "sizes") is { } t ? PublishedTable.Parse(t.Name, t.Text) : null;

    private void NeedCoefficient(bool hasCover)
    {
        if (!hasCover && !_project["flow"].Has("curve_number") && _project["flow"].Texts("methods").FirstOrDefault(m => m.StartsWith("nrcs-", StringComparison.Ordinal)) is { } nrcs)
            _problems.Add(new InputProblem($"{_shownName}, [flow] curve_number", "no curve number", $"curve_number = 75 or the like, or [cover] land_cover, since methods names \"{nrcs}\""));
        var flow = _project["flow"];
        if (hasCover || flow.Has("runoff_coefficient") || !flow.Texts("methods").Any(m => m is "rational" or "modified-rational")) return;
        _problems.Add(new InputProblem($"{_shownName}, [flow] runoff_coefficient", "no runoff coefficient", "runoff_coefficient = 0.35 or the like, or [cover] land_cover, since methods names \"rational\""));
    }

    private static ConditioningSettings ConditioningOf(ProjectTable terrain) => new()
    {
        Breaching = terrain.Text("depressions") switch
        {
            "breach" => new BreachSettings(DepressionMethod.Breach, terrain.Needed("breach_length"), terrain.Needed("breach_depth")),
            "mix" => new BreachSettings(DepressionMethod.Mix, terrain.Needed("breach_length"), terrain.Needed("breach_depth")),
            _ => null,
        },
        Streams = new StreamSettings { DrawnDownstream = terrain.Text("streams_drawn") == "downstream" },
        KeepBasins = terrain.Number("keep_basin_area") is { } area ? new BasinLimits(area, terrain.Needed("keep_basin_depth")) : null,
    };

    private StudySettings Settings(FlowSettings flow, CulvertCatalogue catalogue)
    {
        var criteria = _project["criteria"];
        return new StudySettings
        {
            SmoothOutlines = _project["study"].Text("outlines") == "smooth",
            Units = _project["study"].Text("units") == "us" ? UnitSystem.Us : UnitSystem.Si,
            StreamAreaM2 = _project["terrain"].Needed("stream_area"),
            CrossDrainAreaM2 = _project["crossings"].Needed("cross_drain_area"),
            RoadsTogetherM = _project["crossings"].Needed("together"),
            Conditioning = ConditioningOf(_project["terrain"]),
            Openings = new OpeningSettings
            {
                Scope = _project["terrain"].Text("openings") switch { "known" => OpeningScope.Known, "none" => OpeningScope.None, _ => OpeningScope.Search },
                ReliefSpacingM = _project["crossings"].Number("relief_spacing"),
                LongestM = _project["terrain"].Needed("opening_length"),
                DeepestM = _project["terrain"].Needed("opening_depth"),
                SmallestPondM = _project["terrain"].Needed("opening_pond"),
            },
            SnapM = _project["crossings"].Number("snap"),
            AcceptedEdgeContactShare = _project["crossings"].Needed("accept_edge_contact"),
            Flow = flow,
            RunoffCoefficient = _project["flow"].Number("runoff_coefficient"),
            CurveNumber = _project["flow"].Number("curve_number"),
            DesignReturnPeriodYr = _project["flow"].Number("design_return_period"),
            CheckReturnPeriodYr = _project["flow"].Number("check_return_period"),
            Catalogue = catalogue,
            Prices = _prices,
            SmallestRiseM = criteria.Number("smallest_rise"),
            Criteria = new SizingCriteria
            {
                LargestHeadwaterRatio = criteria.Needed("hw_over_d"),
                FreeboardM = criteria.Needed("freeboard"),
                LargestHeadwaterDepthM = criteria.Number("largest_headwater_depth"),
                HighestHeadwaterElevationM = criteria.Number("highest_headwater_elevation"),
                SmallestCoverM = criteria.Needed("smallest_cover"),
                LargestOutletVelocityMPerS = criteria.Number("largest_outlet_velocity"),
                LargestOvertoppingDepthM = criteria.Number("largest_overtopping_depth"),
            },
            Tailwater = _tailwater!,
        };
    }
}
