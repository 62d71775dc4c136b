"""Dominant frequency of every epoch of an hour by Burg and by multitaper, with numpy and scipy.

An hour at 4 Hz: a slow wave that wanders from 2.6 to 3.4 cpm, weak in its second half, breathing, 1/f noise. Each 240 s
window every 60 s, line removed: Burg's recursion as Kay & Marple (1981) print it on every second sample, order of least
n log(variance) + 2 order up to n / 3 (Akaike 1974), spectrum by scipy.signal.freqz, peak of the most area; tapers by scipy.signal.windows.dpss,
spectra by numpy.fft, mean weighted by the concentrations, place by numpy.convolve and the centroid of what stands above
the lower end.
Run: /usr/bin/python3 test/reference/stomach-opinions.py > test/reference/stomach-opinions.json
"""
import json
import numpy as np
import scipy
from scipy import signal

RATE, SECONDS, LENGTH, STEP = 4, 3600, 960, 240
LOW, HIGH = 1.0, 9.0
NW, K = 2.5, 4

random = np.random.RandomState(21)
t = np.arange(RATE * SECONDS) / RATE
cpm = 3 + 0.4 * np.sin(2 * np.pi * t / 2400)
phase = 2 * np.pi * np.cumsum(cpm / 60) / RATE
size = np.where(t < 1800, 100, 12)
white = random.standard_normal(2 * len(t))
spectrum = np.fft.rfft(white)
f = np.arange(len(spectrum))
spectrum[1:] /= np.sqrt(f[1:])
spectrum[0] = 0
# nothing above 0.5 Hz, as an anti-aliased lead has it
spectrum[f > 0.5 / RATE * 2 * len(t)] = 0
pink = np.fft.irfft(spectrum)[: len(t)]
pink *= 15 / pink.std()
x = size * np.sin(phase) + 0.2 * size * np.sin(2 * phase + 1) + 30 * np.sin(2 * np.pi * 0.25 * t)
x = np.round(x + pink + 0.3 * random.standard_normal(len(t)), 2)


def local_max(density, step_cpm, by_area=False):
    """Highest local maximum in the band, or that of the most area between its lows; refined through the logarithms."""
    best = None
    for k in range(1, len(density) - 1):
        a, b, c = density[k - 1: k + 2]
        if not (b > a and b > c):
            continue
        la, lb, lc = np.log([a, b, c])
        offset = 0.5 * (la - lc) / (la - 2 * lb + lc)
        place = (k + offset) * step_cpm
        score = lb - 0.25 * (la - lc) * offset
        if by_area:
            i = j = k
            while i > 1 and density[i - 1] < density[i]:
                i -= 1
            while j + 1 < len(density) and density[j + 1] < density[j]:
                j += 1
            score = density[i: j + 1].sum()
        if LOW <= place < HIGH and (best is None or score > best[0]):
            best = (score, place, k)
    return best


def burg(z, most):
    n = len(z)
    f, b = z.copy(), z.copy()
    a, variance = np.array([1.0]), float(np.mean(z ** 2))
    best = (np.inf, 0, None)
    for m in range(1, most + 1):
        ff, bb = f[m:], b[m - 1: n - 1]
        k = -2 * np.dot(ff, bb) / (np.dot(ff, ff) + np.dot(bb, bb))
        f[m:], b[m:] = ff + k * bb, bb + k * ff
        padded = np.append(a, 0)
        a = padded + k * padded[::-1]
        variance *= 1 - k * k
        criterion = n * np.log(variance) + 2 * m
        if criterion < best[0]:
            best = (criterion, m, a)
    return best[1], best[2]


tapers, ratios = signal.windows.dpss(LENGTH, NW, K, return_ratios=True)
rows = []
for first in range(0, len(x) - LENGTH + 1, STEP):
    w = signal.detrend(x[first: first + LENGTH], type="linear")
    order, a = burg(w[::2].copy(), LENGTH // 2 // 3)
    n_fft = 16384
    _, h = signal.freqz([1], a, worN=n_fft // 2, fs=2)
    peak = local_max(np.abs(h) ** 2, 60 * 2 / n_fft, by_area=True)
    spectra = np.abs(np.fft.rfft(tapers * w, 4096)) ** 2
    mean = np.average(spectra, axis=0, weights=ratios)
    step = 60 * RATE / 4096
    half = round(NW * 4096 / LENGTH)
    smooth = np.convolve(mean, np.ones(2 * half + 1) / (2 * half + 1), "same")
    smooth[:half] = 0
    _, _, k = local_max(smooth, step)
    near = np.arange(k - half, k + half + 1)
    above = np.maximum(0, mean[near] - min(mean[near[0]], mean[near[-1]]))
    rows.append({"order": order, "burg_cpm": round(peak[1], 6), "multitaper_cpm": round(float((above * near).sum() / above.sum() * step), 6),
                 "true_cpm": round(float(cpm[first: first + LENGTH].mean()), 4)})

print(json.dumps({"made_by": "test/reference/stomach-opinions.py", "numpy": np.__version__, "scipy": scipy.__version__,
                  "rate_hz": RATE, "length": LENGTH, "step": STEP, "x": x.tolist(), "epochs": rows}))
