using GeoCulvert.Design.Basis;
using GeoCulvert.Design.Study;

namespace GeoCulvert.Report.Tests;

/// <summary>The sheet of an invented crossing; see <see cref="InventedStudy"/>.</summary>
internal static class InventedSheet
{
    public static CrossingSheet Make(InventedCrossing i, IReadOnlyList<(double, double)> profile)
    {
        var station = $"{(int)i.X / 1000}+{(int)i.X % 1000:D3}";
        var sheet = new CrossingSheet
        {
            CrossingId = i.Id,
            Road = i.Road,
            Station = station,
            Status = i.Status,
            Culvert = i.Culvert,
            Location = i.At,
            Watershed = i.Watershed,
            FlowPath = i.FlowPath,
            FlowPathProfile = profile,
            Findings = i.Findings,
            Groups =
            [
                new("Watershed", [
                    new("Drainage area", i.AreaM2, QuantityKind.Area, null, "measured from the DEM"), new("Longest flow path", i.FlowPath.Length, QuantityKind.Length, null, "measured from the DEM"),
                    new("10\u201385 slope", 0.0847, QuantityKind.Slope, null, "measured from the DEM"), new("Basin slope", 0.213, QuantityKind.Slope, null, "measured from the DEM"),
                    new("Relief", 88.4, QuantityKind.Length, null, "measured from the DEM"), new("Share of outline on the edge", i.Findings.Count > 1 ? 0.12 : 0, QuantityKind.Share, null, "measured from the DEM")]),
                new("Rainfall and time", [
                    new("Time of concentration", 1122, QuantityKind.Time, null, "computed, Kirpich"), new("Intensity, 25 yr", 61.3e-3 / 3600, QuantityKind.Intensity, null, "atlas14.csv"),
                    new("Runoff coefficient", 0.35, QuantityKind.None, null, "given in the project file"), new("Curve number", 75, QuantityKind.None, null, "default")]),
                new("Road and culvert line", [
                    new("Road level", i.InletM + 4.1, QuantityKind.Length, null, "profile.csv"), new("Road width", 9, QuantityKind.Length, null, "given in the project file"),
                    new("Skew", 12.4, QuantityKind.Angle, null, "measured from the DEM"), new("Inlet", null, QuantityKind.None, "square edge with headwall", "default")]),
                new("Tailwater", [new("Method", null, QuantityKind.None, "normal depth", "default"), new("Channel slope", 0.021, QuantityKind.Slope, null, "measured from the DEM"), new("Roughness", 0.04, QuantityKind.None, null, "default")]),
            ],
            Flows = [.. new[] { 2.0, 10, 25, 50, 100 }.SelectMany((y, k) => new[]
            {
                new SheetFlow("Rational", y, i.FlowM3PerS * (0.45 + (0.275 * k * (k < 3 ? 1 : 0.92))), null, null, true),
                new SheetFlow("Regional regression", y, i.FlowM3PerS * (0.38 + (0.24 * k)), i.FlowM3PerS * (0.2 + (0.1 * k)), i.FlowM3PerS * (0.8 + (0.5 * k)), false),
            })],
            Calculations =
            [
                new("Time of concentration", [
                    new("flow_path_length_ft", i.FlowPath.Length / 0.3048, "ft", "", "DEM"), new("slope_ft_per_ft", 0.0847, "ft/ft", "", "DEM"),
                    new("time_of_concentration_min", 18.7, "min", "0.0078 \u00d7 5906^0.77 / 0.0847^0.385", "Invented handbook, eq. 1")]),
                new("Rational method, 25 yr", [
                    new("intensity_mm_per_h", 61.3, "mm/h", "between 15 min and 30 min, log-log", "atlas14.csv"), new("runoff_coefficient", 0.35, "", "", "project file"),
                    new("flow_m3_s", i.FlowM3PerS, "m3/s", $"0.35 \u00d7 61.3 \u00d7 {i.AreaM2 / 1e4:F2} / 360", "Invented handbook, eq. 2")]),
            ],
        };
        return i.Barrels == 0 ? sheet with
        {
            Criteria = [new("Headwater elevation", "Design flood, 25 yr", 1441.93, 1440.5, QuantityKind.Length, false, "road level less 0.3 m freeboard")],
            Options = [new("3 x 2.40 m x 2.40 m box, concrete", 17.28, 1441.93, 1.61, 3.4, "headwater 1441.93 m above the limit 1440.50 m")],
        }
        : sheet with
        {
            Barrel = new($"{i.Culvert}, square edge with headwall, n = 0.012", i.LengthM, i.InletM, i.OutletM, i.RiseM, i.InletM + 4.1, 9, 2),
            Floods = [Flood("Design flood, 25 yr", 25, 1), Flood("Check flood, 100 yr", 100, 1.42)],
            Rating = [.. Enumerable.Range(0, 25).Select(k => Rated(k / 24.0 * 3.2))],
            Criteria =
            [
                new("Headwater elevation", "Design flood, 25 yr", i.HeadwaterM, i.LimitM, QuantityKind.Length, true, "1.5 times the rise"),
                new("HW/D", "Design flood, 25 yr", 1.18, 1.5, QuantityKind.None, true, "criteria.hw_over_d"),
                new("Outlet velocity", "Design flood, 25 yr", 2.9, 3.0, QuantityKind.Velocity, true, "criteria.outlet_velocity"),
                new("Freeboard", "Check flood, 100 yr", 0.21, 0.3, QuantityKind.Length, i.X < 2000, "criteria.freeboard"),
            ],
            Options =
            [
                new(i.Culvert, Math.PI / 4 * i.RiseM * i.RiseM * i.Barrels, i.HeadwaterM, 1.18, 2.9, "chosen"),
                new("1 x 0.45 m circle, concrete", 0.159, i.HeadwaterM + 1.12, 3.31, 4.8, "HW/D 3.31 above 1.5"),
                new("2 x 0.90 m circle, concrete", 1.272, i.HeadwaterM - 0.2, 0.98, 2.5, "more barrel area than needed"),
            ],
        };

        SheetRatingPoint Rated(double share)
        {
            var inlet = i.InletM + (i.RiseM * 1.18 * Math.Pow(share, 0.68));
            var outlet = i.InletM + (i.RiseM * (0.45 + (0.62 * share * share)));
            var road = i.InletM + 4.1;
            return new(share * i.FlowM3PerS, inlet, outlet, Math.Min(Math.Max(inlet, outlet), road + 0.2), share > 3 ? 0.1 : 0);
        }

        SheetFlood Flood(string name, double years, double share) => new(
            name, years, share * i.FlowM3PerS, Rated(share).HeadwaterElevationM, i.OutletM + (0.42 * i.RiseM * share), 2.9 * share, 0, "inlet", "S2",
            [.. Enumerable.Range(0, 20).Select(k => (k / 19.0 * i.LengthM, i.InletM - (0.437 * k / 19.0) + (i.RiseM * share * (0.66 - (0.14 * Math.Sqrt(k / 19.0))))))]);
    }
}
