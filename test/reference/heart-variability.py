#!/usr/bin/python3
"""Reference numbers for heart rate variability, by numpy and scipy alone (Debian's /usr/bin/python3).

Writes heart-variability.json beside itself. Nothing here imports or copies the program: definitions are those of
Task Force 1996 (Eur Heart J 17:354), Brennan 2001 (IEEE Trans Biomed Eng) and scipy's documentation.
"""
import json
import pathlib
import platform

import numpy as np
import scipy
from scipy import integrate, interpolate, signal

rng = np.random.default_rng(208)
LF, HF = (0.04, 0.15), (0.15, 0.40)


def made_up_intervals(seconds, rate, ectopic):
    """Beat times (s) of an invented rhythm and the class of each beat; early V beats with a pause after them."""
    times, classes = [0.0], ["N"]
    while times[-1] < seconds:
        t = times[-1]
        rr = 60 / rate * (1 + 0.04 * np.sin(2 * np.pi * 0.1 * t) + 0.05 * np.sin(2 * np.pi * 0.27 * t))
        rr += rng.normal(0, 0.01)
        if rng.random() < ectopic:
            times += [t + 0.62 * rr, t + 2 * rr]
            classes += ["V", "N"]
        else:
            times.append(t + rr)
            classes.append("N")
    ticks = np.round(np.array(times) * 64 * 250).astype(int)
    return ticks, classes


def time_domain(ticks, classes):
    rr = np.diff(ticks) * 1000 / (64 * 250)
    nn = np.array([a == "N" and b == "N" for a, b in zip(classes[:-1], classes[1:])])
    kept = rr[nn]
    pair = nn[1:] & nn[:-1]
    d = (rr[1:] - rr[:-1])[pair]
    sdnn, sdsd = np.std(kept, ddof=1), np.std(d, ddof=1)
    counts = np.bincount((kept // 7.8125).astype(int))
    return {
        "nnCount": int(nn.sum()), "pairCount": int(pair.sum()), "meanMs": kept.mean(), "heartRateBpm": 60000 / kept.mean(),
        "sdnnMs": sdnn, "rmssdMs": np.sqrt(np.mean(d**2)), "sdsdMs": sdsd, "pnn50Pct": 100 * np.mean(np.abs(d) > 50),
        "sd1Ms": sdsd / np.sqrt(2), "sd2Ms": np.sqrt(2 * sdnn**2 - sdsd**2 / 2),
        "triangularIndex": len(kept) / counts.max(),
    }


def without_line(t, y):
    return y - np.polyval(np.polyfit(t - t.mean(), y, 1), t - t.mean())


def cells(freqs, density, band, step):
    """Integral with every value standing for the cell of one step about it."""
    low = np.maximum(freqs - step / 2, band[0])
    high = np.minimum(freqs + step / 2, band[1])
    return float(np.sum(density * np.clip(high - low, 0, None)))


def lomb(t, rr_ms):
    n = len(t)
    length = (t[-1] - t[0]) * n / (n - 1)
    freqs = np.arange(1, int(np.ceil(0.5 * length))) / length
    y = without_line(t, rr_ms)
    p = signal.lombscargle(t - t.mean(), y - y.mean(), 2 * np.pi * freqs)
    density = 2 * p * (rr_ms.sum() / 1000) / n
    return {"lf": cells(freqs, density, LF, 1 / length), "hf": cells(freqs, density, HF, 1 / length)}


def welch(t, rr_ms):
    even = np.arange(t[0], t[-1] + 1e-9, 0.25)
    y = interpolate.CubicSpline(t, rr_ms)(even)
    freqs, density = signal.welch(y, 4.0, window="hann", nperseg=256, noverlap=128, detrend="linear")
    return {"lf": cells(freqs, density, LF, freqs[1]), "hf": cells(freqs, density, HF, freqs[1])}


def floor_case(sd_ms, mean_ms):
    """HF power and RMSSD of independent timing errors: by quadrature and by drawing them (a million beats)."""
    density = lambda f: 8 * sd_ms**2 * mean_ms / 1000 * np.sin(np.pi * f * mean_ms / 1000) ** 2
    top = min(HF[1], 500 / mean_ms)
    errors = np.diff(rng.normal(0, sd_ms, 2**20 + 1))
    freqs, p = signal.welch(errors, 1000 / mean_ms, nperseg=4096)
    drawn = cells(freqs, p, (HF[0], top), freqs[1])
    return {
        "sdMs": sd_ms, "meanMs": mean_ms, "hfMs2": integrate.quad(density, HF[0], top)[0], "hfDrawnMs2": drawn,
        "rmssdDrawnMs": float(np.sqrt(np.mean(np.diff(errors) ** 2))),
    }


lists = []
for seconds, rate, ectopic in [(240, 62, 0.0), (300, 75, 0.03), (1500, 71, 0.05), (60, 110, 0.2)]:
    ticks, classes = made_up_intervals(seconds, rate, ectopic)
    lists.append({"ticks": ticks.tolist(), "classes": "".join(classes), "expected": time_domain(ticks, classes)})

spectra = []
for seconds, rate, dropped in [(300, 62, 0), (300, 88, 0), (180, 70, 0), (300, 66, 25)]:
    ticks, _ = made_up_intervals(seconds, rate, 0.0)
    t = ticks[1:] / 16000
    rr = np.diff(ticks) * 1000 / 16000
    keep = np.ones(len(t), bool)
    keep[rng.choice(len(t) - 2, dropped, replace=False) + 1] = False
    t, rr = t[keep], rr[keep]
    spectra.append({"timesS": t.tolist(), "rrMs": rr.tolist(), "lomb": lomb(t, rr),
                    "welch": welch(t, rr) if dropped == 0 else None})

out = {
    "made_by": "heart-variability.py",
    "made_with": {"python": platform.python_version(), "numpy": np.__version__, "scipy": scipy.__version__},
    "rate_hz": 250,
    "lists": lists,
    "spectra": spectra,
    "floors": [floor_case(s, m) for s, m in [(1.0, 850.0), (3.266, 1000.0), (2.0, 1400.0)]],
}
path = pathlib.Path(__file__).with_suffix(".json")
path.write_text(json.dumps(out, indent=1) + "\n")
