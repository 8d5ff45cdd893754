"""Times the training of scikit-learn's random forest: features labels n_features trees max_features threads seed."""

import json
import sys
import time

import numpy as np
from sklearn.ensemble import RandomForestClassifier

features, labels = sys.argv[1:3]
n_features, trees, max_features, threads, seed = map(int, sys.argv[3:8])
x = np.fromfile(features, np.float32).reshape(-1, n_features)
y = np.fromfile(labels, np.uint8)
forest = RandomForestClassifier(trees, max_features=max_features, n_jobs=threads, random_state=seed)
start, cpu = time.perf_counter(), time.process_time()
forest.fit(x, y)
print(json.dumps({"seconds": time.perf_counter() - start, "cpuSeconds": time.process_time() - cpu}))
