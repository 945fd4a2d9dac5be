"""The four benchmark integrands in NumPy/SciPy, in blocks of 16,384 points so that arrays stay in cache.

Generators: NumPy's PCG64 and MT19937, SciPy's unscrambled Sobol'. Reads lines "WORKLOAD SOURCE POINTS" on standard input,
answers each with "ESTIMATE SECONDS"; "points SOURCE D POINTS" times points alone (PCG64, ..., sobol, sobol-scrambled,
halton, halton-scrambled). Imports and set-up are not timed.
"""
import sys
import time
import warnings

import numpy as np
import scipy
from scipy.special import ndtri
from scipy.stats import qmc

warnings.simplefilter("ignore")
BLOCK = 16384


def peak(x):
    j = np.arange(8)
    return np.exp(-np.sum(((0.6 + 0.1 * j) * (x - (0.3 + 0.05 * j))) ** 2, axis=1))


def product(x):
    a = 0.5 * np.arange(1, 17)
    return np.prod((np.abs(4 * x - 2) + a) / (1 + a), axis=1)


def path(x):
    walk = np.cumsum((0.05 - 0.02) / 64 + 0.025 * ndtri(x), axis=1)
    return np.maximum(100 * np.exp(walk).mean(axis=1) - 100, 0)


def wave(x):
    return np.cos(2 * np.pi * 0.3 + x @ (0.9 / (1 + 0.1 * np.arange(10))))


WORKLOADS = {"peak": (peak, 8), "product": (product, 16), "path": (path, 64), "wave": (wave, 10)}


def estimate(name, source, points):
    f, d = WORKLOADS[name]
    rng = np.random.Generator(np.random.MT19937(1) if source == "mt19937" else np.random.PCG64(1))
    sobol = qmc.Sobol(d, scramble=False, bits=52)
    total = 0.0
    start = time.perf_counter()
    for begin in range(0, points, BLOCK):
        n = min(BLOCK, points - begin)
        x = sobol.random(n) + 2.0**-53 if source == "sobol" else rng.random((n, d))
        total += f(x).sum()
    return total / points, time.perf_counter() - start


def maker(source, d):
    if source.startswith("sobol"):
        return qmc.Sobol(d, scramble=source.endswith("scrambled"), bits=52, rng=1).random
    if source.startswith("halton"):
        return qmc.Halton(d, scramble=source.endswith("scrambled"), rng=1).random
    rng = np.random.Generator(getattr(np.random, source)(1))
    return lambda n: rng.random((n, d))


def points_alone(source, d, points):
    make = maker(source, d)
    block = min(points, max(64, BLOCK * 8 // d))
    start = time.perf_counter()
    for _ in range(0, points, block):
        x = make(block)
    return float(x[-1, 0]), time.perf_counter() - start


print(np.__version__, scipy.__version__, flush=True)
for line in sys.stdin:
    words = line.split()
    if words[0] == "points":
        answer = points_alone(words[1], int(words[2]), int(words[3]))
    else:
        answer = estimate(words[0], words[1], int(words[2]))
    print("%.17g %.9f" % answer, flush=True)
