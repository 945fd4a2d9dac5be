"""Values of the suite `quantities`, by quadrature of densities and roots of distribution functions (mpmath, 30 digits).

Run: python3 quantity-values.py > quantity-values.json
"""
import json
import mpmath as mp

mp.mp.dps = 30
exp_density = lambda mean: (lambda x: mp.exp(-x / mean) / mean)
tail = lambda f, a: mp.quad(f, mp.linspace(a, a + 400, 41))


def exponential_tail(mean, a):
    return tail(exp_density(mean), a)


def quantile(upper, level, start):
    return mp.findroot(lambda x: upper(x) - (1 - level), start)


def normal_upper(x, centre, sd):
    return mp.quad(lambda t: mp.npdf(t, centre, sd), mp.linspace(x, x + 12 * sd, 25))


def uniform_mean(f, a, b):
    return mp.quad(f, [a, b]) / (b - a)


def variance_exponential(mean):
    density = exp_density(mean)
    moment = lambda k: mp.quad(lambda x: x**k * density(x), mp.linspace(0, 80 * mean, 81))
    return moment(2) - moment(1) ** 2


values = {}
values["calm-spell"] = 1 - (1 - exponential_tail(mp.mpf("2.5"), 9)) ** 6
rated = mp.mpf("1.2")
hours = uniform_mean(lambda u: 24 - 6 * u, 0, 1)
values["energy-per-hour"] = rated * uniform_mean(lambda u: u**2, 0, 1) * hours / hours
values["cost-per-repair"] = uniform_mean(lambda x: 90 * x + 12 * x**2, 2, 10) / uniform_mean(lambda x: x, 2, 10)
values["repair-variance"] = sum(variance_exponential(m) for m in (4, 6, 10))
lo, mid = mp.mpf("0.8"), mp.mpf("0.6")
product = lambda k: uniform_mean(lambda x: x**k, lo, 1) * uniform_mean(lambda x: x**k, mid, 1)
values["yield-variance"] = product(2) - product(1) ** 2
values["repair-quantile"] = quantile(lambda x: exponential_tail(8, x), mp.mpf("0.99"), 36)
sd = 20 / mp.sqrt(12)
values["season-low"] = quantile(lambda x: normal_upper(x, 100, sd), mp.mpf("0.05"), 90)
q = quantile(lambda x: normal_upper(x, 100, 50), mp.mpf("0.975"), 198)
values["member-shortfall"] = mp.quad(lambda x: x * mp.npdf(x, 100, 50), mp.linspace(q, q + 600, 25)) / mp.mpf("0.025")
q = quantile(lambda x: exponential_tail(8, x), mp.mpf("0.95"), 24)
values["repair-shortfall"] = tail(lambda x: x * exp_density(8)(x), q) / mp.mpf("0.05")

print(json.dumps({"meta": {"script": "quantity-values.py", "library": "mpmath " + mp.__version__, "digits": 30},
                  "values": {k: mp.nstr(v, 20) for k, v in values.items()}}, indent=2))
