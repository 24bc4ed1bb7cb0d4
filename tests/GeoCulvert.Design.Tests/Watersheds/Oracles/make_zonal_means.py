"""Area-weighted means over labelled cells from rasters on grids of their own, with numpy 1.24.

Labels and values follow from formulas that the test repeats. The overlap of two axis-aligned grids is a product of two
matrices of overlap lengths, one for columns and one for rows; nothing is swept. Run: python3 make_zonal_means.py > zonal_means.csv
"""
import numpy as np

W, H = 120, 90
i = np.arange(W * H)
labels = ((((i % W) * 7) + ((i // W) * 3)) // 97 % 4).reshape(H, W)


def overlap(edges_a, edges_b):
    """Length that interval j of b has in common with interval i of a."""
    low = np.maximum(edges_a[:-1, None], edges_b[None, :-1])
    high = np.minimum(edges_a[1:, None], edges_b[None, 1:])
    return np.clip(high - low, 0, None)


print("label,columns,rows,west,north,cell_width,cell_height,mean,missing_share")
for cols, rows, west, north, cw, ch in [
    (45, 35, 990.0, 9005.0, 28.6, 27.3),      # coarser, off the lines, covers all
    (400, 300, 1203.7, 8700.2, 2.5, 1.9),     # finer, covers a part
]:
    r, c = np.mgrid[0:rows, 0:cols]
    values = ((r * 13 + c * 29) % 101).astype(float)
    there = (r + 2 * c) % 11 != 0
    across = overlap(1000 + 10.0 * np.arange(W + 1), west + cw * np.arange(cols + 1))            # W x cols
    down = overlap(-9000 + 10.0 * np.arange(H + 1), -north + ch * np.arange(rows + 1))           # H x rows
    area = down @ there.astype(float) @ across.T                                                 # H x W
    total = down @ np.where(there, values, 0) @ across.T
    for label in (1, 2, 3):
        m = labels == label
        print(f"{label},{cols},{rows},{west},{north},{cw},{ch},{total[m].sum() / area[m].sum():.12g},{1 - area[m].sum() / (100.0 * m.sum()):.12g}")
