"""Reference vectors for core/signal, made with SciPy. Run: python3 test/golden/generate_signal.py > test/golden/signal.json"""
import json
import sys

import numpy as np
import scipy
from scipy import signal


def lcg(n, seed):
    """Same numbers in any language: x' = (1103515245 x + 12345) mod 2^31, scaled to -1..1."""
    x, out = seed, []
    for _ in range(n):
        x = (1103515245 * x + 12345) % 2**31
        out.append(x / 2**30 - 1)
    return np.array(out)


def r(values, digits=12):
    return [float(f"%.{digits}g" % v) for v in values]


def weighting(kind, f):
    """ISO 8041-1 filters as polynomials in s, evaluated by scipy.signal.freqs."""
    p = {"Wk": (0.4, 100, 12.5, 12.5, 0.63, 2.37, 0.91, 3.35, 0.91), "Wd": (0.4, 100, 2.0, 2.0, 0.63, None, None, None, None)}[kind]
    w = 2 * np.pi * np.array([v if v else 1 for v in (p[0], p[1], p[2], p[3], p[5], p[7])])
    w1, w2, w3, w4, w5, w6 = w
    s = 2 * np.pi * np.array(f)
    q = 1 / np.sqrt(2)
    h = signal.freqs([1, 0, 0], [1, w1 / q, w1**2], s)[1]
    h = h * signal.freqs([w2**2], [1, w2 / q, w2**2], s)[1]
    h = h * signal.freqs([1 / w3, 1], [1 / w4**2, 1 / (p[4] * w4), 1], s)[1]
    if p[5]:
        h = h * signal.freqs([1 / w5**2, 1 / (p[6] * w5), 1], [1 / w6**2, 1 / (p[8] * w6), 1], s)[1] * (w5 / w6) ** 2
    return np.abs(h)


fft = []
for n in (8, 12, 97, 250):
    x = lcg(n, n)
    z = np.fft.rfft(x)
    keep = slice(0, 20)
    fft.append({"size": n, "seed": n, "re": r(z.real[keep]), "im": r(z.imag[keep])})

x = lcg(400, 7) + 3 * np.sin(2 * np.pi * 0.11 * np.arange(400))
f, pxx = signal.welch(x, fs=50.0, window="hann", nperseg=64, noverlap=32, detrend=False, scaling="density")
frequencies = [0.5, 1, 2, 4, 8, 10, 16, 25, 40, 63]

json.dump(
    {
        "generator": "test/golden/generate_signal.py",
        "versions": {"python": sys.version.split()[0], "numpy": np.__version__, "scipy": scipy.__version__},
        "fft": fft,
        "windows": {
            name: r(signal.get_window(scipy_name, 16, fftbins=True))
            for name, scipy_name in {
                "hann": "hann",
                "hamming": "hamming",
                "blackman": "blackman",
                "blackman-harris": "blackmanharris",
                "flat-top": "flattop",
            }.items()
        },
        "welch": {"seed": 7, "count": 400, "rateHz": 50, "segment": 64, "density": r(pxx)},
        "weighting": {"frequencyHz": frequencies, "Wk": r(weighting("Wk", frequencies)), "Wd": r(weighting("Wd", frequencies))},
        "line": {"seed": 3, "count": 50, "left": r(signal.detrend(lcg(50, 3)))},
    },
    sys.stdout,
    indent=1,
)
print()
