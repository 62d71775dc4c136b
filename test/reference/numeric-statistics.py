"""Quantiles, spreads, Wilson intervals, splines, local maxima, running medians and lines by numpy and scipy.

Run with /usr/bin/python3; writes numeric-statistics.json beside this file.
"""
import json
import pathlib

import numpy
import scipy
from scipy import interpolate, ndimage, signal, stats

random = numpy.random.RandomState(11)


def spline_case(n):
    x = numpy.round(numpy.cumsum(random.uniform(0.4, 1.2, n)), 6)
    y = numpy.round(random.standard_normal(n), 6)
    at = numpy.round(numpy.linspace(x[0] - 0.5, x[-1] + 0.5, 41), 6)
    return {"x": x.tolist(), "y": y.tolist(), "at": at.tolist(),
            "values": interpolate.CubicSpline(x, y, bc_type="not-a-knot")(at).tolist()}


def wilson_case(successes, n):
    interval = stats.binomtest(successes, n).proportion_ci(method="wilson")
    return [successes, n, interval.low, interval.high]


def running_case(x, window, q):
    series = numpy.pad(x, window // 2, constant_values=numpy.nan)
    return [float(numpy.nanquantile(series[i:i + window], q)) for i in range(len(x))]


values = numpy.round(random.standard_normal(101), 3)
steps = numpy.array([0, 1, 3, 3, 2, 5, 5, 5, 1, 4, 4, 6, 0, 2, 2], dtype=float)
kept = (random.uniform(size=101) > 0.3).astype(int)
index = numpy.arange(101)
slope, intercept = numpy.polyfit(index[kept == 1], values[kept == 1], 1)
result = {
    "made_with": {"scipy": scipy.__version__, "numpy": numpy.__version__},
    "values": values.tolist(),
    "mean": float(values.mean()),
    "variance": float(values.var(ddof=1)),
    "median": float(numpy.median(values)),
    "quantiles": [[q, float(numpy.quantile(values, q))] for q in (0, 0.025, 0.25, 0.333, 0.5, 0.9, 0.975, 1)],
    "medianAbsoluteDeviation": float(stats.median_abs_deviation(values)),
    "wilson": [wilson_case(5, 7), wilson_case(21, 30), wilson_case(0, 12), wilson_case(12, 12)],
    "spline": [spline_case(n) for n in (2, 3, 4, 5, 12)],
    "steps": steps.tolist(),
    "stepMaxima": signal.find_peaks(steps)[0].tolist(),
    "valueMaxima": signal.find_peaks(values)[0].tolist(),
    "running": [{"window": w, "q": q, "values": running_case(values, w, q)}
                for w, q in ((1, 0.5), (9, 0.5), (31, 0.1), (151, 0.5))],
    "medianFilter": ndimage.median_filter(values, 9).tolist(),
    "kept": kept.tolist(),
    "residual": (values - slope * index - intercept).tolist(),
}
pathlib.Path(__file__).with_suffix(".json").write_text(json.dumps(result, indent=1) + "\n")
