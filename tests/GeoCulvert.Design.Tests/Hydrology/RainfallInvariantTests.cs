using CsCheck;
using GeoCulvert.Design.Hydrology;

namespace GeoCulvert.Design.Tests.Hydrology;

public class RainfallInvariantTests
{
    private static readonly RainfallTable Table = RainfallTable.Read(
        "a.csv", Oracle.Rainfall("atlas14_ann_arbor_mi_pds_depth_in.csv"));

    private static readonly Gen<double> Duration = Gen.Double[5, 86400], Period = Gen.Double[1, 1000];

    [Fact]
    public void RisesWithReturnPeriodAndFallsWithDuration() => Gen.Select(Duration, Duration, Period, Period).Sample((d1, d2, t1, t2) =>
    {
        double short_ = Math.Min(d1, d2), long_ = Math.Max(d1, d2), often = Math.Min(t1, t2), rare = Math.Max(t1, t2);
        double I(double d, double t) => Table.Intensity(d, t).IntensityMmPerH!.Value;
        return I(short_, often) >= I(long_, often) * (1 - 1e-12) && I(short_, often) <= I(short_, rare) * (1 + 1e-12);
    });

    [Fact]
    public void LiesBetweenItsFourEntries() => Gen.Select(Duration, Period).Sample((d, t) =>
    {
        var value = Table.Intensity(d, t);
        var entries = value.Corners.Select(c => c.IntensityMmPerH).ToArray();
        return value.IntensityMmPerH >= entries.Min() * (1 - 1e-12) && value.IntensityMmPerH <= entries.Max() * (1 + 1e-12);
    });

    [Fact]
    public void NeverNaNNorNegativeAndAlwaysFlaggedOutside() => Gen.Select(Gen.Double[0.01, 1e6], Gen.Double[0.01, 1e5]).Sample((d, t) =>
    {
        var value = Table.Intensity(d, t);
        var outside = d < 5 || d > 86400 || t < 1 || t > 1000;
        var flagged = value.Findings.Any(f => f.Kind == HydrologyFindings.RainfallExtrapolated || f.Kind == HydrologyFindings.RainfallBeyondTable);
        return outside == flagged && (value.IntensityMmPerH is null || (value.IntensityMmPerH > 0 && double.IsFinite(value.IntensityMmPerH.Value)));
    });

    [Fact]
    public void AnnualMaximaHaveNoChanceAtOneYear()
    {
        var table = RainfallTable.Read("r.csv", "# series: annual maximum\nduration_min\\depth_mm,2,10\n5,8,12\n60,24,36\n");
        Assert.Null(table.Intensity(5, 1).IntensityMmPerH);
        Assert.NotNull(table.Intensity(5, 1.5).IntensityMmPerH);
        // z is 0 at the median of annual maxima and 1.2816 at 10 years (standard normal table).
        Assert.Equal(0, table.Deviate(2), 1e-9);
        Assert.Equal(1.2816, table.Deviate(10), 5e-5);
    }

    [Fact]
    public void TablesOfOneRowOrColumnGiveOnlyTheirEntries()
    {
        var table = RainfallTable.Read("r.csv", "duration_min\\depth_mm,10\n5,8\n60,24\n");
        Assert.Equal(24, table.Intensity(60, 10).IntensityMmPerH);
        Assert.Null(table.Intensity(60, 12).IntensityMmPerH);
    }
}
