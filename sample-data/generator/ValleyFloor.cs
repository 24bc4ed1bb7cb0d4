namespace GeoCulvert.SampleData;

/// <summary>Lays a nearly flat floor of river deposits along the larger rivers of a mesh.</summary>
public static class ValleyFloor
{
    /// <summary>
    /// Raises the ground beside every river of at least <paramref name="leastAreaM2"/> to a plain that rises from its bank at 0.4 %; the
    /// plain widens with the drained area. Returns how much of a plain each node is, 0 (hill) to 1 (plain).
    /// </summary>
    public static double[] Fill(double[] z, int rows, int cols, double nodeM, double leastAreaM2)
    {
        ArgumentNullException.ThrowIfNull(z);
        var water = Drainage.Of(z, rows, cols, (r, _) => r == rows - 1 || r == 0);
        var area = water.Areas(nodeM * nodeM);
        var target = new double[z.Length];
        var plain = new double[z.Length];
        Array.Fill(target, double.NegativeInfinity);
        for (var i = 0; i < z.Length; i++)
        {
            if (area[i] < leastAreaM2) continue;
            var halfWidthM = 45 * Math.Sqrt(Math.Sqrt(area[i] / 1e6)) * Math.Min(1, area[i] / leastAreaM2 - 0.5);
            Spread(i, halfWidthM);
        }

        for (var i = 0; i < z.Length; i++) z[i] = Math.Max(z[i], target[i]);
        return plain;

        void Spread(int i, double halfWidthM)
        {
            var reach = (int)Math.Ceiling(halfWidthM * 1.6 / nodeM);
            var (r, c) = (i / cols, i % cols);
            for (var rr = Math.Max(0, r - reach); rr <= Math.Min(rows - 1, r + reach); rr++)
            {
                for (var cc = Math.Max(0, c - reach); cc <= Math.Min(cols - 1, c + reach); cc++)
                {
                    var far = Math.Sqrt((rr - r) * (rr - r) + (cc - c) * (cc - c)) * nodeM;
                    var level = z[i] + 0.5 + 0.004 * far - (far > halfWidthM ? 0.12 * (far - halfWidthM) : 0);
                    if (far < nodeM * 0.5) level = z[i];
                    var j = rr * cols + cc;
                    if (level > z[j] || far < nodeM * 0.5) plain[j] = Math.Max(plain[j], far <= halfWidthM ? 1 : 0.4);
                    target[j] = Math.Max(target[j], level);
                }
            }
        }
    }
}
