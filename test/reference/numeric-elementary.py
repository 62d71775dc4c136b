"""Elementary and special functions by mpmath at 50 digits, and Mersenne Twister by numpy.

Run with /usr/bin/python3; writes numeric-elementary.json beside this file.
"""
import json
import pathlib

import mpmath
import numpy

mpmath.mp.dps = 50
random = numpy.random.RandomState(20)


def table(f, places):
    return [{"at": [float(p) for p in place], "value": float(f(*map(mpmath.mpf, place)))} for place in places]


def singles(values):
    return [(float(v),) for v in values]


angles = singles(list(random.uniform(-700, 700, 60)) + [0.0, 1e-9, numpy.pi, 1e6, 12345678.9])
positives = singles(list(10 ** random.uniform(-12, 12, 60)) + [1.0, 2.0, 10.0])
result = {
    "made_with": {"mpmath": mpmath.__version__, "numpy": numpy.__version__},
    "sin": table(mpmath.sin, angles),
    "cos": table(mpmath.cos, angles),
    "exp": table(mpmath.exp, singles(random.uniform(-300, 300, 60))),
    "log": table(mpmath.log, positives),
    "log10": table(mpmath.log10, positives),
    "pow": table(mpmath.power, list(zip(10 ** random.uniform(-3, 3, 60), random.uniform(-5, 5, 60)))),
    "atan2": table(mpmath.atan2, list(zip(random.uniform(-5, 5, 60), random.uniform(-5, 5, 60)))),
    "besselI0": table(lambda x: mpmath.besseli(0, x), singles([0, 0.1, 1, 3.4, 8, 12.3, 25])),
    "logGamma": table(mpmath.loggamma, singles([0.01, 0.3, 0.5, 1, 2, 2.5, 7.7, 12, 100.5])),
    "reciprocalGamma": table(mpmath.rgamma, singles([-2.5, -1.3, -1, -0.4, 0, 0.3, 0.5, 0.7, 1, 4.2])),
}
seeds = []
for seed in (0, 1, 4294967295):
    bits = numpy.random.MT19937()
    bits._legacy_seeding(seed)
    seeds.append({
        "seed": seed,
        "uint32": [int(v) for v in bits.random_raw(700)][-10:],
        "uniform": numpy.random.RandomState(seed).random_sample(5).tolist(),
        "gaussian": numpy.random.RandomState(seed).standard_normal(9).tolist(),
    })
result["random"] = seeds
pathlib.Path(__file__).with_suffix(".json").write_text(json.dumps(result, indent=1) + "\n")
