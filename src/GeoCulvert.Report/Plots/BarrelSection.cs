using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Study;

namespace GeoCulvert.Report.Plots;

/// <summary>The culvert cut along its barrel: embankment, barrel, headwater, water in the barrel and tailwater. Vertical scale exaggerated.</summary>
public static class BarrelSection
{
    /// <summary>Draws the section; the first flood is filled, the second a broken line.</summary>
    /// <param name="barrel">Barrel and embankment.</param>
    /// <param name="floods">Design flood first, then the check flood.</param>
    /// <param name="units">System of the axes.</param>
    /// <param name="title">What the plot shows.</param>
    /// <returns>SVG text for the page.</returns>
    public static string Write(SheetBarrel barrel, IReadOnlyList<SheetFlood> floods, UnitSystem units, string title)
    {
        ArgumentNullException.ThrowIfNull(barrel);
        ArgumentNullException.ThrowIfNull(floods);
        (double, double) Out(double x, double z) => (DisplayUnits.FromSi(x, QuantityKind.Length, units), DisplayUnits.FromSi(z, QuantityKind.Length, units));
        var unit = FigureText.Unit(QuantityKind.Length, units);
        var plot = new PlotSvg(title, $"Distance from the inlet ({unit})", $"Elevation ({unit})", 940, 330);

        var (length, inlet, outlet, rise) = (barrel.LengthM, barrel.InletInvertM, barrel.OutletInvertM, barrel.RiseM);
        var reach = Math.Max(0.3 * length, 3 * rise);
        var (west, east) = (-reach, length + reach);
        double Invert(double x) => inlet + ((outlet - inlet) * x / length);
        var levels = floods.SelectMany(f => f.Surface.Select(s => s.ElevationM).Append(f.HeadwaterElevationM).Append(f.TailwaterElevationM));
        var high = levels.Append(inlet + rise).Append(outlet + rise).Append(barrel.RoadElevationM).Where(double.IsFinite).Max();
        var low = Math.Min(inlet, outlet);
        var margin = 0.12 * (high - low);
        (plot.XRange, plot.YRange) = ((Out(west, 0).Item1, Out(east, 0).Item1), (Out(0, low - margin).Item2, Out(0, high + margin).Item2));

        var half = Math.Min(barrel.RoadWidthM, length) / 2;
        var bank = Bank(barrel);
        var bed = low - margin;
        if (floods.Count > 0) FillOutside(floods[0]);
        plot.Fill([Out(west, bed), Out(west, inlet), Out(0, inlet), Out(length, outlet), Out(east, outlet), Out(east, bed)], "earth");
        plot.Fill(bank.Select(p => Out(p.X, p.Z)), "bank");
        plot.Fill([Out(0, inlet), Out(0, inlet + rise), Out(length, outlet + rise), Out(length, outlet)], "void");
        if (floods.Count > 0 && floods[0].Surface.Count > 1)
        {
            var wet = floods[0].Surface.Select(s => Out(s.DistanceM, Math.Clamp(s.ElevationM, Invert(s.DistanceM), Invert(s.DistanceM) + rise)));
            plot.Fill(wet.Prepend(Out(0, inlet)).Append(Out(length, outlet)), "water");
        }
        plot.Line([Out(0, inlet), Out(length, outlet)], "c6").Line([Out(0, inlet + rise), Out(length, outlet + rise)], "c6", "barrel");
        for (var i = 0; i < Math.Min(2, floods.Count); i++) plot.Line(Surface(floods[i]), i == 0 ? "c1" : "c5", floods[i].Name);
        foreach (var flood in floods.Take(1))
        {
            plot.Note(Out(west / 2, 0).Item1, Out(0, flood.HeadwaterElevationM).Item2, "headwater " + FigureText.FromSi(flood.HeadwaterElevationM, QuantityKind.Length, units), isBelow: true);
            plot.Note(Out(length + (reach / 2), 0).Item1, Out(0, Math.Max(flood.TailwaterElevationM, outlet)).Item2, "tailwater " + FigureText.FromSi(flood.TailwaterElevationM, QuantityKind.Length, units), isBelow: true);
        }
        plot.Note(Out(length / 2, 0).Item1, Out(0, barrel.RoadElevationM).Item2, "road " + FigureText.FromSi(barrel.RoadElevationM, QuantityKind.Length, units));
        return plot.Render(isStandalone: false);

        // Three pieces with a gap between: the pool up to the embankment, the water along the barrel, the tailwater from the embankment.
        IEnumerable<(double, double)> Surface(SheetFlood flood) =>
        [
            Out(west, flood.HeadwaterElevationM), Out(Math.Max(0, FaceAt(flood.HeadwaterElevationM, (length / 2) - half)), flood.HeadwaterElevationM), (double.NaN, 0),
            .. flood.Surface.Select(s => Out(s.DistanceM, s.ElevationM)), (double.NaN, 0),
            Out(Math.Min(length, length - FaceAt(flood.TailwaterElevationM, (length / 2) - half)), flood.TailwaterElevationM), Out(east, flood.TailwaterElevationM),
        ];

        double FaceAt(double level, double crest) => level >= barrel.RoadElevationM ? length / 2 : crest - ((barrel.RoadElevationM - level) * Math.Max(0, barrel.SideSlope));

        void FillOutside(SheetFlood flood)
        {
            var edge = length / 2;
            plot.Fill([Out(west, bed), Out(west, flood.HeadwaterElevationM), Out(edge, flood.HeadwaterElevationM), Out(edge, bed)], "water");
            plot.Fill([Out(edge, bed), Out(edge, flood.TailwaterElevationM), Out(east, flood.TailwaterElevationM), Out(east, bed)], "water");
        }
    }

    /// <summary>The embankment: crest, slopes down to the barrel line, and a headwall where a slope reaches the end of the barrel above it.</summary>
    private static List<(double X, double Z)> Bank(SheetBarrel b)
    {
        var (middle, half) = (b.LengthM / 2, Math.Min(b.RoadWidthM, b.LengthM) / 2);
        var slope = Math.Max(0, b.SideSlope);
        double Invert(double x) => b.InletInvertM + ((b.OutletInvertM - b.InletInvertM) * x / b.LengthM);
        List<(double X, double Z)> Face(double crest, double end)
        {
            var run = Math.Abs(end - crest);
            var atEnd = slope > 0 ? b.RoadElevationM - (run / slope) : double.NegativeInfinity;
            if (atEnd > Invert(end)) return [(end, Invert(end)), (end, atEnd)];

            // The slope meets the line of the barrel between the crest and its end: solve road - t / slope = invert(crest + sign t).
            var sign = Math.Sign(end - crest);
            var fall = (b.OutletInvertM - b.InletInvertM) / b.LengthM * sign;
            var t = slope > 0 ? Math.Clamp((b.RoadElevationM - Invert(crest)) / ((1 / slope) + fall), 0, run) : 0;
            return [(crest + (sign * t), Invert(crest + (sign * t)))];
        }
        var left = Face(middle - half, 0);
        var right = Face(middle + half, b.LengthM);
        right.Reverse();
        return [.. left, (middle - half, b.RoadElevationM), (middle + half, b.RoadElevationM), .. right];
    }
}
