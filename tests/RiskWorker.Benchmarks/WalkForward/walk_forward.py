"""The walk-forward loop of the demo as a careful analyst would write it in NumPy: today's positions held fixed, and for each of the
last days the model calibrated on what was known then, moves drawn, every position revalued, VaR 99% and ES 97.5% of every book.

  walk_forward.py FOLDER [--days 750] [--scenarios 50000] [--seed 1] [--draw-once]

Only what a plain loop values is taken: log-normal factors; cash, spot, futures, forwards and European options at flat rates.
EWMA 0.94 over the newest 500 days that are complete over all factors, zero expected return, log-normal moves over one day. With
--draw-once the standard normals are drawn before the loop and serve every day. Prints one JSON object.
"""
import argparse, csv, datetime, json, os, time
import numpy as np
from scipy.special import ndtr

p = argparse.ArgumentParser()
p.add_argument("folder")
p.add_argument("--days", type=int, default=750)
p.add_argument("--scenarios", type=int, default=50_000)
p.add_argument("--seed", type=int, default=1)
p.add_argument("--draw-once", action="store_true")
a = p.parse_args()
N, BLOCK, LAMBDA, WINDOW = a.scenarios, 10_000, 0.94, 500


def read(name):
    file = os.path.join(a.folder, "feed", name)
    return list(csv.DictReader(open(file, newline="", encoding="utf-8"))) if os.path.exists(file) else []


# Factors, prices on open days, and the daily log-return of each factor where it has one.
factors = sorted((r for r in read("factors.csv") if r["shock"] == "lognormal"), key=lambda r: r["factor"])
at = {r["factor"]: j for j, r in enumerate(factors)}
F = len(factors)
observations = read("observations.csv")
dates = sorted({r["date"] for r in observations})
row = {d: t for t, d in enumerate(dates)}
prices = np.full((len(dates), F), np.nan)
for r in observations:
    if r["factor"] in at:
        prices[row[r["date"]], at[r["factor"]]] = float(r["value"])
holidays = {}
for r in read("holidays.csv"):
    holidays.setdefault(r["calendar"], set()).add(r["date"])
splits = [(at[r["factor"]], r["date"], float(r["ratio"])) for r in read("adjustments.csv")]
days = [datetime.date.fromisoformat(d) for d in dates]


def is_open(day, closed):
    return day.weekday() < 5 and day.isoformat() not in closed


returns = np.full_like(prices, np.nan)
for j, f in enumerate(factors):
    closed = holidays.get(f["calendar"], set())
    for t, day in enumerate(days):
        if not is_open(day, closed):
            prices[t, j] = np.nan
            continue
        before = day - datetime.timedelta(1)
        while not is_open(before, closed):
            before -= datetime.timedelta(1)
        u = row.get(before.isoformat())
        if u is None or np.isnan(prices[u, j]):
            continue
        ratio = np.prod([k for g, d, k in splits if g == j and dates[u] < d <= dates[t]])
        returns[t, j] = np.log(prices[t, j] / (prices[u, j] * ratio))
complete = np.flatnonzero(np.isfinite(returns).all(axis=1))

# Books and today's positions: lines of one book and instrument added up.
books = read("books.csv")
name_of = [b["book"] for b in books]
book_at = {b: i for i, b in enumerate(name_of)}
root = next(b for b in books if not b["parent"])
home = root["currency"]
B = len(books)
roll_up = np.zeros((B, B))
for i, b in enumerate(books):
    k = i
    while True:
        roll_up[k, i] = 1
        if not books[k]["parent"]:
            break
        k = book_at[books[k]["parent"]]
rate_factor = {f["currency"]: at[f["factor"]] for f in factors if f["class"] == "fx"}
instruments = {r["instrument"]: r for r in read("instruments.csv")}
positions = read("positions.csv")
today = max(r["as_of"] for r in positions)
number = lambda text: float(text) if text else 0.0


def is_plain(i):
    try:
        number(i["curve"]), number(i["carry"])
    except ValueError:
        return False
    return i["kind"] in ("fx", "spot", "future", "forward") or i["kind"] == "option" and i["style"] == "european"


held = {}
for r in positions:
    if r["as_of"] == today and is_plain(instruments[r["instrument"]]):
        key = (r["book"], r["instrument"])
        held[key] = held.get(key, 0.0) + float(r["quantity"])
cells = sorted({(book_at[b], instruments[i]["currency"]) for b, i in held})
cell_at = {c: k for k, c in enumerate(cells)}

lines = []
for (b, name), quantity in held.items():
    i = instruments[name]
    size = quantity * (float(i["multiplier"]) if i["multiplier"] else 1.0)
    up = at[i["factor"]] if i["factor"] else rate_factor.get(i["base_currency"], -1)
    down = rate_factor.get(i["currency"], -1) if i["base_currency"] else -1
    lines.append((cell_at[book_at[b], i["currency"]], i["kind"], size, up, down, i))


def black_scholes(S, x_over, K, T, v, r, q, sign):
    root_T = np.sqrt(T)
    d1 = (x_over + (r - q + 0.5 * v * v) * T) / (v * root_T)
    d2 = d1 - v * root_T
    return sign * (S * np.exp(-q * T) * ndtr(sign * d1) - K * np.exp(-r * T) * ndtr(sign * d2))


def level_on(t):
    """Last price of each factor up to date t, as adjusted by the splits known then."""
    known = np.isfinite(prices[: t + 1])
    last = t - np.argmax(known[::-1], axis=0)
    level = prices[last, np.arange(F)]
    for g, d, k in splits:
        if dates[last[g]] < d <= dates[t]:
            level[g] *= k
    return level


def rate(currency, S, n):
    return np.ones(n) if currency == home else S[rate_factor[currency]]


def measure(t, draws):
    kept = complete[complete <= t][-WINDOW:]
    ret = returns[kept]
    w = LAMBDA ** np.arange(len(ret))[::-1]
    w /= w.sum()
    cov = (ret * w[:, None]).T @ ret
    L = np.linalg.cholesky(cov)
    drift = -0.5 * np.diag(cov)
    S0 = level_on(t)
    rate0 = {c: (1.0 if c == home else S0[rate_factor[c]]) for _, c in cells}

    # What does not change with the scenario: values today, times to expiry.
    terms, value0 = [], np.zeros(len(cells))
    for cell, kind, size, up, down, i in lines:
        spot = (S0[up] if up >= 0 else 1.0) / (S0[down] if down >= 0 else 1.0)
        if kind == "fx":
            value0[cell] += size
            continue
        if kind in ("spot", "future"):
            value0[cell] += size * spot if kind == "spot" else 0.0
            terms.append((cell, kind, size, up, down, spot, None))
            continue
        T = (datetime.date.fromisoformat(i["expiry"]) - days[t]).days / 365.0
        r, q, K = number(i["curve"]), number(i["carry"]), float(i["strike"])
        if kind == "forward":
            value0[cell] += size * (spot * np.exp(-q * T) - K * np.exp(-r * T))
            terms.append((cell, kind, size * np.exp(-q * T), up, down, spot, None))
            continue
        vol_factor = at[i["vol_factor"]] if i["vol_factor"] else -1
        vol0 = S0[vol_factor] if vol_factor >= 0 else float(i["vol"])
        sign = 1 if i["right"] == "call" else -1
        base = black_scholes(spot, np.log(spot / K), K, T, vol0, r, q, sign)
        value0[cell] += size * base
        terms.append((cell, kind, size, up, down, spot, (K, T, vol_factor, vol0, r, q, sign, np.log(spot / K), base)))

    firm0 = roll_up @ np.bincount([b for b, _ in cells], [value0[k] * rate0[c] for k, (_, c) in enumerate(cells)], B)
    losses = np.empty((B, N))
    own = {i: np.empty(N) for i, b in enumerate(books) if b["currency"] != home}
    for lo in range(0, N, BLOCK):
        n = min(BLOCK, N - lo)
        X = L @ draws(lo, n)
        X += drift[:, None]
        S = np.exp(X)
        S *= S0[:, None]
        pnl = np.zeros((len(cells), n))
        for cell, kind, size, up, down, spot, option in terms:
            if up >= 0 and down >= 0:
                level, move = S[up] / S[down], X[up] - X[down]
            elif up >= 0:
                level, move = S[up], X[up]
            else:
                level, move = 1.0 / S[down], -X[down]
            if option is None:
                pnl[cell] += size * (level - spot)
            else:
                K, T, vol_factor, vol0, r, q, sign, log_moneyness, base = option
                vol = S[vol_factor] if vol_factor >= 0 else vol0
                pnl[cell] += size * (black_scholes(level, move + log_moneyness, K, T, vol, r, q, sign) - base)
        book_pnl = np.zeros((B, n))
        for k, (b, c) in enumerate(cells):
            price = rate(c, S, n)
            book_pnl[b] += pnl[k] * price + value0[k] * (price - rate0[c])
        node_pnl = roll_up @ book_pnl
        losses[:, lo : lo + n] = -node_pnl
        for i in own:
            price, price0 = rate(books[i]["currency"], S, n), S0[rate_factor[books[i]["currency"]]]
            own[i][lo : lo + n] = firm0[i] / price0 - (firm0[i] + node_pnl[i]) / price
    series = [own.get(i, losses[i]) for i in range(B)]
    return [tail(x) for x in series]


def tail(x):
    k, m = int(np.ceil(N * 0.99)) - 1, int(round(N * 0.025))
    worst = np.partition(x, N - m)[N - m :]
    return np.sort(worst)[k - (N - m)], worst.mean()


ends = list(range(len(dates)))[-a.days :]
start = time.perf_counter()
rng = np.random.default_rng(a.seed)
if a.draw_once:
    pool = rng.standard_normal((F, N))
    draw = lambda lo, n: pool[:, lo : lo + n]
else:
    draw = lambda lo, n: rng.standard_normal((F, n))
result = [measure(t, draw) for t in ends]
seconds = time.perf_counter() - start
top = book_at[root["book"]]
print(json.dumps({"seconds": seconds, "days": [{"date": dates[t], "var": float(r[top][0]), "es": float(r[top][1])} for t, r in zip(ends, result)]}))
