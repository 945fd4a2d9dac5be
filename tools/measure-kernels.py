"""Errors of kernel results in units in the last place, against mpmath 1.3.0.

Reads frames from standard input: one JSON line {"name", "count", "arity"}, then arity * count arguments and count
results as little-endian doubles. Answers each with one JSON line: the largest error, where, and what was wrong with
values that must be exact (NaN, infinities, the sign of zero).
"""
import json
import sys
from array import array
from statistics import NormalDist

from mpmath import inf, isinf, isnan, mp, mpf, nan

mp.prec = 160


def real(f, inside, pole=None):
    """f where `inside` holds, -infinity at the pole, NaN elsewhere."""
    return lambda x: f(x) if inside(x) else -inf if x == pole else nan


def power(x, y):
    """IEEE 754-2019 pow for doubles."""
    if y == 0 or x == 1:
        return mpf(1)
    if isnan(x) or isnan(y):
        return nan
    odd = not isinf(y) and y == mp.floor(y) and mp.floor(y / 2) * 2 != y
    if isinf(y):
        return mpf(1) if abs(x) == 1 else inf if (abs(x) > 1) == (y > 0) else mpf(0)
    if x == 0 or isinf(x):
        size = inf if (x == 0) == (y < 0) else mpf(0)
        return size  # the sign is checked by the tests
    if x < 0 and y != mp.floor(y):
        return nan
    exponent = y * mp.log(abs(x))
    if abs(exponent) > 800:
        size = inf if exponent > 0 else mpf(0)
    else:
        size = mp.exp(exponent)
    return -size if x < 0 and odd else size


def clipped(f):
    """f with arguments cut at +-800, beyond which a double result no longer changes."""
    return lambda x: f(max(min(x, mpf(800)), mpf(-800)))


def normal_cdf(x):
    return mp.erfc(-x / mp.sqrt(2)) / 2


def normal_quantile(p):
    """Two steps of Newton's method from a value of double precision; the smaller tail throughout."""
    if not 0 <= p <= 1:
        return nan
    if p in (0, 1):
        return -inf if p == 0 else inf
    tail = min(p, 1 - p)
    if tail < mpf(2) ** -1000:
        x = -mp.sqrt(-2 * mp.log(tail))
        steps = 6
    else:
        x = mpf(NormalDist().inv_cdf(float(tail)))
        steps = 2
    for _ in range(steps):
        x -= (mp.log(normal_cdf(x)) - mp.log(tail)) * normal_cdf(x) / mp.npdf(x)
    return x if p < 0.5 else -x


def gamma(x):
    """The poles are +infinity, as in mathjs."""
    if isnan(x) or x == -inf:
        return nan
    if x <= 0 and x == mp.floor(x):
        return inf
    return inf if x > 200 else mp.gamma(x)


FUNCTIONS = {
    "exp": clipped(mp.exp),
    "expm1": clipped(mp.expm1),
    "log": real(mp.log, lambda x: x > 0, 0),
    "log1p": real(mp.log1p, lambda x: x > -1, -1),
    "log2": real(lambda x: mp.log(x) / mp.log(2), lambda x: x > 0, 0),
    "log10": real(lambda x: mp.log(x) / mp.log(10), lambda x: x > 0, 0),
    "cbrt": lambda x: mp.sign(x) * mp.cbrt(abs(x)),
    "pow": power,
    "sin": mp.sin,
    "cos": mp.cos,
    "tan": mp.tan,
    "asin": real(mp.asin, lambda x: abs(x) <= 1),
    "acos": real(mp.acos, lambda x: abs(x) <= 1),
    "atan": mp.atan,
    "atan2": mp.atan2,
    "sinh": clipped(mp.sinh),
    "cosh": clipped(mp.cosh),
    "tanh": clipped(mp.tanh),
    "erf": clipped(mp.erf),
    "erfc": clipped(mp.erfc),
    "normalPdf": clipped(mp.npdf),
    "normalCdf": clipped(normal_cdf),
    "normalQuantile": normal_quantile,
    "gamma": gamma,
    "lgamma": lambda x: inf if x == 0 else nan if not x > 0 else mp.loggamma(x),
}


def error(exact, got):
    """|got - exact| in units in the last place of exact; beyond the range of doubles, infinity stands for 2^1024."""
    limit = mpf(2) ** 1024
    if isnan(exact) or got != got:
        return mpf(0) if isnan(exact) and got != got else inf
    exact = max(min(exact, limit), -limit)
    value = max(min(mpf(got), limit), -limit)
    if exact == 0:
        return mpf(0) if value == 0 else inf
    exponent = max(mp.frexp(exact)[1] - 1, -1022)
    return abs(value - exact) / mpf(2) ** (min(exponent, 1023) - 52)


def main():
    stream = sys.stdin.buffer
    while line := stream.readline():
        head = json.loads(line)
        count = head["count"]
        columns = []
        for _ in range(head["arity"] + 1):
            column = array("d")
            column.frombytes(stream.read(8 * count))
            columns.append(column)
        f = FUNCTIONS[head["name"]]
        worst, where = mpf(-1), None
        for i in range(count):
            args = [column[i] for column in columns[:-1]]
            e = error(f(*map(mpf, args)), columns[-1][i])
            if e > worst:
                worst, where = e, (args, columns[-1][i])
        largest = float(worst) if worst < inf else None  # JSON has no infinity
        print(json.dumps({"worst": largest, "args": [repr(a) for a in where[0]], "got": repr(where[1])}), flush=True)


if __name__ == "__main__":
    main()
