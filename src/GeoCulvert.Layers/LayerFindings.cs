using GeoCulvert.Design.Basis;

namespace GeoCulvert.Layers;

/// <summary>Codes of reading and writing maps.</summary>
public static class LayerFindings
{
    /// <summary>The terrain model was projected.</summary>
    public static readonly FindingCode Projected = new(
        "terrain-projected", Severity.Note, "The terrain model was resampled into the working coordinate system.", "Name working_crs and cell_size in the project file when others serve better.");

    /// <summary>The plane of the terrain model is far from true to size.</summary>
    public static readonly FindingCode PlaneLeft = new(
        "plane-left", Severity.Warning, "The terrain model's plane is too far from true size, so another was taken.", "Check the working system; name a better one as working_crs in the project file.");

    /// <summary>The working plane is not quite true to size.</summary>
    public static readonly FindingCode PlaneOff = new(
        "plane-off", Severity.Warning, "The working plane is not true to size here; areas, perimeters and flow paths are corrected, culvert lengths and distances are not.", "Name a working_crs that fits the place, for example its UTM zone.");

    /// <summary>File and project name different systems.</summary>
    public static readonly FindingCode CrsStatedDiffers = new(
        "crs-differs", Severity.Warning, "The file and the project file name different coordinate systems.", "Remove crs from the project file, or mend the file.");

    /// <summary>File and project name different vertical units.</summary>
    public static readonly FindingCode VerticalUnitDiffers = new(
        "vertical-unit-differs", Severity.Warning, "The file and the project file name different vertical units.", "Check the elevations of a known place before relying on any result.");

    /// <summary>Elevations that no land has.</summary>
    public static readonly FindingCode ElevationsDoubtful = new(
        "elevations-doubtful", Severity.Warning, "The terrain model has elevations that no land on Earth has.", "If they stand for missing cells, give their value as nodata in the project file; if not, check the vertical unit.");

    /// <summary>A feature could not be used.</summary>
    public static readonly FindingCode FeatureLeftOut = new(
        "feature-left-out", Severity.Warning, "A feature of an input layer could not be used and was left out.", "Mend the feature in its file.");
}
