using System.Globalization;
using System.Text.RegularExpressions;
using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Hydrology;

/// <summary>
/// An equation as it is printed: <c>10^1.84257 * DA^0.86396 * (1 + 0.1*Sto)^-0.4918</c>. Numbers, names, + - * / ^ and brackets, and
/// the functions log10, ln and exp. ^ binds tightest and to the right, then the sign, then * /, then + -. This takes in products of powers,
/// offsets inside powers, exponents that depend on a share, and sums of logarithms.
/// </summary>
public sealed partial class EquationText
{
    private static readonly Dictionary<string, Func<double, double>> Functions = new(StringComparer.Ordinal)
    {
        ["log10"] = Math.Log10, ["ln"] = Math.Log, ["exp"] = Math.Exp,
    };

    private readonly Func<IReadOnlyDictionary<string, double>, double> _value;

    private EquationText(string text, Func<IReadOnlyDictionary<string, double>, double> value, IReadOnlyList<string> names) =>
        (Text, _value, Names) = (text, value, names);

    /// <summary>The equation as written.</summary>
    public string Text { get; }

    /// <summary>Names of its variables, each once, in order.</summary>
    public IReadOnlyList<string> Names { get; }

    /// <summary>Reads an equation.</summary>
    /// <param name="text">The right-hand side.</param>
    /// <param name="place">File and line for the error.</param>
    /// <exception cref="InputException">It is no equation; says where it stopped.</exception>
    public static EquationText Parse(string text, string place)
    {
        var parser = new Parser(text, place);
        var value = parser.Whole();
        return new(text.Trim(), value, [.. parser.Names.Distinct(StringComparer.Ordinal)]);
    }

    /// <summary>The value; may be infinite or NaN when the variables leave no other, which the caller checks.</summary>
    /// <exception cref="KeyNotFoundException">A variable is missing (a programmer's error).</exception>
    public double Value(IReadOnlyDictionary<string, double> variables) => _value(variables);

    /// <summary>The equation with the numbers put in.</summary>
    public string WithNumbers(IReadOnlyDictionary<string, double> variables) => NamePattern().Replace(Text, m =>
        Functions.ContainsKey(m.Value) || !variables.TryGetValue(m.Value, out var v) ? m.Value : v < 0 ? $"({v:G6})" : $"{v:G6}");

    // A letter that does not follow a digit or a dot, so that 1e5 stays a number.
    [GeneratedRegex(@"(?<![0-9.A-Za-z_])[A-Za-z_][A-Za-z0-9_]*")]
    private static partial Regex NamePattern();

    private sealed class Parser(string text, string place)
    {
        private const int DeepestNesting = 50;
        private int _at, _depth;

        public List<string> Names { get; } = [];

        public Func<IReadOnlyDictionary<string, double>, double> Whole()
        {
            var value = Sum();
            return Next() == '\0' ? value : throw Wrong("an operator or the end of the equation");
        }

        private Func<IReadOnlyDictionary<string, double>, double> Sum()
        {
            var left = Product();
            while (Next() is '+' or '-')
            {
                var (a, plus) = (left, text[_at++] == '+');
                var b = Product();
                left = plus ? v => a(v) + b(v) : v => a(v) - b(v);
            }
            return left;
        }

        private Func<IReadOnlyDictionary<string, double>, double> Product()
        {
            var left = Signed();
            while (Next() is '*' or '/')
            {
                var (a, times) = (left, text[_at++] == '*');
                var b = Signed();
                left = times ? v => a(v) * b(v) : v => a(v) / b(v);
            }
            return left;
        }

        private Func<IReadOnlyDictionary<string, double>, double> Signed()
        {
            if (Next() is not ('-' or '+')) return Power();
            var minus = text[_at++] == '-';
            var a = Nested(Signed);
            return minus ? v => -a(v) : a;
        }

        private Func<IReadOnlyDictionary<string, double>, double> Power()
        {
            var a = Atom();
            if (Next() != '^') return a;
            _at++;
            var b = Nested(Signed);
            return v => Math.Pow(a(v), b(v));
        }

        private Func<IReadOnlyDictionary<string, double>, double> Atom()
        {
            var c = Next();
            if (c == '(')
            {
                _at++;
                var inside = Nested(Sum);
                if (Next() != ')') throw Wrong("a closing bracket");
                _at++;
                return inside;
            }
            var start = _at;
            if (char.IsAsciiDigit(c) || c == '.')
            {
                while (_at < text.Length && (char.IsAsciiDigit(text[_at]) || text[_at] == '.' || IsExponent())) _at++;
                if (!double.TryParse(text[start.._at], NumberStyles.Float, CultureInfo.InvariantCulture, out var number) || !double.IsFinite(number))
                {
                    _at = start;
                    throw Wrong("a number");
                }
                return _ => number;
            }
            if (!char.IsAsciiLetter(c) && c != '_') throw Wrong("a number, a variable or a bracket");
            while (_at < text.Length && (char.IsAsciiLetterOrDigit(text[_at]) || text[_at] == '_')) _at++;
            var name = text[start.._at];
            if (Functions.TryGetValue(name, out var function))
            {
                if (Next() != '(') throw Wrong($"a bracket after {name}");
                var argument = Atom();
                return v => function(argument(v));
            }
            Names.Add(name);
            return v => v[name];
        }

        private Func<IReadOnlyDictionary<string, double>, double> Nested(Func<Func<IReadOnlyDictionary<string, double>, double>> part)
        {
            if (++_depth > DeepestNesting) throw Wrong($"at most {DeepestNesting} brackets and signs inside each other");
            var value = part();
            _depth--;
            return value;
        }

        // The e of 1e-5 and its sign belong to the number.
        private bool IsExponent() => (text[_at] is 'e' or 'E' && _at + 1 < text.Length && (char.IsAsciiDigit(text[_at + 1]) || text[_at + 1] is '-' or '+'))
            || (text[_at] is '-' or '+' && text[_at - 1] is 'e' or 'E');

        private char Next()
        {
            while (_at < text.Length && char.IsWhiteSpace(text[_at])) _at++;
            return _at < text.Length ? text[_at] : '\0';
        }

        private InputException Wrong(string expected) =>
            new(place, _at < text.Length ? $"'{text[_at]}' at character {_at + 1} of '{text.Trim()}'" : $"the end of '{text.Trim()}'", expected);
    }
}
