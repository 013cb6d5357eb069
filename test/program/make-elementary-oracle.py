"""Reference values and coefficient tables for src/program/elementary.ts, in 60-digit arithmetic.

Needs Python 3 with mpmath (Debian: python3-mpmath). Run from the top of the repository:

    python3 test/program/make-elementary-oracle.py oracle > test/program/elementary-oracle.json
    python3 test/program/make-elementary-oracle.py tables     # prints the fitted numbers of elementary-tables.ts

One oracle line is "argument result rest": argument and result are the 16 hexadecimal digits of a double, the rest is
the exact value minus that double in units of its last place, so that errors far below one such unit can be measured.
"power" lines have two arguments. The draws come from a fixed seed; running it twice gives the same file.
"""

import json
import random
import struct
import sys

from mpmath import cos, erfc, exp, expm1, inf, isinf, isnan, log, log1p, lu_solve, matrix, mp, mpf, nan, pi, sqrt

mp.dps = 60


# ---------------------------------------------------------------- doubles


def bits(value):
    return struct.pack(">d", value).hex()


def from_bits(whole):
    return struct.unpack(">d", struct.pack(">Q", whole))[0]


def nearest(value):
    """The double nearest to a 60-digit value; ties cannot occur here. Subnormals and overflow included."""
    if isnan(value):
        return float("nan")
    if isinf(value) or value == 0:
        return float(value)
    power = max(mp.mag(value) - 53, -1074)
    whole = int(mp.nint(mp.ldexp(value, -power)))
    try:
        return float(mp.ldexp(mpf(whole), power)) if power > -1000 else whole * 2.0 ** (power + 60) * 2.0**-60
    except OverflowError:
        return float("inf") if value > 0 else float("-inf")


def line(arguments, value):
    rounded = nearest(value)
    if rounded != rounded or isinf(mpf(rounded)):
        rest = mpf(0)
    else:
        last_place = max(mp.mag(mpf(rounded)) - 53, -1074) if rounded else -1074
        rest = mp.ldexp(value - mpf(rounded), -last_place)
    return " ".join([*(bits(a) for a in arguments), bits(rounded), f"{float(rest):.4f}"])


# ---------------------------------------------------------------- the functions


def exact_exp(x):
    return nan if x != x else exp(mpf(x))


def exact_log(x):
    if x != x or x < 0:
        return nan
    return -inf if x == 0 else log(mpf(x))


def exact_cumulative(x):
    if x != x:
        return nan
    if abs(x) > 60:
        return mpf(0 if x < 0 else 1)
    return erfc(-mpf(x) / sqrt(mpf(2))) / 2


def exact_quantile(p):
    """Newton on the logarithm of the tail, which converges from a rough start for every double."""
    if p != p or p < 0 or p > 1:
        return nan
    if p in (0.0, 0.5, 1.0):
        return {0.0: -inf, 0.5: mpf(0), 1.0: inf}[p]
    tail = mpf(p) if p < 0.5 else 1 - mpf(p)
    root = sqrt(-2 * log(tail))
    x = -(root - (2.30753 + 0.27061 * root) / (1 + 0.99229 * root + 0.04481 * root * root))
    for _ in range(60):
        cumulative = erfc(-x / sqrt(mpf(2))) / 2
        density = exp(-x * x / 2) / sqrt(2 * pi)
        move = log(cumulative / tail) * cumulative / density
        x -= move
        if abs(move) < abs(x) * mpf(10) ** -45:
            return x if p < 0.5 else -x
    raise ArithmeticError(f"no convergence at {p!r}")


def exact_power(base, exponent):
    if base != base or exponent != exponent or base < 0:
        return nan
    if exponent == 0:
        return mpf(1)
    if base == 0:
        return mpf(0) if exponent > 0 else inf
    return exp(mpf(exponent) * log(mpf(base)))


# ---------------------------------------------------------------- the arguments

BIGGEST, SMALLEST_NORMAL, SMALLEST = from_bits(0x7FEFFFFFFFFFFFFF), 2.0**-1022, from_bits(1)
SPECIAL = [0.0, -0.0, float("inf"), float("-inf"), float("nan"), SMALLEST, -SMALLEST, SMALLEST_NORMAL, BIGGEST, -BIGGEST]


def around(value):
    whole = struct.unpack(">Q", struct.pack(">d", value))[0]
    return [from_bits(whole - 1), value, from_bits(whole + 1)]


def exp_arguments(draw):
    edges = [709.782712893384, -708.3964185322641, -744.4400719213812, -745.1332191019411, 710.0, -746.0, 1.0, -1.0]
    half_steps = [(n + 0.5) * float(log(mpf(2))) for n in range(-60, 60, 7)]
    return (
        SPECIAL
        + [y for x in edges + half_steps for y in around(x)]
        + [draw.uniform(-745.2, 709.8) for _ in range(500)]
        + [draw.uniform(-1, 1) for _ in range(600)]
        + [draw.uniform(-40, 5) for _ in range(400)]
        + [draw.uniform(-745.2, -708) for _ in range(120)]
        + [draw.choice((-1, 1)) * 2.0 ** draw.uniform(-60, 0) for _ in range(150)]
    )


def log_arguments(draw):
    edges = [1.0, 2.0, 0.5, float(sqrt(mpf(2))), float(sqrt(mpf(0.5))), 10.0, SMALLEST_NORMAL]
    return (
        SPECIAL
        + [y for x in edges for y in around(x)]
        + [from_bits(draw.randrange(1, 0x7FF0000000000000)) for _ in range(500)]
        + [draw.uniform(0.4, 2.5) for _ in range(700)]
        + [1 + draw.choice((-1, 1)) * 2.0 ** draw.uniform(-52, -1) for _ in range(300)]
        + [2.0 ** draw.uniform(-40, 40) for _ in range(250)]
        + [from_bits(draw.randrange(1, 1 << draw.randrange(1, 53))) for _ in range(100)]
    )


def cumulative_arguments(draw):
    return (
        SPECIAL
        + [y for x in (1.0, -1.0, 8.0, -8.0, -37.5, -38.0, -38.4, 40.0, -40.0, 8.3) for y in around(x)]
        + [draw.uniform(-8, 8) for _ in range(1100)]
        + [draw.uniform(-8, 0) for _ in range(300)]
        + [draw.uniform(-37.5, -8) for _ in range(250)]
        + [draw.uniform(-38.6, -37.5) for _ in range(80)]
        + [draw.choice((-1, 1)) * 2.0 ** draw.uniform(-60, 0) for _ in range(80)]
    )


def quantile_arguments(draw):
    edges = [0.5, 0.075, 0.925, float(exp(mpf(-25))), 0.25, 0.975, 1.0 - 2.0**-53]
    return (
        SPECIAL
        + [1.0, -0.1, 1.1]
        + [y for p in edges for y in around(p) if y <= 1]
        + [draw.random() for _ in range(900)]
        + [draw.uniform(0, 0.1) for _ in range(200)]
        + [0.5 + draw.choice((-1, 1)) * 2.0 ** draw.uniform(-54, -1) for _ in range(150)]
        + [1 - 2.0 ** draw.uniform(-53, -1) for _ in range(100)]
        + [2.0 ** draw.uniform(-1074, -1) for _ in range(300)]
        + [2.0 ** draw.uniform(-60, -1) for _ in range(200)]
    )


def power_arguments(draw):
    bases = [0.0, -0.0, 1.0, 2.0, -2.0, float("inf"), float("nan")]
    exponents = [0.0, 0.5, -0.5, 1.0, -1.0, 2.0, float("nan")]
    return (
        [(b, e) for b in bases for e in exponents]
        + [(2.0 ** draw.uniform(-10, 10), draw.uniform(-8, 8)) for _ in range(250)]
        + [(2.0 ** draw.uniform(-1000, 1000), draw.uniform(-1.02, 1.02)) for _ in range(100)]
    )


def print_oracle():
    draw = random.Random(20270301)
    sections = {
        "exp": [line([x], exact_exp(x)) for x in exp_arguments(draw)],
        "log": [line([x], exact_log(x)) for x in log_arguments(draw)],
        "normalCumulative": [line([x], exact_cumulative(x)) for x in cumulative_arguments(draw)],
        "normalQuantile": [line([p], exact_quantile(p)) for p in quantile_arguments(draw)],
        "power": [line([b, e], exact_power(b, e)) for b, e in power_arguments(draw)],
    }
    print(json.dumps(sections, indent=0))


# ---------------------------------------------------------------- the coefficient tables


def chebyshev_nodes(low, high, count):
    return [(low + high) / 2 + (high - low) / 2 * cos(pi * (j + mpf(1) / 2) / count) for j in range(count)]


def level_nodes(half_width):
    """Ten points for which r^2 (r - node) ... (r - node) has level peaks: zeros of T6 in r^2, the smallest moved to 0."""
    zeros = sorted(chebyshev_nodes(mpf(0), mpf(1), 6))
    moved = [half_width * sqrt((z - zeros[0]) / (1 - zeros[0])) for z in zeros[1:]]
    return [-r for r in moved] + moved


def polynomial_through(function, nodes):
    """Ascending coefficients of the interpolating polynomial."""
    system = matrix([[x**j for j in range(len(nodes))] for x in nodes])
    return list(lu_solve(system, matrix([function(x) for x in nodes])))


def upper_tail_ratio(degree):
    """N and D (degrees n and n+1, N(0)/D(0) = 1/2) with exp(a^2/2) Phi(-a) = N(a)/D(a) on 0 <= a <= 39."""
    middle, end = mpf(4), mpf(39)
    unknowns = 2 * degree + 1
    mapped = chebyshev_nodes(mpf(-1), (end - middle) / (end + middle), unknowns)
    rows, right = [], []
    for t in mapped:
        a = middle * (1 + t) / (1 - t)
        ratio = exp(a * a / 2) * erfc(a / sqrt(mpf(2))) / 2
        scale = (1 + a) ** -degree / ratio
        rows.append([a**j * scale for j in range(1, degree + 1)] + [-ratio * a**j * scale for j in range(1, degree + 2)])
        right.append((ratio - mpf(1) / 2) * scale)
    solved = list(lu_solve(matrix(rows), matrix(right)))
    return [mpf(1) / 2, *solved[:degree]], [mpf(1), *solved[degree:]]


def print_tables():
    def show(name, values):
        for j, value in enumerate(values):
            print(f"export const {name}{j} = {float(value)!r};")

    two = log(mpf(2))
    high = mp.floor(mp.ldexp(two, 32)) / mpf(2) ** 32
    show("logOfTwoHigh", [high])
    show("logOfTwoLow", [two - high])
    show("oneOverLogOfTwo", [1 / two])
    show("exponential", polynomial_through(lambda r: (expm1(r) - r) / (r * r), level_nodes(two / 2)))
    widest = ((sqrt(mpf(2)) - 1) / (sqrt(mpf(2)) + 1)) ** 2

    def odd_part(z):
        s = sqrt(z)
        return ((log1p(s) - log1p(-s)) / s - 2) / z

    show("logarithm", polynomial_through(odd_part, chebyshev_nodes(mpf(0), widest, 7)))
    numerator, denominator = upper_tail_ratio(9)
    show("tailNumerator", numerator)
    show("tailDenominator", denominator)


if __name__ == "__main__":
    {"oracle": print_oracle, "tables": print_tables}[sys.argv[1]]()
