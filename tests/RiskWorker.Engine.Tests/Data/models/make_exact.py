"""Value-at-risk and expected shortfall of small books under laws with a known characteristic function or mixture.

Writes exact.csv. NumPy and SciPy alone; nothing of the product. Losses are V - V(h) of spot positions, prices S exp(x).
Student-t: x over h days is the sum of h independent t variates of variance sigma^2 a day (the mixing variable is not cut here), plus the drift;
one factor by the inversion of the h-th power of the characteristic function on a fine grid, two factors in one day by conditioning on the mixing
variable and on the first factor. Jump-diffusion: a Poisson mixture of (bivariate) normals. Every row is computed on two grids, which agree to 1e-6.
"""
import csv
import itertools

import numpy as np
from scipy import optimize, special, stats

YEAR = 252.0
rows = []


def characteristic(nu, u):
    """Of Student's t with nu degrees of freedom, scale 1."""
    z = np.sqrt(nu) * np.abs(u)
    out = np.ones_like(z)
    m = z > 1e-12
    with np.errstate(over="ignore", under="ignore", invalid="ignore"):
        out[m] = np.exp(np.log(special.kve(nu / 2, z[m])) - z[m] + (nu / 2) * np.log(z[m]) - special.gammaln(nu / 2) - (nu / 2 - 1) * np.log(2))
    out[~np.isfinite(out)] = 0
    return out


def sum_of_t(nu, scale, days, half_width, points):
    """Grid and density of the sum of `days` independent scaled t variates."""
    step = 2 * half_width / points
    u = 2 * np.pi * np.fft.fftfreq(points, step)
    density = np.real(np.fft.fft(characteristic(nu, scale * u) ** days)) / (points * step)
    x = (np.arange(points) - points // 2) * step
    return x, np.fft.fftshift(density)


def grid_measures(x, density, drift, confidence_var, confidence_es, sign):
    """VaR and ES of sign * (1 - e^(x + drift)) from a density on a fine even grid."""
    step = x[1] - x[0]
    order = np.arange(len(x)) if sign > 0 else np.arange(len(x))[::-1]
    x, density = x[order], density[order]

    def tail(values):  # cumulative trapezoid from the losing end
        return np.concatenate([[0.0], np.cumsum((values[1:] + values[:-1]) / 2)]) * step

    mass = tail(density)

    def quantile(p):
        return np.interp(p, mass, x)

    q = quantile(1 - confidence_var)
    var = sign * (1 - np.exp(q + drift))
    if sign < 0:
        return var, None
    e = quantile(1 - confidence_es)
    growth = np.interp(e, x, tail(density * np.exp(x + drift)))
    return var, 1 - growth / (1 - confidence_es)


def student(name, nu, sigma_year, mu, days, sign):
    sigma = sigma_year / np.sqrt(YEAR)
    drift = (mu / YEAR - sigma**2 / 2) * days
    scale = sigma * np.sqrt((nu - 2) / nu)
    found = []
    for half, points in ((1000, 2**20), (2000, 2**22)):
        x, density = sum_of_t(nu, scale, days, half * sigma, points)
        found.append(grid_measures(x, density, drift, 0.99, 0.975, sign))
    a, b = found
    assert abs(a[0] / b[0] - 1) < 1e-6 and (a[1] is None or abs(a[1] / b[1] - 1) < 1e-6), (name, found)
    if days == 1:  # the closed form
        q = stats.t.ppf(0.01, nu) * scale
        assert abs(b[0] / (sign * (1 - np.exp(sign * q + drift))) - 1) < 1e-6
    rows.append([name, "student-t", f"nu={nu};sigma={sigma_year};mu={mu};days={days};side={sign}", b[0], "" if b[1] is None else b[1]])


def two_asset(name, kind, terms, mixture, values, drift):
    """Long values in two assets; mixture: (weight, mean1, mean2, s1, s2, rho) of the logarithms."""
    z, w = special.roots_hermitenorm(201)
    w = w / w.sum()
    w_, m1, m2, s1, s2, rho = (np.asarray(a)[:, None] for a in zip(*mixture))
    total = sum(values)

    def parts(loss):
        """P(L > loss) and E[L; L > loss]."""
        a = values[0] * np.exp(drift[0] + m1 + s1 * z)
        rest = total - loss - a
        c = s2 * np.sqrt(1 - rho**2)
        centre = drift[1] + m2 + s2 * rho * z
        positive = rest > 0
        k = np.log(np.where(positive, rest, 1) / values[1])
        p = np.where(positive, stats.norm.cdf((k - centre) / c), 0)
        g = np.where(positive, np.exp(centre + c**2 / 2) * stats.norm.cdf((k - centre) / c - c), 0)
        lost = (total - a) * p - values[1] * g
        return float((w_ * p * w).sum()), float((w_ * lost * w).sum())

    def measures():
        var = optimize.brentq(lambda l: parts(l)[0] - 0.01, 1e-6 * total, 0.9 * total, xtol=1e-10 * total)
        q = optimize.brentq(lambda l: parts(l)[0] - 0.025, 1e-6 * total, 0.9 * total, xtol=1e-10 * total)
        return var, parts(q)[1] / 0.025

    var, es = measures()
    z, w = special.roots_hermitenorm(161)
    w = w / w.sum()
    again = measures()
    assert abs(var / again[0] - 1) < 1e-7 and abs(es / again[1] - 1) < 1e-7, (name, var, es, again)
    rows.append([name, kind, terms, var, es])


def student_mixture(nu, sigma, rho, count):
    """One day: W = nu / chi2 by Gauss-Legendre over its normal score, from -8.5 to 6."""
    x, w = np.polynomial.legendre.leggauss(count)
    score = -1.25 + 7.25 * x
    weight = w * stats.norm.pdf(score)
    mixing = nu / np.where(score > 0, stats.chi2.ppf(stats.norm.sf(score), nu), stats.chi2.isf(stats.norm.cdf(score), nu))
    unit = np.sqrt(mixing * (nu - 2) / nu)
    return [(p / weight.sum(), 0, 0, sigma[0] * s, sigma[1] * s, rho) for p, s in zip(weight, unit)]


def jump_mixture(days, sigma, rho, common, sizes_common, own, sizes_own):
    """Counts of common jumps and of each factor's own; rates a day."""
    def counts(rate):
        return [(k, stats.poisson.pmf(k, rate * days)) for k in range(60) if stats.poisson.pmf(k, rate * days) > 1e-13]
    out = []
    for (n, p), (a, q), (b, r) in itertools.product(counts(common), counts(own[0]), counts(own[1])):
        if p * q * r < 1e-13:
            continue
        v1 = sigma[0] ** 2 * days + n * sizes_common[0][1] ** 2 + a * sizes_own[0][1] ** 2
        v2 = sigma[1] ** 2 * days + n * sizes_common[1][1] ** 2 + b * sizes_own[1][1] ** 2
        out.append((p * q * r, n * sizes_common[0][0] + a * sizes_own[0][0], n * sizes_common[1][0] + b * sizes_own[1][0],
                    np.sqrt(v1), np.sqrt(v2), rho * sigma[0] * sigma[1] * days / np.sqrt(v1 * v2)))
    return out


for nu, mu, days, sign in [(3, 0, 1, 1), (4, 0.08, 1, 1), (6.5, 0.08, 1, 1), (4, 0.08, 1, -1), (3, 0, 10, 1), (4, 0.08, 10, 1), (6.5, 0, 10, 1), (4, 0.08, 10, -1)]:
    student(f"T-{nu}-{days}-{'long' if sign > 0 else 'short'}", nu, 0.25, mu, days, sign)

for nu, rho in [(4, 0.5), (3, -0.3), (8, 0.9)]:
    sigma = (0.25 / np.sqrt(YEAR), 0.4 / np.sqrt(YEAR))
    two_asset(f"T2-{nu}-{rho}", "student-t", f"nu={nu};rho={rho};sigma=0.25,0.4;values=600000,400000;days=1", student_mixture(nu, sigma, rho, 400),
              (600000, 400000), (-sigma[0] ** 2 / 2, -sigma[1] ** 2 / 2))

for days, rho in [(1, 0.5), (10, 0.5), (10, -0.3)]:
    sigma = (0.15 / np.sqrt(YEAR), 0.2 / np.sqrt(YEAR))
    common, own = 6 / YEAR, (12 / YEAR, 3 / YEAR)
    sizes_common, sizes_own = ((-0.04, 0.02), (-0.05, 0.03)), ((0.01, 0.03), (-0.06, 0.01))
    drift = [(-sigma[j] ** 2 / 2 - common * (np.exp(sizes_common[j][0] + sizes_common[j][1] ** 2 / 2) - 1)
              - own[j] * (np.exp(sizes_own[j][0] + sizes_own[j][1] ** 2 / 2) - 1)) * days for j in range(2)]
    two_asset(f"J2-{days}-{rho}", "jump-diffusion",
              f"days={days};rho={rho};sigma=0.15,0.2;common=6:(-0.04,0.02),(-0.05,0.03);own=12:(0.01,0.03),3:(-0.06,0.01);values=600000,400000",
              jump_mixture(days, sigma, rho, common, sizes_common, own, sizes_own), (600000, 400000), drift)

with open("exact.csv", "w", newline="") as file:
    writer = csv.writer(file, lineterminator="\n")
    writer.writerow(["case", "law", "terms", "var99", "es975"])
    for name, kind, terms, var, es in rows:
        writer.writerow([name, kind, terms, repr(float(var)), "" if es == "" else repr(float(es))])
