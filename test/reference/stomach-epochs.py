"""Spectra of single epochs by scipy.signal.periodogram and the arithmetic of figures by numpy.

Run with /usr/bin/python3; writes stomach-epochs.json beside this file. Check values CV-17, 18, 19, 20
and 59 are the field notes' own; they are computed again here.
"""
import json
import pathlib

import numpy
import scipy
from scipy import signal

RATE, LENGTH, SIZE = 4, 960, 4096
random = numpy.random.RandomState(11)
t = numpy.arange(LENGTH) / RATE
taper = signal.windows.hann(LENGTH, sym=False)


def lead():
    x = 400 + 0.5 * t + 120 * numpy.sin(2 * numpy.pi * 0.0517 * t + 0.4) + 30 * numpy.sin(2 * numpy.pi * 0.26 * t)
    return numpy.round(x + 25 * random.standard_normal(LENGTH), 2)


def density(x, **more):
    return signal.periodogram(x, fs=RATE, window=taper, nfft=SIZE, scaling="density", **more)[1]


def clean():
    x = lead()
    return {"x": x.tolist(), "density": density(x, detrend="linear")[:260].tolist()}


def spoiled():
    """Mean and line by numpy.polyfit on what is kept; spoiled samples zero; power of a line made whole."""
    x = lead()
    kept = numpy.ones(LENGTH, bool)
    kept[300:390] = kept[700:720] = False
    x[~kept] += 5000
    residual = x - numpy.polyval(numpy.polyfit(t[kept], x[kept], 1), t)
    residual[~kept] = 0
    share = taper[kept].sum() / taper.sum()
    p = density(residual, detrend=False) / share ** 2
    return {"x": x.tolist(), "spoiled_s": [[75, 97.5], [175, 180]], "spoiled_fraction": 1 - share,
            "density": p[:260].tolist()}


df = numpy.array([3.0, 2.9, 3.1, 3.0, 2.8, 3.2])
powers = numpy.array([4e5, 9e5, 5e5, 7e5, 6e5, 8e5])
result = {
    "made_by": "test/reference/stomach-epochs.py",
    "versions": {"numpy": numpy.__version__, "scipy": scipy.__version__},
    "clean": clean(), "spoiled": spoiled(),
    "arithmetic": {
        "df": df.tolist(), "df_mean": df.mean(), "df_median": float(numpy.median(df)), "df_sd": df.std(ddof=1),
        "df_instability_pct": 100 * df.std(ddof=1) / df.mean(),
        "density": powers.tolist(), "dp_instability_pct": 100 * powers.std(ddof=1) / powers.mean(),
        "dp_median_db": 10 * numpy.log10(numpy.median(powers)),
        "percent_20_of_27": 100 * 20 / 27,
        "db_of_2_4": 10 * numpy.log10(2.4), "mean_then_db": 10 * numpy.log10(numpy.mean([1, 100])),
    },
}
pathlib.Path(__file__).with_suffix(".json").write_text(json.dumps(result) + "\n")
