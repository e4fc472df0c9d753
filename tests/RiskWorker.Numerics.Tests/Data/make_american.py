"""American option values from binomial trees of Leisen and Reimer (1996), for the test of the integral equation.

For every row trees of 3,001 to 17,001 steps are fitted by value + slope/steps + curve/steps^2; `spread` is the largest
residual, four times it at least what the fit is off by. Nothing is shared with the method under test but the contract.

python3 make_american.py > american-reference.csv      (under a minute; numpy)
"""
import numpy as np

STEPS = [3001, 4001, 5001, 6501, 8001, 10001, 13001, 17001]


def share(d, n):
    scaled = d / (n + 1 / 3 + 0.1 / (n + 1))
    half = 0.5 * np.sqrt(-np.expm1(-scaled * scaled * (n + 1 / 6)))
    return 0.5 + half if d >= 0 else 0.5 - half


def tree(spot, strike, years, volatility, rate, carry_yield, sign, n):
    deviation = volatility * np.sqrt(years)
    d1 = (np.log(spot / strike) + (rate - carry_yield) * years) / deviation + deviation / 2
    up, step = share(d1 - deviation, n), years / n
    growth = np.exp((rate - carry_yield) * step)
    rise = growth * share(d1, n) / up
    fall = (growth - up * rise) / (1 - up)
    i = np.arange(n + 1)
    level = np.exp(np.log(spot) + i * np.log(rise) + (n - i) * np.log(fall))
    value = np.maximum(sign * (level - strike), 0)
    discount = np.exp(-rate * step)
    for m in range(n, 0, -1):
        level = level[:m] / fall
        value = np.maximum(sign * (level - strike), discount * up * value[1:] + discount * (1 - up) * value[:-1])
    return value[0]


def fitted(*terms):
    n = np.array(STEPS, dtype=float)
    y = np.array([tree(*terms, k) for k in STEPS])
    x = np.stack([np.ones_like(n), 1 / n, 1 / n**2], axis=1)
    scale = np.abs(x).max(axis=0)
    coefficients, *_ = np.linalg.lstsq(x / scale, y, rcond=None)
    return coefficients[0], np.abs(x / scale @ coefficients - y).max()


def rows():
    yield from ((s, 40, t, v, 0.06, 0.0, -1) for s, t, v in [(36, 1, 0.2), (44, 1, 0.2), (36, 1, 0.4), (40, 2, 0.4)])
    rng = np.random.default_rng(20_261_201)
    for i in range(36):
        years = round(float(np.exp(rng.uniform(np.log(0.05), np.log(8)))), 3)
        volatility = round(float(np.exp(rng.uniform(np.log(0.06), np.log(0.8)))), 3)
        rate = round(float(rng.uniform(0, 0.12)), 4) if i % 6 else 0.0
        carry_yield = round(float(rng.uniform(-0.04, 0.12)), 4) if i % 4 else 0.0
        spot = round(float(100 * np.exp(rng.uniform(-1.2, 1.2) * volatility * np.sqrt(years))), 2)
        yield spot, 100, years, volatility, rate, carry_yield, 1 if i % 2 else -1
    # Two boundaries: the yield below the rate below zero for a put, the other way round for a call.
    yield from [(95, 100, 1, 0.1, -0.01, -0.03, -1), (100, 100, 1, 0.2, -0.01, -0.03, -1), (90, 100, 3, 0.08, -0.005, -0.04, -1),
                (105, 100, 1, 0.1, -0.03, -0.01, 1), (100, 100, 2, 0.15, -0.04, -0.005, 1), (75, 100, 5, 0.05, -0.01, -0.02, -1)]


print("right,spot,strike,years,volatility,rate,carry_yield,value,spread")
for spot, strike, years, volatility, rate, carry_yield, sign in rows():
    value, spread = fitted(spot, strike, years, volatility, rate, carry_yield, sign)
    print(f"{'call' if sign > 0 else 'put'},{spot},{strike},{years},{volatility},{rate},{carry_yield},{value:.10g},{spread:.1e}", flush=True)
