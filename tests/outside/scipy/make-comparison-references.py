"""Reference numbers from SciPy and NumPy for tests/outside/comparison-scipy.test.ts, written to ../fixtures/comparison-scipy.json.

Run: python3 tests/outside/scipy/make-comparison-references.py   (needs NumPy and SciPy)

Sources: the SciPy and NumPy references of scipy.stats.t.ppf, numpy.median, numpy.std(ddof=1), numpy.quantile (method "linear"),
scipy.signal.correlate with scipy.signal.correlation_lags, scipy.spatial.distance.euclidean.
"""
import json
import pathlib

import numpy as np
from scipy import signal, stats
from scipy.spatial import distance

rng = np.random.default_rng(20261201)


def rounded(a, digits=15):
    return [float(f"{x:.{digits}g}") for x in np.asarray(a, dtype=float)]


def band(values):
    n = len(values)
    half = stats.t.ppf(0.975, n - 1) * np.std(values, ddof=1) * np.sqrt(1 + 1 / n)
    return {
        "values": rounded(values, 17),
        "low": float(np.mean(values) - half),
        "high": float(np.mean(values) + half),
        "median": float(np.median(values)),
        "sd": float(np.std(values, ddof=1)),
        "quarter": float(np.quantile(values, 0.25)),
    }


def lag():
    a = np.cumsum(rng.standard_normal(600))
    a -= a.mean()
    shift = 37
    b = np.concatenate([np.zeros(shift), a])[: len(a)]
    found = signal.correlate(b, a)
    lags = signal.correlation_lags(len(b), len(a))
    return {"a": rounded(a, 9), "b": rounded(b, 9), "lag": int(lags[np.argmax(found)])}


pairs = [(rng.standard_normal(128), rng.standard_normal(128)) for _ in range(3)]
out = {
    "studentT975": [[n, float(stats.t.ppf(0.975, n))] for n in [1, 2, 3, 5, 10, 29, 30, 31, 40, 49, 100]],
    "bands": [band(10 + rng.standard_normal(n)) for n in [3, 4, 7, 12, 30]],
    "lag": lag(),
    "distances": [
        {"a": rounded(a, 9), "b": rounded(b, 9), "distance": float(distance.euclidean(rounded(a, 9), rounded(b, 9)))}
        for a, b in pairs
    ],
}
target = pathlib.Path(__file__).parent.parent / "fixtures" / "comparison-scipy.json"
target.write_text(json.dumps(out) + "\n")
