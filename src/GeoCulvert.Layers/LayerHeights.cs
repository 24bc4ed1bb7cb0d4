using GeoCulvert.Design.Basis;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Layers;

/// <summary>Heights of a vector layer: whether it has any, and what its coordinate system says of them.</summary>
/// <param name="HasAny">Whether a coordinate has a height other than 0.</param>
/// <param name="IsUnitSaid">Whether the system says the unit.</param>
/// <param name="AreLeftOut">Whether heights were left out since their unit cannot be told.</param>
/// <param name="Datum">Name of the vertical datum, "" when it is not said.</param>
public sealed record LayerHeights(bool HasAny, bool IsUnitSaid, bool AreLeftOut, string Datum)
{
    /// <summary>A layer without heights.</summary>
    public static LayerHeights None { get; } = new(false, false, false, "");

    /// <summary>
    /// Brings heights to metres in place. Without a vertical part of the system they are taken as metres where the plane is in metres or
    /// degrees, and left out where it is in feet: feet are never guessed. Where all are 0 there are none.
    /// </summary>
    internal static LayerHeights InMetres(IEnumerable<Geometry> geometries, Crs crs)
    {
        var all = geometries.ToList();
        var hasAny = all.Any(g => g.Coordinates.Any(c => !double.IsNaN(c.Z) && c.Z != 0));
        var unit = !hasAny ? double.NaN : crs.VerticalUnitM ?? (crs.LinearUnitM == 1 ? 1 : double.NaN);
        if (unit != 1)
            foreach (var geometry in all) geometry.Apply(new Heights(unit));
        return new(hasAny, crs.VerticalUnitM is not null, hasAny && double.IsNaN(unit), crs.VerticalDatum);
    }

    /// <summary>What cannot be told of the heights of a road beside those of the terrain.</summary>
    /// <param name="path">The road's file.</param>
    /// <param name="terrainDatum">Vertical datum of the terrain model, "" when not said.</param>
    public IEnumerable<Finding> Doubts(string path, string terrainDatum)
    {
        ArgumentNullException.ThrowIfNull(terrainDatum);
        if (!HasAny) yield break;
        if (AreLeftOut) yield return LayerFindings.HeightsDoubtful.With($"{path}: heights without a unit in a system of feet; they were left out and the road lies on the terrain");
        else if (!IsUnitSaid) yield return LayerFindings.HeightsDoubtful.With($"{path}: heights without a unit, taken as metres");
        else if (terrainDatum.Length == 0) yield return LayerFindings.HeightsDoubtful.With($"{path}: heights on {Datum}, the terrain model does not say its datum");
        else if (!string.Equals(Datum, terrainDatum, StringComparison.OrdinalIgnoreCase)) yield return LayerFindings.VerticalDatumDiffers.With($"{path}: {Datum}, the terrain model {terrainDatum}");
    }

    private sealed class Heights(double unitM) : IEntireCoordinateSequenceFilter
    {
        public bool Done => false;

        public bool GeometryChanged => false;

        public void Filter(CoordinateSequence s)
        {
            if (!s.HasZ) return;
            for (var i = 0; i < s.Count; i++) s.SetZ(i, s.GetZ(i) * unitM);
        }
    }
}
