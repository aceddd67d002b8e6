#!/bin/sh
# Two bays (one with a hole), written by GDAL's ogr2ogr in several coordinate systems and formats; sizes below 4 kB each.
# Debian: gdal-bin 3.6.2, zip. Run in tests/reference/outlines.
set -e
cat > bays.geojson <<'J'
{"type":"FeatureCollection","features":[
{"type":"Feature","properties":{"name":"Fjord of Ålesund"},"geometry":{"type":"Polygon","coordinates":[[[-12,50],[-11,50],[-11,51],[-12,51],[-12,50]],[[-11.6,50.4],[-11.6,50.6],[-11.4,50.6],[-11.4,50.4],[-11.6,50.4]]]}},
{"type":"Feature","properties":{"name":"Two parts"},"geometry":{"type":"MultiPolygon","coordinates":[[[[-10.8,50],[-10.6,50],[-10.6,50.2],[-10.8,50.2],[-10.8,50]]],[[[-10.5,50],[-10.3,50],[-10.3,50.2],[-10.5,50.2],[-10.5,50]]]]}}]}
J
for crs in 4326 32629 3035; do
  mkdir -p s && ogr2ogr -f 'ESRI Shapefile' -t_srs EPSG:$crs -lco ENCODING=UTF-8 s/bays.shp bays.geojson && (cd s && zip -q -X ../bays-$crs.zip bays.*) && rm -r s
done
ogr2ogr -f KML bays.kml bays.geojson -nln bays
