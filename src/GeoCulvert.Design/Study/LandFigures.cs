using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Terrain;
using GeoCulvert.Design.Watersheds;

namespace GeoCulvert.Design.Study;

/// <summary>A raster of the user's whose mean over every watershed is wanted.</summary>
/// <param name="Name">Its name in the results.</param>
/// <param name="Values">Values in their own unit, NaN for none, on a grid of their own in the plane of the terrain.</param>
public sealed record StudyRaster(string Name, Grid<float> Values);

/// <summary>The mean of a raster over a watershed.</summary>
/// <param name="Raster">Name of the raster.</param>
/// <param name="MeanOrNull">Area-weighted mean over the part with values, in the raster's own unit; null when there is none.</param>
/// <param name="MissingShare">Share of the watershed without a value, 0-1.</param>
public sealed record RasterMean(string Raster, double? MeanOrNull, double MissingShare);

/// <summary>A watershed, total or local, with all that is known of its land.</summary>
/// <param name="Ground">Area, outline and figures of the terrain.</param>
/// <param name="Cover">Land cover and soils; null when neither was given.</param>
/// <param name="Means">Means of the user's rasters.</param>
public sealed record LandFigures(WatershedCharacteristics Ground, CoverSummary? Cover, IReadOnlyList<RasterMean> Means);

/// <summary>The tables of land cover and of raster means, and the fields that total and local watersheds share.</summary>
public static class LandLayers
{
    /// <summary>Land cover and soil groups of every watershed.</summary>
    public static LayerDefinition<(string CrossingId, CoverAreaResult Area)> CoverAreas { get; } = new(
        "cover_areas", "Land cover", "A land cover and soil group in the total watershed of a crossing.", LayerGeometry.None, _ => null,
        [
            ResultLayers.Text<(string CrossingId, CoverAreaResult Area)>("crossing_id", "Crossing", "Id of the crossing.", r => r.CrossingId),
            ResultLayers.Text<(string CrossingId, CoverAreaResult Area)>("land_cover", "Land cover", "Code of the land cover; empty where there is none.", r => r.Area.Code),
            ResultLayers.Text<(string CrossingId, CoverAreaResult Area)>("land_cover_name", "Name", "Name of the land cover in the table of runoff coefficients.", r => r.Area.Name),
            ResultLayers.Text<(string CrossingId, CoverAreaResult Area)>("soil_group", "Soil group", "Hydrologic soil group; empty where there is none.", r => r.Area.SoilGroup),
            ResultLayers.Real<(string CrossingId, CoverAreaResult Area)>("area", QuantityKind.Area, "Area", "Overlap with the cells of the watershed, parts of cells counted.", r => r.Area.AreaM2),
            ResultLayers.Real<(string CrossingId, CoverAreaResult Area)>("area_share", QuantityKind.Share, "Share", "Share of the watershed.", r => r.Area.Share),
        ]);

    /// <summary>Means of the user's rasters.</summary>
    public static LayerDefinition<(string CrossingId, RasterMean Total, RasterMean Local)> RasterMeans { get; } = new(
        "raster_means", "Raster means", "The mean of a raster of the project over the watersheds of a crossing.", LayerGeometry.None, _ => null,
        [
            ResultLayers.Text<(string CrossingId, RasterMean Total, RasterMean Local)>("crossing_id", "Crossing", "Id of the crossing.", r => r.CrossingId),
            ResultLayers.Text<(string CrossingId, RasterMean Total, RasterMean Local)>("raster", "Raster", "Name of the raster.", r => r.Total.Raster),
            ResultLayers.Real<(string CrossingId, RasterMean Total, RasterMean Local)>("mean", QuantityKind.None, "Mean", "Area-weighted mean over the total watershed, in the raster's own unit; parts of cells counted.", r => r.Total.MeanOrNull),
            ResultLayers.Real<(string CrossingId, RasterMean Total, RasterMean Local)>("missing_share", QuantityKind.Share, "Without value", "Share of the total watershed where the raster has no value; the mean is that of the rest.", r => r.Total.MissingShare),
            ResultLayers.Real<(string CrossingId, RasterMean Total, RasterMean Local)>("local_mean", QuantityKind.None, "Local mean", "The same over the local watershed.", r => r.Local.MeanOrNull),
            ResultLayers.Real<(string CrossingId, RasterMean Total, RasterMean Local)>("local_missing_share", QuantityKind.Share, "Local without value", "Share of the local watershed where the raster has no value.", r => r.Local.MissingShare),
        ]);

    internal static IReadOnlyList<LayerColumn<CrossingResult>> Columns(Func<CrossingResult, LandFigures> land) =>
    [
        ResultLayers.Real<CrossingResult>("perimeter", QuantityKind.Length, "Perimeter", "True length of the outline along cell edges, holes included; longer than a smooth divide.", c => land(c).Ground.Outline.PerimeterM),
        ResultLayers.Real<CrossingResult>("centroid_x", QuantityKind.None, "Centroid x", "Mean of the cells' centres, in the coordinate system of the layer.", c => land(c).Ground.Centroid?.X),
        ResultLayers.Real<CrossingResult>("centroid_y", QuantityKind.None, "Centroid y", "Mean of the cells' centres, in the coordinate system of the layer.", c => land(c).Ground.Centroid?.Y),
        ResultLayers.Real<CrossingResult>("edge_contact_share", QuantityKind.Share, "Edge contact", "Share of the boundary on the edge of the terrain or on nodata.", c => land(c).Ground.EdgeContactShare),
        ResultLayers.Real<CrossingResult>("mean_slope", QuantityKind.Slope, "Basin slope", "Mean slope of the ground.", c => land(c).Ground.MeanBasinSlopeMPerM),
        ResultLayers.Real<CrossingResult>("mean_elevation", QuantityKind.Length, "Mean elevation", "Mean elevation of the ground.", c => land(c).Ground.MeanElevationM),
        ResultLayers.Real<CrossingResult>("relief", QuantityKind.Length, "Relief", "Highest less lowest elevation.", c => land(c).Ground.ReliefM),
        ResultLayers.Real<CrossingResult>("flow_path_length", QuantityKind.Length, "Longest flow path", "Length of the longest flow path from the divide.", c => land(c).Ground.LongestFlowPath?.LengthM),
        ResultLayers.Real<CrossingResult>("slope_10_85", QuantityKind.Slope, "10-85 slope", "Slope of the longest flow path between 10 % and 85 % of its length above the crossing.", c => land(c).Ground.LongestFlowPath?.Slope1085MPerM),
        ResultLayers.Real<CrossingResult>("slope_end_to_end", QuantityKind.Slope, "End-to-end slope", "Fall of the longest flow path over its length.", c => land(c).Ground.LongestFlowPath?.EndToEndSlopeMPerM),
        ResultLayers.Real<CrossingResult>("slope_equal_area", QuantityKind.Slope, "Equal-area slope", "Slope of the line from the crossing with as much area under it as the profile of the longest flow path.", c => land(c).Ground.LongestFlowPath?.EqualAreaSlopeMPerM),
        ResultLayers.Real<CrossingResult>("shape_factor", QuantityKind.None, "Shape factor", "Square of the longest flow path by the area.", c => land(c).Ground.ShapeFactor),
        ResultLayers.Real<CrossingResult>("filled_share", QuantityKind.Share, "Filled depressions", "Share of the cells that were raised to make water leave: closed depressions, real or of the terrain model.", c => land(c).Ground.FilledShare),
        ResultLayers.Real<CrossingResult>("lake_share", QuantityKind.Share, "Open water", "Share of land covers that are open water; empty without a land cover or where its table does not say.", c => land(c).Cover?.LakeShare),
        ResultLayers.Real<CrossingResult>("wetland_share", QuantityKind.Share, "Wetland", "Share of land covers that are wetland.", c => land(c).Cover?.WetlandShare),
        ResultLayers.Real<CrossingResult>("storage_share", QuantityKind.Share, "Storage", "Share that is open water, wetland or a filled depression, each place counted once; filled depressions alone where lakes are not known.", c => land(c).Cover?.StorageShare ?? land(c).Ground.FilledShare),
        ResultLayers.Real<CrossingResult>("impervious_share", QuantityKind.Share, "Impervious", "Impervious share by land cover, of the area whose cover has a figure.", c => land(c).Cover?.ImperviousShare),
        ResultLayers.Text<CrossingResult>("land_cover", "Land cover", "Land covers with their shares of the watershed, the largest first; by soil group in cover_areas.", c => land(c).Cover?.LandCover),
        ResultLayers.Real<CrossingResult>("cover_missing_share", QuantityKind.Share, "Without land cover", "Share without a land cover.", c => land(c).Cover?.CoverMissingShare),
        ResultLayers.Real<CrossingResult>("soil_a_share", QuantityKind.Share, "Soil group A", "Share of hydrologic soil group A.", c => land(c).Cover?.SoilShare(g => g == "A")),
        ResultLayers.Real<CrossingResult>("soil_b_share", QuantityKind.Share, "Soil group B", "Share of hydrologic soil group B.", c => land(c).Cover?.SoilShare(g => g == "B")),
        ResultLayers.Real<CrossingResult>("soil_c_share", QuantityKind.Share, "Soil group C", "Share of hydrologic soil group C.", c => land(c).Cover?.SoilShare(g => g == "C")),
        ResultLayers.Real<CrossingResult>("soil_d_share", QuantityKind.Share, "Soil group D", "Share of hydrologic soil group D.", c => land(c).Cover?.SoilShare(g => g == "D")),
        ResultLayers.Real<CrossingResult>("soil_dual_share", QuantityKind.Share, "Dual soil groups", "Share of the dual groups A/D, B/D and C/D.", c => land(c).Cover?.SoilShare(g => g.Length > 1)),
        ResultLayers.Real<CrossingResult>("soil_missing_share", QuantityKind.Share, "Without soil group", "Share without a soil group.", c => land(c).Cover?.SoilMissingShare),
    ];
}
