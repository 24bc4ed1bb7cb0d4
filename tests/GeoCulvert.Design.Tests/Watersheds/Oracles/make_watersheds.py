"""Figures of local and total watersheds on real terrain, with GDAL 3.6 (polygonize), numpy 1.24 and SciPy 1.10.

Reads elevation, direction and labels beside the tests of the terrain room (labels there are SciPy's). Area, perimeter and parts come
from GDAL's polygons of a mask; contact from counting sides with numpy; slopes of the ground from whole-array differences; the longest
path from distances added up the tree in order of rising distance, its slopes from numpy.interp and numpy.trapz.
Run: python3 make_watersheds.py > watersheds.csv
"""
import csv
import gzip
import os

import numpy as np
from osgeo import gdal, ogr
from scipy.sparse import csr_matrix
from scipy.sparse.csgraph import dijkstra

gdal.UseExceptions()
HERE = os.path.dirname(os.path.abspath(__file__))
TERRAIN = os.path.join(HERE, "..", "..", "Terrain", "Oracles")
STEP = {1: (-1, 0), 2: (-1, 1), 3: (0, 1), 4: (1, 1), 5: (1, 0), 6: (1, -1), 7: (0, -1), 8: (-1, -1)}
EVERY = 2


def read(name, what, kind):
    return np.frombuffer(gzip.open(os.path.join(TERRAIN, f"{name}_{what}.bin.gz")).read(), kind)


def polygons(mask, west, north, dx, dy):
    rows, cols = mask.shape
    ds = gdal.GetDriverByName("MEM").Create("", cols, rows, 1, gdal.GDT_Byte)
    ds.SetGeoTransform((west, dx, 0, north, 0, -dy))
    ds.GetRasterBand(1).WriteArray(mask.astype(np.uint8))
    out = ogr.GetDriverByName("Memory").CreateDataSource("x")
    layer = out.CreateLayer("x", None, ogr.wkbPolygon)
    gdal.Polygonize(ds.GetRasterBand(1), ds.GetRasterBand(1), layer, -1, [])
    area = length = 0.0
    parts = 0
    for feature in layer:
        g = feature.GetGeometryRef()
        area += g.GetArea()
        length += g.Boundary().Length()
        parts += 1
    return area, length, parts


def slope(z, dx, dy):
    """Horn 1981; a missing side is twice the middle less the opposite, or the middle; a missing corner its two sides less the middle."""
    p = np.pad(z, 1, constant_values=np.nan)
    at = lambda r, c: p[1 + r: 1 + r + z.shape[0], 1 + c: 1 + c + z.shape[1]]

    def side(r, c):
        s, o = at(r, c), at(-r, -c)
        return np.where(~np.isnan(s), s, np.where(np.isnan(o), z, 2 * z - o))

    n, s, w, e = side(-1, 0), side(1, 0), side(0, -1), side(0, 1)
    corner = lambda r, c, a, b: np.where(np.isnan(at(r, c)), a + b - z, at(r, c))
    nw, ne, sw, se = corner(-1, -1, n, w), corner(-1, 1, n, e), corner(1, -1, s, w), corner(1, 1, s, e)
    gx = (ne + 2 * e + se - nw - 2 * w - sw) / (8 * dx)
    gy = (nw + 2 * n + ne - sw - 2 * s - se) / (8 * dy)
    return np.hypot(gx, gy)


print("terrain,outlet,extent,cells,area_m2,perimeter_m,parts,contact_m,centroid_x,centroid_y,mean_elevation_m,relief_m,mean_slope,path_m,slope_10_85,slope_end,slope_equal_area")
for row in csv.DictReader(line for line in open(os.path.join(TERRAIN, "terrains.csv"))):
    name, cols, rows = row["name"], int(row["columns"]), int(row["rows"])
    west, north, dx, dy = (float(row[k]) for k in ("west", "north", "cell_width_m", "cell_height_m"))
    z = read(name, "elevation", "<f4").astype(float).reshape(rows, cols)
    d = read(name, "direction", "u1").reshape(rows, cols)
    labels = read(name, "labels", "<i4").reshape(rows, cols)
    outlets = [int(o["outlet_cell"]) for o in csv.DictReader(open(os.path.join(TERRAIN, "outlets.csv"))) if o["terrain"] == name]
    there = ~np.isnan(z)
    ground = slope(z, dx, dy)
    flat = d.ravel()
    cells = np.arange(rows * cols)
    dr, dc = np.zeros(9, int), np.zeros(9, int)
    for code, (r, c) in STEP.items():
        dr[code], dc[code] = r, c
    down = cells + dr[flat] * cols + dc[flat]
    step = np.hypot(dr[flat] * dy, dc[flat] * dx)
    has = flat > 0
    up = csr_matrix((step[has], (down[has], cells[has])), shape=(rows * cols, rows * cols))
    cx = west + (np.arange(cols) + 0.5) * dx
    cy = north - (np.arange(rows) + 0.5) * dy
    outside = np.pad(~there, 1, constant_values=True)
    for k in range(0, len(outlets), EVERY):
        far = dijkstra(up, indices=outlets[k])
        for extent in ("local", "total"):
            mask = labels == k + 1 if extent == "local" else np.isfinite(far).reshape(rows, cols)
            area, length, parts = polygons(mask, west, north, dx, dy)
            contact = (
                (mask & outside[:-2, 1:-1]).sum() * dx + (mask & outside[2:, 1:-1]).sum() * dx
                + (mask & outside[1:-1, :-2]).sum() * dy + (mask & outside[1:-1, 2:]).sum() * dy)
            rr, cc = np.nonzero(mask)
            inside = np.where(mask.ravel(), far, -1)
            path = [int(np.argmax(inside))]
            ties = (np.abs(inside - inside.max()) < 1e-6).sum()
            while path[-1] != outlets[k]:
                path.append(int(down[path[-1]]))
            s = np.concatenate([[0], np.cumsum(step[path[:-1]])])
            h = z.ravel()[path]
            slopes = ["", "", ""]
            if len(path) > 1 and ties == 1:
                above = s[-1] - s
                order = np.argsort(above)
                e10, e85 = np.interp([0.10 * s[-1], 0.85 * s[-1]], above[order], h[order])
                slopes = [f"{(e85 - e10) / (0.75 * s[-1]):.10g}", f"{(h[0] - h[-1]) / s[-1]:.10g}", f"{2 * np.trapz(h[order] - h[-1], above[order]) / s[-1] ** 2:.10g}"]
            print(",".join([name, str(k), extent, str(mask.sum()), f"{area:.12g}", f"{length:.12g}", str(parts), f"{contact:.12g}",
                            f"{cx[cc].mean():.12g}", f"{cy[rr].mean():.12g}", f"{z[mask].mean():.10g}", f"{z[mask].max() - z[mask].min():.10g}",
                            f"{ground[mask].mean():.10g}", f"{inside.max():.12g}", *slopes]))
