"""Makes the static tables of src/kernels/assembly/math/tables/ and prints the polynomial coefficients of the kernels.

Run: python3 tools/kernel-tables.py          (mpmath 1.3.0; takes some seconds)

Every value is computed with 300 bits and rounded to nearest. Polynomials are Chebyshev interpolants of the function
on the reduced interval, which come within a factor of two of the best uniform approximation (L. N. Trefethen,
"Approximation Theory and Approximation Practice", SIAM 2013, chapter 16); their coefficients are printed to be pasted
into the kernels, with the largest relative error of the rounded polynomial.
"""
import struct
from pathlib import Path

from mpmath import mp, mpf

mp.prec = 300
FOLDER = Path(__file__).parent.parent / "src/kernels/assembly/math/tables"


def bits(x):
    return struct.unpack("<Q", struct.pack("<d", x))[0]


def double(x):
    """Nearest double of an mpf."""
    return float(x)


def words(values):
    return "\n".join(
        "    " + " ".join(f"0x{v:016x}," for v in values[i : i + 4]) for i in range(0, len(values), 4)
    )


def table(file, name, head, values):
    text = "".join(f"// {line}\n" for line in head) + "// Made by tools/kernel-tables.py.\n"
    text += f"export const {name} = memory.data<u64>(\n  [\n{words(values)}\n  ],\n  16,\n);\n"
    (FOLDER / file).write_text(text)


def exp_table():
    values = []
    for j in range(128):
        exact = mpf(2) ** (mpf(j) / 128)
        high = double(exact)
        low = double(exact / mpf(high) - 1)
        values += [bits(low), (bits(high) - (j << 45)) % 2**64]
    table(
        "exp.ts",
        "EXP_TABLE",
        [
            "2^(j/128), j = 0...127, as pairs (e, bits of h less j * 2^45) where 2^(j/128) = h (1 + e) and h is the nearest",
            "double: adding n * 2^45 to the second word, n = 128 k + j, gives 2^k h.",
        ],
        values,
    )


def log_table():
    pairs, lows = [], []
    start = 0x3FE6900000000000
    for i in range(128):
        a, b = start + (i << 45), start + ((i + 1) << 45)
        lo, hi = (mpf(struct.unpack("<d", struct.pack("<Q", v))[0]) for v in (a, b))
        if lo < 1 < hi:
            inverse, value = mpf(1), mpf(0)
        else:
            # 1/c on the grid of 2^-21 near the middle, where -log(1/c) is nearest to a double
            centre, best = 2 / (lo + hi), None
            for step in range(-1500, 1501):
                candidate = mp.floor(centre * 2**21 + step) / 2**21
                exact = -mp.log(candidate)
                high = double(exact)
                unit = mpf(2) ** (mp.floor(mp.log(abs(exact), 2)) - 52)
                miss = abs(exact - mpf(high)) / unit
                if best is None or miss < best[0]:
                    best = (miss, candidate, exact)
            inverse, value = best[1], best[2]
        high = double(value)
        pairs += [bits(double(inverse)), bits(high)]
        lows += [bits(double(value - mpf(high)))]
    head = [
        "Cells i = 0...127 of the significand, beginning at bits 0x3fe69000_00000000 + i * 2^45 (0.705 to 1.410; the",
        "cell around 1 has c = 1).",
    ]
    more = [
        "Pairs (1/c, log c): 1/c is a multiple of 2^-21 near the middle of the cell, picked so that the double",
        "next to log c misses it by less than 2^-10 units (S. Gal, \"Computing elementary functions\", Lecture Notes in",
        "Computer Science 235 (1986) 1-16).",
    ]
    table("log.ts", "LOG_TABLE", head + more, pairs)
    table("log-low.ts", "LOG_LOW_TABLE", head + ["What log c of LOG_TABLE lacks: log c - high."], lows)


def sine_table():
    values = []
    for k in range(128):
        sine, cosine = mp.sin(k * mp.pi / 64), mp.cos(k * mp.pi / 64)
        if k % 64 == 0:
            sine = mpf(0)
        if k % 64 == 32:
            cosine = mpf(0)
        unit = 1 if cosine >= 0 else -1
        high = double(sine)
        values += [bits(high if k % 64 else -0.0), bits(double(cosine - unit))]
        values += [bits(double(sine - mpf(high))), bits(float(unit))]
    table(
        "sine.ts",
        "SINE_TABLE",
        [
            "Angles k * pi/64, k = 0...127, as entries (sine, cosine - unit, what the sine lacks, unit) with unit = 1 or -1 of",
            "the cosine's sign. The zeros of the sine are -0 so that sin(-0) = -0.",
        ],
        values,
    )


def two_over_pi():
    """Two words of zeros, then 2/pi to 1280 binary digits: enough for the largest double."""
    with mp.workprec(1400):
        digits = int(mp.floor(2 / mp.pi * mpf(2) ** 1280))
    words32 = [0, 0] + [(digits >> (1248 - 32 * i)) & 0xFFFFFFFF for i in range(40)]
    lines = "\n".join(
        "    " + " ".join(f"0x{w:08x}," for w in words32[i : i + 7]) for i in range(0, len(words32), 7)
    )
    (FOLDER / "two-over-pi.ts").write_text(
        "// Two words of zeros, then the binary digits of 2/pi behind the point, 32 a word, the leading ones first.\n"
        "// Made by tools/kernel-tables.py.\n"
        f"export const TWO_OVER_PI = memory.data<u32>(\n  [\n{lines}\n  ],\n  16,\n);\n"
    )


def arctangent_table():
    """Cells of |x|: below 2^-6, sixteen an octave from 2^-6 to 2^6, and above."""
    values = [bits(0.0), bits(1.0), bits(0.0), bits(0.0)]
    for i in range(192):
        centre = mpf(2) ** (i // 16 - 6) * (1 + mpf(2 * (i % 16) + 1) / 32)
        angle = mp.atan(centre)
        high = double(angle)
        values += [bits(double(centre)), bits(1.0), bits(high), bits(double(angle - mpf(high)))]
    high = double(mp.pi / 2)
    values += [bits(1.0), bits(0.0), bits(high), bits(double(mp.pi / 2 - mpf(high)))]
    table(
        "atan.ts",
        "ATAN_TABLE",
        [
            "Entries (p, q, high, low): the middle p/q of a cell and its arctangent in two parts. Cell 0: below 2^-6,",
            "p/q = 0; cells 1...192: sixteen an octave from 2^-6 to 2^6; cell 193: above, p/q = infinity.",
        ],
        values,
    )


def chebyshev(f, a, b, n):
    """Coefficients of the polynomial of degree n - 1 that interpolates f at the Chebyshev points of [a, b]."""
    a, b = mpf(a), mpf(b)
    nodes = [(a + b) / 2 + (b - a) / 2 * mp.cos(mp.pi * (2 * i + 1) / (2 * n)) for i in range(n)]
    matrix = mp.matrix(n, n)
    right = mp.matrix(n, 1)
    for i, x in enumerate(nodes):
        right[i] = f(x)
        for j in range(n):
            matrix[i, j] = x**j
    return list(mp.lu_solve(matrix, right))


def polynomial(title, f, a, b, n, error):
    """Prints coefficients of f on [a, b]; `error(x, p(x))` is the error that matters."""
    c = [double(v) for v in chebyshev(f, a, b, n)]
    worst = mpf(0)
    for i in range(400):
        x = mpf(a) + (mpf(b) - mpf(a)) * (i + mpf(1) / 3) / 400
        p = sum(mpf(c[j]) * x**j for j in range(n))
        worst = max(worst, abs(error(x, p)))
    print(f"{title}: error 2^{float(mp.log(worst, 2)):.1f}")
    for v in c:
        print(f"    {v!r}, {v!r},")


def main():
    FOLDER.mkdir(exist_ok=True)
    exp_table()
    log_table()
    sine_table()
    two_over_pi()
    arctangent_table()
    h = mp.log(2) / 256 * mpf("1.001")
    polynomial("exp: (e^r - 1 - r) / r^2", lambda r: (mp.expm1(r) - r) / r**2, -h, h, 4,
               lambda r, p: (p * r**2 + r) / mp.expm1(r) - 1)
    h = mpf("0.0047")
    polynomial("log: (log(1+r) - r) / r^2", lambda r: (mp.log1p(r) - r) / r**2, -h, h, 6,
               lambda r, p: (p * r**2 + r) / mp.log1p(r) - 1)
    polynomial("log, third order: (log(1+r) - r + r^2/2) / r^3", lambda r: (mp.log1p(r) - r + r**2 / 2) / r**3, -h, h * mpf("1.01"), 6,
               lambda r, p: (p * r**3 - r**2 / 2 + r) / mp.log1p(r) - 1)
    z = (mp.pi / 128) ** 2 * mpf("1.001")
    root = mp.sqrt
    polynomial("sin: (r - sin r) / r^3 in r^2", lambda x: (root(x) - mp.sin(root(x))) / root(x) ** 3, z / 10**6, z, 3,
               lambda x, p: (root(x) - p * root(x) ** 3) / mp.sin(root(x)) - 1)
    polynomial("cos: (1 - cos r) / r^2 in r^2", lambda x: (1 - mp.cos(root(x))) / x, z / 10**6, z, 3,
               lambda x, p: (1 - p * x) / mp.cos(root(x)) - 1)
    polynomial("asin: (asin s - s) / s^3 in s^2", lambda x: (mp.asin(root(x)) - root(x)) / root(x) ** 3,
               mpf(10) ** -8, mpf(1) / 4, 13, lambda x, p: (root(x) + p * root(x) ** 3) / mp.asin(root(x)) - 1)
    z = (mpf(1) / 64) ** 2 * mpf("1.002")
    polynomial("atan: (z - atan z) / z^3 in z^2", lambda x: (root(x) - mp.atan(root(x))) / root(x) ** 3,
               z / 10**6, z, 4, lambda x, p: (root(x) - p * root(x) ** 3) / mp.atan(root(x)) - 1)


if __name__ == "__main__":
    main()
