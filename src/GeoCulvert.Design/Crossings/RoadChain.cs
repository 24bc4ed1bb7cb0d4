using NetTopologySuite.Geometries;

namespace GeoCulvert.Design.Crossings;

/// <summary>Joins the parts of a road end to end.</summary>
internal static class RoadChain
{
    /// <summary>
    /// Joins parts whose ends lie within a tolerance. Starts with the first part as drawn, grows it at its end, then at its beginning, nearest
    /// end first; what does not touch begins a new chain. Same parts, same result.
    /// </summary>
    public static List<Coordinate[]> Join(IReadOnlyList<Coordinate[]> parts, double toleranceM)
    {
        var left = parts.ToList();
        var chains = new List<Coordinate[]>();
        while (left.Count > 0)
        {
            var chain = left[0].ToList();
            left.RemoveAt(0);
            while (Grow(chain, left, atEnd: true, toleranceM) || Grow(chain, left, atEnd: false, toleranceM))
            {
            }

            chains.Add([.. chain]);
        }

        return chains;
    }

    private static bool Grow(List<Coordinate> chain, List<Coordinate[]> left, bool atEnd, double toleranceM)
    {
        var end = atEnd ? chain[^1] : chain[0];
        int best = -1;
        var least = toleranceM;
        for (var i = 0; i < left.Count; i++)
        {
            var distance = Math.Min(left[i][0].Distance(end), left[i][^1].Distance(end));
            if (distance > least || (distance == least && best >= 0)) continue;
            (best, least) = (i, distance);
        }

        if (best < 0) return false;
        var part = left[best];
        left.RemoveAt(best);
        var beginsHere = part[0].Distance(end) <= part[^1].Distance(end);
        IEnumerable<Coordinate> onward = beginsHere ? part : part.Reverse();
        // The shared vertex is kept once; the few centimetres within the tolerance become part of the line.
        var joined = onward.Where((p, i) => i > 0 || p.Distance(end) > 0);
        if (atEnd) chain.AddRange(joined);
        else chain.InsertRange(0, joined.Reverse());
        return true;
    }
}

/// <summary>Directions in plan.</summary>
internal static class Bearings
{
    /// <summary>Direction from one point to another, degrees clockwise from grid north, 0 to below 360.</summary>
    public static double AzimuthDeg(Coordinate from, Coordinate to)
    {
        var azimuth = Math.Atan2(to.X - from.X, to.Y - from.Y) * 180 / Math.PI;
        return azimuth < 0 ? azimuth + 360 : azimuth;
    }

    /// <summary>Angle between a flow and the perpendicular of a road, 0 (square) to 90 (along the road), degrees.</summary>
    public static double SkewDeg(double flowAzimuthDeg, double roadAzimuthDeg)
    {
        var angle = Math.Abs(flowAzimuthDeg - roadAzimuthDeg) % 180;
        return Math.Abs(90 - angle);
    }
}
