#!/usr/bin/env python3
"""Makes the expected files of the terrain tests with general-purpose libraries (NumPy, scikit-image, SciPy, GDAL for reading).

    make_oracles.py DATA      DATA holds red_butte/, usgs_small_basins/ and small_dems/ with the files named in CASES

Two steps, because water on a flat may leave in more than one right way:
 1. elevations, filled surface (morphological reconstruction by erosion) and steepest descent come from the rasters alone;
 2. accumulation, labels and longest paths are computed here for the directions in NAME_direction.bin.gz, which the tests write
    with GEOCULVERT_WRITE_ORACLE_INPUT=1. Run the script, that test, and the script again.
All files: little-endian, row-major from the north-west, gzip.
"""
import gzip
import os
import sys

import numpy as np
from osgeo import gdal
from scipy import sparse
from scipy.sparse import csgraph
from skimage.morphology import reconstruction

gdal.UseExceptions()
HERE = os.path.dirname(os.path.abspath(__file__))
CASES = {
    "red_butte": ("red_butte/red_butte_dem.tif", "USGS National Elevation Dataset (public domain); packaged by others under MIT"),
    "bla_472": ("usgs_small_basins/bla_472_dem.tif", "USGS 3DEP (public domain)"),
    "cs_840": ("usgs_small_basins/cs_840_dem.tif", "USGS 3DEP (public domain)"),
    "gpo_3312": ("usgs_small_basins/gpo_3312_dem.tif", "USGS 3DEP (public domain)"),
    "wit_7506": ("usgs_small_basins/wit_7506_dem.tif", "USGS 3DEP (public domain)"),
    "jacksboro": ("small_dems/jacksboro_srtm3.tif", "NASA SRTM 3 arc-second, whole metres (public domain); cells taken as 77 x 92 m"),
}
# code - 1 -> row and column step, clockwise from north
STEPS = [(-1, 0), (-1, 1), (0, 1), (1, 1), (1, 0), (1, -1), (0, -1), (-1, -1)]
OUTLETS = 60


def write(name, array, kind):
    with open(os.path.join(HERE, name + ".bin.gz"), "wb") as raw, gzip.GzipFile("", "wb", 9, raw, 0) as file:
        file.write(np.ascontiguousarray(array).astype(kind).tobytes())


def read(name, kind):
    with gzip.open(os.path.join(HERE, name + ".bin.gz")) as file:
        return np.frombuffer(file.read(), kind)


def fill(z):
    """Nodata is a drain below everything; the rim of the grid is a seed at its own height; all else starts at the top."""
    hole = np.isnan(z)
    mask = np.where(hole, np.float32(-1e9), z).astype(np.float32)
    padded = np.pad(mask, 1, constant_values=np.float32(-1e9))
    seed = np.full_like(padded, padded.max())
    seed[padded == -1e9] = -1e9
    filled = reconstruction(seed, padded, method="erosion", footprint=np.ones((3, 3)))[1:-1, 1:-1].astype(np.float32)
    return np.where(hole, np.float32(np.nan), filled)


def shifted(a, step):
    """Value of the neighbour of every cell; NaN beyond the grid."""
    padded = np.pad(a, 1, constant_values=np.nan)
    return padded[1 + step[0]: 1 + step[0] + a.shape[0], 1 + step[1]: 1 + step[1] + a.shape[1]]


def steepest(filled, width, height):
    """Code of the steepest fall by true distance, first of equals clockwise from north; 255 where nothing is lower, 0 on nodata."""
    z = filled.astype(np.float64)
    slopes = np.stack([(z - shifted(z, s)) / np.hypot(s[0] * height, s[1] * width) for s in STEPS])
    slopes = np.where(np.isnan(slopes), -np.inf, slopes)
    code = np.where(slopes.max(0) > 0, slopes.argmax(0) + 1, 255)
    # two neighbours equally steep to within rounding: which one is 'first' depends on the order of operations, so leave these out
    ordered = np.sort(slopes, 0)
    with np.errstate(invalid="ignore"):
        close = (ordered[-1] > 0) & (ordered[-1] != ordered[-2]) & (ordered[-1] - ordered[-2] <= 1e-12 * ordered[-1])
    code = np.where(close, 254, code)
    return np.where(np.isnan(filled), 0, code).astype(np.uint8)


def routed(direction, valid, width, height, name, rows):
    shape = direction.shape
    flat = direction.ravel().astype(int)
    cells = np.flatnonzero(flat)
    steps = np.array([s[0] * shape[1] + s[1] for s in STEPS])
    target = cells + steps[flat[cells] - 1]
    n = flat.size
    # M[i, j] = 1 when j drains into i: accumulation = (1 + M + M^2 + ...) valid, summed until nothing moves any more
    m = sparse.csr_matrix((np.ones(cells.size, np.int64), (target, cells)), (n, n))
    moving = valid.ravel().astype(np.int64)
    total = moving.copy()
    turns = 0
    while moving.any():
        moving = m @ moving
        total += moving
        turns += 1
        assert turns <= n, "the directions hold a circle"
    write(name + "_accumulation", total, "<i4")

    # outlets: random cells, preferring large ones, so that they nest deeply
    draw = np.random.default_rng(20260101)
    weight = np.where(valid.ravel(), total.astype(float) ** 0.7, 0)
    outlets = draw.choice(n, OUTLETS, replace=False, p=weight / weight.sum())
    # cut the link below every outlet; what still hangs together is a local watershed (or drains to no outlet)
    keep = ~np.isin(cells, outlets)
    cut = sparse.csr_matrix((np.ones(keep.sum()), (cells[keep], target[keep])), (n, n))
    _, part = csgraph.connected_components(cut, directed=False)
    label_of = np.zeros(part.max() + 1, int)
    label_of[part[outlets]] = np.arange(1, OUTLETS + 1)
    assert np.unique(part[outlets]).size == OUTLETS
    labels = np.where(valid.ravel(), label_of[part], 0)
    write(name + "_labels", labels, "<i4")

    # distances up the tree from each outlet; there is one way only, so the shortest way is the way
    length = np.array([np.hypot(s[0] * height, s[1] * width) for s in STEPS])[flat[cells] - 1]
    up = sparse.csr_matrix((length, (target, cells)), (n, n))
    for start in range(0, OUTLETS, 10):
        some = outlets[start: start + 10]
        far = csgraph.dijkstra(up, indices=some)
        for k, outlet in enumerate(some):
            reached = np.isfinite(far[k])
            rows.append((f"{name}-{start + k}", name, outlet, int((labels == start + k + 1).sum()), int(reached.sum()), far[k][reached].max()))


def main(data):
    terrains = ["name,columns,rows,west,north,cell_width_m,cell_height_m,origin"]
    rows = []
    for name, (path, origin) in CASES.items():
        source = gdal.Open(os.path.join(data, path))
        z = source.ReadAsArray().astype(np.float32)
        z[z < -1000] = np.nan
        west, width, _, north, _, height = source.GetGeoTransform()
        if name == "jacksboro":
            west, width, north, height = 0, 77, 0, -92
        terrains.append(f'{name},{z.shape[1]},{z.shape[0]},{west!r},{north!r},{width!r},{-height!r},"{origin}"')
        write(name + "_elevation", z, "<f4")
        filled = fill(z)
        raised = np.flatnonzero((filled != z).ravel() & ~np.isnan(z).ravel())
        write(name + "_raised_cells", raised, "<i4")
        write(name + "_raised_to", filled.ravel()[raised], "<f4")
        write(name + "_steepest", steepest(filled, width, -height), "u1")
        if os.path.exists(os.path.join(HERE, name + "_direction.bin.gz")):
            direction = read(name + "_direction", "u1").reshape(z.shape)
            routed(direction, ~np.isnan(z), width, -height, name, rows)
    with open(os.path.join(HERE, "terrains.csv"), "w", encoding="utf-8") as file:
        file.write("\n".join(terrains) + "\n")
    if rows:
        with open(os.path.join(HERE, "outlets.csv"), "w", encoding="utf-8") as file:
            file.write("case,terrain,outlet_cell,local_cells,total_cells,expected,tolerance,unit,source,locator,status\n")
            for case, name, outlet, local, total, far in rows:
                file.write(f"{case},{name},{outlet},{local},{total},{far!r},1e-9,m,SciPy,"
                           "\"scipy.sparse.csgraph.connected_components and dijkstra, make_oracles.py\",COMPUTED\n")


if __name__ == "__main__":
    main(sys.argv[1])
