"""Writes kernel-reference.csv and option-reference.csv: exact values by mpmath at 60 digits.

Usage: python3 make_reference.py [rows per function] [folder]
Needs mpmath (BSD licence). Seeded: the same arguments give the same files.
A function's value stands as the nearest double and what it lacks in ulps of that double, an option's as the sum of
two doubles, so that an error can be told to a small part of an ulp.
"""
import math
import random
import sys

import mpmath as mp

mp.mp.dps = 60
rows = int(sys.argv[1]) if len(sys.argv) > 1 else 600
folder = sys.argv[2] if len(sys.argv) > 2 else "."
rng = random.Random(20250101)


def two(value):
    head = float(value)
    return head, float(value - mp.mpf(head))


def in_ulps(value):
    head = float(value)
    return head, float(mp.nstr((value - mp.mpf(head)) / mp.mpf(math.ulp(head)), 6))


def either(*ranges):
    low, high = rng.choice(ranges)
    return rng.uniform(low, high)


def exponential():
    return either((-1, 1), (-0.35, 0.35), (-708, 709), (-745, -708), (-40, 40), (-1e-3, 1e-3))


def positive():
    kind = rng.randrange(4)
    if kind == 0:
        return rng.uniform(0.5, 2.0)
    if kind == 1:
        return rng.uniform(0.99, 1.01)
    if kind == 2:
        return 2.0 ** rng.uniform(-1074, -1022)
    return 2.0 ** rng.uniform(-1022, 1023.9)


def deviate():
    return either((-38.4, 0), (-38.4, -8), (-8, 8), (-1, 1), (-1e-3, 1e-3))


def probability():
    kind = rng.randrange(4)
    if kind == 0:
        return rng.uniform(0.0, 1.0)
    if kind == 1:
        return 2.0 ** rng.uniform(-1074, 0)
    if kind == 2:
        return 2.0 ** rng.uniform(-53, 0)
    return rng.choice((0.075, 0.925, 0.5)) + rng.uniform(-1e-3, 1e-3)


def cdf(x):
    return mp.erfc(-x / mp.sqrt(2)) / 2


def density(x):
    return mp.exp(-x * x / 2) / mp.sqrt(2 * mp.pi)


def quantile(p):
    if p > 0.5:
        return -quantile(1 - p)
    a = p * mp.sqrt(2 * mp.pi)
    x = -mp.sqrt(-2 * mp.log(a)) if p < 0.05 else (p - mp.mpf(1) / 2) * mp.sqrt(2 * mp.pi)
    for _ in range(40):
        residual = cdf(x) / p - 1
        slope = density(x) / cdf(x)
        step = mp.log1p(residual) / slope      # Newton on the logarithm: monotone from either side
        x -= step
        if abs(step) < mp.mpf(10) ** -45 * (1 + abs(x)):
            break
    return x


FUNCTIONS = (
    ("exp", exponential, mp.exp),
    ("log", positive, mp.log),
    ("cdf", deviate, cdf),
    ("density", deviate, density),
    ("quantile", probability, quantile),
)

with open(f"{folder}/kernel-reference.csv", "w", newline="\n") as out:
    out.write("function,x,nearest,lacking_ulps\n")
    for name, draw, function in FUNCTIONS:
        for _ in range(rows):
            x = draw()
            if name == "quantile" and not 0 < x < 1:
                continue
            nearest, lacking = in_ulps(function(mp.mpf(x)))
            out.write(f"{name},{x!r},{nearest!r},{lacking!r}\n")


def price(spot, strike, years, volatility, rate, carry, call):
    s, k, t, v, r, b = map(mp.mpf, (spot, strike, years, volatility, rate, carry))
    deviation = v * mp.sqrt(t)
    d1 = (mp.log(s / k) + (b + v * v / 2) * t) / deviation
    d2 = d1 - deviation
    sign = 1 if call else -1
    return sign * (s * mp.exp((b - r) * t) * cdf(sign * d1) - k * mp.exp(-r * t) * cdf(sign * d2))


with open(f"{folder}/option-reference.csv", "w", newline="\n") as out:
    out.write("right,spot0,x,spot,strike,years,volatility,rate,carry,head,tail\n")
    for _ in range(rows):
        spot0 = 100.0 * 2.0 ** rng.uniform(-3, 3)
        strike = spot0 * 2.0 ** either((-0.3, 0.3), (-3, 3))
        years = 2.0 ** rng.uniform(-8, 5)
        volatility = 2.0 ** rng.uniform(-6, 1)
        rate = rng.uniform(-0.01, 0.1)
        carry = rng.uniform(-0.1, 0.1)
        x = rng.gauss(0.0, 1.0) * rng.choice((0.0, 0.01, 0.05, 0.3))
        call = rng.random() < 0.5
        exact = mp.mpf(spot0) * mp.exp(mp.mpf(x))
        head, tail = two(price(exact, strike, years, volatility, rate, carry, call))
        right = "call" if call else "put"
        out.write(f"{right},{spot0!r},{x!r},{float(exact)!r},{strike!r},{years!r},{volatility!r},{rate!r},{carry!r},{head!r},{tail!r}\n")
