"""Makes test/published/data/special.json: values of special functions, computed with mpmath 1.3.0 at 50 digits.

    python3 test/published/make/special.py     (Python 3.11; deterministic)

A point is [x, y, rest]: y the double nearest to f(x), rest = (f(x) - y) / ulp(y), so that the error of a result in
units in the last place, |(result - y) / ulp(y) - rest|, is known to 1e-6.
"""

import json
import math
import random
from pathlib import Path

from mpmath import erf, erfc, gamma, log, loggamma, mp, mpf, npdf, sqrt

mp.dps = 50
random.seed(20260401)


def cdf(x):
    return erfc(-x / sqrt(mpf(2))) / 2


def quantile(p):
    """Newton's method on log cdf (lower half) or on the complement."""
    if p > mpf(1) / 2:
        return -quantile(1 - p)
    if p == mpf(1) / 2:
        return mpf(0)
    x = -sqrt(-2 * log(p)) if p < mpf("0.05") else 3 * (p - mpf(1) / 2)
    for _ in range(60):
        step = (log(cdf(x)) - log(p)) * cdf(x) / npdf(x)
        x -= step
        if abs(step) < mpf(10) ** -45 * max(1, abs(x)):
            return x
    raise ArithmeticError(p)


def point(f, x):
    exact = f(mpf(x))
    y = float(exact)
    if math.isinf(y):
        return None
    return [x, y, round(float((exact - mpf(y)) / mpf(math.ulp(y))), 6)]


def spread(low, high, count):
    """Evenly spread, each moved at random inside its share."""
    return [low + (high - low) * (k + random.random()) / count for k in range(count)]


def powers(low, high, count):
    """2 to powers spread over [low, high], with full significands."""
    return [math.ldexp(1 + random.random(), int(e)) for e in spread(low, high, count)]


def both(values):
    return [v for x in values for v in (x, -x)]


def near(centres, count):
    return [c + s * math.ldexp(1 + random.random(), int(e)) for c in centres for s in (1, -1) for e in spread(-50, -3, count)]


POINTS = {
    "erf": (erf, both(powers(-1074, -2, 40) + spread(0, 2, 90) + spread(2, 6.2, 40) + [n / 16 for n in range(1, 97, 5)])),
    "erfc": (erfc, both(powers(-1074, -2, 20) + spread(0, 2, 60)) + spread(-6.5, -2, 20) + spread(2, 27.3, 150) + [0.9375, 1.0, 3.0, 7.0, 15.0, 26.5, 26.543, 27.2, 27.226]),
    "normalPdf": (npdf, both(powers(-1074, -2, 10) + spread(0, 38.6, 140)) + [37.5, 38.0, 38.56, -38.58]),
    "normalCdf": (cdf, spread(-38.5, -1, 180) + spread(-1, 1, 80) + spread(1, 8.5, 40) + both(powers(-1074, -2, 10)) + [-38.0, -37.5, -38.467]),
    "normalQuantile": (
        quantile,
        spread(0, 1, 100)
        + near([0.075, 0.5, 0.925], 12)
        + powers(-1074, -3, 120)
        + [1 - x for x in powers(-52, -3, 40)]
        + [5e-324, 2.0**-1022, 1e-300, math.exp(-25), 0.075, 0.925, 1 - 2.0**-53, 0.5],
    ),
    "gamma": (
        gamma,
        spread(0, 12, 100)
        + spread(12, 171.6, 110)
        + spread(-12, 0, 60)
        + spread(-184, -12, 80)
        + both(powers(-1021, -2, 20))
        + near([-1, -2, -3, -11, -12, -30, -100, -170], 4)
        + [11.999999999999998, 11.5, 12.5, 171.62437695630271, -171.5, -177.5, -183.5],
    ),
    "lgamma": (
        loggamma,
        spread(0, 12, 150) + near([1, 2], 30) + spread(12, 200, 60) + powers(8, 1013, 60) + powers(-1074, -2, 30) + [0.75, 1.0, 2.0, 3.0, 12.0, 11.999999999999998],
    ),
}

if __name__ == "__main__":
    data = {"meta": {"script": "test/published/make/special.py", "library": "mpmath 1.3.0", "digits": 50}, "points": {}}
    for name, (f, xs) in POINTS.items():
        points = [q for q in (point(f, x) for x in xs) if q is not None]
        print(name, len(points))
        data["points"][name] = points
    rows = ",\n".join(f'    "{n}": [\n' + ",\n".join(f"      {json.dumps(p)}" for p in ps) + "\n    ]" for n, ps in data["points"].items())
    text = '{\n  "meta": ' + json.dumps(data["meta"]) + ',\n  "points": {\n' + rows + "\n  }\n}\n"
    target = Path(__file__).resolve().parent.parent / "data" / "special.json"
    target.write_text(text)
