"""The most likely course across a gap, and the levels on both sides, by numpy's dense solver.

Conditional mean of a stationary process of known spectrum with an unknown mean on each side (kriging with
unknown means, Matheron 1963), written down as one linear system and solved by numpy.linalg.solve: no
factorisation, no levels by elimination as in src/separate/bridge.ts.
Run: /usr/bin/python3 test/reference/separate-bridge.py > test/reference/separate-bridge.json
"""
import json
import numpy as np

RATE, SIZE, N, FROM, TO = 2.0, 4096, 400, 190, 214
SIDE, STEP, UNFORESEEN = 60, 2, 1e-4  # a minute on each side, read once a second
SMEAR = 3  # 1.5 s: what is spoiled reaches so far into what is not
FIRST, NEXT = FROM - SMEAR, TO + SMEAR
k = np.arange(SIZE // 2 + 1)
f = k * RATE / SIZE
density = 50 / (1 + (f / 0.02) ** 2) + 8000 * np.exp(-(((f - 0.05) / 0.002) ** 2))
# autocovariance: inverse transform of the two-sided density
two = density.copy()
two[1:-1] /= 2
full = np.concatenate([two, two[-2:0:-1]]) * RATE
cov = np.fft.ifft(full).real

t = np.arange(N) / RATE
x = 60 * np.sin(2 * np.pi * 0.05 * t + 0.4) + 15 * np.cos(2 * np.pi * 0.11 * t) + 0.02 * t
x[TO:] += 5000
before = np.arange(FIRST - 1, FIRST - 1 - SIDE * STEP, -STEP)
after = np.arange(NEXT, NEXT + SIDE * STEP, STEP)
after = after[after < N]
places = np.concatenate([before, after])
C = cov[np.abs(places[:, None] - places[None, :])]
C[np.diag_indices_from(C)] *= 1 + UNFORESEEN
sides = np.stack([np.isin(places, before), np.isin(places, after)], axis=1).astype(float)
system = np.block([[C, sides], [sides.T, np.zeros((2, 2))]])
solution = np.linalg.solve(system, np.concatenate([x[places], [0, 0]]))
weights, levels = solution[: len(places)], solution[len(places):]
gap = np.arange(FIRST, NEXT)
filled = cov[np.abs(gap[:, None] - places[None, :])] @ weights
print(json.dumps({
    "numpy": np.__version__, "rate_hz": RATE, "size": SIZE, "from": FROM, "to": TO,
    "density": density.tolist(), "lead": x.tolist(),
    "filled_from": FIRST, "filled": (levels[0] + filled).tolist(), "shift": float(levels[0] - levels[1]),
}))
