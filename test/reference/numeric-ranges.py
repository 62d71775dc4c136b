"""Student's t, cosine-series and block variances, and Newcombe's interval of a difference, by numpy and scipy.

Run with /usr/bin/python3; writes numeric-ranges.json beside this file. The cosines are scipy's DCT (type II, orthonormal); the
variance of a block mean is counted over every block there is; Newcombe's tenth method (1998) is put together from scipy's
Wilson intervals.
"""
import json
import pathlib

import numpy
import scipy
from scipy import fft, stats

random = numpy.random.RandomState(5)


def walk(n, keep):
    x = random.standard_normal(n)
    for i in range(1, n):
        x[i] += keep * x[i - 1]
    return numpy.round(x, 4)


def cosine(x, terms):
    weights = fft.dct(x, type=2, norm="ortho")[1:terms + 1] ** 2
    return float(numpy.average(weights, weights=numpy.arange(terms, 0, -1)))


def block(x, length):
    sums = lambda m: numpy.array([x[k:k + m].sum() for k in range(len(x) - length + 1)])
    whole, rest = divmod(len(x), length)
    return float((whole * sums(length).var() + (sums(rest).var() if rest else 0)) / len(x))


def newcombe(a, m, b, n):
    wilson = lambda k, of: stats.binomtest(k, of).proportion_ci(method="wilson")
    p, q, one, two = a / m, b / n, wilson(a, m), wilson(b, n)
    return {"before": [q, two.low, two.high], "after": [p, one.low, one.high],
            "low": p - q - numpy.hypot(p - one.low, two.high - q),
            "high": p - q + numpy.hypot(one.high - p, q - two.low)}


series = [walk(27, 0.7), walk(200, 0.95)]
result = {
    "made_with": {"scipy": scipy.__version__, "numpy": numpy.__version__},
    "t": [[d, stats.t.ppf(0.975, d)] for d in [1, 2, 3, 4, 7, 12, 13, 20, 57.5, 1000]],
    "t_between": [[d, stats.t.ppf(0.975, d)] for d in [18 / 7, 10 / 3, 4.09, 5.6, 9.3]],
    "variances": [{"x": x.tolist(), "terms": terms, "length": length,
                   "cosine": cosine(x, terms), "block": block(x, length)}
                  for x in series for terms, length in [(1, 1), (3, 4), (6, 7)]],
    # 56 of 70 against 48 of 80: the worked example of Newcombe 1998, his table II, 0.0524 to 0.3339 (from memory).
    "newcombe": [newcombe(56, 70, 48, 80), newcombe(5, 7, 7, 7)],
}
path = pathlib.Path(__file__).with_suffix(".json")
path.write_text(json.dumps(result, indent=1) + "\n")
