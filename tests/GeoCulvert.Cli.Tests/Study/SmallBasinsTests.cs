using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Crossings;
using GeoCulvert.Design.Hydraulics;
using GeoCulvert.Design.Hydrology;
using GeoCulvert.Design.Sizing;
using GeoCulvert.Design.Study;
using GeoCulvert.Layers;
using NetTopologySuite.Geometries;

namespace GeoCulvert.Cli.Tests.Study;

/// <summary>Drainage areas of 58 small basins against published ones: USGS Open-File Report 2016-1106, appendix 1, on USGS 3DEP terrain.</summary>
public class SmallBasinsTests
{
    [Fact]
    public void AreasAgreeWithThePublishedOnes()
    {
        var table = PublishedTable.Parse("basins.csv", File.ReadAllText(Path.Combine(Geoculvert.DataFolder, "usgs_small_basins", "basins.csv")));
        Assert.Equal(58, table.Rows.Count);
        var ratios = table.Rows.Select(r => Area(r) / r.Number("published_contributing_area_km2")).Order().ToArray();
        var median = (ratios[28] + ratios[29]) / 2;
        Assert.InRange(median, 0.95, 1.03);
        var within = ratios.Count(r => Math.Abs(r - 1) <= 0.10);
        Assert.True(within >= 0.75 * 58, $"{within} of 58 within 10 %");
    }

    private static double Area(TableRow row)
    {
        using var source = RasterSource.Open(Path.Combine(Geoculvert.DataFolder, "usgs_small_basins", row.Text("file")));
        var model = ElevationReader.Read(source, new ElevationOptions(VerticalUnitM: 1));
        var given = GivenFlows.Read("given.csv", "crossing_id,return_period_yr,flow_m3_s\n*,25,1\n*,100,2\n");
        var result = DrainageStudy.Run(
            new StudyInputs
            {
                Elevation = model.Elevation,
                Roads = [],
                Points = [new GivenPoint("outlet", new Coordinate(row.Number("outlet_x_epsg5070_m"), row.Number("outlet_y_epsg5070_m")))],
            },
            new StudySettings
            {
                Flow = new FlowSettings([given], "given", [25, 100], [], new TimeOfConcentrationRule(TimeOfConcentrationChoice.Smallest), null),
                Catalogue = CulvertCatalogue.Build([InletCatalogue.Find("hds5-1-1", "test")], ["circle"], 0.012, null, 1),
                Criteria = new SizingCriteria(),
            },
            new Untimed());
        return result.Crossings.Single().Watershed.AreaM2 / 1e6;
    }

    private sealed class Untimed : IStages, IProgress<double>
    {
        public T Run<T>(string name, long? cells, Func<IProgress<double>, T> work) => work(this);

        public void Report(double value)
        {
        }
    }
}
