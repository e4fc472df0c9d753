"""Makes student-reference.csv: tails and quantiles about Student's t at seeded arguments, with mpmath at 50 digits.

usage: make_student.py [rows a function] [folder]

kind      a          b          x          value
mixing    nu                    u          W = nu / (the chi-square whose upper tail is u)
lower     nu                    x          P(chi-square <= x)
upper     nu                    x          P(chi-square > x)
density   nu                    x          ln of the density of t
tail      nu                    x          P(t > x)
quantile  nu                    q          the x with P(t > x) = q
map       nu         nu_j       y          sqrt((nu_j - 2)/nu_j) times the x with P(t_nu_j > x) = P(t_nu > y)
loggamma                        x          ln Gamma(x)
"""
import random
import sys
from pathlib import Path

import mpmath as mp

mp.mp.dps = 50


def gamma_tails(a, x):
    lower = mp.gammainc(a, 0, x, regularized=True)
    upper = mp.gammainc(a, x, mp.inf, regularized=True)
    return lower, upper


def solve(function, start, slope):
    """Newton's method on ln of a tail, in the logarithm of its argument."""
    y = mp.log(start)
    for _ in range(200):
        move = function(mp.exp(y)) / slope(mp.exp(y))
        y -= move
        if abs(move) < mp.mpf(10) ** -40:
            break
    else:
        raise ArithmeticError("no convergence")
    return mp.exp(y)


def chi_square_of_upper(nu, u):
    a = nu / 2
    if u < mp.mpf(1) / 2:
        def tail(x):
            return gamma_tails(a, x)[1]
        sign = -1
    else:
        def tail(x):
            return gamma_tails(a, x)[0]
        sign = 1
    target = mp.log(u if sign < 0 else 1 - u)
    density = lambda x: mp.exp(a * mp.log(x) - x - mp.loggamma(a))
    start = a if sign < 0 else mp.exp((target + mp.loggamma(a + 1)) / a)
    return 2 * solve(lambda x: mp.log(tail(x)) - target, start, lambda x: sign * density(x) / tail(x))


def density(nu, x):
    return mp.exp(log_density(nu, x))


def log_density(nu, x):
    return (mp.loggamma((nu + 1) / 2) - mp.loggamma(nu / 2) - mp.log(nu * mp.pi) / 2
            - (nu + 1) / 2 * mp.log(1 + x * x / nu))


def tail(nu, x):
    if x < 0:
        return 1 - tail(nu, -x)
    return mp.betainc(nu / 2, mp.mpf(1) / 2, 0, nu / (nu + x * x), regularized=True) / 2


def quantile(nu, q):
    if q > mp.mpf(1) / 2:
        return -quantile(nu, 1 - q)
    target = mp.log(q)
    start = mp.sqrt(nu * mp.expm1(mp.mpf(2) * -mp.log(2 * q) / nu)) + mp.mpf(10) ** -12
    if q > mp.mpf(1) / 4:
        return mp.findroot(lambda x: tail(nu, x) - q, (mp.mpf(1) / 2 - q) / density(nu, 0))
    return solve(lambda x: mp.log(tail(nu, x)) - target, start, lambda x: -x * density(nu, x) / tail(nu, x))


def rows(count):
    r = random.Random(2026)
    degrees = [2.05, 2.5, 3.0, 3.7, 5.0, 8.0, 13.3, 30.0, 77.0, 200.0]
    for i in range(count):
        nu = degrees[i % len(degrees)]
        n = mp.mpf(nu)
        u = [10.0 ** r.uniform(-16, 0), r.random(), 1 - 10.0 ** r.uniform(-6.999, 0)][(i // len(degrees)) % 3]
        yield "mixing", nu, "", u, n / chi_square_of_upper(n, mp.mpf(u))
        x = nu * 10.0 ** r.uniform(-2, 0.7)
        lower, upper = gamma_tails(n / 2, mp.mpf(x) / 2)
        if lower > 1e-100:
            yield "lower", nu, "", x, lower
        if upper > 1e-100:
            yield "upper", nu, "", x, upper
        x = [r.uniform(-4, 4), 10.0 ** r.uniform(-8, 0), 10.0 ** r.uniform(0, min(5.5, 16.0 / nu + 0.9))][(i // len(degrees)) % 3]
        yield "density", nu, "", x, log_density(n, mp.mpf(x))
        yield "tail", nu, "", x, tail(n, mp.mpf(x))
        q = [10.0 ** r.uniform(-16, -0.4), r.random(), 0.5 - 10.0 ** r.uniform(-9, -1)][(i // len(degrees)) % 3]
        yield "quantile", nu, "", q, quantile(n, mp.mpf(q))
        nu_j = degrees[r.randrange(len(degrees))]
        m, tails = mp.mpf(nu_j), 10.0 ** r.uniform(-7.3, -0.31)
        y = float(quantile(n, mp.mpf(tails)))
        yield "map", nu, nu_j, y, mp.sqrt((m - 2) / m) * quantile(m, tail(n, mp.mpf(y)))
        x = 10.0 ** r.uniform(-2, 3.3)
        yield "loggamma", "", "", x, mp.loggamma(mp.mpf(x))


def main():
    count = int(sys.argv[1]) if len(sys.argv) > 1 else 60
    folder = Path(sys.argv[2]) if len(sys.argv) > 2 else Path(__file__).parent
    with open(folder / "student-reference.csv", "w", encoding="utf-8", newline="\n") as out:
        out.write("kind,a,b,x,value\n")
        for kind, a, b, x, value in rows(count):
            out.write(f"{kind},{a},{b},{x!r},{mp.nstr(value, 20)}\n")


main()
