"""Areas, perimeters and flow path lengths on the ellipsoid by geodesics (GeographicLib through pyproj.Geod), an implementation apart from the program's.

Reads longitude and latitude of what a run wrote with --geojson and prints one row for each watershed.
pyproj 3.4.1 with PROJ 9.1.1. Run: python3 make_geodesic.py CASE RESULTS/geojson >> geodesic.csv
"""
import json
import sys

import pyproj

GEOD = pyproj.Geod(ellps="WGS84")
case, folder = sys.argv[1:3]


def features(layer):
    with open(f"{folder}/{layer}.geojson", encoding="utf-8") as file:
        return json.load(file)["features"]


def area_and_perimeter(geometry):
    polygons = geometry["coordinates"] if geometry["type"] == "MultiPolygon" else [geometry["coordinates"]]
    area = perimeter = 0.0
    for rings in polygons:
        for i, ring in enumerate(rings):
            lon, lat = zip(*[c[:2] for c in ring])
            a, p = GEOD.polygon_area_perimeter(lon, lat)
            area += abs(a) if i == 0 else -abs(a)
            perimeter += p
    return area, perimeter


paths = {f["properties"]["crossing_id"]: f["geometry"]["coordinates"] for f in features("flow_paths")}
for f in features("watersheds"):
    name = f["properties"]["crossing_id"]
    area, perimeter = area_and_perimeter(f["geometry"])
    lon, lat = zip(*[c[:2] for c in paths[name]])
    print(f"{case},{name},{area / 1e6:.9f},{perimeter:.3f},{GEOD.line_length(lon, lat):.3f}")
