"""Maps a scene with scikit-learn's random forest, read in windows and written as GeoTIFF.

features labels trees max_features threads rows_per_window out band...
"""

import json
import sys
import time

import numpy as np
from osgeo import gdal
from sklearn.ensemble import RandomForestClassifier

features, labels = sys.argv[1:3]
trees, max_features, threads, rows = map(int, sys.argv[3:7])
out_path, paths = sys.argv[7], sys.argv[8:]
x = np.fromfile(features, np.float32).reshape(-1, len(paths))
y = np.fromfile(labels, np.uint8)
forest = RandomForestClassifier(trees, max_features=max_features, n_jobs=threads, random_state=1).fit(x, y)

start = time.perf_counter()
bands = [gdal.Open(path) for path in paths]
width, height = bands[0].RasterXSize, bands[0].RasterYSize
options = ["TILED=YES", "BLOCKXSIZE=256", "BLOCKYSIZE=256", "COMPRESS=DEFLATE"]
out = gdal.GetDriverByName("GTiff").Create(out_path, width, height, 1, gdal.GDT_Byte, options)
for top in range(0, height, rows):
    n = min(rows, height - top)
    pixels = np.stack([band.ReadAsArray(0, top, width, n).ravel() for band in bands], axis=1)
    classes = forest.predict(pixels.astype(np.float32))
    out.GetRasterBand(1).WriteArray(classes.reshape(n, width), 0, top)
out = None
print(json.dumps({"seconds": time.perf_counter() - start}))
