namespace GeoCulvert.SampleData;

/// <summary>A road through made terrain.</summary>
/// <param name="Name">Its name.</param>
/// <param name="Class">arterial, collector, local or track.</param>
/// <param name="WidthM">Shoulder to shoulder, m.</param>
/// <param name="Surface">paved or gravel.</param>
/// <param name="Through">Points it passes, (row, column).</param>
public sealed record RoadPlan(string Name, string Class, double WidthM, string Surface, IReadOnlyList<(double Row, double Col)> Through);

/// <summary>Where a made road meets a made stream.</summary>
/// <param name="StationM">Distance from the start of the road, m.</param>
/// <param name="AreaM2">Area above, m2.</param>
/// <param name="BedM">Bed of the stream, m.</param>
/// <param name="RoadM">Road level, m.</param>
public sealed record BedCrossing(double StationM, double AreaM2, double BedM, double RoadM)
{
    /// <summary>Number of the sample on the road.</summary>
    public int Sample { get; init; }
}

/// <summary>A road laid out: its line in short steps and its levels.</summary>
public sealed class RoadLine
{
    private RoadLine(RoadPlan plan, List<(double Row, double Col)> line, double[] station) => (Plan, Line, StationM, LevelM) = (plan, line, station, new double[line.Count]);

    /// <summary>The plan it follows.</summary>
    public RoadPlan Plan { get; }

    /// <summary>Samples about one cell apart, (row, column).</summary>
    public IReadOnlyList<(double Row, double Col)> Line { get; }

    /// <summary>Distance of each sample from the start, m.</summary>
    public double[] StationM { get; }

    /// <summary>Finished road level at each sample, m; zeros before <see cref="Grade"/>.</summary>
    public double[] LevelM { get; }

    /// <summary>Streams it meets, found by <see cref="Grade"/>.</summary>
    public IReadOnlyList<BedCrossing> Streams { get; private set; } = [];

    /// <summary>A smooth line through the points of the plan (Catmull-Rom).</summary>
    public static RoadLine Along(RoadPlan plan, double cellM)
    {
        ArgumentNullException.ThrowIfNull(plan);
        var p = plan.Through;
        var line = new List<(double, double)>();
        for (var k = 0; k + 1 < p.Count; k++)
        {
            var (a, b, c, d) = (p[Math.Max(0, k - 1)], p[k], p[k + 1], p[Math.Min(p.Count - 1, k + 2)]);
            var parts = Math.Max(1, (int)Math.Sqrt((c.Row - b.Row) * (c.Row - b.Row) + (c.Col - b.Col) * (c.Col - b.Col)));
            for (var s = 0; s < parts; s++)
            {
                var t = (double)s / parts;
                line.Add((Spline(a.Row, b.Row, c.Row, d.Row, t), Spline(a.Col, b.Col, c.Col, d.Col, t)));
            }
        }

        line.Add(p[^1]);
        var station = new double[line.Count];
        for (var k = 1; k < line.Count; k++)
        {
            var (dr, dc) = (line[k].Item1 - line[k - 1].Item1, line[k].Item2 - line[k - 1].Item2);
            station[k] = station[k - 1] + Math.Sqrt(dr * dr + dc * dc) * cellM;
        }

        return new(plan, line, station);
    }

    /// <summary>
    /// Sets the levels: the ground smoothed along the line, raised at every stream so that the bank stands 1.8 to 4 m over the bed.
    /// </summary>
    public void Grade(MadeSurface land, double[] areaM2, double leastAreaM2)
    {
        ArgumentNullException.ThrowIfNull(land);
        ArgumentNullException.ThrowIfNull(areaM2);
        for (var k = 0; k < LevelM.Length; k++) LevelM[k] = land.ElevationM[Cell(land, k)];
        for (var pass = 0; pass < 3; pass++) Smooth(LevelM, 11);
        var streams = new List<BedCrossing>();
        for (var k = 0; k < LevelM.Length; k++)
        {
            LevelM[k] += 0.5;
            var i = Cell(land, k);
            if (areaM2[i] < leastAreaM2) continue;
            var found = new BedCrossing(StationM[k], areaM2[i], land.ElevationM[i], 0) { Sample = k };
            if (streams.Count > 0 && StationM[k] - streams[^1].StationM < 40)
            {
                if (found.AreaM2 > streams[^1].AreaM2) streams[^1] = found;
            }
            else
            {
                streams.Add(found);
            }
        }

        foreach (var s in streams)
        {
            var lift = s.BedM + Math.Min(4.2, 1.9 + 1.6 * Math.Sqrt(s.AreaM2 / 1e6)) - LevelM[s.Sample];
            if (lift <= 0) continue;
            for (var k = 0; k < LevelM.Length; k++)
            {
                var t = (StationM[k] - s.StationM) / 160;
                if (t * t < 1) LevelM[k] += lift * (1 - t * t) * (1 - t * t);
            }
        }

        Ease(0.075);
        Streams = streams.ConvertAll(s => s with { RoadM = LevelM[s.Sample] });
    }

    /// <summary>Builds bank and cutting into the ground, sides 1 in 2; where <paramref name="spare"/> holds, the ground stays.</summary>
    public void Build(MadeSurface land, double sideSlope, bool[] spare)
    {
        ArgumentNullException.ThrowIfNull(land);
        ArgumentNullException.ThrowIfNull(spare);
        var nearest = new Dictionary<int, (double FarM, int Sample)>();
        var reach = (int)(40 / land.CellM);
        for (var k = 0; k < Line.Count; k++)
        {
            var (row, col) = Line[k];
            for (var r = Math.Max(0, (int)row - reach); r <= Math.Min(land.Rows - 1, (int)row + reach); r++)
            {
                for (var c = Math.Max(0, (int)col - reach); c <= Math.Min(land.Cols - 1, (int)col + reach); c++)
                {
                    var far = Math.Sqrt((r - row) * (r - row) + (c - col) * (c - col)) * land.CellM;
                    var i = r * land.Cols + c;
                    if (!nearest.TryGetValue(i, out var old) || far < old.FarM) nearest[i] = (far, k);
                }
            }
        }

        foreach (var (i, (far, k)) in nearest)
        {
            if (spare[i]) continue;
            var beyond = Math.Max(0, far - Plan.WidthM / 2) / sideSlope;
            land.ElevationM[i] = (float)Math.Min(LevelM[k] + beyond, Math.Max(LevelM[k] - beyond, land.ElevationM[i]));
        }
    }

    /// <summary>Marks the stream beds, three cells wide, within 50 m of a crossing: there the maker of the terrain model took the bank out.</summary>
    public void Spare(MadeSurface land, BedCrossing at, double[] areaM2, double leastAreaM2, bool[] spare)
    {
        ArgumentNullException.ThrowIfNull(land);
        ArgumentNullException.ThrowIfNull(at);
        ArgumentNullException.ThrowIfNull(areaM2);
        ArgumentNullException.ThrowIfNull(spare);
        var (row, col) = ((int)Line[at.Sample].Row, (int)Line[at.Sample].Col);
        var reach = (int)(50 / land.CellM);
        for (var r = Math.Max(1, row - reach); r <= Math.Min(land.Rows - 2, row + reach); r++)
        {
            for (var c = Math.Max(1, col - reach); c <= Math.Min(land.Cols - 2, col + reach); c++)
            {
                if (areaM2[r * land.Cols + c] < leastAreaM2) continue;
                for (var k = 0; k < 9; k++) spare[(r - 1 + k / 3) * land.Cols + c - 1 + k % 3] = true;
            }
        }
    }

    private int Cell(MadeSurface land, int sample) =>
        (int)Math.Clamp(Line[sample].Row + 0.5, 0, land.Rows - 1) * land.Cols + (int)Math.Clamp(Line[sample].Col + 0.5, 0, land.Cols - 1);

    /// <summary>Holds the grade: half-way between the lowest line above and the highest line below that are no steeper.</summary>
    private void Ease(double steepest)
    {
        var (above, below) = ((double[])LevelM.Clone(), (double[])LevelM.Clone());
        for (var k = 1; k < LevelM.Length; k++) Hold(k, k - 1);
        for (var k = LevelM.Length - 2; k >= 0; k--) Hold(k, k + 1);
        for (var k = 0; k < LevelM.Length; k++) LevelM[k] = 0.5 * (above[k] + below[k]);

        void Hold(int k, int from)
        {
            var most = steepest * Math.Abs(StationM[k] - StationM[from]);
            above[k] = Math.Max(above[k], above[from] - most);
            below[k] = Math.Min(below[k], below[from] + most);
        }
    }

    private static double Spline(double a, double b, double c, double d, double t) =>
        0.5 * (2 * b + (c - a) * t + (2 * a - 5 * b + 4 * c - d) * t * t + (3 * b - a - 3 * c + d) * t * t * t);

    private static void Smooth(double[] values, int half)
    {
        var old = (double[])values.Clone();
        for (var k = 0; k < values.Length; k++)
        {
            var width = Math.Min(half, Math.Min(k, values.Length - 1 - k));
            double sum = 0;
            for (var j = k - width; j <= k + width; j++) sum += old[j];
            values[k] = sum / (2 * width + 1);
        }
    }
}
