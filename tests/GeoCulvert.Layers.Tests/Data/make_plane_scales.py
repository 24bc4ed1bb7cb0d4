"""Expected scale factors of planes, by PROJ's own factors (pyproj.Proj.get_factors), an implementation apart from the program's.

pyproj 3.4.1 with PROJ 9.1.1. Columns: EPSG code, x and y in the system's units, scales along the meridian (h) and along the parallel (k), areal scale (s),
largest (a) and smallest (b) scale of the Tissot ellipse; all are plane by true. Run: python3 make_plane_scales.py > plane_scales.csv
"""
import math

import pyproj

PLACES = [
    (26912, -111.80, 40.78),  # Red Butte, near the middle of its half zone
    (32612, -110.70, 45.03),  # Gardiner
    (32612, -108.00, 36.00),  # edge of the zone
    (32612, -105.00, 36.00),  # beyond it
    (3857, -110.70, 45.03),   # Web Mercator: nearly 1.41
    (3857, 10.00, 60.00),
    (5070, -120.00, 47.00),   # equal area, lengths off
    (5070, -96.00, 37.00),
    (2277, -97.70, 30.30),    # US survey feet, Lambert
    (2056, 8.30, 46.80),      # Swiss oblique Mercator
    (27700, -3.00, 55.00),    # Airy ellipsoid
    (28992, 5.40, 52.20),     # oblique stereographic, Bessel
    (3413, -45.00, 89.00),    # a degree from the pole
    (6933, 100.00, 50.00),    # cylindrical equal area
]


def web_mercator(lat):
    """PROJ gives the factors of EPSG:3857 on a sphere; on the ellipsoid of WGS 84 they follow from its radii of curvature M and N by hand."""
    a, f = 6378137.0, 1 / 298.257223563
    e2, p = f * (2 - f), math.radians(lat)
    w = math.sqrt(1 - e2 * math.sin(p) ** 2)
    h, k = a / math.cos(p) / (a * (1 - e2) / w ** 3), a / math.cos(p) / (a / w)
    return h, k, h * k, max(h, k), min(h, k)


print("epsg,x,y,h,k,s,a,b")
for epsg, lon, lat in PLACES:
    plane = pyproj.Proj(pyproj.CRS.from_epsg(epsg))
    f = plane.get_factors(lon, lat)
    figures = f.meridional_scale, f.parallel_scale, f.areal_scale, f.tissot_semimajor, f.tissot_semiminor
    if epsg == 3857:
        figures = web_mercator(lat)
    x, y = plane(lon, lat)
    print(f"{epsg},{x:.6f},{y:.6f}," + ",".join(f"{v:.12f}" for v in figures))
