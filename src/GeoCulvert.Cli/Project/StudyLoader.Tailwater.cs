using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Hydraulics;
using GeoCulvert.Design.Study;

namespace GeoCulvert.Cli.Project;

/// <summary>Tailwater of a project.</summary>
internal sealed partial class StudyLoader
{
    private TailwaterSettings? Tailwater() => Try(() =>
    {
        var t = _project["tailwater"];
        // A level or a table alone says which method is meant.
        var method = t.Has("method") ? t.Text("method") : t.Has("rating") ? "rating" : t.Has("elevation") ? "fixed" : "channel-from-dem";
        if (method == "fixed" && !t.Has("elevation"))
            throw new InputException($"{_shownName}, [tailwater] elevation", "no elevation", "elevation = \"101.5 m\" or the like, since method is \"fixed\"");
        if (method == "rating" && !t.Has("rating"))
            throw new InputException($"{_shownName}, [tailwater] rating", "no table", "rating = \"tailwater.csv\" with the columns flow_m3_s and elevation_m or depth_m, since method is \"rating\"");
        var (low, high) = (t.Number("low_depth_factor"), t.Number("high_depth_factor"));
        if (low is null != high is null)
            throw new InputException($"{_shownName}, [tailwater] {(low is null ? "low_depth_factor" : "high_depth_factor")}", "one bound without the other", "both low_depth_factor and high_depth_factor, or neither");
        return new TailwaterSettings
        {
            Method = method switch
            {
                "fixed" => TailwaterMethod.Fixed,
                "rating" => TailwaterMethod.Rating,
                "normal-depth" => TailwaterMethod.NormalDepth,
                _ => TailwaterMethod.ChannelFromDem,
            },
            FixedElevationM = t.Number("elevation"),
            Rating = method == "rating" && TextFile("tailwater", "rating", "tailwater rating") is { } file ? TailwaterRatingTable.Read(file.Name, file.Text) : null,
            BottomWidthM = t.Number("bottom_width"),
            SideSlope = t.Needed("side_slope"),
            RoughnessN = t.Needed("roughness"),
            OverbankRoughnessN = t.Needed("overbank_roughness"),
            SlopeMPerM = t.Number("slope"),
            SectionDistanceM = t.Needed("section_distance"),
            LowDepthFactor = low,
            HighDepthFactor = high,
        };
    });
}
