"""The sum of local average heartbeats of a lead, by numpy and scipy.

Route beat-average as the README defines it, written down beat by beat: polynomials of degree 5 through six samples by
scipy.interpolate.lagrange, the course beneath a beat by the same through four levels, averages over the 20 beats about each
one, sizes by numpy.linalg.lstsq. No running sums, no ring of snippets as in src/separate/average-beats.ts.
Run: /usr/bin/python3 test/reference/separate-average.py > test/reference/separate-average.json
"""
import json
import math
import numpy as np
import scipy
from scipy.interpolate import lagrange

RATE, N, COUNT = 32.0, 32 * 90, 20
BEFORE_S, AFTER_S = 0.3, 0.5
SHARES, PAUSE_S, TAPER, ALIKE, LEAST_SIZES, LARGEST = (0.36, 0.6), 1.5, 2, 4, 8, 2

state = 1
def noise():
    global state
    state = (state * 1103515245 + 12345) % 2147483648
    return state / 2147483648 - 0.5

times, t = [], 0.7
while t < 88.5:
    times.append(round(t * RATE * 64) / (RATE * 64))
    t += 0.85 + 0.06 * math.sin(2 * math.pi * 0.09 * t) + 0.02 * noise()
x = np.zeros(N)
clock = np.arange(N) / RATE
for at in times:
    height = 1 + 0.15 * math.sin(2 * math.pi * 0.25 * at)
    for centre, width, size in ((0, 0.03, 200), (0.27, 0.045, 500), (-0.16, 0.03, 25)):
        x += height * size * np.exp(-0.5 * ((clock - at - centre) / width) ** 2)
x += 100 * np.sin(2 * np.pi * 0.05 * clock) + 30 * np.sin(2 * np.pi * 0.25 * clock + 1)
x += np.array([8 * noise() for _ in range(N)])
x = np.round(x, 3)

place = np.array(times) * RATE
n = len(place)
near = lambda m: range(max(0, m - COUNT // 2), min(n, m + COUNT // 2 + 1))
def usual(m, step):
    rr = [min(PAUSE_S * RATE, abs(place[k + step] - place[k])) for k in near(m) if 0 <= k + step < n]
    return np.mean(rr)
before = [int(min(math.ceil(BEFORE_S * RATE), SHARES[0] * usual(m, -1))) for m in range(n)]
after = [int(min(math.ceil(AFTER_S * RATE), SHARES[1] * usual(m, 1))) for m in range(n)]
centre, length = max(before), max(before) + max(after) + 1

def at(position):
    whole = math.floor(position)
    if whole - 2 < 0 or whole + 3 >= N:
        return math.nan
    return float(np.polyval(lagrange(np.arange(-2, 4), x[whole - 2: whole + 4]), position - whole))
level = lambda k, offset: np.mean([at(place[k] + offset + d) for d in (-1, 0, 1)])
start = [place[k] - before[k] for k in range(n)]
levels = [level(k, -before[k]) for k in range(n)]

def course(k):
    ids = [k - 1, k, k + 1, k + 2]
    if ids[0] >= 0 and ids[-1] < n:
        mid = start[k]
        p = lagrange(np.array([start[i] - mid for i in ids]), np.array([levels[i] for i in ids]))
        return lambda s: float(np.polyval(p, s - mid))
    end = level(k, after[k])
    return lambda s: levels[k] + (end - levels[k]) * (s - start[k]) / (place[k] + after[k] - start[k])

snippets = np.zeros((n, length))
for k in range(n):
    under = course(k)
    for o in range(-before[k], after[k] + 1):
        snippets[k, centre + o] = at(place[k] + o) - under(place[k] + o)
good = [bool(np.isfinite(snippets[k]).all()) for k in range(n)]

averages, sizes, spread = np.zeros((n, length)), np.full(n, np.nan), np.full(n, np.nan)
for m in range(n):
    some = [k for k in near(m) if good[k]]
    reach = np.array([[-before[k] <= j - centre <= after[k] for j in range(length)] for k in some])
    wide = np.flatnonzero(reach.sum(0) >= max(1, len(some) / 2))
    averages[m, wide] = snippets[some].sum(0)[wide] / reach.sum(0)[wide]
    for i in range(TAPER):
        averages[m, wide[i]] *= (i + 1) / (TAPER + 1)
        averages[m, wide[-1 - i]] *= (i + 1) / (TAPER + 1)
    averages[m] = averages[m].astype(np.float32)
    if good[m]:
        sizes[m] = np.linalg.lstsq(averages[m][:, None], snippets[m], rcond=None)[0][0]
        rest = ((snippets[m] - sizes[m] * averages[m]) ** 2).sum()
        spread[m] = ALIKE * rest / ((averages[m] != 0).sum() - 2) / (averages[m] ** 2).sum()

total = np.zeros(N)
believed = []
for m in range(n):
    known = [k for k in near(m) if np.isfinite(sizes[k])]
    mean = sizes[known].mean()
    trust = max(0, 1 - spread[known].mean() / sizes[known].var(ddof=1))
    size = mean if not np.isfinite(sizes[m]) else mean + trust * (sizes[m] - mean)
    size = min(LARGEST, max(0, size))
    believed.append(size)
    padded = np.concatenate([np.zeros(8), averages[m], np.zeros(8)])
    for i in range(max(0, math.floor(place[m]) - centre - 3), min(N, math.ceil(place[m]) + length)):
        p = i - place[m] + centre
        whole = math.floor(p)
        if -3 <= whole < length + 2:
            six = padded[8 + whole - 2: 8 + whole + 4]
            total[i] += size * float(np.polyval(lagrange(np.arange(-2, 4), six), p - whole))

print(json.dumps({
    "numpy": np.__version__, "scipy": scipy.__version__, "rate_hz": RATE, "count": COUNT,
    "ticks": [round(t * RATE * 64) for t in times], "lead_uv": x.tolist(),
    "sizes": [round(float(s), 9) for s in believed], "sum_uv": [round(float(v), 7) for v in total],
}))
