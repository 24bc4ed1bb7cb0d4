namespace GeoCulvert.Cli.Project;

/// <summary>Every key a project file may hold, in the order of the template.</summary>
internal static class ProjectKeys
{
    /// <summary>Tables and what they are about; <c>road</c> may repeat.</summary>
    public static readonly IReadOnlyList<(string Name, string About)> Tables =
    [
        ("study", "the study and how results are written"),
        ("terrain", "the terrain model"),
        ("road", "a road alignment; repeat the table for more roads"),
        ("crossings", "where water crosses the road: found along the roads, or given as points"),
        ("inventory", "existing culverts, to be rated instead of sized; each row becomes a crossing"),
        ("cover", "land cover and soil groups for the runoff coefficient; other rasters to average"),
        ("rainfall", "rainfall intensity by duration and return period"),
        ("flow", "design flow"),
        ("culvert", "what may be built"),
        ("criteria", "what a culvert must meet"),
        ("tailwater", "water level at the outlet"),
    ];

    private static readonly string[] FlowMethods = ["rational", "modified-rational", "nrcs-graphical", "nrcs-unit-hydrograph", "regression", "given"];
    private static readonly string[] TimeMethods = ["kirpich", "nrcs-velocity", "kerby", "kerby-kirpich", "faa", "nrcs-lag", "bransby-williams", "papadakis-kazan", "kinematic-wave"];

    /// <summary>All keys.</summary>
    public static readonly IReadOnlyList<ProjectKey> All =
    [
        new("study", "name", KeyKind.Text, null, "name printed on every sheet; default: the name of the project file"),
        new("study", "units", KeyKind.Choice, "\"si\"", "system of units of the results, not of the inputs") { Words = ["si", "us"] },
        new("study", "outlines", KeyKind.Choice, "\"cells\"", "outlines of watersheds along the edges of cells, or smoothed for drawing; areas and perimeters are those of the cells either way") { Words = ["cells", "smooth"] },
        new("study", "folder", KeyKind.Path, "\"results\"", "where results go"),

        new("terrain", "dem", KeyKind.Paths, null, "terrain model: a file, a list of files, a folder of tiles or a VRT"),
        new("terrain", "vertical_unit", KeyKind.Choice, null, "unit of the elevations; needed only when the file does not say") { Words = ["m", "ft", "us-ft"] },
        new("terrain", "nodata", KeyKind.Number, null, "value that means 'no data'; needed only when the file does not say"),
        new("terrain", "crs", KeyKind.Text, null, "coordinate system of the terrain model; needed only when the file does not say"),
        new("terrain", "working_crs", KeyKind.Text, null, "projected coordinate system to work in; default: the terrain model's own, or the UTM zone of its middle"),
        Length("terrain", "cell_size", null, "cell size after a geographic terrain model is projected; default: its own spacing", 0.01),
        new("terrain", "stream_area", KeyKind.Quantity, "\"10 ha\"", "drainage area at which a stream begins") { Dimension = "area", Least = 1 },

        new("terrain", "streams", KeyKind.Path, null, "streams from a map; the terrain model is cut so that water follows them"),
        new("terrain", "streams_layer", KeyKind.Text, null, "layer in the file; default: its first"),
        new("terrain", "streams_where", KeyKind.Text, null, "filter on the fields"),
        new("terrain", "streams_name", KeyKind.Text, null, "field that holds their names"),
        new("terrain", "streams_drawn", KeyKind.Choice, "\"any\"", "whether every line is known to be drawn downstream; any: the terrain decides line by line") { Words = ["any", "downstream"] },
        new("terrain", "depressions", KeyKind.Choice, "\"fill\"", "what is done with depressions: filled, cut open where the limits allow, or whichever moves less earth") { Words = ["fill", "breach", "mix"] },
        Length("terrain", "breach_length", "\"50 m\"", "longest cut of a depression (own rule)", 0),
        Length("terrain", "breach_depth", "\"3 m\"", "deepest cut of a depression (own rule)", 0),
        new("terrain", "closed_basins", KeyKind.Path, null, "points in closed basins that are kept as sinks: their land drains to no crossing"),
        new("terrain", "closed_basins_name", KeyKind.Text, null, "field that holds their names"),
        new("terrain", "keep_basin_area", KeyKind.Quantity, null, "area from which every depression is kept as a closed basin; default: only those named by points") { Dimension = "area", Least = 1 },
        Length("terrain", "keep_basin_depth", "\"1 m\"", "depth from which it is kept, beside its area (own rule)", 0),
        new("terrain", "openings", KeyKind.Choice, "\"search\"", "where embankments that dam the terrain model are opened: by search along the roads, at known culverts and given crossings only, or nowhere") { Words = ["search", "known", "none"] },
        new("terrain", "culverts", KeyKind.Path, null, "lines of culverts known to be there; embankments are opened along them"),
        new("terrain", "culverts_layer", KeyKind.Text, null, "layer in the file; default: its first"),
        new("terrain", "culverts_where", KeyKind.Text, null, "filter on the fields"),
        new("terrain", "culverts_id", KeyKind.Text, null, "field that holds their names; default: numbered in the order of the file"),
        Length("terrain", "opening_length", "\"80 m\"", "longest opening of an embankment (own rule)", 1),
        Length("terrain", "opening_depth", "\"12 m\"", "deepest opening below the terrain model (own rule)", 0.1),
        Length("terrain", "opening_pond", "\"0.3 m\"", "smallest depth of water behind an embankment that counts as dammed (own rule)", 0.01),

        new("road", "file", KeyKind.Path, null, "alignment, in any vector format"),
        new("road", "layer", KeyKind.Text, null, "layer in the file; default: its first"),
        new("road", "where", KeyKind.Text, null, "filter on the fields, as an SQL WHERE clause"),
        new("road", "name", KeyKind.Text, null, "road name; default: the field of name_field, else the file's name"),
        new("road", "name_field", KeyKind.Text, null, "field that holds the road name, when one file holds several roads"),
        new("road", "class", KeyKind.Choice, "\"local\"", "picks design and check return periods and the smallest size (common practice; each can be set)") { Words = ["arterial", "collector", "local", "track"] },
        Length("road", "width", "\"8 m\"", "shoulder to shoulder", 0.5),
        new("road", "side_slope", KeyKind.Number, "2.0", "embankment side slope, horizontal per one vertical") { Least = 0, Most = 20 },
        new("road", "surface", KeyKind.Choice, "\"paved\"", "road surface, for overtopping") { Words = ["paved", "gravel"] },
        new("road", "profile", KeyKind.Path, null, "table station,elevation with units in its heading; default: the line's own z, else the terrain"),
        new("road", "design_return_period", KeyKind.Number, null, "years; default: [flow] design_return_period, else by class") { Least = 1.0001, Most = 10000 },
        new("road", "check_return_period", KeyKind.Number, null, "years; default: [flow] check_return_period, else by class") { Least = 1.0001, Most = 10000 },

        new("crossings", "points", KeyKind.Path, null, "given crossings; without it crossings are found along the roads"),
        new("crossings", "layer", KeyKind.Text, null, "layer in the file; default: its first"),
        new("crossings", "where", KeyKind.Text, null, "filter on the fields"),
        new("crossings", "id", KeyKind.Text, null, "field that holds the crossing id; default: numbered in the order of the file"),
        Length("crossings", "snap", null, "how far a given point may be moved to its stream; default: the larger of 60 m and five cells", 0),
        new("crossings", "cross_drain_area", KeyKind.Quantity, "\"1 ha\"", "drainage area from which water let through an embankment, or met at a low point of the road, is a crossing though it is no stream yet (own rule)") { Dimension = "area", Least = 1 },
        Length("crossings", "together", "\"30 m\"", "roads whose shoulders follow each other within this distance along the stream have one culvert under all (own rule)", 0),
        Length("crossings", "relief_spacing", null, "longest stretch of road without a way under; where it is longer a ditch relief is placed; default: none", 20),
        new("crossings", "overrides", KeyKind.Path, null, "table keyed by crossing_id that sets values of single crossings"),
        new("crossings", "accept_edge_contact", KeyKind.Number, "0.0", "largest share of a watershed's boundary on the edge of the terrain for which a size is still issued") { Least = 0, Most = 1 },

        new("inventory", "file", KeyKind.Path, null, "points or lines of existing culverts; embankments are opened at them"),
        new("inventory", "layer", KeyKind.Text, null, "layer in the file; default: its first"),
        new("inventory", "where", KeyKind.Text, null, "filter on the fields"),
        new("inventory", "id", KeyKind.Text, null, "field that holds the id; default: numbered in the order of the file"),
        new("inventory", "shape", KeyKind.Text, null, "field that holds the shape"),
        new("inventory", "size", KeyKind.Text, null, "field that holds the diameter, or both sizes of a box (\"8 x 6 ft\")"),
        new("inventory", "span", KeyKind.Text, null, "field that holds the span"),
        new("inventory", "rise", KeyKind.Text, null, "field that holds the rise"),
        new("inventory", "barrels", KeyKind.Text, null, "field that holds the number of barrels"),
        new("inventory", "material", KeyKind.Text, null, "field that holds the material"),
        new("inventory", "inlet", KeyKind.Text, null, "field that holds the inlet type, hds5-CHART-SCALE"),
        new("inventory", "length", KeyKind.Text, null, "field that holds the length; default: measured"),
        new("inventory", "inlet_elevation", KeyKind.Text, null, "field that holds the inlet invert; default: measured"),
        new("inventory", "outlet_elevation", KeyKind.Text, null, "field that holds the outlet invert; default: measured"),
        new("inventory", "size_unit", KeyKind.Choice, null, "unit of sizes written without one") { Words = ["mm", "cm", "m", "in", "ft"] },
        new("inventory", "length_unit", KeyKind.Choice, null, "unit of lengths written without one") { Words = ["m", "ft"] },
        new("inventory", "elevation_unit", KeyKind.Choice, null, "unit of elevations written without one") { Words = ["m", "ft"] },

        new("cover", "land_cover", KeyKind.Path, null, "raster of land-cover codes"),
        new("cover", "soil_group", KeyKind.Path, null, "raster of hydrologic soil groups: 1 = A, 2 = B, 3 = C, 4 = D, 5 = A/D, 6 = B/D, 7 = C/D"),
        new("cover", "lookup", KeyKind.Path, null, "your own table of runoff coefficients by land cover and soil group; default: the table shipped"),
        new("cover", "means", KeyKind.Paths, null, "rasters whose area-weighted mean over every watershed is wanted, for example annual rainfall"),

        new("cover", "curve_numbers", KeyKind.Path, null, "your own table of curve numbers by land cover and soil group; default: the table shipped"),
        new("cover", "dual_soil_group", KeyKind.Choice, "\"undrained\"", "which letter of a dual soil group (A/D, B/D, C/D) counts for curve numbers") { Words = ["undrained", "drained"] },

        new("rainfall", "table", KeyKind.Path, null, "NOAA Atlas 14 file or a plain table"),
        new("rainfall", "equation", KeyKind.Path, null, "coefficients of i = a / (t + b)^c for each return period, instead of a table"),
        new("rainfall", "climate_factors", KeyKind.Path, null, "table return_period_yr,factor; each factor holds from its return period up to the next; default: none"),
        new("rainfall", "climate_on", KeyKind.Choice, "\"intensity\"", "what climate factors multiply") { Words = ["intensity", "flow"] },
        new("rainfall", "quantity", KeyKind.Choice, null, "what the table holds; needed only when it does not say") { Words = ["depth", "intensity"] },
        new("rainfall", "unit", KeyKind.Choice, null, "unit of the table; needed only when it does not say") { Words = ["mm", "in", "mm/h", "in/h"] },

        new("flow", "methods", KeyKind.Choices, "[\"rational\"]", "methods to compute") { Words = FlowMethods },
        new("flow", "choose", KeyKind.Choice, null, "method that sets the design value; default: the first of methods") { Words = FlowMethods },
        new("flow", "return_periods", KeyKind.Numbers, "[2, 10, 25, 50, 100]", "years") { Least = 1.0001, Most = 10000 },
        new("flow", "design_return_period", KeyKind.Number, null, "years; default: by road class") { Least = 1.0001, Most = 10000 },
        new("flow", "check_return_period", KeyKind.Number, null, "years; default: by road class") { Least = 1.0001, Most = 10000 },
        new("flow", "runoff_coefficient", KeyKind.Number, null, "rational C where no land cover is given") { Least = 0.01, Most = 1 },
        new("flow", "frequency_factors", KeyKind.Choice, "\"none\"", "Cf of the rational method: none, or 1.1 from 25, 1.2 from 50 and 1.25 from 100 years on (common practice)") { Words = ["none", "common"] },
        new("flow", "curve_number", KeyKind.Number, null, "runoff curve number where no land cover is given") { Least = 1, Most = 100 },
        new("flow", "abstraction_ratio", KeyKind.Number, "0.2", "initial abstraction over retention of the curve-number methods: 0.2 or 0.05") { Least = 0.05, Most = 0.2 },
        new("flow", "storm", KeyKind.Text, null, "storm of the curve-number methods: I, IA, II or III (24 h; the graphical method needs one of these), nested (blocks from the rainfall table), or a file of a given storm; default: nested"),
        new("flow", "peak_factor", KeyKind.Number, "484", "peak factor of the unit hydrograph (NEH-630 ch. 16)") { Least = 50, Most = 1000 },
        new("flow", "pond_share", KeyKind.Number, "0", "share of the area in ponds and swamps away from the flow path, for nrcs-graphical") { Least = 0, Most = 1 },
        new("flow", "time_of_concentration", KeyKind.Choices, "[\"kirpich\", \"nrcs-velocity\"]", "methods for the time of concentration") { Words = TimeMethods },
        new("flow", "time_of_concentration_choose", KeyKind.Choice, null, "which time is used; default: the first method that can be computed") { Words = [.. TimeMethods, "median", "smallest"] },
        new("flow", "kerby_retardance", KeyKind.Number, null, "Kerby's retardance N of the overland flow, for kerby and kerby-kirpich") { Least = 0.001, Most = 2 },
        new("flow", "smallest_time_of_concentration", KeyKind.Quantity, "\"5 min\"", "floor of the time of concentration (common practice)") { Dimension = "time", Least = 60 },
        new("flow", "regression", KeyKind.Path, null, "regression equations (TOML or CSV)"),
        new("flow", "region", KeyKind.Text, null, "region of the regression equations"),
        new("flow", "given", KeyKind.Path, null, "table crossing_id (or * for all), return_period_yr, flow_m3_s or flow_cfs"),

        new("culvert", "shapes", KeyKind.Choices, "[\"circle\", \"box\"]", "shapes allowed") { Words = ["circle", "box"] },
        new("culvert", "inlets", KeyKind.Texts, "[\"hds5-1-1\", \"hds5-8-1\"]", "inlet types allowed, by chart and scale of HDS-5"),
        new("culvert", "largest_number_of_barrels", KeyKind.Integer, "4", "barrels side by side (common practice)") { Least = 1, Most = 20 },
        new("culvert", "roughness", KeyKind.Number, "0.012", "Manning n of the barrel; concrete 0.012 (HDS-5 2nd ed. table 4)") { Least = 0.005, Most = 0.1 },
        new("culvert", "entrance_loss", KeyKind.Number, null, "entrance loss coefficient; default: the inlet's own") { Least = 0, Most = 2 },
        new("culvert", "sizes_circle", KeyKind.Path, null, "your own table of pipe sizes; default: the table shipped"),
        new("culvert", "sizes_box", KeyKind.Path, null, "your own table of box sizes; default: the table shipped"),

        new("culvert", "unit_prices", KeyKind.Path, null, "table shape,size,price_per_m (or price_per_ft),price_per_end: the least cost is sought; default: the least barrel area"),
        new("culvert", "example_prices", KeyKind.Choice, "\"no\"", "use the shipped prices, which are invented and only show how a table looks") { Words = ["no", "yes"] },

        new("criteria", "hw_over_d", KeyKind.Number, "1.5", "largest headwater depth over rise at the design flood (common practice)") { Least = 0.3, Most = 10 },
        Length("criteria", "freeboard", "\"0.3 m\"", "from the design headwater to the lowest road level (common practice)", 0),
        Length("criteria", "largest_headwater_depth", null, "above the inlet invert, at the design flood", 0.01),
        Length("criteria", "highest_headwater_elevation", null, "at the design flood", -500),
        Length("criteria", "smallest_rise", null, "smallest diameter or rise; default: by road class", 0.05),
        Length("criteria", "smallest_cover", "\"0.3 m\"", "from the crown to the road level (common practice)", 0),
        new("criteria", "largest_outlet_velocity", KeyKind.Quantity, null, "at the design flood; default: no limit, high velocity is a finding") { Dimension = "velocity", Least = 0.1 },
        Length("criteria", "largest_overtopping_depth", null, "over the lowest road point at the check flood; default: no limit, overtopping is a finding", 0),

        new("tailwater", "method", KeyKind.Choice, "\"channel-from-dem\"", "normal depth in a cross-section of the terrain below the outlet, or in a trapezoid; a fixed elevation; or a rating table") { Words = ["channel-from-dem", "normal-depth", "fixed", "rating"] },
        Length("tailwater", "bottom_width", null, "channel bottom width; default: from the drainage area, and a finding says so", 0),
        new("tailwater", "side_slope", KeyKind.Number, "2.0", "channel side slope, horizontal per one vertical") { Least = 0, Most = 20 },
        new("tailwater", "roughness", KeyKind.Number, "0.04", "Manning n of the channel; natural streams on plains 0.03-0.05 (Chow 1959, table 5-6)") { Least = 0.01, Most = 0.3 },
        new("tailwater", "slope", KeyKind.Quantity, null, "bed slope; default: from the terrain below the outlet") { Dimension = "slope", Least = 1e-6, Most = 1 },
        Length("tailwater", "elevation", null, "for method \"fixed\"", -500),
        new("tailwater", "rating", KeyKind.Path, null, "for method \"rating\": CSV with flow_m3_s or flow_cfs and elevation_m, elevation_ft, or depth_m, depth_ft above the outlet invert"),
        new("tailwater", "overbank_roughness", KeyKind.Number, "0.08", "Manning n beside the channel in a cross-section; brush on flood plains 0.05-0.1 (Chow 1959, table 5-6)") { Least = 0.01, Most = 0.5 },
        Length("tailwater", "section_distance", "\"20 m\"", "distance of the cross-section below the outlet; at least two cells", 1),
        new("tailwater", "low_depth_factor", KeyKind.Number, null, "depth of a low tailwater over the expected one; with high_depth_factor both headwaters are reported") { Least = 0, Most = 1 },
        new("tailwater", "high_depth_factor", KeyKind.Number, null, "depth of a high tailwater over the expected one") { Least = 1, Most = 10 },
    ];

    /// <summary>Keys that are planned and not computed yet: saying so beats taking them for a slip of the pen.</summary>
    public static readonly IReadOnlyDictionary<string, string> NotYet = new Dictionary<string, string>(StringComparer.Ordinal)
    {
        ["[rainfall] rasters"] = "rainfall rasters are not read yet; give a table",
    };

    /// <summary>The key with a table and a name, or null.</summary>
    public static ProjectKey? Find(string table, string name) => All.FirstOrDefault(k => k.Table == table && k.Name == name);

    private static ProjectKey Length(string table, string name, string? @default, string description, double least) =>
        new(table, name, KeyKind.Quantity, @default, description) { Dimension = "length", Least = least };
}
