using System.Globalization;
using GeoCulvert.Design.Watersheds;

namespace GeoCulvert.Design.Study;

/// <summary>What lies on a piece of land: its land cover, soil group, slope class and whether it is a filled depression; coded as one class for the overlay.</summary>
/// <param name="Code">Land-cover code; null for none.</param>
/// <param name="SoilGroup">Soil group; null for none.</param>
/// <param name="SlopeClass">Class of slope, 0-2.</param>
/// <param name="IsFilled">Whether conditioning raised it.</param>
internal readonly record struct CoverPiece(int? Code, string? SoilGroup, int SlopeClass, bool IsFilled)
{
    private const int LargestCode = 100_000;
    private static readonly string?[] Groups = [null, "A", "B", "C", "D", "A/D", "B/D", "C/D"];

    /// <summary>The class of a piece: cover, soil group (1-7), slope class and filling as one number.</summary>
    public static int ClassOf(int cover, int soil, int slopeClass, bool isFilled) =>
        ((((((cover is >= 0 and <= LargestCode ? cover + 1 : 0) * 8) + (soil is > 0 and < 8 ? soil : 0)) * 4) + slopeClass) * 2) + (isFilled ? 1 : 0);

    /// <summary>The piece of a class.</summary>
    public static CoverPiece Of(int classCode) => new(
        classCode / 64 is > 0 and var cover ? cover - 1 : null, Groups[classCode / 8 % 8], classCode / 2 % 4, (classCode & 1) != 0);
}

/// <summary>A land cover and soil group of a watershed.</summary>
/// <param name="Code">Land-cover code; null where there is none.</param>
/// <param name="Name">Its name in the table; "" when the table has none.</param>
/// <param name="SoilGroup">Soil group; null where there is none.</param>
/// <param name="AreaM2">Area, m2.</param>
/// <param name="Share">Share of the watershed, 0-1.</param>
public sealed record CoverAreaResult(string? Code, string Name, string? SoilGroup, double AreaM2, double Share);

/// <summary>Shares of land cover and soil groups in a watershed, of its whole area, 0-1; what is not known is null.</summary>
public sealed record CoverSummary
{
    /// <summary>Areas by cover and soil group, the largest first.</summary>
    public required IReadOnlyList<CoverAreaResult> Areas { get; init; }

    /// <summary>Land covers with their shares, the largest first, as text: "41 Deciduous forest 62 %, ..."; empty without a land cover.</summary>
    public required string LandCover { get; init; }

    /// <summary>Share without a land cover; null when no land cover was given.</summary>
    public double? CoverMissingShare { get; init; }

    /// <summary>Share without a soil group; null when no soil groups were given.</summary>
    public double? SoilMissingShare { get; init; }

    /// <summary>Impervious share, of the area whose cover has a figure; null when none has.</summary>
    public double? ImperviousShare { get; init; }

    /// <summary>Share of open water.</summary>
    public double? LakeShare { get; init; }

    /// <summary>Share of wetland.</summary>
    public double? WetlandShare { get; init; }

    /// <summary>Share that is open water, wetland or a filled depression, each place counted once.</summary>
    public double? StorageShare { get; init; }

    /// <summary>Area-weighted runoff coefficient below 25 years and from 25 years on; null when it cannot be formed.</summary>
    public (double Below25Yr, double From25Yr)? RunoffCoefficient { get; init; }

    /// <summary>Share of a soil group, "A" to "D" or a dual group; null when no soil groups were given.</summary>
    public double? SoilShare(Func<string, bool> group) => SoilMissingShare is null ? null : Areas.Where(a => a.SoilGroup is { } g && group(g)).Sum(a => a.Share);

    /// <summary>Summarises the classes of a watershed.</summary>
    internal static CoverSummary Of(ClassCells classes, double areaM2, CoverClasses table, bool hasCover, bool hasSoil)
    {
        var cells = classes.CellCount;
        var pieces = classes.CellsByClass.Select(c => (Piece: CoverPiece.Of(c.Key), Cells: c.Value)).ToList();
        var areas = pieces.GroupBy(p => (p.Piece.Code, p.Piece.SoilGroup))
            .Select(g => (Code: Text(g.Key.Code), g.Key.SoilGroup, Cells: g.Sum(p => p.Cells)))
            .OrderByDescending(g => g.Cells).ThenBy(g => g.Code, StringComparer.Ordinal).ThenBy(g => g.SoilGroup, StringComparer.Ordinal)
            .Select(g => new CoverAreaResult(g.Code, g.Code is null ? "" : table.Find(g.Code)?.Name ?? "", g.SoilGroup, g.Cells / cells * areaM2, g.Cells / cells))
            .ToList();
        double Share(Func<CoverPiece, CoverClass?, bool> counts) => pieces.Where(p => counts(p.Piece, Known(p.Piece))).Sum(p => p.Cells) / cells;
        CoverClass? Known(CoverPiece piece) => Text(piece.Code) is { } code ? table.Find(code) : null;
        var paved = pieces.Where(p => Known(p.Piece)?.ImperviousShare is not null).ToList();
        var covers = areas.Where(a => a.Code is not null).GroupBy(a => (a.Code, a.Name)).Select(g => (g.Key.Code, g.Key.Name, Share: g.Sum(a => a.Share))).OrderByDescending(g => g.Share);
        return new CoverSummary
        {
            Areas = areas,
            LandCover = string.Join(", ", covers.Select(c => string.Create(CultureInfo.InvariantCulture, $"{c.Code}{(c.Name.Length > 0 ? " " : "")}{c.Name} {100 * c.Share:0.#} %"))),
            CoverMissingShare = hasCover ? Share((p, _) => p.Code is null) : null,
            SoilMissingShare = hasSoil ? Share((p, _) => p.SoilGroup is null) : null,
            ImperviousShare = paved.Count > 0 ? paved.Sum(p => p.Cells * Known(p.Piece)!.ImperviousShare!.Value) / paved.Sum(p => p.Cells) : null,
            LakeShare = hasCover && table.KnowsStorage ? Share((_, c) => c is { IsLake: true }) : null,
            WetlandShare = hasCover && table.KnowsStorage ? Share((_, c) => c is { IsWetland: true }) : null,
            StorageShare = hasCover && table.KnowsStorage ? Share((p, c) => p.IsFilled || c is { IsLake: true } or { IsWetland: true }) : null,
        };
    }

    private static string? Text(int? code) => code?.ToString(CultureInfo.InvariantCulture);
}
