"""Times of NumPy and SciPy on the same samples: levels and crossings, peaks, spectrum. Called by measuring.ts."""
import json
import sys
import time

import numpy as np
from scipy.signal import find_peaks


def fastest(work, times=5):
    best = float("inf")
    for _ in range(times):
        start = time.perf_counter()
        work()
        best = min(best, time.perf_counter() - start)
    return 1000 * best


def levels_and_crossings(x):
    counts, edges = np.histogram(x, 256)
    low = edges[np.argmax(counts[:128])]
    high = edges[128 + np.argmax(counts[128:])]
    middle, reach = (low + high) / 2, 0.2 * (high - low)
    # Hysteresis: the state is that of the last sample outside the dead band.
    state = np.where(x > middle + reach, 1, np.where(x < middle - reach, -1, 0)).astype(np.int8)
    known = np.flatnonzero(state)
    turns = known[1:][np.diff(state[known]) != 0]
    return turns - 1 + (middle - x[turns - 1]) / (x[turns] - x[turns - 1])


wave = np.fromfile(sys.argv[1], dtype=np.float32)
curve = np.fromfile(sys.argv[2], dtype=np.float64)
print(
    json.dumps(
        {
            "levelsMs": fastest(lambda: levels_and_crossings(wave)),
            "peaksMs": fastest(lambda: find_peaks(curve, distance=20, prominence=0.1)),
            "spectrumMs": fastest(lambda: np.abs(np.fft.rfft(curve * np.hanning(curve.size)))),
        }
    )
)
