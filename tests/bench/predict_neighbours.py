"""Times scikit-learn's 5 nearest neighbours with its k-d tree: features labels pixels n_features k threads out."""

import json
import sys
import time

import numpy as np
from sklearn.neighbors import KNeighborsClassifier

features, labels, pixels = sys.argv[1:4]
n_features, k, threads = map(int, sys.argv[4:7])
x = np.fromfile(features, np.float32).reshape(-1, n_features).astype(np.float64)
q = np.fromfile(pixels, np.float32).reshape(-1, n_features).astype(np.float64)
y = np.fromfile(labels, np.uint8)
mean, deviation = x.mean(axis=0), x.std(axis=0)
model = KNeighborsClassifier(k, algorithm="kd_tree", n_jobs=threads).fit((x - mean) / deviation, y)
start = time.perf_counter()
classes = model.predict((q - mean) / deviation)
seconds = time.perf_counter() - start
classes.astype(np.uint8).tofile(sys.argv[7])
print(json.dumps({"seconds": seconds}))
