using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Hydrology;

namespace GeoCulvert.Design.Tests.Hydrology;

public class TimeMethodsOracleTests
{
    private const double Ft = 0.3048, Mile = 5280 * Ft;

    private static double Step(TimeOfConcentration t, string name) => t.Steps.Single(s => s.Name == name).Value;

    // TxDOT Hydraulic Design Manual, chapter 4, "Application of the Kerby-Kirpich Method": 0.5 mi2, path of 5280 ft falling 50 ft, overland
    // flow 500 ft at 2 percent over average grass (N 0.40): about 25 min, channel about 32 min, together about 57 min.
    [Fact]
    public void KerbyKirpichExampleOfTxDot()
    {
        var catchment = new Catchment("x", 0.5 * Mile * Mile) { LongestFlowPathM = 5280 * Ft, FlowPathEndToEndSlopeMPerM = 50.0 / 5280 };
        var tc = new KerbyKirpich(0.40) { OverlandLengthM = 500 * Ft, OverlandSlopeMPerM = 0.02 }.Compute(catchment, new());
        Assert.Equal(25, Step(tc, "overland_time_min"), 0.5);
        Assert.Equal(32, Step(tc, "channel_time_min"), 0.5);
        Assert.Equal(57, tc.TimeMin!.Value, 0.5);
        Assert.Equal([500 * Ft, 5280 * Ft], tc.Segments.Select(s => s.ToM));
        Assert.DoesNotContain(tc.Findings, f => f.Kind == TimeFindings.OutsideRange);
    }

    // TxDOT Hydraulic Design Manual eq. 4-14: K = 0.828 with feet, 1.44 with metres (by hand 0.828 x 3.28084^0.467 = 1.442).
    // Kerby's own form ((0.67 N L)/S^0.5)^0.467 has 0.67^0.467 = 0.829 and 0.467/2 = 0.2335 in place of 0.235.
    [Theory]
    [InlineData(60, 0.4, 0.02)]
    [InlineData(300, 0.1, 0.005)]
    public void KerbyForms(double length, double n, double s)
    {
        var t = Kerby.TimeMin(length, n, s);
        Assert.Equal(1.44 * Math.Pow(length * n, 0.467) * Math.Pow(s, -0.235), t, 0.005 / 1.44 * t);
        Assert.Equal(Math.Pow(0.67 * n * length / Ft / Math.Sqrt(s), 0.467), t, 0.015 * t);
    }

    // Drainage report filed with the Colorado Division of Reclamation, Mining and Safety (document 760903): 500 ft at 0.6 % with C 0.10 by
    // 1.8 (1.1 - C) L^0.5 / S^(1/3): 47.72 min.
    [Fact]
    public void FaaFiledExample() => Assert.Equal(47.72, FaaTime.TimeMin(0.10, 500 * Ft, 0.006), 0.005);

    // With metres 1.8 x 3.28084^0.5 = 3.26.
    [Fact]
    public void FaaForms() => Assert.Equal(3.26 * (1.1 - 0.35) * Math.Sqrt(120) / Math.Cbrt(1.5), FaaTime.TimeMin(0.35, 120, 0.015), 0.005 / 3.26 * 40);

    // NEH-630 chapter 15: L = l^0.8 (S+1)^0.7/(1900 Y^0.5), Tc = L/0.6 = l^0.8 (S+1)^0.7/(1140 Y^0.5); both forms are seen in a filed flood report
    // (Colorado DRMS document 484917). By hand: 5000 ft, CN 75, 4 %: 5000^0.8 = 910.28, 4.33333^0.7 = 2.79110, 910.28 x 2.79110/3800 = 0.66860 h.
    [Fact]
    public void LagByHandAndItsForms()
    {
        var lag = NrcsLag.LagMin(5000 * Ft, 75, 0.04);
        Assert.Equal(0.66860, lag / 60, 0.00005);
        var catchment = new Catchment("x", 1e6) { LongestFlowPathM = 5000 * Ft, MeanBasinSlopeMPerM = 0.04, CurveNumber = 75 };
        var tc = new NrcsLag().Compute(catchment, new());
        Assert.Equal(Math.Pow(5000, 0.8) * Math.Pow(1000.0 / 75 - 9, 0.7) / (1140 * Math.Sqrt(4)), tc.TimeMin!.Value / 60, 1e-9);
        // Metric form, constants MEMORY: l^0.8 (2540 - 22.86 CN)^0.7 / (14104 CN^0.7 Y^0.5) with m and m/m.
        var si = Math.Pow(5000 * Ft, 0.8) * Math.Pow(2540 - 22.86 * 75, 0.7) / (14104 * Math.Pow(75, 0.7) * Math.Sqrt(0.04));
        Assert.Equal(si, lag / 60, 0.0002 * si);
    }

    // Bransby Williams (1922) as taken apart by Ladson (2017): a^2 = t^5 (100 S) for a circle of a square miles, times L/d for other shapes.
    // Handbook forms: 21.3 (mi, mi2, ft/ft), 14.6 (km, km2, m/m), 58 (km, km2, m/km).
    [Theory]
    [InlineData(2.0, 1.5, 0.01)]
    [InlineData(9.0, 20, 0.03)]
    public void BransbyWilliamsForms(double lengthMi, double areaMi2, double slope)
    {
        var t = BransbyWilliams.TimeMin(lengthMi * Mile, areaMi2 * Mile * Mile, slope);
        var circleHours = Math.Pow(areaMi2 * areaMi2 / (100 * slope), 0.2);
        var paper = 60 * circleHours * lengthMi / Math.Sqrt(4 * areaMi2 / Math.PI);
        Assert.Equal(paper, t, 0.007 * t);
        double km = lengthMi * Mile / 1000, km2 = areaMi2 * Mile * Mile / 1e6;
        Assert.Equal(14.6 * km * Math.Pow(km2, -0.1) * Math.Pow(slope, -0.2), t, 0.005 * t);
        Assert.Equal(58 * km / (Math.Pow(km2, 0.1) * Math.Pow(1000 * slope, 0.2)), t, 0.009 * t);
    }

    // HEC-22: 6.92 with metres and mm/h, 0.933 with feet and in/h; and by hand from Manning's equation on a plane, t = (n L/S^0.5)^0.6/i^0.4 in SI, whose
    // constant with minutes and mm/h is (3.6e6)^0.4/60 = 6.99.
    [Fact]
    public void KinematicForms()
    {
        var t = KinematicWave.SheetTimeMin(30, 0.24, 0.02, 60);
        Assert.Equal(0.933 / Math.Pow(60 / 25.4, 0.4) * Math.Pow(0.24 * 30 / Ft / Math.Sqrt(0.02), 0.6), t, 0.003 * t);
        Assert.Equal(Math.Pow(0.24 * 30 / Math.Sqrt(0.02), 0.6) / Math.Pow(60 / 3.6e6, 0.4) / 60, t, 0.011 * t);
    }

    // By hand: 1000 ft, n 0.05, 0.02, 2 in/h: 0.66 x 31.6228 x 0.05^0.52 (0.210597) x 0.02^-0.31 (3.362696) x 2^-0.38 (0.768437) = 11.358 min. Coefficients MEMORY.
    [Fact]
    public void PapadakisKazanByHand() => Assert.Equal(11.358, PapadakisKazan.TimeMin(1000 * Ft, 0.05, 0.02, 50.8), 0.002);

    // With i = 120 t^-0.6 (mm/h, min) the iteration has a closed solution: t = K i^-p gives t = (K 120^-p)^(1/(1 - 0.6 p)).
    [Fact]
    public void IterationMeetsItsClosedSolution()
    {
        var path = Enumerable.Range(0, 3).Select(k => new FlowPathPoint(10 * k, 1 - 0.2 * k, "71")).ToList();
        var catchment = new Catchment("x", 1e4) { LongestFlowPathM = 20, FlowPathEndToEndSlopeMPerM = 0.02, FlowPath = path };
        var context = new TimeOfConcentrationContext(new PowerRain(120, 0.6), ReturnPeriodYr: 10);
        double Closed(double k, double p) => Math.Pow(k * Math.Pow(120, -p), 1 / (1 - 0.6 * p));
        var wave = new KinematicWave().Compute(catchment, context).TimeMin!.Value;
        Assert.Equal(Closed(KinematicWave.SheetTimeMin(20, 0.15, 0.02, 1), 0.4), wave, 1e-6 * wave);
        var papadakis = new PapadakisKazan().Compute(catchment, context);
        Assert.Equal(0.15, Step(papadakis, "roughness"), 1e-12);
        Assert.Equal(Closed(PapadakisKazan.TimeMin(20, 0.15, 0.02, 1), 0.38), papadakis.TimeMin!.Value, 1e-6 * papadakis.TimeMin!.Value);
    }

    private sealed record PowerRain(double A, double B) : IRainfall
    {
        public string Origin => "power law";

        public RainfallIntensity Intensity(double durationMin, double returnPeriodYr) => new(durationMin, returnPeriodYr, A * Math.Pow(durationMin, -B), [], 0, 0, Origin, []);
    }
}
