"""Makes the coefficient tables of the special-function kernels, with mpmath at 60 digits.

    python3 tools/special-tables.py     (Python 3.11, mpmath 1.3.0; deterministic)

Every row is the polynomial that interpolates the function in the Chebyshev nodes of its interval (within a factor of
a few of the minimax polynomial), written in powers of the distance h from the row's centre. Coefficients are rounded
from the highest power down, so the printed errors are those of the rounded row, rounding in the evaluation left out.
"""

from pathlib import Path

from mpmath import bernoulli, cos, erf, erfc, exp, factorial, frexp, gamma, log, loggamma, mp, mpf, pi, sin

mp.dps = 60
HERE = Path(__file__).resolve().parent.parent / "src" / "kernels" / "assembly" / "math" / "tables"


def interpolate(f, low, high, degree):
    """Coefficients in powers of h of the interpolant of f(h) in the Chebyshev nodes of [low, high]."""
    nodes = [(low + high) / 2 + (high - low) / 2 * cos(pi * (2 * k + 1) / (2 * degree + 2)) for k in range(degree + 1)]
    table = [f(h) for h in nodes]
    for step in range(1, degree + 1):
        for i in range(degree, step - 1, -1):
            table[i] = (table[i] - table[i - 1]) / (nodes[i] - nodes[i - step])
    row = [mpf(0)] * (degree + 1)
    for i in range(degree, -1, -1):
        row = [mpf(0), *row[:-1]] if i < degree else row
        if i < degree:
            shifted = row
            row = [shifted[k] - nodes[i] * (shifted[k + 1] if k < degree else 0) for k in range(degree + 1)]
        row[0] += table[i]
    return row


def evaluate(row, h):
    value = mpf(0)
    for c in reversed(row):
        value = value * h + c
    return value


def largest(f, row, low, high):
    """Largest relative error of the rounded row on 65 points of [low, high]."""
    worst = mpf(0)
    for k in range(65):
        h = low + (high - low) * k / 64
        if f(h) != 0:
            worst = max(worst, abs(evaluate(row, h) / f(h) - 1))
    return worst


def rounded(row):
    return [float(c) for c in row]


def anchored(f, low, high, degree):
    """Row [a0 high part, a0 low part, a1, ...]: f(0) kept as a pair, (f(h) - f(0)) / h interpolated."""
    f0 = f(mpf(0))
    slope = interpolate(lambda h: (f(h) - f0) / h, low, high, degree - 1)
    head = float(f0)
    return [head, float(f0 - mpf(head)), *rounded(slope)]


def write(name, comment, tables):
    text = "".join(f"// {line}\n" for line in comment)
    for constant, note, rows in tables:
        text += f"\n/** {note} */\n// prettier-ignore\nexport const {constant} = memory.data<f64>([\n"
        text += "".join("  " + ", ".join(repr(c) for c in row) + ",\n" for row in rows)
        text += "], 16);\n"
    (HERE / name).write_text(text)


def erf_table():
    rows, worst = [], mpf(0)
    for n in range(97):
        c = mpf(n) / 16
        half = mpf(1) / 32
        low = mpf(2) ** -60 if n == 0 else -half

        def f(h):
            return erf(c + h)

        row = anchored(f, low, half, 8)
        worst = max(worst, largest(f, [mpf(row[0]) + mpf(row[1]), *row[2:]], low, half))
        rows.append(row)
    print("erf", len(rows), "rows", mp.nstr(worst, 3))
    return rows


def erfcx_table():
    rows, worst = [], mpf(0)
    for k in range(16 * 5):
        binade, part = divmod(k, 16)
        width = mpf(2) ** binade / 16
        c = mpf(2) ** binade + (part + mpf(1) / 2) * width - 1
        if c - width / 2 > mpf("27.5"):
            break

        def f(h):
            z = c + h
            return exp(z * z) * erfc(z)

        row = rounded(interpolate(f, -width / 2, width / 2, 9))
        worst = max(worst, largest(f, row, -width / 2, width / 2))
        rows.append(row)
    print("erfcx", len(rows), "rows", mp.nstr(worst, 3))
    return rows


def gamma_table():
    rows, worst = [], mpf(0)
    half = mpf(1) / 16
    for k in range(8, 97):
        c = mpf(k) / 8

        def f(h):
            return gamma(c + h)

        row = anchored(f, -half, half, 12)
        worst = max(worst, largest(f, [mpf(row[0]) + mpf(row[1]), *row[2:]], -half, half))
        rows.append(row)
    print("gamma", len(rows), "rows", mp.nstr(worst, 3))
    return rows


def factor_lgamma(x):
    """log gamma(x) / ((x - 1) (x - 2)), its limits at 1 and 2."""
    for zero in (1, 2):
        if abs(x - zero) < mpf(10) ** -20:
            x = zero + mpf(10) ** -20
    with mp.workdps(90):
        return loggamma(x) / ((x - 1) * (x - 2))


def lgamma_table():
    rows, worst = [], mpf(0)
    half = mpf(1) / 16
    for k in range(6, 97):
        c = mpf(k) / 8

        def f(h):
            return factor_lgamma(c + h)

        row = rounded(interpolate(f, -half, half, 13))
        worst = max(worst, largest(f, row, -half, half))
        rows.append(row)
    print("lgamma", len(rows), "rows", mp.nstr(worst, 3))
    return rows


def stirling(x):
    """log gamma(x) - (x - 1/2) log x + x - log(2 pi) / 2."""
    return loggamma(x) - (x - mpf(1) / 2) * log(x) + x - log(2 * pi) / 2


def factorial_table():
    rows = []
    for n in range(12, 191):
        mantissa, exponent = frexp(factorial(n - 1))
        head = mp.floor(log(n) * 2**24) / 2**24
        rows.append(rounded([2 * mantissa, exponent - 1, head, log(n) - head, stirling(mpf(n))]))
    return rows


def sine_row():
    """(sin(pi r) / (pi r) - 1) / r^2 in powers of r^2, |r| <= 1/2."""

    def f(z):
        r = mp.sqrt(z)
        return (sin(pi * r) / (pi * r) - 1) / z

    row = rounded(interpolate(f, mpf(10) ** -12, mpf(1) / 4, 8))
    print("sine", mp.nstr(largest(f, row, mpf(10) ** -12, mpf(1) / 4), 3))
    return [row]


def stirling_row():
    """B_2k / (2k (2k - 1)), k = 1...8 (DLMF 5.11.1)."""
    return [rounded([bernoulli(2 * k) / (2 * k * (2 * k - 1)) for k in range(1, 9)])]


if __name__ == "__main__":
    made = "Made by tools/special-tables.py (mpmath 1.3.0, 60 digits); do not edit."
    write(
        "error-function.ts",
        ["Coefficients of the error functions.", made],
        [
            ("ERF_ROWS", "erf(n/16 + h), |h| <= 1/32, n = 0...96: erf(n/16) as high and low part, then the powers 1 to 8 of h.", erf_table()),
            ("ERFCX_ROWS", "exp(z^2) erfc(z) for z + 1 in sixteen equal parts of each binade from 1 on, up to z = 27.5: the powers 0 to 9 of the distance from the part's middle.", erfcx_table()),
        ],
    )
    write(
        "gamma-function.ts",
        ["Coefficients of the gamma function and its logarithm.", made],
        [
            ("GAMMA_ROWS", "gamma(k/8 + h), |h| <= 1/16, k = 8...96: gamma(k/8) as high and low part, then the powers 1 to 12 of h.", gamma_table()),
            ("LGAMMA_ROWS", "log gamma(x) / ((x - 1) (x - 2)), x = k/8 + h, |h| <= 1/16, k = 6...96: the powers 0 to 13 of h.", lgamma_table()),
            ("FACTORIAL_ROWS", "n = 12...190: gamma(n) as m and e with gamma(n) = m 2^e, 1 <= m < 2; log n as high part (24 bits behind the point) and low part; log gamma(n) - ((n - 1/2) log n - n + log(2 pi) / 2).", factorial_table()),
            ("SINE_ROW", "(sin(pi r) / (pi r) - 1) / r^2, |r| <= 1/2: the powers 0 to 8 of r^2.", sine_row()),
            ("STIRLING_ROW", "B_2k / (2k (2k - 1)), k = 1...8.", stirling_row()),
            ("LOG_ROW", "log(1 + u) / u = 1 - u/2 + u^2/3 - ...: twelve terms.", [[(-1) ** k / (k + 1) for k in range(12)]]),
            ("ENTROPY_ROW", "((1 + u) log(1 + u) - u) / u^2 = 1/2 - u/6 + u^2/12 - ...: twelve terms.", [[(-1) ** k / ((k + 1) * (k + 2)) for k in range(12)]]),
        ],
    )
