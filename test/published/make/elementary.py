"""Makes test/published/data/elementary.json: values of the elementary functions at some 200 points each.

Run: python3 test/published/make/elementary.py          (mpmath 1.3.0, Python 3.11 or later; deterministic)

Every value is computed by mpmath with 60 digits (more for huge angles) and stored as the nearest double `hi` and what
it lacks, (value - hi) / ulp(hi), to 17 digits: some 32 digits in all. A row is [x, hi, rest] or [x, y, hi, rest].
"""
import json
import random
import struct
from pathlib import Path

import mpmath
from mpmath import mp, mpf

mp.dps = 60
rng = random.Random(20261201)


def from_bits(b):
    return struct.unpack("<d", struct.pack("<Q", b))[0]


def next_up(x, steps=1):
    """The double `steps` further from zero."""
    return from_bits(struct.unpack("<Q", struct.pack("<d", x))[0] + steps)


def magnitude(low, high):
    """A positive double with random significand and exponent 2^low...2^high."""
    return from_bits((rng.randint(low + 1023, high + 1022) << 52) | rng.getrandbits(52))


def signed(x):
    return x if rng.random() < 0.5 else -x


def many(n, f):
    return [f() for _ in range(n)]


SUBNORMAL = [5e-324, 1.5e-323, 1e-310, 2.2250738585072009e-308, 2.2250738585072014e-308, 3e-308]
ALL = many(60, lambda: magnitude(-1022, 1024)) + SUBNORMAL + [1.7976931348623157e308]
NEAR_ONE = [1 - 2**-53, 1 + 2**-52, 1.0, 0.999, 1.001] + many(60, lambda: 1 + signed(magnitude(-50, -3)))
TINY = many(20, lambda: signed(magnitude(-1022, -30))) + [s for x in SUBNORMAL for s in (x, -x)]
SMALL = many(50, lambda: signed(magnitude(-30, 0)))
MIDDLE = many(60, lambda: rng.uniform(-10, 10))


def around(x, n=3):
    return [next_up(x, i) for i in range(-n, n + 1)]


def near_multiples():
    points = []
    for _ in range(60):
        k = rng.choice([rng.randint(1, 20), rng.randint(1, 5000), rng.randint(1, 10**6)])
        points += [signed(next_up(float(k * mp.pi / 2), rng.randint(-2, 2)))]
    # nearest to a multiple of pi/2 among the doubles: J.-M. Muller et al., Handbook of Floating-Point Arithmetic, 2nd
    # ed., Birkhaeuser 2018, section 10.2 (from memory)
    return points + [6381956970095103 * 2.0**797, -6381956970095103 * 2.0**797]


ANGLES = near_multiples() + many(40, lambda: signed(magnitude(10, 1024))) + many(20, lambda: rng.uniform(-8192, 8192)) + around(8192.0, 1)
EXP_EDGES = around(709.782712893384, 0) + [-745.1, -744.0, -740.3, -708.4, -708.396418532264, 690.0, -690.0] + around(690.0, 1)
EXP = MIDDLE + SMALL + TINY + many(40, lambda: rng.uniform(-744, 709)) + EXP_EDGES
UNIT = many(60, lambda: rng.uniform(-1, 1)) + [signed(1 - magnitude(-50, -3)) for _ in range(40)] + [1.0, -1.0, 0.5, -0.5] + around(0.5, 2)

POINTS = {
    "exp": EXP,
    "expm1": EXP,
    "log": ALL + NEAR_ONE + many(40, lambda: rng.uniform(0, 10)),
    "log1p": TINY + SMALL + many(40, lambda: rng.uniform(-1, 10)) + [x for x in ALL] + [-1 + 2**-53, -0.999],
    "log2": ALL + NEAR_ONE + [2.0**k for k in (-1074, -1022, -10, 1, 52, 1023)],
    "log10": ALL + NEAR_ONE + [10.0**k for k in (1, 2, 15, 22)],
    "cbrt": [signed(x) for x in ALL] + MIDDLE + [27.0, -1e-300, 1e15],
    "sin": ANGLES + MIDDLE + SMALL + TINY,
    "cos": ANGLES + MIDDLE + SMALL + TINY,
    "tan": ANGLES + MIDDLE + SMALL + TINY,
    "asin": UNIT + SMALL + TINY,
    "acos": UNIT + SMALL + TINY,
    "atan": [signed(x) for x in ALL] + MIDDLE + SMALL + TINY,
    "sinh": MIDDLE + SMALL + TINY + [signed(rng.uniform(600, 710.4)) for _ in range(30)] + [710.4758600739439],
    "cosh": MIDDLE + SMALL + TINY + [signed(rng.uniform(600, 710.4)) for _ in range(30)] + [710.4758600739439],
    "tanh": MIDDLE + SMALL + TINY + many(30, lambda: rng.uniform(-25, 25)) + [345.0, 346.0, -800.0],
}


def powers():
    pairs = []
    while len(pairs) < 200:
        kind = len(pairs) % 5
        if kind == 0:
            x, y = magnitude(-1022, 1024), signed(magnitude(-8, 3))
        elif kind == 1:
            x = 1 + signed(magnitude(-50, -2))
            y = signed(rng.uniform(0, 740) / abs(float(mp.log(mpf(x)))))
        elif kind == 2:
            x, y = rng.uniform(0, 10), rng.uniform(-20, 20)
        elif kind == 3:
            x, y = -rng.uniform(0, 100), float(rng.randint(-150, 150))
        else:
            x, y = rng.choice(SUBNORMAL), rng.uniform(-0.95, 1.02)
        if -744 < y * float(mp.log(abs(mpf(x)))) < 709.7:
            pairs.append((x, y))
    return pairs


PAIRS = {
    "pow": powers() + [(10.0, 22.0), (10.0, -5.0), (2.0, -1074.0), (2.0, 1023.5), (-3.0, 33.0), (1 + 2**-52, 1e17)],
    "atan2": [(rng.uniform(-10, 10), rng.uniform(-10, 10)) for _ in range(80)]
    + [(signed(magnitude(-1022, 1024)), signed(magnitude(-1022, 1024))) for _ in range(60)]
    + [(signed(magnitude(k, k + 30)), signed(magnitude(k, k + 30))) for k in (-1022, -530, -100, 0, 480, 990) for _ in range(12)]
    + [(5e-324, 5e-324), (5e-324, 1.0), (1e-310, -1e-312), (1.7e308, 1.7e308), (3.0, 1e-320)],
}

FUNCTIONS = {
    "exp": mp.exp, "expm1": mp.expm1, "log": mp.log, "log1p": mp.log1p, "log2": lambda x: mp.log(x, 2),
    "log10": lambda x: mp.log(x, 10), "cbrt": lambda x: mp.sign(x) * mp.cbrt(abs(x)), "sin": mp.sin, "cos": mp.cos,
    "tan": mp.tan, "asin": mp.asin, "acos": mp.acos, "atan": mp.atan, "sinh": mp.sinh, "cosh": mp.cosh,
    "tanh": mp.tanh, "pow": lambda x, y: mp.power(x, y).real, "atan2": mp.atan2,
}  # fmt: skip


def row(f, *args):
    with mp.workdps(1500 if max(map(abs, args)) > 1e20 and f in (mp.sin, mp.cos, mp.tan) else 120):
        value = +f(*map(mpf, args))
        exponent = max(mp.frexp(value)[1] - 53, -1074)
        high = float(mp.nint(value * mpf(2) ** -exponent)) * 2.0**exponent if exponent < 970 else float(value)
        unit = max(mp.frexp(mpf(high))[1] - 53, -1074)
        return [*args, high, float((value - mpf(high)) * mpf(2) ** -unit)]


def main():
    values = {name: [row(FUNCTIONS[name], x) for x in points] for name, points in POINTS.items()}
    values |= {name: [row(FUNCTIONS[name], *pair) for pair in pairs] for name, pairs in PAIRS.items()}
    for name, rows in values.items():
        assert len(rows) >= 100 and all(all(abs(v) <= 1.7976931348623157e308 for v in r) for r in rows), name
    head = {
        "source": f"mpmath {mpmath.__version__}, by test/published/make/elementary.py",
        "row": "[argument(s), nearest double of the value, (value - double) / ulp(double)]",
    }
    lines = [f'"head": {json.dumps(head)}']
    for name, rows in values.items():
        lines.append(f'"{name}": [\n' + ",\n".join(json.dumps(r) for r in rows) + "\n]")
    target = Path(__file__).parent.parent / "data/elementary.json"
    target.write_text("{\n" + ",\n".join(lines) + "\n}\n")


if __name__ == "__main__":
    main()
