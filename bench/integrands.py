"""Integrands with correlated inputs and paths in NumPy/SciPy, as a script would have them, in blocks that stay in cache.

Points: `draws`, NumPy's PCG64 with its ziggurat normals; `sobol`, SciPy's Sobol' points through scipy.special.ndtri. Reads lines
"WORKLOAD POINTS-KIND POINTS" on standard input, answers each with "ESTIMATE SECONDS". Set-up is not timed.
"""
import sys
import time
import warnings

import numpy as np
from scipy.special import ndtri
from scipy.stats import qmc

warnings.simplefilter("ignore")
BLOCK = 4096
STEPS, START, LEVEL, VOLATILITY = 64, 100.0, 95.0, 0.2


def growth(w):
    return -(VOLATILITY**2) / 2 * np.arange(1, STEPS + 1) / STEPS + VOLATILITY * w


def guarantee(w):
    return np.maximum(LEVEL - START * np.exp(growth(w)).mean(axis=1), 0)


def bridge_plan():
    """Midpoints in van der Corput order: index, left and right neighbour (-1: time 0), weights and deviation."""
    times = np.arange(1, STEPS + 1) / STEPS
    plan, spans = [], [(-1, STEPS - 1)]
    while spans:
        left, right = spans.pop(0)
        if right - left < 2:
            continue
        middle = (left + right + 1) // 2
        t0 = 0.0 if left < 0 else times[left]
        t, t1 = times[middle], times[right]
        plan.append((middle, left, right, (t1 - t) / (t1 - t0), np.sqrt((t - t0) * (t1 - t) / (t1 - t0))))
        spans += [(left, middle), (middle, right)]
    return plan


PLAN = bridge_plan()


def bridge(z):
    w = np.empty((STEPS, len(z)))
    z = np.ascontiguousarray(z.T)
    w[-1] = z[0]
    for k, (middle, left, right, weight, deviation) in enumerate(PLAN, 1):
        w[middle] = (1 - weight) * w[right] + deviation * z[k]
        if left >= 0:
            w[middle] += weight * w[left]
    return guarantee(w.T)


def components():
    times = np.arange(1, STEPS + 1) / STEPS
    values, vectors = np.linalg.eigh(np.minimum.outer(times, times))
    return (vectors * np.sqrt(values))[:, ::-1].T


PCA = components()


def principal(z):
    return guarantee(z @ PCA)


CORRELATION = np.full((5, 5), 0.5) + 0.5 * np.eye(5)
LOWER = np.linalg.cholesky(CORRELATION).T


def basket(z):
    return np.maximum(100 * np.exp(0.2 * (z @ LOWER) - 0.02).mean(axis=1) - 100, 0)


LIMIT = ndtri(0.04)


def credit(z):
    worth = np.sqrt(0.2) * z[:, :1] + np.sqrt(0.8) * z[:, 1:]
    return (worth < LIMIT).mean(axis=1)


WORKLOADS = {"bridge": (bridge, 64), "principal": (principal, 64), "basket": (basket, 5), "credit": (credit, 101)}


def estimate(name, kind, points):
    f, d = WORKLOADS[name]
    rng = np.random.Generator(np.random.PCG64(1))
    sobol = qmc.Sobol(d, scramble=False, bits=52)
    total = 0.0
    start = time.perf_counter()
    for begin in range(0, points, BLOCK):
        n = min(BLOCK, points - begin)
        z = ndtri(sobol.random(n) + 2.0**-53) if kind == "sobol" else rng.standard_normal((n, d))
        total += f(z).sum()
    return total / points, time.perf_counter() - start


for line in sys.stdin:
    name, kind, points = line.split()
    print("%.17g %.9f" % estimate(name, kind, int(points)), flush=True)
