"""Writes rainfall_equation_expected.csv: i = a/(t + b)^c fitted with scipy to two Atlas 14 files, 5 min to 24 h.

Run in this folder: python3 rainfall_equation_expected.py. scipy.optimize.least_squares on ln i with free ln a, b, c (b held at zero or more).
"""
import csv
import re
import numpy as np
from scipy.optimize import least_squares

MIN = {"min": 1, "hr": 60, "day": 1440}


def read(path):
    years, t, v = None, [], []
    intensity = "inches/hour" in open(path, encoding="latin-1").readline()
    for line in open(path, encoding="latin-1"):
        cells = [c.strip() for c in line.strip().split(",")]
        m = re.match(r"(\d+)-(min|hr|day):?$", cells[0])
        if m:
            t.append(int(m[1]) * MIN[m[2]])
            v.append([float(c) for c in cells[1:] if c])
        elif len(cells) > 5 and cells[1] == "1":
            years = [float(c) for c in cells[1:] if c]
    t, v = np.array(t, float), np.array(v) * 25.4
    return years, t, v if intensity else v * 60 / t[:, None]


out = csv.writer(open("rainfall_equation_expected.csv", "w"), lineterminator="\n")
out.writerow("case,file,return_period_yr,duration_min,expected,unit,tolerance,b_min,c,worst_misfit,source,locator,status,note".split(","))
n = 0
for file in ["atlas14_ann_arbor_mi_pds_depth_in.csv", "atlas14_west_lafayette_in_pds_intensity_in_per_h.csv"]:
    years, t, i = read("../rainfall/" + file)
    use = t <= 1440
    for y in (2, 25, 100):
        obs = np.log(i[use, years.index(y)])
        best = min((least_squares(lambda p: p[0] - p[2] * np.log(t[use] + p[1]) - obs, [obs[0], b0, 0.8], bounds=([-20, 0, 0], [30, 200, 3]), xtol=1e-15, ftol=1e-15, gtol=1e-15)
                    for b0 in (1, 10, 30)), key=lambda r: r.cost)
        a, b, c = best.x
        fit = np.exp(a - c * np.log(t[use] + b))
        for d in (10, 60, 720):
            n += 1
            e = np.exp(a - c * np.log(d + b))
            out.writerow([f"EQ-{n}", file, y, d, f"{e:.6f}", "mm/h", f"{1e-5 * e:.6f}", f"{b:.5f}", f"{c:.6f}", f"{np.max(np.abs(fit / np.exp(obs) - 1)):.6f}",
                          "scipy.optimize.least_squares", "rainfall_equation_expected.py", "COMPUTED", ""])
