"""Interpolated Atlas 14 intensities, made independently of the program. Run in this folder: python3 rainfall_expected.py > expected.csv

ln(intensity) is linear in ln(duration) and in the normal deviate z = Phi^-1(exp(-1/T)) of an average recurrence interval T.
"""
import csv, math, statistics

PHI = statistics.NormalDist().inv_cdf
MINUTES = {"min": 1, "hr": 60, "day": 1440}
CASES = [  # file, minutes, years
    ("atlas14_ann_arbor_mi_pds_depth_in.csv", 7, 10), ("atlas14_ann_arbor_mi_pds_depth_in.csv", 42, 25),
    ("atlas14_ann_arbor_mi_pds_depth_in.csv", 60, 20), ("atlas14_ann_arbor_mi_pds_depth_in.csv", 23.4, 33),
    ("atlas14_ann_arbor_mi_pds_depth_in.csv", 12.5, 1.5), ("atlas14_ann_arbor_mi_pds_depth_in.csv", 2000, 75),
    ("atlas14_fort_myers_fl_pds_depth_in.csv", 8, 3), ("atlas14_fort_myers_fl_pds_depth_in.csv", 90, 40),
    ("atlas14_fort_myers_fl_pds_depth_in.csv", 1000, 1000), ("atlas14_west_lafayette_in_pds_intensity_in_per_h.csv", 6, 2),
    ("atlas14_west_lafayette_in_pds_intensity_in_per_h.csv", 75, 60), ("atlas14_west_lafayette_in_pds_intensity_in_per_h.csv", 300, 350),
]


def read(name):
    years, rows, intensity = None, [], False
    for cells in csv.reader(open("rainfall/" + name, encoding="latin-1")):
        text = ",".join(cells)
        intensity = intensity or "inches/hour" in text
        first = cells[0].strip().rstrip(":") if cells else ""
        if years is None and len(cells) > 9 and cells[1].strip() == "1":
            years = [float(c) for c in cells[1:] if c.strip()]
        elif years and "-" in first and first.split("-")[1] in MINUTES:
            n, unit = first.split("-")
            d = float(n) * MINUTES[unit]
            v = [float(c) * 25.4 for c in cells[1:] if c.strip()]
            rows.append((d, v if intensity else [x * 60 / d for x in v]))
    return years, rows


def around(nodes, x):
    k = next(i for i in range(1, len(nodes)) if x <= nodes[i])
    return k - 1, k


print("file,duration_min,return_period_yr,expected_mm_per_h,relative_tolerance,source,status")
for name, d, t in CASES:
    years, rows = read(name)
    i0, i1 = around([r[0] for r in rows], d)
    j0, j1 = around(years, t)
    z = lambda y: PHI(math.exp(-1 / y))
    u = math.log(d / rows[i0][0]) / math.log(rows[i1][0] / rows[i0][0])
    v = (z(t) - z(years[j0])) / (z(years[j1]) - z(years[j0]))
    L = lambda i, j: math.log(rows[i][1][j])
    ln = (1 - u) * ((1 - v) * L(i0, j0) + v * L(i0, j1)) + u * ((1 - v) * L(i1, j0) + v * L(i1, j1))
    print(f"{name},{d},{t},{math.exp(ln):.9g},1e-7,rainfall_expected.py from the NOAA Atlas 14 file,COMPUTED")
