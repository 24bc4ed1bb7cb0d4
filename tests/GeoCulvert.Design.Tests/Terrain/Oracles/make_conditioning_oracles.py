#!/usr/bin/env python3
"""Makes cheapest_cuts.csv (scikit-image's minimum-cost paths) and depressions.csv (SciPy's labels) from the elevations beside this file.

    make_conditioning_oracles.py

cheapest_cuts: square windows of the terrain, seeded at random, without nodata, half of them upside down (hills make deep pits). For the lowest pit of a window the least sum of cuts over all ways to a
cell lower than the pit or on the window's edge, without and with a limit of depth a little below the deepest cut of that way. Sums, not paths: of equal ways the library may take another.
depressions: the connected cells that morphological reconstruction raised, the largest of each terrain and the sums of all.
"""
import csv
import os

import numpy as np
from scipy import ndimage
from skimage.graph import MCP
from skimage.morphology import local_minima

from make_oracles import CASES, HERE, fill, read

SIDES, WINDOWS, LARGEST = (25, 61), 15, 12


def shape_of(name):
    with open(os.path.join(HERE, "terrains.csv"), encoding="utf-8") as file:
        row = next(r for r in csv.DictReader(file) if r["name"] == name)
    return int(row["rows"]), int(row["columns"])


def least_cut(z, pit, limit):
    """The least sum and the deepest cut on the way the library took."""
    level = z[pit][0]
    cut = np.maximum(0.0, z.astype(float) - float(level))
    cost = np.where(cut <= limit, cut, np.inf)
    ends = z < level
    ends[[0, -1], :] = True
    ends[:, [0, -1]] = True
    paths = MCP(cost, fully_connected=True)
    total, _ = paths.find_costs(np.argwhere(pit))
    least = np.where(ends, total, np.inf)
    end = np.unravel_index(least.argmin(), least.shape)
    if np.isinf(least[end]):
        return np.inf, np.inf
    return least[end], max(cut[cell] for cell in paths.traceback(end))


def cuts(name, z, chance):
    seen = set()
    for _ in range(3000):
        side, sign = int(chance.choice(SIDES)), int(chance.choice((1, -1)))
        if min(z.shape) < side:
            continue
        row, column = (int(chance.integers(0, n - side + 1)) for n in z.shape)
        window = np.float32(sign) * z[row:row + side, column:column + side]
        minima = local_minima(window, connectivity=2, allow_borders=False)
        if np.isnan(window).any() or not minima.any():
            continue
        level = window[minima].min()
        if level in seen or sum((known > 0) == (sign > 0) for known in seen) == WINDOWS:
            continue
        seen.add(level)
        labels, _ = ndimage.label(minima & (window == level), np.ones((3, 3)))
        pit = labels == 1
        free, deepest = least_cut(window, pit, np.inf)
        limit = round(deepest * 0.9, 3)
        held, _ = least_cut(window, pit, limit)
        yield name, sign, row, column, side, repr(float(level)), repr(float(free)), limit, "" if np.isinf(held) else repr(float(held))


def depressions(name, z):
    filled = fill(z)
    depth = np.where(filled > z, filled.astype(float) - z, 0.0)
    labels, count = ndimage.label(depth > 0, np.ones((3, 3)))
    index = np.arange(1, count + 1)
    cells = ndimage.sum(np.ones(z.shape), labels, index)
    sums = ndimage.sum(depth, labels, index)
    deepest = ndimage.maximum(depth, labels, index)
    level = ndimage.maximum(filled, labels, index)
    for k in np.lexsort((index, -sums))[:LARGEST]:
        yield name, count, int(cells.sum()), repr(float(sums.sum())), k, int(cells[k]), repr(float(sums[k])), repr(float(deepest[k])), repr(float(level[k]))


def write(file, head, rows):
    with open(os.path.join(HERE, file), "w", encoding="utf-8", newline="") as out:
        writer = csv.writer(out, lineterminator="\n")
        writer.writerow(head)
        writer.writerows(rows)


chance = np.random.default_rng(20140)
terrain = {name: read(name + "_elevation", "<f4").reshape(shape_of(name)) for name in CASES}
write("cheapest_cuts.csv", ["name", "sign", "row", "column", "side", "pit_level_m", "cut_m", "depth_limit_m", "limited_cut_m"],
      [r for name, z in terrain.items() for r in cuts(name, z, chance)])
write("depressions.csv", ["name", "all", "all_cells", "all_depths_m", "number", "cells", "depths_m", "deepest_m", "level_m"],
      [r for name, z in terrain.items() for r in depressions(name, z)])
