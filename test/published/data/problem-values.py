"""Exact values of the shipped problems, found without the closed forms that the problem files use.

Made problem-values.json by:  python3 problem-values.py > problem-values.json   (mpmath 1.3.0, BSD licence)

A product of one-dimensional factors is integrated factor by factor by Gauss-Legendre quadrature; what depends on a sum
or a distance is reduced to one dimension by a Laplace or radial representation; counts go through the recursion of
the Poisson binomial distribution. All at 40 digits.
"""

import json
import sys

from mpmath import mp, mpf, quad, exp, cos, sin, pi, sqrt, fabs, log, erf, gamma, npdf, ncdf, inf, findroot, mpc, norm, nsum, factorial

mp.dps = 40

B = ["0.1", "0.4", "0.2", "0.5", "0.3"]
U = ["0.37", "0.74", "0.11", "0.48", "0.85", "0.22", "0.59", "0.96", "0.33", "0.7"]


def scaled(factor, d):
    # Rounded to four places, as the files write them.
    return [mpf(str(round(float(factor) * float(b), 4))) for b in B * (d // 5)]


def centres(d):
    return [mpf(u) for u in U[:d]]


def gl(f, a=0, b=1, cuts=()):
    return quad(f, [a, *cuts, b], method="gauss-legendre")


def product(factors):
    value = mpf(1)
    for factor in factors:
        value *= factor
    return value


values = {}


def put(name, value, how):
    values[name] = {"value": mp.nstr(value, 25), "how": how}
    print(name, values[name]["value"], file=sys.stderr)


FACTORS = "one-dimensional Gauss-Legendre quadrature of each factor"

for d, k in ((5, 6), (10, 3)):
    a = scaled(k, d)
    wave = product(gl(lambda x, c=c: exp(mpc(0, 1) * c * x)) for c in a) * exp(mpc(0, 2) * pi * mpf("0.37"))
    put(f"genz-oscillatory-d{d}", wave.real, FACTORS)
for d, k in ((5, "13.333"), (10, 10)):
    pairs = zip(scaled(k, d), centres(d))
    put(f"genz-product-peak-d{d}", product(gl(lambda x: 1 / (c**-2 + (x - u) ** 2), cuts=[u]) for c, u in pairs), FACTORS)


def corner(a):
    # (1 + s)^-(d+1) = integral of t^d exp(-t (1 + s)) / d! over t > 0; the integrals over x are then products.
    d = len(a)
    inner = lambda t: t**d * exp(-t) * product((1 - exp(-c * t)) / (c * t) for c in a)
    return quad(inner, [0, 1, 5, 10, 20, 40, 80, 200]) / gamma(d + 1)


LAPLACE = "Laplace representation of the power, one-dimensional quadrature"
put("genz-corner-peak-d5", corner([mpf(b) for b in B]), LAPLACE)
put("genz-corner-peak-d10", corner([mpf("0.15")] * 10), LAPLACE)
for d, k in ((5, 7), (10, 4)):
    pairs = zip(scaled(k, d), centres(d))
    put(f"genz-gaussian-d{d}", product(gl(lambda x: exp(-((c * (x - u)) ** 2)), cuts=[u]) for c, u in pairs), FACTORS)
for d, k in ((5, "5.333"), (10, 4)):
    pairs = zip(scaled(k, d), centres(d))
    put(f"genz-continuous-d{d}", product(gl(lambda x: exp(-c * fabs(x - u)), cuts=[u]) for c, u in pairs), FACTORS)
for d, k in ((5, "2.6667"), (10, "1.5")):
    a = scaled(k, d)
    ends = [mpf("0.37"), mpf("0.74")] + [mpf(1)] * (d - 2)
    put(f"genz-discontinuous-d{d}", product(gl(lambda x: exp(c * x), 0, end) for c, end in zip(a, ends)), FACTORS)

weights = [mpf(w) for w in (0, 1, "4.5", 9, 99, 99, 99, 99)]
put("sobol-g-d8", product(gl(lambda x: (fabs(4 * x - 2) + w) / (1 + w), cuts=[mpf("0.5")]) for w in weights), FACTORS)
for d in (9, 25):
    density = lambda r: 2 * r ** (d - 1) * exp(-r * r / 2) / (2 ** (mpf(d) / 2) * gamma(mpf(d) / 2))
    radial = quad(lambda r: cos(r / sqrt(2)) * density(r), [0, 1, 2, 3, 4, 5, 6, 8, 10, 14, 20])
    put(f"keister-d{d}", radial, "radial integral against the chi density")
put("morokoff-caflisch-d5", quad(lambda x: mpf(6) / 5 * x ** (mpf(1) / 5), [0, 1]) ** 5, "tanh-sinh quadrature of each factor")
half = gl(lambda x: x)
put("alternating-products-d8", sum((-half) ** i for i in range(1, 9)), "sum of products of one-dimensional means")


def distance(square_transform, mean_square):
    # E sqrt(s) = 1/(2 sqrt(pi)) integral of (1 - E exp(-t s)) t^(-3/2) over t > 0; t = v^2. Below v = 1e-12 the
    # difference would cancel; there the integrand is the mean of s.
    cut = mpf(10) ** -12
    piece = lambda v: (1 - square_transform(v)) / v**2
    steps = [cut, mpf("0.1"), 1, 2, 4, 8, 16, 32, 100, 1000, 10**4, inf]
    return (mean_square * cut + quad(piece, steps)) / sqrt(pi)


DISTANCE = "Laplace representation of the square root, one-dimensional quadrature"
put("box-distance-d5", distance(lambda v: gl(lambda x: exp(-((v * x) ** 2)), cuts=[min(mpf(1) / 2, 4 / v)] if v > 8 else []) ** 5, mpf(5) / 3), DISTANCE)
put(
    "cube-distance-d8",
    distance(lambda v: gl(lambda x: 2 * (1 - x) * exp(-((v * x) ** 2)), cuts=[min(mpf(1) / 2, 4 / v)] if v > 8 else []) ** 4, mpf(4) / 6),
    DISTANCE,
)
angle = lambda x: 2 * pi * x - pi
ishigami = (
    gl(lambda x: sin(angle(x)))
    + 7 * gl(lambda x: sin(angle(x)) ** 2)
    + mpf("0.1") * gl(lambda x: angle(x) ** 4) * gl(lambda x: sin(angle(x)))
)
put("ishigami", ishigami, "one-dimensional Gauss-Legendre quadrature of each term")
ball = mpf(1)
for d in range(2, 6):
    # Slices of a d-ball: V_d = V_(d-1) * integral of (1 - x^2)^((d-1)/2).
    ball *= quad(lambda x: (1 - x * x) ** (mpf(d - 1) / 2), [-1, 1])
put("ball-fraction-d5", ball / 2**4, "recursion over slices of the ball")

peak = lambda c, s: gl(lambda x: exp(-((x - c) ** 2) / (2 * s * s)) / (s * sqrt(2 * pi)), cuts=[c - 8 * s, c - 2 * s, c, c + 2 * s, c + 8 * s])
put("midway-peak", product(peak(mpf(c), mpf("0.03")) for c in ("0.5", "0.4", "0.4")), FACTORS)
put("on-plane-peak", peak(mpf("0.5"), mpf("0.03")) ** 4, FACTORS)
tone = lambda h: gl(lambda x: exp(mpc(0, 2) * pi * h * x), cuts=[mpf(i) / h for i in range(1, abs(h))])
put("standing-wave", 1 + (tone(9) * tone(6) * tone(1) * exp(mpc(0, -2) * pi * mpf("0.1"))).real, FACTORS)
put("product-comb", product((1 + mpf("0.9") * tone(h).real) for h in (9, 6, 1)), FACTORS)
put("pair-ripple", mpf(1) + mpf("0.5") * gl(lambda x: cos(2 * pi * x)), FACTORS + ", one of the 16807 equal periods")
ridge = gl(lambda x: exp(-4 * cos(2 * pi * x)), cuts=[mpf(i) / 8 for i in range(1, 8)])
put("narrow-ridge", ridge / mpf("11.301921952136330496356270183217102"), "mean over one period by Gauss-Legendre quadrature")

# The geometric mean: weights of the steps by brute force, then the payoff against the normal density.
weeks, vol = 64, mpf("0.2")
shares = [mpf(sum(1 for i in range(weeks) if i >= j)) / weeks for j in range(weeks)]
centre = log(100) - vol**2 / 2 / weeks * sum(shares)
spread = vol / sqrt(weeks) * norm(shares)
kink = (log(95) - centre) / spread
put("season-guarantee-geometric", quad(lambda t: (95 - exp(centre + spread * t)) * npdf(t), [-30, -12, -6, -3, kink]), "payoff against the normal density, weights of the steps summed one by one")
v = mpf("0.35")
kink = (log(mpf(75) / 80) + v * v / 2) / v
put("price-floor", quad(lambda t: (75 - 80 * exp(v * t - v * v / 2)) * npdf(t), [-30, -12, -6, -3, kink]), "payoff against the normal density")
v, w, r = mpf("0.3"), mpf("0.25"), mpf("0.4")


def exchange(t):
    # Given z1 = t the southern output is lognormal: an inner closed form against an outer quadrature.
    north = 50 * exp(v * t - v * v / 2)
    m, s = log(48) + w * r * t - w * w / 2, w * sqrt(1 - r * r)
    k = (log(north) - m) / s
    return (north * ncdf(k) - exp(m + s * s / 2) * ncdf(k - s)) * npdf(t)


put("site-exchange", quad(exchange, [-30, -12, -6, -3, 0, 3, 6, 12, 30]), "conditional on the first input, one-dimensional quadrature")
losses = [mpf(x) for x in ("0.12", "0.11", "0.1", "0.1", "0.09", "0.08", "0.08", "0.07", "0.06", "0.05", "0.05", "0.04")]
put("availability-chain", product(gl(lambda x: 1 - c * x * x) for c in losses), FACTORS)


def count(probabilities):
    table = [mpf(1)]
    for p in probabilities:
        table = [a * (1 - p) + b * p for a, b in zip(table + [mpf(0)], [mpf(0)] + table)]
    return table


works = mpf("0.97") * mpf("0.92") * mpf("0.95")
put("turbine-reserve", sum(count([works] * 12)[9:]), "recursion of the Poisson binomial distribution")


def holds(strength, load):
    # P(strength > load) by conditioning on the load.
    return quad(lambda t: ncdf((strength - load - 40 * t) / 50) * npdf(t), [-30, -12, -6, -3, 0, 3, 6, 12, 30])


lines = zip((520, 540, 500, 560), (310, 330, 300, 340))
put("mooring-lines", 1 - product(holds(mpf(s), mpf(l)) for s, l in lines), "conditional on each load, one-dimensional quadrature")


def quantile(p):
    return findroot(lambda x: ncdf(x) - p, -2)


STEPS = [-30, -12, -8, -6, -5, -4, -3, -2, -1, 0, 1, 2, 3, 5, 8, 30]
p, r = mpf("0.04"), mpf("0.2")
threshold = quantile(p)
one = quad(lambda t: ncdf((threshold - sqrt(r) * t) / sqrt(1 - r)) * npdf(t), STEPS)
exposure = [40, 35, 30, 30, 25, 25, 20, 20, 20, 15, 15, 15, 10, 10, 10, 10, 5, 5, 5, 5]
put("member-losses", mpf("0.45") * sum(exposure) * one, "default probability integrated over the common factor")
p = mpf("0.03")
threshold2 = quantile(p)
tail = lambda t: 1 - sum(count([ncdf((threshold2 - sqrt(r) * t) / sqrt(1 - r))] * 25)[:4])
put("member-losses-tail", quad(lambda t: tail(t) * npdf(t), STEPS), "conditional recursion over members, integrated over the common factor")

# The suite "inputs": densities integrated in place of closed forms.
I = lambda f, *ends: quad(f, list(ends))
put("storm-repairs", nsum(lambda k: k * mpf("6.5") ** k * exp(-mpf("6.5")) / factorial(k), [0, inf])
    * I(lambda x: x * x ** mpf("1.5") * exp(-x / 3) / (gamma(mpf("2.5")) * mpf(3) ** mpf("2.5")), 0, 2, 10, 40, 200, 600)
    + mpf("0.6"), "sum over the Poisson law times quadrature of the gamma density")
put("rough-seas", 2 * I(lambda x: x * (1 + x * x / 4) ** mpf("-2.5") * mpf(3) / 8, 0, 1, 5, 50, 1000, inf), "quadrature of Student's density")
put("worn-blades", I(lambda x: x ** mpf("2.5") * sqrt(1 - x), 0, 1) / I(lambda x: x ** mpf("1.5") * sqrt(1 - x), 0, 1)
    * I(lambda x: (x + 2) * npdf(x), -1, 2) / I(npdf, -1, 2) * I(lambda x: 2 * x * x * exp(-x * x), 0, 1, 3, 12), "quadrature of the three densities")
put("first-passage", I(lambda x: exp(-mpf("0.4") * x) * sqrt(3 / (2 * pi * x ** 3)) * exp(-3 * (x - 2) ** 2 / (8 * x)), 0, 0.1, 0.5, 1, 3, 10, 40, 200), "quadrature of the density")
r = mpf("0.6")
put("both-sites-low", I(lambda t: ncdf(-r * t / sqrt(1 - r * r)) * npdf(t), -30, -8, -3, -1, 0), "one normal given the other, one-dimensional quadrature")
put("all-members-pay", quad(lambda t: ncdf(t) ** 9 * npdf(t), STEPS), "conditional on the factor, one-dimensional quadrature")
centre = log(mpf(100)) - mpf("0.04") * 65 / 256
spread = mpf("0.2") / 64 * sqrt(mpf(65) * 129 / 6)
k = (log(mpf(95)) - centre) / spread
average = quad(lambda t: (95 - exp(centre + spread * t)) * npdf(t), [-30, -12, -8, -6, -4, -3, -2, -1, k])
for construction in ("increments", "bridge", "principal-components"):
    put("season-average-" + construction, average, "quadrature of the lognormal law of the geometric mean")
def exchange(t):
    # north given by t; south's mean of max(c - B, 0) by quadrature over its own part
    c = 100 * exp(mpf("0.2") * t - mpf("0.02"))
    own = mpf("0.3") * sqrt(1 - r * r)
    rest = log(mpf(90)) - mpf("0.045") + mpf("0.3") * r * t
    return quad(lambda e: (c - exp(rest + own * e)) * npdf(e), [-15, -9, -6, -4, -2, (log(c) - rest) / own]) * npdf(t)
put("site-exchange-paths", quad(exchange, [-14, -9, -6, -4, -2, -1, 0, 1, 2, 4, 6, 9, 14]), "double quadrature over two correlated normals")
m = mpf("0.1") + mpf("0.3") * exp(mpf("-1.4"))
w = sqrt(mpf("0.25") / mpf("1.4") * (1 - exp(mpf("-2.8"))))
put("reverting-price", quad(lambda t: exp(m + w * t) * npdf(t), STEPS), "quadrature over the normal end of the path")

json.dump({"meta": {"script": "problem-values.py", "library": "mpmath " + __import__("mpmath").__version__, "digits": 40}, "values": values}, sys.stdout, indent=2)
print()
