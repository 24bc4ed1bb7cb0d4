"""Small deflate-compressed GeoTIFFs of many layouts, written by GDAL 3.6.2. The cells are known: z = 100 + column * 0.37 + row * 1.83, -9999 where column + row is a multiple of 11.

Run: python3 make_deflated.py
"""
import numpy as np
from osgeo import gdal, osr

COLUMNS, ROWS = 75, 53
column, row = np.meshgrid(np.arange(COLUMNS), np.arange(ROWS))
z = (100 + column * 0.37 + row * 1.83).astype("float32")
z[(column + row) % 11 == 0] = -9999
utm = osr.SpatialReference()
utm.ImportFromEPSG(26912)

LAYOUTS = {
    "tiled_1": ["TILED=YES", "BLOCKXSIZE=32", "BLOCKYSIZE=16"],
    "tiled_2": ["TILED=YES", "BLOCKXSIZE=32", "BLOCKYSIZE=16", "PREDICTOR=2"],
    "tiled_3": ["TILED=YES", "BLOCKXSIZE=32", "BLOCKYSIZE=16", "PREDICTOR=3"],
    "strips_1": ["BLOCKYSIZE=7"],
    "strips_2": ["BLOCKYSIZE=7", "PREDICTOR=2"],
    "strips_3": ["BLOCKYSIZE=7", "PREDICTOR=3"],  # 75 cells: rows of 300 bytes are no whole number of words
    "big_3": ["TILED=YES", "BLOCKXSIZE=32", "BLOCKYSIZE=16", "PREDICTOR=3", "BIGTIFF=YES"],
    "sparse_3": ["TILED=YES", "BLOCKXSIZE=32", "BLOCKYSIZE=16", "PREDICTOR=3", "SPARSE_OK=TRUE"],
    "motorola_1": ["TILED=YES", "BLOCKXSIZE=32", "BLOCKYSIZE=16", "ENDIANNESS=BIG"],
    "half_1": ["TILED=YES", "BLOCKXSIZE=32", "BLOCKYSIZE=16", "NBITS=16"],
}

for name, options in LAYOUTS.items():
    file = gdal.GetDriverByName("GTiff").Create(f"deflated/{name}.tif", COLUMNS, ROWS, 1, gdal.GDT_Float32, ["COMPRESS=DEFLATE", *options])
    file.SetGeoTransform((430000, 10, 0, 4514000, 0, -10))
    file.SetProjection(utm.ExportToWkt())
    band = file.GetRasterBand(1)
    band.SetNoDataValue(-9999)
    cells = z.copy()
    if name.startswith("sparse"):
        cells[16:32, 32:64] = -9999  # one whole tile without data is not written
    band.WriteArray(cells)
    file = None
