"""Writes moved-, barrier-, geometric- and hit-reference.csv: option values by mpmath at 120 digits.

Usage: python3 make_closed_forms.py [rows a file] [folder]
Needs mpmath (BSD licence). Seeded: the same arguments give the same files. A value stands as the sum of two doubles.
Barriers follow the textbook's terms A to F (Reiner and Rubinstein 1991, as Haug prints them) literally, with a complex exponent where
a negative rate makes it so; each first row of that sort is held against the integral of the hitting time's density.
"""
import math
import random
import sys

import mpmath as mp

mp.mp.dps = 120
rows = int(sys.argv[1]) if len(sys.argv) > 1 else 300
folder = sys.argv[2] if len(sys.argv) > 2 else "."
rng = random.Random(20250102)
N = lambda z: mp.erfc(-z / mp.sqrt(2)) / 2


def two(value):
    head = float(value)
    return head, float(value - mp.mpf(head))


def market(years, volatilities=(0.02, 1.0)):
    """x, spot0, discount, carry, deviation."""
    x = rng.choice([0.0, rng.gauss(0, 0.02), rng.gauss(0, 0.15), rng.uniform(-0.6, 0.6)])
    rate, carry = rng.uniform(-0.02, 0.1), rng.uniform(-0.03, 0.1)
    low, high = volatilities
    sigma = math.exp(rng.uniform(math.log(low), math.log(high)))
    return x, math.exp(rng.uniform(math.log(0.5), math.log(5000))), rate * years, carry * years, sigma * math.sqrt(years)


def years():
    return rng.choice([1 / 365, 7 / 365, rng.uniform(0.01, 1), rng.uniform(1, 10)])


def near(spot0, width):
    return spot0 * math.exp(rng.choice([rng.gauss(0, width), rng.uniform(-0.7, 0.7)]))


def levels(x, spot0, discount, carry, deviation, strike):
    spot = mp.mpf(spot0) * mp.exp(mp.mpf(x))
    w, m = mp.mpf(deviation), mp.mpf(discount) - mp.mpf(carry)
    d1 = (mp.log(spot / mp.mpf(strike)) + m) / w + w / 2
    return spot, spot * mp.exp(-mp.mpf(carry)), mp.exp(-mp.mpf(discount)), d1, d1 - w


def moved(payoff, *terms):
    spot, asset, discounted, d1, d2 = levels(*terms)
    kind, right = payoff.split("-")
    sign = 1 if right == "call" else -1
    if kind == "plain":
        return sign * (asset * N(sign * d1) - mp.mpf(terms[-1]) * discounted * N(sign * d2))
    return asset * N(sign * d1) if kind == "asset" else discounted * N(sign * d2)


def barrier(kind, x, spot0, discount, carry, deviation, strike, level, rebate, time, spacing):
    down, out, call = kind.startswith("down"), "-out-" in kind, kind.endswith("call")
    eta, phi = (1 if down else -1), (1 if call else -1)
    S, K, R = mp.mpf(spot0) * mp.exp(mp.mpf(x)), mp.mpf(strike), mp.mpf(rebate)
    w, rT, qT = mp.mpf(deviation), mp.mpf(discount), mp.mpf(carry)
    touched = S <= level if down else S >= level
    H = mp.mpf(level)
    if spacing:
        H *= mp.exp(-eta * (-mp.zeta(mp.mpf(1) / 2) / mp.sqrt(2 * mp.pi)) * w * mp.sqrt(mp.mpf(spacing) / mp.mpf(time)))
    mu = (rT - qT - w * w / 2) / w**2
    lam = mp.sqrt(mp.mpc(mu * mu + 2 * rT / w**2))
    asset, cash = S * mp.exp(-qT), K * mp.exp(-rT)
    x1, x2 = mp.log(S / K) / w + (1 + mu) * w, mp.log(S / H) / w + (1 + mu) * w
    y1, y2 = mp.log(H * H / (S * K)) / w + (1 + mu) * w, mp.log(H / S) / w + (1 + mu) * w
    z = mp.log(H / S) / w + lam * w
    straight = lambda v: phi * (asset * N(phi * v) - cash * N(phi * (v - w)))
    image = lambda v: phi * (asset * (H / S) ** (2 * mu + 2) * N(eta * v) - cash * (H / S) ** (2 * mu) * N(eta * (v - w)))
    A, B, C, D = straight(x1), straight(x2), image(y1), image(y2)
    E = R * mp.exp(-rT) * (N(eta * (x2 - w)) - (H / S) ** (2 * mu) * N(eta * (y2 - w)))
    F = mp.re(R * ((H / S) ** (mu + lam) * N(eta * z) + (H / S) ** (mu - lam) * N(eta * (z - 2 * lam * w))))
    if touched:
        return R if out else A
    above = K > H
    table = {
        "down-in-call": C + E if above else A - B + D + E,
        "up-in-call": A + E if above else B - C + D + E,
        "down-in-put": B - C + D + E if above else A + E,
        "up-in-put": A - B + D + E if above else C + E,
        "down-out-call": A - C + F if above else B - D + F,
        "up-out-call": F if above else A - B + C - D + F,
        "down-out-put": A - B + C - D + F if above else F,
        "up-out-put": B - D + F if above else A - C + F,
    }
    return table[kind]


def held_against_the_density(args):
    kind, x, spot0, discount, carry, deviation, strike, level, rebate, time, spacing = args
    gap = abs(mp.log(mp.mpf(level) / (mp.mpf(spot0) * mp.exp(mp.mpf(x)))))
    w, rT, qT = mp.mpf(deviation), mp.mpf(discount), mp.mpf(carry)
    drift = (rT - qT - w * w / 2) * (1 if kind.startswith("up") else -1)
    density = lambda t: gap / (w * mp.sqrt(2 * mp.pi * t**3)) * mp.exp(-((gap - drift * t) ** 2) / (2 * w * w * t) - rT * t)
    hit = mp.mpf(rebate) * mp.quad(density, [0, 0.01, 0.03, 0.1, 0.3, 1])
    option = barrier(*args[:8], 0.0, time, spacing)
    assert abs(barrier(*args) - option - hit) < 1e-12 * rebate, args


def write(name, header, lines):
    with open(f"{folder}/{name}", "w", newline="\n") as out:
        out.write(header + ",head,tail\n")
        for line, value in lines:
            out.write(",".join(map(str, line)) + ",%r,%r\n" % two(value))


def moved_rows():
    kinds = [f"{k}-{r}" for k in ("plain", "cash", "asset") for r in ("call", "put")]
    for i in range(rows):
        x, spot0, discount, carry, deviation = market(years())
        strike = near(spot0, 0.1)
        if i % 20 == 0:
            deviation *= 1e-3
        terms = (x, spot0, discount, carry, deviation, strike)
        yield (kinds[i % 6],) + terms, moved(kinds[i % 6], *terms)


def barrier_rows():
    kinds = [f"{s}-{l}-{r}" for s in ("down", "up") for l in ("in", "out") for r in ("call", "put")]
    held = 0
    for i in range(rows):
        kind, time = kinds[i % 8], years()
        x, spot0, discount, carry, deviation = market(time, (0.005, 1.0) if i % 3 == 0 else (0.05, 0.8))
        strike = near(spot0, 0.1)
        side = -1 if kind.startswith("down") else 1
        away = abs(rng.choice([rng.gauss(0, 0.02), rng.gauss(0, 0.2), rng.gauss(0, 2 * deviation)]))
        level = spot0 * math.exp(side * away + (x if rng.random() < 0.9 else 0))
        rebate = rng.choice([0.0, 0.03 * spot0, strike * rng.uniform(0, 1)])
        spacing = rng.choice([0.0, 0.0, 1 / 252])
        oscillates = i % 10 in (2, 7)  # a negative rate, and a drift near 0
        if oscillates:
            spacing = 0.0
            discount = -rng.uniform(0.0005, 0.03) * time
            carry = discount - deviation**2 / 2 + rng.uniform(-1, 1) * deviation * math.sqrt(-2 * discount)
        args = (kind, x, spot0, discount, carry, deviation, strike, level, rebate, time, spacing)
        if oscillates and "-out-" in kind and rebate > 0 and held < 12 and away > 1e-4 and (level - spot0 * math.exp(x)) * side > 0:
            held_against_the_density(args)
            held += 1
        yield args, barrier(*args)
    assert held > 0 or rows < 40


def geometric_rows():
    for i in range(rows):
        time = years()
        x, spot0, discount, carry, deviation = market(time)
        strike, sign = near(spot0, 0.1), 1 if i % 2 else -1
        S, w, b = mp.mpf(spot0) * mp.exp(mp.mpf(x)), mp.mpf(deviation), mp.mpf(discount) - mp.mpf(carry)
        fixings, past, start, average = [], [], "", ""
        if i % 3 == 0:  # continuous: from a moment to come, or with a past
            start = rng.choice([0.0, rng.uniform(0, time), -rng.uniform(0, 3 * time)])
            average = near(spot0, 0.1)
            T, t0 = mp.mpf(time), mp.mpf(start)
            f = T / (T - t0) if t0 < 0 else mp.mpf(1)
            s = max(t0, mp.mpf(0)) / T
            mean = (1 - f) * mp.log(mp.mpf(average)) + f * mp.log(S) + f * (b - w * w / 2) * (s + 1) / 2
            variance = w * w * f * f * (s + (1 - s) / 3)
        else:
            fixings = sorted([rng.uniform(0, time) for _ in range(rng.randrange(1, 12))])
            if i % 2:
                fixings[-1] = time
            past = [near(spot0, 0.1) for _ in range(rng.choice([0, 0, 3, 11]))]
            n, t = len(fixings) + len(past), [mp.mpf(v) / mp.mpf(time) for v in fixings]
            mean = (sum(mp.log(mp.mpf(p)) for p in past) + sum(mp.log(S) + (b - w * w / 2) * v for v in t)) / n
            variance = w * w * sum(min(u, v) for u in t for v in t) / n**2
        s = mp.sqrt(variance)
        d2 = (mean - mp.log(mp.mpf(strike))) / s
        value = mp.exp(-mp.mpf(discount)) * sign * (mp.exp(mean + variance / 2) * N(sign * (d2 + s)) - mp.mpf(strike) * N(sign * d2))
        yield ("call" if sign > 0 else "put", x, spot0, discount, carry, deviation, strike, time,
               ";".join(map(str, fixings)), ";".join(map(str, past)), start, average), value


def hit_rows():
    """2 Re g(a + ib), g(z) = e^(z²/2) Φ(-z), at m = 0: -2rT = b²."""
    for _ in range(rows):
        gap = rng.choice([0.0, math.exp(rng.uniform(-8, 0)), rng.uniform(0, 5), rng.uniform(5, 60)])
        discount = -rng.choice([math.exp(rng.uniform(-12, 0)), rng.uniform(0, 2), 2.0])
        z = mp.mpc(gap, mp.sqrt(-2 * mp.mpf(discount)))
        yield (gap, discount), 2 * mp.re(mp.exp(z * z / 2) * mp.erfc(z / mp.sqrt(2)) / 2)


terms = "x,spot0,discount,carry,deviation,strike"
write("moved-reference.csv", "payoff," + terms, moved_rows())
write("barrier-reference.csv", "kind," + terms + ",barrier,rebate,years,spacing", barrier_rows())
write("geometric-reference.csv", "right," + terms + ",years,fixings,past,start,average", geometric_rows())
write("hit-reference.csv", "gap,discount", hit_rows())
