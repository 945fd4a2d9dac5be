"""Quantiles of the distributions of inputs at 50 digits, by mpmath: closed forms where there are, else the root of the
distribution function (mpmath's incomplete gamma and beta functions), found by bisection and the secant method from SciPy's
value. Levels are doubles, and enter exactly. Writes ../data/quantiles.json.

    python3 test/published/make/quantiles.py        (mpmath 1.3.0, SciPy 1.17.1)
"""

import json
import os

import mpmath as mp
from scipy import stats

mp.mp.dps = 50
LEVELS = [1e-15, 3e-12, 1e-9, 1e-6, 1e-4, 0.01, 0.1, 0.25, 0.3, 0.4375, 0.4999, 0.5,
          0.5001, 0.6, 0.75, 0.9, 0.99, 0.9999, 1 - 1e-6, 1 - 1e-9, 1 - 1e-12, 1 - 1e-15]


def lower_gamma(a, x):
    return mp.gammainc(a, 0, x, regularized=True)


def upper_gamma(a, x):
    return mp.gammainc(a, x, mp.inf, regularized=True)


def beta_odds(a, b, r, upper):
    """Distribution function (or its complement) of Beta(a, b) at the odds r = x / (1 - x)."""
    if upper:
        return beta_odds(b, a, 1 / r, False)
    return mp.betainc(a, b, 0, r / (1 + r), regularized=True)


def root(lower, upper, u, guess):
    """x > 0 with lower(x) = u, in the logarithm of x; the nearer tail decides."""
    u = mp.mpf(u)
    target, f = (u, lower) if u <= 0.5 else (1 - u, upper)
    g = lambda w: mp.log(f(mp.exp(w))) - mp.log(target)
    w = mp.log(guess)
    return mp.exp(mp.findroot(g, (w, w + mp.mpf("1e-8") * max(1, abs(w))), solver="secant", tol=1e-80, maxsteps=60, verify=False))


def positive(u, guess, lower, upper):
    guess = mp.mpf(float(guess)) if 1e-300 < guess < 1e300 else None
    if guess is None:
        return None
    x = root(lower, upper, u, guess)
    u = mp.mpf(u)
    miss = abs(lower(x) / u - 1) if u <= 0.5 else abs(upper(x) / (1 - u) - 1)
    assert miss < mp.mpf(10) ** -35, (u, guess, miss)
    return x


def normal(u):
    u = mp.mpf(u)
    return mp.sqrt(2) * mp.erfinv(2 * u - 1)


def gamma(u, shape, scale=1):
    a = mp.mpf(shape)
    x = positive(u, stats.gamma.ppf(u, shape), lambda x: lower_gamma(a, x), lambda x: upper_gamma(a, x))
    return None if x is None else x * mp.mpf(scale)


def odds(u, a, b):
    guess = stats.beta.ppf(u, a, b)
    guess = guess / (1 - guess) if guess < 0.999 else (1 - (c := stats.beta.ppf(1 - u, b, a))) / c
    if u > 0.5 and guess > 10:
        c = stats.beta.isf(u, b, a)
        guess = (1 - c) / c
    return positive(u, guess, lambda r: beta_odds(a, b, r, False), lambda r: beta_odds(a, b, r, True))


def beta(u, alpha, beta):
    r = odds(u, alpha, beta)
    return None if r is None else r / (1 + r)


def student(u, degrees):
    if u == 0.5:
        return mp.mpf(0)
    nu = mp.mpf(degrees)
    t = min(mp.mpf(u), 1 - mp.mpf(u))
    upper = lambda x: mp.betainc(nu / 2, mp.mpf(1) / 2, 0, nu / (nu + x * x), regularized=True) / 2
    guess = abs(stats.t.ppf(min(u, 1 - u), degrees)) if u < 0.9 else stats.t.isf(1 - u, degrees)
    x = mp.exp(mp.findroot(lambda w: mp.log(upper(mp.exp(w))) - mp.log(t),
                           (mp.log(guess), mp.log(guess) + mp.mpf("1e-8")), solver="secant", tol=1e-80, maxsteps=60, verify=False))
    assert abs(upper(x) / t - 1) < mp.mpf(10) ** -35
    return x if u > 0.5 else -x


def f(u, numerator, denominator):
    r = odds(u, numerator / 2, denominator / 2)
    return None if r is None else r * denominator / mp.mpf(numerator)


def inverse_gaussian(u, mean, shape):
    m, s = mp.mpf(mean), mp.mpf(shape)
    phi = lambda z: mp.erfc(-z / mp.sqrt(2)) / 2
    mp.mp.dps = 80
    root_of = lambda x: mp.sqrt(s / x)
    lower = lambda x: phi(root_of(x) * (x / m - 1)) + mp.exp(2 * s / m) * phi(-root_of(x) * (x / m + 1))
    upper = lambda x: phi(-root_of(x) * (x / m - 1)) - mp.exp(2 * s / m) * phi(-root_of(x) * (x / m + 1))
    x = positive(u, stats.invgauss.ppf(u, mean / shape, scale=shape) if u <= 0.5
                 else stats.invgauss.isf(1 - u, mean / shape, scale=shape), lower, upper)
    mp.mp.dps = 50
    return x


def truncated_normal(u, lo, hi):
    mp.mp.dps = 80
    phi = lambda z: mp.erfc(-z / mp.sqrt(2)) / 2
    a, b = mp.mpf(lo), mp.mpf(hi)
    u = mp.mpf(u)
    mass = phi(b) - phi(a) if b < 30 else phi(-a) - phi(-b)
    f = lambda x: mp.log(phi(x) - phi(a) if x < 1 else phi(-a) - phi(-x)) - mp.log(u * mass)
    g = lambda x: mp.log(phi(b) - phi(x) if x < -1 else phi(-x) - phi(-b)) - mp.log((1 - u) * mass)
    h = f if u <= 0.5 else g
    top = b if b < 100 else max(a, 0) + 40
    bottom = a if a > -100 else -40
    for _ in range(300):
        middle = (bottom + top) / 2
        below = h(middle) < 0 if u <= 0.5 else h(middle) > 0
        bottom, top = (middle, top) if below else (bottom, middle)
    mp.mp.dps = 50
    return +bottom


CLOSED = {
    "uniform": lambda u, **_: u,
    "normal": lambda u, **_: normal(u),
    "lognormal": lambda u, logMean, logDeviation: mp.exp(mp.mpf(logMean) + mp.mpf(logDeviation) * normal(u)),
    "exponential": lambda u, mean: -mp.mpf(mean) * mp.log(1 - u),
    "weibull": lambda u, shape: (-mp.log(1 - u)) ** (1 / mp.mpf(shape)),
    "pareto": lambda u, shape: (1 - u) ** (-1 / mp.mpf(shape)),
    "logistic": lambda u, **_: mp.log(u / (1 - u)),
    "laplace": lambda u, **_: mp.log(2 * u) if u < 0.5 else -mp.log(2 * (1 - u)),
    "cauchy": lambda u, **_: -mp.cot(mp.pi * u) if u != 0.5 else mp.mpf(0),
    "gumbel": lambda u, **_: -mp.log(-mp.log(u)),
    "triangular": lambda u, mode: mp.sqrt(u * mp.mpf(mode)) if u < mode else 1 - mp.sqrt((1 - u) * (1 - mp.mpf(mode))),
}
CASES = [
    ("uniform", {}), ("normal", {}), ("lognormal", {"logMean": 0.5, "logDeviation": 0.75}),
    ("exponential", {"mean": 2.5}), ("weibull", {"shape": 0.5}), ("weibull", {"shape": 3.5}),
    ("pareto", {"shape": 2.5}), ("pareto", {"shape": 0.5}), ("logistic", {}), ("laplace", {}), ("cauchy", {}),
    ("gumbel", {}), ("triangular", {"mode": 0.25}),
    *[("gamma", {"shape": a}) for a in (0.03125, 0.5, 1, 2.5, 17, 300, 10000)],
    *[("chi-squared", {"degrees": k}) for k in (1, 3, 40)],
    *[("beta", {"alpha": a, "beta": b}) for a, b in ((0.25, 0.5), (1, 3), (2.5, 1.5), (30, 4), (0.125, 20), (800, 1200))],
    *[("student", {"degrees": k}) for k in (1, 2.5, 4, 30, 500)],
    *[("f", {"numerator": a, "denominator": b}) for a, b in ((1, 4), (5, 2), (12, 30))],
    *[("inverse-gaussian", {"mean": m, "shape": s}) for m, s in ((1, 1), (1, 0.125), (2, 50))],
    *[("truncated-normal", {"from": a, "to": b}) for a, b in ((-1, 2), (0, 1e30), (3, 5), (-1e30, -2), (-6, 1), (12, 13))],
]


def value(name, u, parameters):
    m = mp.mpf(u)
    if name in CLOSED:
        return CLOSED[name](m, **parameters)
    if name == "gamma":
        return gamma(u, **parameters)
    if name == "chi-squared":
        return gamma(u, parameters["degrees"] / 2, 2)
    if name == "beta":
        return beta(u, **parameters)
    if name == "student":
        return student(u, **parameters)
    if name == "f":
        return f(u, **parameters)
    if name == "inverse-gaussian":
        return inverse_gaussian(u, **parameters)
    return truncated_normal(u, parameters["from"], parameters["to"])


rows = []
for name, parameters in CASES:
    values = []
    for u in LEVELS:
        try:
            x = value(name, u, parameters)
            values.append(None if x is None else mp.nstr(x, 25))
        except Exception as error:  # left out, and said
            print(name, parameters, u, type(error).__name__, error, flush=True)
            values.append(None)
    rows.append({"distribution": name, "parameters": parameters, "values": values})
    print(name, parameters, sum(v is not None for v in values), flush=True)
STEPS = {
    "binomial": ([{"trials": 1, "probability": 0.3}, {"trials": 40, "probability": 0.3}, {"trials": 100000, "probability": 0.001}],
                 lambda trials, probability: stats.binom(trials, probability)),
    "poisson": ([{"mean": 0.01}, {"mean": 6.5}, {"mean": 1e6}], lambda mean: stats.poisson(mean)),
    "negative-binomial": ([{"successes": 2.5, "probability": 0.4}, {"successes": 100, "probability": 0.01}],
                          lambda successes, probability: stats.nbinom(successes, probability)),
    "geometric": ([{"probability": 0.25}, {"probability": 0.001}], lambda probability: stats.geom(probability, loc=-1)),
}
for name, (cases, law) in STEPS.items():
    for parameters in cases:
        # SciPy's own levels near 1 are rounded: those above 1 - 1e-9 are left out
        values = [str(int(law(**parameters).ppf(u))) if u < 1 - 1e-8 else None for u in LEVELS]
        rows.append({"distribution": name, "parameters": parameters, "values": values})
data = {"source": "mpmath 1.3.0 at 50 digits, discrete laws SciPy 1.17.1; make/quantiles.py", "levels": LEVELS, "rows": rows}
with open(os.path.join(os.path.dirname(__file__), "..", "data", "quantiles.json"), "w") as out:
    json.dump(data, out, indent=1)
