"""Reference arrays from SciPy for tests/outside/scipy.test.ts, written to ../fixtures/scipy.json.

Run: python3 tests/outside/scipy/make-references.py   (needs NumPy and SciPy)
Prints the JSON instead of writing it when called with --print.

The inputs are made here and kept with the results, so that the comparison needs no SciPy. Sources: the SciPy reference,
scipy.signal.find_peaks (prominence, distance), scipy.fft.rfft, scipy.optimize.curve_fit, scipy.signal.get_window.
"""
import json
import pathlib
import sys

import numpy as np
from scipy import fft, optimize, signal

rng = np.random.default_rng(20260501)


def rounded(a, digits=12):
    return [float(f"{x:.{digits}g}") for x in np.asarray(a, dtype=float)]


def peaks_case(x, **options):
    found, properties = signal.find_peaks(x, **{"prominence": 0, **options})
    return {
        "x": rounded(x, 17),
        "options": options,
        "index": [int(i) for i in found],
        "prominence": rounded(properties["prominences"]),
    }


def peaks():
    t = np.arange(1200) / 500
    humps = 160 + 25 * np.sin(2 * np.pi * 6.5 * t) + 3 * rng.standard_normal(len(t))
    steps = np.round(4 * np.sin(2 * np.pi * np.arange(400) / 37) + rng.standard_normal(400))
    walk = np.cumsum(rng.standard_normal(800))
    return [
        peaks_case(humps, prominence=20.0),
        peaks_case(humps, prominence=20.0, distance=40),
        peaks_case(steps),
        peaks_case(steps, prominence=2.0),  # no distance: equal heights leave it open which of two peaks goes
        peaks_case(walk),
        peaks_case(walk, prominence=1.5, distance=5),
        peaks_case(np.array([0.0, 1, 1, 1, 0, 2, 2, 0, 3])),
    ]


def crossings():
    """Passages of a level by a straight line between samples, the plain definition, on a curve that passes cleanly."""
    t = np.arange(2000) / 2000
    x = np.sin(2 * np.pi * 7 * t + 0.3) + 0.3 * np.sin(2 * np.pi * 3 * t)
    level = 0.2
    above = x >= level
    i = np.nonzero(above[1:] != above[:-1])[0]
    at = i + (level - x[i]) / (x[i + 1] - x[i])
    return {"x": rounded(x, 17), "level": level, "at": rounded(at, 15), "rising": [bool(v) for v in above[i + 1]]}


def spectra():
    cases = []
    for n, window in ((1024, "none"), (4096, "hann"), (1000, "hann")):
        x = 2 + np.sin(2 * np.pi * 0.0371 * np.arange(n)) + 0.2 * rng.standard_normal(n)
        size = 1 << int(np.ceil(np.log2(n)))
        w = signal.get_window("hann", n) if window == "hann" else np.ones(n)
        a = np.abs(fft.rfft(w * (x - x.mean()), size)) / w.sum()
        a[1:-1] *= 2
        cases.append({"x": rounded(x, 17), "window": window, "amplitude": rounded(a)})
    return cases


def charges():
    """Least squares by the Levenberg-Marquardt method of i = I (1 - exp(-(t - t0) / tau)) with noise."""
    cases = []
    for final, tau, length in ((15.0, 4e-3, 4e-3), (26.47, 13.7e-3, 5e-3), (4.0, 0.9e-3, 6e-3)):
        t = np.arange(400) * length / 400
        i = final * -np.expm1(-(t + 20e-6) / tau) + 0.002 * final * rng.standard_normal(len(t))

        def model(t, final, start, tau):
            return final * -np.expm1(-(t - start) / tau)

        (f, t0, k), covariance = optimize.curve_fit(model, t, i, p0=(1.1 * final, 0, 1.2 * tau))
        cases.append(
            {
                "t": rounded(t, 17),
                "i": rounded(i, 17),
                "final": float(f),
                "zeroS": float(t0),
                "tau": float(k),
                "tauError": float(np.sqrt(covariance[2, 2])),
            }
        )
    return cases


def windows():
    """Weights as scipy.signal.get_window gives them, periodic."""
    return {name: rounded(signal.get_window(name, 60)) for name in ("hann", "blackman", "flattop")}


def filtered():
    """Second-order Butterworth low-pass of 50 Hz at 1 kHz, forwards and backwards, with SciPy's own ends."""
    t = np.arange(400) / 1000
    x = np.float32(2 + np.sin(2 * np.pi * 7 * t) + 0.3 * np.sign(np.sin(2 * np.pi * 61 * t)) + 3 * t)
    b, a = signal.butter(2, 50, fs=1000)
    return {"x": rounded(x.astype(float), 9), "y": rounded(signal.filtfilt(b, a, x.astype(float)), 9)}


references = {
    "peaks": peaks(),
    "crossings": crossings(),
    "spectra": spectra(),
    "charges": charges(),
    "windows": windows(),
    "filtered": filtered(),
}
text = json.dumps(references)
if "--print" in sys.argv:
    print(text)
else:
    (pathlib.Path(__file__).parent.parent / "fixtures" / "scipy.json").write_text(text + "\n")
