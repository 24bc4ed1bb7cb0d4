"""Writes unit_peak_expected.csv: qu of TR-55 (1986) table F-1 at every row and half-way between rows, by numpy.

Run in this folder. The curves are evaluated with numpy.polyval in log10, and between two curves numpy.interp takes qu itself.
"""
import csv
import numpy as np

rows = list(csv.DictReader(open("tr55_table_f1.csv")))
hours = [0.1, 0.15, 0.3, 0.5, 1.0, 1.53, 2.0, 4.0, 7.0, 10.0]
out = csv.writer(open("unit_peak_expected.csv", "w"), lineterminator="\n")
out.writerow("case,storm,ia_over_p,tc_h,expected,unit,tolerance,source,locator,status,note".split(","))
n = 0
for storm in ["I", "IA", "II", "III"]:
    curves = [r for r in rows if r["rain_type"] == storm]
    ratio = np.array([float(r["Ia_over_P"]) for r in curves])
    for h in hours:
        qu = np.array([10 ** np.polyval([float(r["C2"]), float(r["C1"]), float(r["C0"])], np.log10(h)) for r in curves])
        for x in np.sort(np.concatenate([ratio, (ratio[1:] + ratio[:-1]) / 2])):
            n += 1
            on = bool(np.any(np.isclose(ratio, x)))
            q = float(np.interp(x, ratio, qu))
            out.writerow([f"F1-{n}", storm, f"{x:.4g}", h, f"{q:.4f}", "csm/in", "0.0001", "TR-55 (1986) table F-1",
                          f"type {storm}, Ia/P {x:.4g}", "COMPUTED", "a row of the table" if on else "between two rows"])
