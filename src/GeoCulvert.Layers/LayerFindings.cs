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

    /// <summary>A lowest value far from all others.</summary>
    public static readonly FindingCode NoDataDoubtful = new(
        "nodata-doubtful", Severity.Warning, "The lowest value of the terrain model lies far below all others and may stand for missing cells.", "If it does, give it as nodata in the project file.");

    /// <summary>A raster with more than one band.</summary>
    public static readonly FindingCode FirstBandUsed = new(
        "first-band-used", Severity.Warning, "The terrain model has more than one band; the first was used.", "Check that the first band holds the elevations.");

    /// <summary>Tiles of different cells.</summary>
    public static readonly FindingCode TilesDiffer = new(
        "tiles-differ", Severity.Warning, "Tiles differ in cell size, or their cells do not lie on one grid; they were joined by the nearest cell.", "Resample the tiles to one grid, with bilinear interpolation.");

    /// <summary>Tiles of different elevations.</summary>
    public static readonly FindingCode TilesDisagree = new(
        "tiles-disagree", Severity.Warning, "Tiles overlap with different values; the later one in order was used.", "Check datum, unit and date of the tiles, or leave one out.");

    /// <summary>A change of datum that is not well known.</summary>
    public static readonly FindingCode DatumShift = new(
        "datum-shift", Severity.Warning, "A map was moved between coordinate systems by a way that is not known well.", "Check a known place on the map; install PROJ's grids for the region, or give the map in the working system.");

    /// <summary>Heights of road and terrain on different datums.</summary>
    public static readonly FindingCode VerticalDatumDiffers = new(
        "vertical-datum-differs", Severity.Warning, "Road and terrain model have heights on different vertical datums.", "Bring both to one datum before relying on headwater, cover and road levels.");

    /// <summary>Heights of a road whose unit or datum is not said.</summary>
    public static readonly FindingCode HeightsDoubtful = new(
        "road-heights-doubtful", Severity.Warning, "Heights of road and terrain model cannot be compared: a vertical unit or datum is not said.", "Check the road levels; give the road in a compound coordinate system, or a profile table.");

    /// <summary>A feature could not be used.</summary>
    public static readonly FindingCode FeatureLeftOut = new(
        "feature-left-out", Severity.Warning, "A feature of an input layer could not be used and was left out.", "Mend the feature in its file.");
}
