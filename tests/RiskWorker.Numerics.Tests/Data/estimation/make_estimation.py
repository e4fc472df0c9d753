"""Estimates and distributions by other means than the code's: writes garch-reference.csv and merton-reference.csv.

GARCH(1,1): the likelihood as a plain loop, maximised by scipy from many starts over (mean, omega, alpha, beta) themselves
and polished by Nelder and Mead. Merton: sums over the number of jumps with scipy's Poisson and normal distributions,
quantiles by Brent's method, tail means by numerical integration of the quantile.
"""
import csv
import os
import sys

import numpy as np
from scipy import integrate, optimize, stats

HERE = os.path.dirname(os.path.abspath(__file__))


def variances(x, mean, omega, alpha, beta):
    e2 = (x - mean) ** 2
    v = np.empty(len(x) + 1)
    square = variance = e2.mean()
    for t in range(len(x) + 1):
        variance = omega + alpha * square + beta * variance
        v[t] = variance
        if t < len(x):
            square = e2[t]
    return v


def minus_log_likelihood(p, x, given):
    mean, (omega, alpha, beta) = (given, p) if given is not None else (p[0], p[1:])
    if omega <= 0 or alpha < 0 or beta < 0 or alpha + beta >= 1:
        return 1e10
    v = variances(x, mean, omega, alpha, beta)[:-1]
    return 0.5 * np.sum(np.log(2 * np.pi * v) + (x - mean) ** 2 / v)


def garch(x, given):
    best = None
    s = np.mean((x - (x.mean() if given is None else given)) ** 2)
    for p, share in [(0.98, 0.05), (0.95, 0.15), (0.8, 0.2), (0.5, 0.5), (0.2, 0.9)]:
        start = [s * (1 - p), p * share, p * (1 - share)]
        start = start if given is not None else [x.mean()] + start
        for _ in range(4):
            found = optimize.minimize(minus_log_likelihood, start, (x, given), method="Nelder-Mead",
                                      options=dict(xatol=1e-11, fatol=1e-12, maxiter=4000, maxfev=4000))
            start = found.x
        if best is None or found.fun < best.fun:
            best = found
    p = best.x
    mean, (omega, alpha, beta) = (given, p) if given is not None else (p[0], p[1:])
    return mean, omega, alpha, beta, -best.fun, variances(x, mean, omega, alpha, beta)[-1]


def make_garch(folder):
    with open(os.path.join(HERE, "mark-pound.csv")) as f:
        x = np.array([float(row["return_pct"]) for row in csv.DictReader(f)])
    with open(os.path.join(folder, "garch-reference.csv"), "w", newline="") as f:
        out = csv.writer(f, lineterminator="\n")
        out.writerow("first count given_mean mean omega alpha beta log_likelihood forecast".split())
        for first, count, given in [(0, 750, None), (300, 750, None), (600, 750, 0.0), (900, 750, None), (1224, 750, 0.0), (100, 250, None), (1474, 500, None)]:
            out.writerow([first, count, "" if given is None else given] + [repr(float(v)) for v in garch(x[first:first + count], given)])


def merton(drift, deviation, intensity, jump_mean, jump_deviation, days):
    k = np.arange(0, 400)
    w = stats.poisson.pmf(k, intensity * days)
    m, s = drift * days + k * jump_mean, np.sqrt(deviation ** 2 * days + k * jump_deviation ** 2)

    def quantile(p):
        def gap(x):
            return (np.sum(w * stats.norm.cdf((x - m) / s)) - p) if p < 0.5 else ((1 - p) - np.sum(w * stats.norm.sf((x - m) / s)))
        reach = 40 * np.sqrt(np.sum(w * (s ** 2 + m ** 2)))
        return optimize.brentq(gap, -reach, reach, xtol=1e-15, rtol=1e-15)

    def density(x):
        return np.sum(w * stats.norm.pdf((x - m) / s) / s)

    return quantile, density


def make_merton(folder):
    with open(os.path.join(folder, "merton-reference.csv"), "w", newline="") as f:
        out = csv.writer(f, lineterminator="\n")
        out.writerow("drift deviation intensity jump_mean jump_deviation days tail long_var long_es short_var short_es return_es".split())
        for case in [(0.0, 0.01, 0.02, -0.04, 0.03, 1), (0.0002, 0.012, 0.05, -0.02, 0.025, 10), (0.0, 0.008, 0.004, 0.05, 0.0, 1),
                     (-0.001, 0.02, 0.8, 0.01, 0.02, 21), (0.0, 0.01, 0.0, 0.0, 0.0, 5)]:
            quantile, density = merton(*case)
            for tail in (0.05, 0.025, 0.01, 0.001):
                low, high = quantile(tail), quantile(1 - tail)

                def part(g, a, b):
                    pieces = np.linspace(a, b, 40)
                    return sum(integrate.quad(lambda x: g(x) * density(x), p, q, epsabs=1e-15, epsrel=1e-12)[0] for p, q in zip(pieces, pieces[1:]))

                far = 0.6 + 3 * max(abs(low), abs(high))
                row = [1 - np.exp(low), part(lambda x: 1 - np.exp(x), low - far, low) / tail, np.exp(high) - 1,
                       part(lambda x: np.exp(x) - 1, high, high + far) / tail, part(lambda x: -x, low - far, low) / tail]
                out.writerow(list(case) + [tail] + [repr(float(v)) for v in row])


if __name__ == "__main__":
    target = sys.argv[1] if len(sys.argv) > 1 else HERE
    make_merton(target)
    make_garch(target)
