# The four Bonner/Whiteman categories in vectorised NumPy, for the bench to run beside ours: every local maximum, fall-off to
# the first higher minimum, on float32 profiles of equal gates without gaps. Prints profiles a second and how many have a jet.
import sys
import time

import numpy as np


def scan(speed):
    """Best category of each row, -1 where there is none."""
    count, gates = speed.shape
    # Where a run of speeds that never rise begins and ends.
    rises = np.zeros((count, gates), bool)
    rises[:, 1:] = speed[:, 1:] > speed[:, :-1]
    start = np.maximum.accumulate(np.where(rises, np.arange(gates), 0), axis=1)
    ends = np.ones((count, gates), bool)
    ends[:, :-1] = rises[:, 1:]
    peak = np.take_along_axis(speed, start, axis=1)
    drop = np.where(ends & (start > 0), peak - speed, -1)
    category = np.full((count, gates), -1, np.int8)
    for index, (least, fall) in enumerate(((10, 5), (12, 6), (16, 8), (20, 10))):
        category[(peak >= least - 1e-5) & (drop >= fall - 1e-5)] = index
    return category.max(axis=1)


path, gates = sys.argv[1], int(sys.argv[2])
speed = np.fromfile(path, np.float32).reshape(-1, gates)
found = int((scan(speed) >= 0).sum())
times = []
for _ in range(5):
    began = time.process_time()
    scan(speed)
    times.append(time.process_time() - began)
print(len(speed) / min(times), found)
