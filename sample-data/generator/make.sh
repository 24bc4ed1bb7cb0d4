#!/usr/bin/env bash
# Makes the maps of the sample valley anew. Needs a .NET 10 SDK and the GDAL tools (gdal_translate).
set -euo pipefail
here=$(cd "$(dirname "${BASH_SOURCE[0]}")" && pwd)
valley="$here/../wexmarrow-vale"
raw=$(mktemp -d)
trap 'rm -rf "$raw"' EXIT

dotnet build "$here" -c Release -v quiet --nologo
dotnet "$here/bin/Release/net10.0/GeoCulvert.SampleTerrain.dll" "$raw"
pack() { # pack NAME PREDICTOR
  gdal_translate -q -of GTiff -co TILED=YES -co COMPRESS=DEFLATE -co ZLEVEL=9 -co PREDICTOR="$2" "$raw/$1.vrt" "$valley/$1.tif"
}
pack dem 3
pack landcover 1
pack soils 1
cp "$raw/roads.geojson" "$raw/rainfall.csv" "$valley/"
ls -l "$valley"
