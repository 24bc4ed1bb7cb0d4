using System.Globalization;
using System.Numerics;
using System.Runtime.CompilerServices;
using GeoCulvert.Design.Basis;

namespace GeoCulvert.Layers;

/// <summary>
/// Looks at the values of a terrain model as its file stores them, before anything is blended: values that stand for missing cells but
/// are not said to, and elevations that no land has.
/// </summary>
internal sealed class StoredElevations(RasterSource source, float verticalM)
{
    // No land lies lower than the shore of the Dead Sea (about -430 m) or higher than Mount Everest (8849 m): common knowledge, with a margin for mines.
    private const float LowestLandM = -600, HighestLandM = 9000;

    // Values like -3.4e38 stand for nodata whose tag was rounded or lost.
    private const float BeyondAnyNumberOfMetres = 1e9f;

    // What writers of rasters use for missing cells (common practice).
    private static readonly double[] MissingValues = [-9999, -99999, -999999, -9999999, -32768, -32767, -2147483648, 32767, 65535];

    private const int Piece = 4096;
    private readonly long[] _missing = new long[MissingValues.Length];
    private long _cells, _doubtful, _lowestCells;
    private float _firstDoubtful, _lowest = float.PositiveInfinity, _next = float.PositiveInfinity, _highest = float.NegativeInfinity;

    /// <summary>Whether a value is a number of metres at all; what is not is nodata.</summary>
    private static bool IsElevation(float z) => MathF.Abs(z) < BeyondAnyNumberOfMetres;

    /// <summary>Brings elevations to metres in place; what is no elevation becomes nodata.</summary>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public static void InMetres(Span<float> values, float verticalM)
    {
        var missing = new Vector<float>(float.NaN);
        var i = 0;
        for (; i + Vector<float>.Count <= values.Length; i += Vector<float>.Count)
        {
            var z = new Vector<float>(values[i..]);
            Vector.ConditionalSelect(Elevations(z), z * verticalM, missing).CopyTo(values[i..]);
        }

        for (; i < values.Length; i++) values[i] = IsElevation(values[i]) ? values[i] * verticalM : float.NaN;
    }

    /// <summary>Looks at cells: scale and offset applied, known nodata NaN, still in the file's unit.</summary>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public void Add(ReadOnlySpan<float> values)
    {
        // Most pieces hold nothing new: neither low nor doubtful. They are passed by their lowest and highest value.
        for (var start = 0; start < values.Length; start += Piece)
        {
            var piece = values.Slice(start, Math.Min(Piece, values.Length - start));
            var (least, most, count) = Range(piece);
            if (count == 0) continue;
            _cells += count;
            _highest = Math.Max(_highest, most);
            if (least > _next && least * verticalM >= LowestLandM && most * verticalM <= HighestLandM) continue;
            foreach (var z in piece)
            {
                if (!IsElevation(z)) continue;
                if (z < _lowest) (_next, _lowest, _lowestCells) = (_lowest, z, 1);
                else if (z == _lowest) _lowestCells++;
                else if (z < _next) _next = z;
                if (!(z * verticalM is >= LowestLandM and <= HighestLandM)) Doubt(z);
            }
        }
    }

    /// <summary>Says what was seen.</summary>
    /// <exception cref="InputException">Cells hold a value that stands for nodata, and nobody says so.</exception>
    public void Conclude(List<Finding> findings)
    {
        var problems = MissingValues.Zip(_missing).Where(m => m.Second > 0).Select(m => new InputProblem(
            source.Path,
            string.Create(CultureInfo.InvariantCulture, $"{m.Second} cells of {m.First}, which no land has and which is not said to mean 'no data'"),
            string.Create(CultureInfo.InvariantCulture, $"[terrain] nodata = {m.First} in the project file, or a file that says so"))).ToList();
        if (problems.Count > 0) throw new InputException(problems);
        if (_doubtful > 0)
            findings.Add(LayerFindings.ElevationsDoubtful.With(string.Create(CultureInfo.InvariantCulture, $"{source.Path}: {_doubtful} of {(long)source.Rows * source.Columns} cells, for example {_firstDoubtful:0.###}")));

        // A lowest value far below all others, farther than these reach from lowest to highest, is hardly ground (own rule; 10 m at least).
        var gap = _next - _lowest;
        if (_doubtful == 0 && _lowestCells > 1 && float.IsFinite(gap) && gap > _highest - _next && gap * verticalM > 10)
            findings.Add(LayerFindings.NoDataDoubtful.With(string.Create(
                CultureInfo.InvariantCulture, $"{source.Path}: {_lowestCells} of {_cells} cells are {_lowest:0.###}, the next lowest is {_next:0.###}, the highest {_highest:0.###}"), _lowest));
    }

    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private static (float Least, float Most, int Count) Range(ReadOnlySpan<float> values)
    {
        Vector<float> low = new(float.PositiveInfinity), high = new(float.NegativeInfinity), below = low, above = high;
        var counted = Vector<int>.Zero;
        var i = 0;
        for (; i + Vector<float>.Count <= values.Length; i += Vector<float>.Count)
        {
            var z = new Vector<float>(values[i..]);
            var counts = Elevations(z);
            low = Vector.Min(low, Vector.ConditionalSelect(counts, z, below));
            high = Vector.Max(high, Vector.ConditionalSelect(counts, z, above));
            counted += counts; // -1 where it counts
        }

        float least = float.PositiveInfinity, most = float.NegativeInfinity;
        var count = -Vector.Sum(counted);
        for (var k = 0; k < Vector<float>.Count; k++) (least, most) = (Math.Min(least, low[k]), Math.Max(most, high[k]));
        for (; i < values.Length; i++)
        {
            if (!IsElevation(values[i])) continue;
            (least, most) = (Math.Min(least, values[i]), Math.Max(most, values[i]));
            count++;
        }

        return (least, most, count);
    }

    private static Vector<int> Elevations(Vector<float> z) => Vector.LessThan(Vector.Abs(z), new Vector<float>(BeyondAnyNumberOfMetres));

    private void Doubt(float z)
    {
        if (_doubtful++ == 0) _firstDoubtful = z;
        var k = Array.IndexOf(MissingValues, Math.Round((z - source.Offset) / source.Scale, 3));
        if (k >= 0) _missing[k]++;
    }
}
