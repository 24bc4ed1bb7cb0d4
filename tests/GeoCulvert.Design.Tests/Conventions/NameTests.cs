using System.Reflection;
using System.Text.RegularExpressions;
using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Tests.Conventions;

/// <summary>Public names carry their unit; finding codes are stable and documented.</summary>
public partial class NameTests
{
    private static readonly string[] UnitEndings =
    [
        "M", "M2", "M3", "Mm", "MPerM", "MPerS", "M3PerS", "MmPerH", "PerM3PerS", "S", "Min", "Minutes", "Hours", "Yr", "Years", "Deg", "Share", "Km2", "Ratio",
        "Factor", "Coefficient", "Number", "Count", "Pct", "MPerS2", "N", "Pa",
    ];

    public static IEnumerable<FindingCode> Codes() => typeof(Finding).Assembly.GetExportedTypes()
        .SelectMany(t => t.GetFields(BindingFlags.Public | BindingFlags.Static))
        .Where(f => f.FieldType == typeof(FindingCode))
        .Select(f => (FindingCode)f.GetValue(null)!);

    [Fact]
    public void NumbersCarryTheirUnit()
    {
        // Pure numbers and generic carriers whose unit stands beside them (Value with Unit, Limit with Kind).
        HashSet<string> plain = new(StringComparer.Ordinal)
        {
            "Value", "Limit", "InSi", "SideSlope", "HeadwaterOverRise", // ratios and carriers
            "West", "North", "East", "South", // coordinates of a frame, m by its contract
            "K", "C", "Y", "Ks", // book symbols of the inlet-control equations, pure numbers
            "Sum", "Least", "Most", "MeanOrNull",
            "Cost", // in the currency of the table of prices, which the program does not know
        };
        var offences = typeof(Finding).Assembly.GetExportedTypes()
            .SelectMany(t => t.GetProperties(BindingFlags.Public | BindingFlags.Instance | BindingFlags.DeclaredOnly))
            .Where(p => p.PropertyType == typeof(double) || p.PropertyType == typeof(double?))
            .Where(p => !plain.Contains(p.Name) && !UnitEndings.Any(e => p.Name.EndsWith(e, StringComparison.Ordinal)))
            .Select(p => $"{p.DeclaringType!.FullName}.{p.Name}")
            .ToList();
        Assert.Empty(offences);
    }

    [Fact]
    public void FindingCodesAreUniqueAndPlain()
    {
        var codes = Codes().ToList();
        Assert.NotEmpty(codes);
        Assert.Equal(codes.Count, codes.Select(c => c.Code).Distinct(StringComparer.Ordinal).Count());
        Assert.All(codes, c =>
        {
            Assert.Matches(Kebab(), c.Code);
            Assert.NotEqual("", c.Meaning);
            Assert.NotEqual("", c.Action);
        });
    }

    [GeneratedRegex("^[a-z0-9]+(-[a-z0-9]+)*$")]
    private static partial Regex Kebab();
}
