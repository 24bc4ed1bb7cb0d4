"""Floods routed through pools by SciPy's LSODA, to which the program is held.

dS/dt = I(t) - O(h), S = c (h - bed)^p, O = k (h - invert)^q above the invert; the tables the program gets are cut from the same
functions. Writes level_pool_routing.csv beside this file. Needs NumPy and SciPy.
"""
import csv
import pathlib

import numpy as np
import scipy
from scipy.integrate import solve_ivp

CASES = [
    # case, bed, invert, c, p, k, q, base of the triangle s, time to peak s, peak m3/s
    ("wedge_weir", 10.0, 10.0, 900.0, 2.0, 2.5, 1.5, 7200.0, 2400.0, 4.0),
    ("cone_weir", 5.0, 5.0, 300.0, 3.0, 1.1, 1.5, 5400.0, 1800.0, 5.0),
    ("box_linear", 0.0, 0.0, 5000.0, 1.0, 2.0, 1.0, 10800.0, 3600.0, 6.0),
    ("dead_storage", 2.0, 2.6, 1500.0, 2.0, 2.5, 1.5, 7200.0, 2400.0, 4.0),
    ("little_storage", 1.0, 1.0, 5.0, 2.0, 2.5, 1.5, 3600.0, 1200.0, 3.0),
]

rows = []
for case, bed, invert, c, p, k, q, base, rise, peak in CASES:
    def inflow(t):
        return np.interp(t, [0, rise, base], [0, peak, 0])

    def level(s):
        return bed + (max(s, 0) / c) ** (1 / p)

    def outflow(s):
        return k * max(level(s) - invert, 0) ** q

    start = c * (invert - bed) ** p + 1e-6  # the slope of outflow over storage has no limit at an empty pool
    best_t, best_s = 0.0, start
    state = start
    top, top_t = 0.0, 0.0
    for a, b in ((0, rise), (rise, base)):
        answer = solve_ivp(lambda t, y: [inflow(t) - outflow(y[0])], (a, b), [state], method="LSODA", rtol=1e-10, atol=1e-8, dense_output=True)
        assert answer.success, (case, answer.message)
        times = np.linspace(a, b, 200001)
        flows = np.array([outflow(s) for s in answer.sol(times)[0]])
        if flows.max() > top:
            top, top_t = flows.max(), times[flows.argmax()]
            best_s = answer.sol(top_t)[0]
        state = answer.y[0, -1]
    rows.append([case, bed, invert, c, p, k, q, base, rise, peak, f"{top:.9g}", f"{top_t:.1f}", f"{level(best_s):.9g}", f"{state:.9g}",
                 "COMPUTED", "SciPy " + scipy.__version__, "make_routing_oracles.py", ""])

with open(pathlib.Path(__file__).with_name("level_pool_routing.csv"), "w", newline="\n") as f:
    out = csv.writer(f, lineterminator="\n")
    out.writerow("case,bed_m,invert_m,c,p,k,q,base_s,rise_s,peak_m3_s,peak_outflow_m3_s,peak_time_s,highest_level_m,last_storage_m3,status,source,locator,note".split(","))
    out.writerows(rows)
