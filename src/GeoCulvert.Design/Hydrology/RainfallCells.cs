using System.Globalization;
using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydrology;

/// <summary>Gathers the rows of a rainfall table and checks them; shared by the two readers.</summary>
internal sealed class RainfallCells(string name, IReadOnlyList<double> returnPeriodsYr)
{
    private readonly List<InputProblem> _problems = [];
    private readonly List<(int Line, double DurationMin, double[] Values)> _rows = [];

    /// <summary>How many rows were read.</summary>
    public int Count => _rows.Count;

    /// <summary>A duration such as "5-min", "2-hr", "24h", "7-day" in minutes; a bare number when a unit is given; null when it is neither.</summary>
    public static double? DurationMin(string text, double? bareUnitMin = null)
    {
        var t = text.Trim().TrimEnd(':').Trim();
        var digits = 0;
        while (digits < t.Length && (char.IsAsciiDigit(t[digits]) || t[digits] == '.')) digits++;
        if (Number(t[..digits]) is not { } number || !(number > 0)) return null;
        var unit = t[digits..].Trim(' ', '-').ToLowerInvariant();
        var minutes = unit switch
        {
            "" => bareUnitMin,
            "min" or "mins" or "minute" or "minutes" => 1,
            "h" or "hr" or "hrs" or "hour" or "hours" => 60,
            "d" or "day" or "days" => 1440,
            _ => null,
        };
        return number * minutes;
    }

    /// <summary>A finite number, or null.</summary>
    public static double? Number(string text) =>
        double.TryParse(text.Trim(), NumberStyles.Float, CultureInfo.InvariantCulture, out var value) && double.IsFinite(value) ? value : null;

    /// <summary>The return periods of a heading, from its second cell on.</summary>
    /// <exception cref="InputException">A cell is no return period, or they do not rise.</exception>
    public static double[] ReturnPeriods(string name, int line, IReadOnlyList<string> cells)
    {
        const string expected = "return periods in years, rising, for example 2,10,25,50,100";
        var periods = new List<double>();
        foreach (var raw in cells)
        {
            var cell = raw.Trim().ToLowerInvariant();
            var text = cell.Replace("years", "", StringComparison.Ordinal).Replace("year", "", StringComparison.Ordinal)
                .Replace("yr", "", StringComparison.Ordinal).Trim(' ', '-', '_');
            // Tables of annual maxima head their columns with the annual chance, 1/25 or 4%.
            var value = text.StartsWith("1/", StringComparison.Ordinal) ? Number(text[2..]) : text.EndsWith('%') ? 100 / Number(text[..^1]) : Number(text);
            if (value is not { } t || !(t > 0) || !double.IsFinite(t)) throw new InputException($"{name} line {line}", $"'{raw.Trim()}' in the heading", expected);
            if (periods.Count > 0 && t <= periods[^1])
                throw new InputException($"{name} line {line}", $"{t:G6} after {periods[^1]:G6} in the heading", expected);
            periods.Add(t);
        }
        return periods.Count > 0 ? [.. periods] : throw new InputException($"{name} line {line}", "a heading without return periods", expected);
    }

    /// <summary>Drops blank cells at the end, which spreadsheets leave behind.</summary>
    public static List<string> WithoutTrailingBlanks(IReadOnlyList<string> cells)
    {
        var list = cells.Select(c => c.Trim()).ToList();
        while (list.Count > 1 && list[^1].Length == 0) list.RemoveAt(list.Count - 1);
        return list;
    }

    /// <summary>Adds a row; its troubles are kept until <see cref="Build"/>.</summary>
    public void Add(int line, string durationText, double? durationMin, IReadOnlyList<string> cells)
    {
        if (durationMin is not { } d)
        {
            _problems.Add(new($"{name} line {line}", $"the duration '{durationText.Trim()}'", "a duration with its unit, such as 5-min, 1-hr or 2-day"));
            return;
        }
        if (cells.Count != returnPeriodsYr.Count)
        {
            _problems.Add(new($"{name} line {line}", $"{cells.Count} values after the duration {durationText.Trim()}",
                $"{returnPeriodsYr.Count} values, one for each return period of the heading"));
            return;
        }
        var values = new double[cells.Count];
        for (var j = 0; j < values.Length; j++)
        {
            if (Number(cells[j]) is { } v && v > 0) values[j] = v;
            else
                _problems.Add(new($"{name} line {line}, return period {returnPeriodsYr[j]:G6}", cells[j].Trim().Length == 0 ? "nothing" : $"'{cells[j].Trim()}'",
                    "a number above zero"));
        }
        _rows.Add((line, d, values));
    }

    /// <summary>Checks the whole table and makes it.</summary>
    /// <exception cref="InputException">Everything that is wrong with it.</exception>
    public RainfallTable Build(string origin, RainfallMeasure measure, RainfallSeries series, IReadOnlyList<string> heading,
        RainfallTable? lower = null, RainfallTable? upper = null)
    {
        if (_problems.Count > 0) throw new InputException(_problems);
        if (_rows.Count == 0) throw new InputException(name, "no rows with durations", "at least one row such as 5-min followed by its values");
        for (var i = 0; i < _rows.Count; i++)
        {
            var (line, d, values) = _rows[i];
            if (i > 0 && d <= _rows[i - 1].DurationMin)
                _problems.Add(new($"{name} line {line}", $"{d:G6} min after {_rows[i - 1].DurationMin:G6} min", "durations rising from row to row, each once"));
            for (var j = 0; j < values.Length; j++)
            {
                if (j > 0 && values[j] < values[j - 1])
                    _problems.Add(new($"{name} line {line}, return period {returnPeriodsYr[j]:G6}", $"{values[j]:G6} after {values[j - 1]:G6}",
                        "values that do not fall as the return period rises"));
                if (i == 0 || _rows[i - 1].Values.Length <= j) continue;
                var before = RainfallTable.ToIntensityMmPerH(_rows[i - 1].Values[j], measure, _rows[i - 1].DurationMin);
                var here = RainfallTable.ToIntensityMmPerH(values[j], measure, d);
                if (d > _rows[i - 1].DurationMin && here > before * (1 + 1e-9))
                    _problems.Add(new($"{name} line {line}, return period {returnPeriodsYr[j]:G6}",
                        $"{values[j]:G6}, which is {here:G4} mm/h over {d:G6} min after {before:G4} mm/h over {_rows[i - 1].DurationMin:G6} min",
                        "an intensity that does not rise with duration (is the table depth or intensity, and in the unit stated?)"));
            }
        }
        if (_problems.Count > 0) throw new InputException(_problems);
        var grid = new double[_rows.Count, returnPeriodsYr.Count];
        for (var i = 0; i < _rows.Count; i++)
            for (var j = 0; j < returnPeriodsYr.Count; j++) grid[i, j] = _rows[i].Values[j];
        return new(origin, measure, series, [.. _rows.Select(r => r.DurationMin)], [.. returnPeriodsYr], grid)
        {
            Heading = heading, LowerBound = lower, UpperBound = upper,
        };
    }
}
