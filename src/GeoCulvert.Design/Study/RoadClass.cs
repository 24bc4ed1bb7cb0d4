using GeoCulvert.Design.Basis;

namespace GeoCulvert.Design.Study;

/// <summary>What a road class asks for unless the project file says otherwise (common practice).</summary>
/// <param name="Name">arterial, collector, local or track.</param>
/// <param name="DesignReturnPeriodYr">Design flood, years.</param>
/// <param name="CheckReturnPeriodYr">Check flood, years.</param>
/// <param name="SmallestRiseM">Smallest diameter or rise of a cross-drain, m.</param>
/// <param name="Source">Where the values come from.</param>
public sealed record RoadClass(string Name, double DesignReturnPeriodYr, double CheckReturnPeriodYr, double SmallestRiseM, Source Source)
{
    /// <summary>The classes of the shipped table.</summary>
    public static IReadOnlyList<RoadClass> All { get; } =
    [
        .. PublishedTable.Embedded("Study/Tables/road_classes.csv").Rows.Select(r => new RoadClass(
            r.Text("class"), r.Number("design_return_period_yr"), r.Number("check_return_period_yr"), r.Number("smallest_rise_m"), r.Source)),
    ];

    /// <summary>The class with a name.</summary>
    /// <exception cref="ArgumentException">There is none (a programmer's error: the project file is checked before).</exception>
    public static RoadClass Named(string name) =>
        All.FirstOrDefault(c => c.Name == name) ?? throw new ArgumentException($"No road class '{name}'.", nameof(name));
}
