"""Discrete prolate spheroidal sequences and multitaper densities by scipy, and by the matrix that defines them.

`long` comes from scipy.signal.windows.dpss; `short` from numpy's dense solver on the sinc matrix itself (Slepian
1978), without the tridiagonal method. Run with /usr/bin/python3; writes numeric-tapers.json beside this file.
"""
import json
import pathlib

import numpy
import scipy
from scipy import signal
from scipy.signal.windows import dpss

random = numpy.random.RandomState(21)


def long_case(n, nw, count, stride):
    tapers, ratios = dpss(n, nw, count, sym=True, norm=2, return_ratios=True)
    return {"length": n, "nw": nw, "count": count, "stride": stride, "concentrations": ratios.tolist(),
            "tapers": [taper[::stride].tolist() for taper in tapers]}


def short_case(n, nw, count):
    i = numpy.arange(n)
    values, vectors = numpy.linalg.eigh(2 * nw / n * numpy.sinc(2 * nw / n * (i[:, None] - i[None, :])))
    tapers = []
    for k in range(count):
        taper = vectors[:, n - 1 - k]
        side = taper.sum() if k % 2 == 0 else ((n - 1 - 2 * i) * taper).sum()
        tapers.append((taper * numpy.sign(side)).tolist())
    return {"length": n, "nw": nw, "count": count, "concentrations": values[::-1][:count].tolist(), "tapers": tapers}


def density_case(n, nw, count, size, rate):
    x = numpy.round(random.standard_normal(n).cumsum(), 6)
    tapers, ratios = dpss(n, nw, count, sym=True, norm=2, return_ratios=True)
    each = [signal.periodogram(x, fs=rate, window=taper, nfft=size, detrend=False, scaling="density")[1] for taper in tapers]
    return {"nw": nw, "count": count, "size": size, "rate": rate, "x": x.tolist(),
            "density": numpy.average(each, axis=0, weights=ratios).tolist()}


result = {
    "made_with": {"scipy": scipy.__version__, "numpy": numpy.__version__},
    "long": [long_case(960, 2.5, 4, 13), long_case(961, 4, 7, 16), long_case(4800, 4, 7, 97), long_case(4800, 2, 3, 97)],
    "short": [short_case(24, 2.5, 4), short_case(31, 3, 5), short_case(60, 4, 7)],
    "density": [density_case(240, 2.5, 4, 512, 4.0), density_case(101, 4, 7, 101, 250.0)],
}
pathlib.Path(__file__).with_suffix(".json").write_text(json.dumps(result) + "\n")
