using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Study;

namespace GeoCulvert.Report.Plots;

/// <summary>The headwater rating of a culvert: what inlet control asks for, what outlet control asks for, and what stands at the inlet.</summary>
public static class RatingPlot
{
    /// <summary>Draws the rating.</summary>
    /// <param name="points">Points in order of flow, SI; values that are not finite are left out.</param>
    /// <param name="units">System of the axes.</param>
    /// <param name="roadElevationM">Level at which the road overtops, or null.</param>
    /// <param name="floods">Floods to mark.</param>
    /// <param name="title">What the plot shows.</param>
    /// <param name="isStandalone">As a file of its own.</param>
    /// <returns>SVG text.</returns>
    public static string Write(
        IReadOnlyList<SheetRatingPoint> points,
        UnitSystem units,
        double? roadElevationM = null,
        IReadOnlyList<SheetFlood>? floods = null,
        string title = "Headwater rating",
        bool isStandalone = true)
    {
        ArgumentNullException.ThrowIfNull(points);
        double Flow(double v) => DisplayUnits.FromSi(v, QuantityKind.Flow, units);
        double Level(double v) => DisplayUnits.FromSi(v, QuantityKind.Length, units);
        var plot = new PlotSvg(
            title, $"Flow ({FigureText.Unit(QuantityKind.Flow, units)})", $"Headwater elevation ({FigureText.Unit(QuantityKind.Length, units)})");
        plot.Line(points.Select(p => (Flow(p.FlowM3PerS), Level(p.HeadwaterElevationM))), "c3", "headwater")
            .Line(points.Select(p => (Flow(p.FlowM3PerS), Level(p.InletControlElevationM))), "c1", "inlet control")
            .Line(points.Select(p => (Flow(p.FlowM3PerS), Level(p.OutletControlElevationM))), "c2", "outlet control");
        if (roadElevationM is { } road && points.Count > 0)
            plot.Line([(Flow(points[0].FlowM3PerS), Level(road)), (Flow(points[^1].FlowM3PerS), Level(road))], "c4", "road");
        foreach (var flood in floods ?? [])
        {
            plot.Dot(
                Flow(flood.FlowM3PerS),
                Level(flood.HeadwaterElevationM),
                FigureText.Round(flood.ReturnPeriodYr, QuantityKind.Years) + " yr",
                $"{flood.Name}: {FigureText.WithUnit(flood.FlowM3PerS, QuantityKind.Flow, units)}, headwater {FigureText.WithUnit(flood.HeadwaterElevationM, QuantityKind.Length, units)}");
        }
        return plot.Render(isStandalone);
    }
}
