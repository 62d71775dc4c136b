"""Cross-spectra, coherence and analytic signals by scipy; Burg models by mpmath at 60 digits.

The Burg model is computed from the definition: each reflection from the forward and backward errors of the
polynomial so far, which is multiplied out anew at every order. Run with /usr/bin/python3; writes numeric-pairs.json.
"""
import json
import pathlib

import mpmath
import numpy
import scipy
from scipy import signal

mpmath.mp.dps = 60
random = numpy.random.RandomState(5)


def pair_case(n, detrend, name, nfft, rate, step):
    x = numpy.round(random.standard_normal(n).cumsum() * 0.3 + 0.02 * numpy.arange(n), 6)
    y = numpy.round(0.7 * numpy.roll(x, 5) + random.standard_normal(n), 6)
    options = dict(fs=rate, window="hann", nperseg=128, noverlap=128 - step, nfft=nfft, detrend=detrend)
    _, cross = signal.csd(x, y, **options)
    _, coherence = signal.coherence(x, y, **options)
    return {"detrend": name, "size": nfft, "rate": rate, "step": step, "x": x.tolist(), "y": y.tolist(),
            "cross": numpy.column_stack([cross.real, cross.imag]).ravel().tolist(), "coherence": coherence.tolist()}


def hilbert_case(n):
    t = numpy.arange(n) / 4
    x = numpy.round(100 * numpy.cos(2 * numpy.pi * 0.05 * t + 0.3 * numpy.sin(2 * numpy.pi * t / 200))
                    + 5 * numpy.cos(2 * numpy.pi * 0.02 * t), 6)
    z = signal.hilbert(x)
    return {"x": x.tolist(), "analytic": numpy.column_stack([z.real, z.imag]).ravel().tolist(),
            "phase": numpy.angle(z).tolist()}


def burg_case(x, order):
    values = [mpmath.mpf(float(v)) for v in x]
    n = len(values)
    polynomial, reflections = [mpmath.mpf(1)], []
    power = sum(v * v for v in values) / n
    for m in range(1, order + 1):
        # Errors of order m - 1 at place t: forward, and backward of the sample m before it.
        forward = [sum(a * values[t - k] for k, a in enumerate(polynomial)) for t in range(m, n)]
        backward = [sum(a * values[t - m + k] for k, a in enumerate(polynomial)) for t in range(m, n)]
        k = -2 * sum(f * b for f, b in zip(forward, backward)) / sum(f * f + b * b for f, b in zip(forward, backward))
        longer = polynomial + [mpmath.mpf(0)]
        polynomial = [longer[i] + k * longer[m - i] for i in range(m + 1)]
        reflections.append(k)
        power *= 1 - k * k
    return {"x": [float(v) for v in x], "order": order, "coefficients": [float(a) for a in polynomial[1:]],
            "reflections": [float(k) for k in reflections], "variance": float(power)}


def density_case(case, rate, size):
    k = numpy.arange(size // 2 + 1)
    w, h = signal.freqz([1.0], numpy.concatenate([[1.0], case["coefficients"]]), worN=2 * numpy.pi * k / size)
    density = 2 * case["variance"] / rate * numpy.abs(h) ** 2
    density[0] /= 2
    if size % 2 == 0:
        density[-1] /= 2
    return {"rate": rate, "size": size, "density": density.tolist()}


noise = numpy.round(random.standard_normal(120), 6)
t = numpy.arange(240) / 4
wave = numpy.round(100 * numpy.sin(2 * numpy.pi * 0.05 * t) + 3 * random.standard_normal(240), 6)
models = [burg_case([1, 2, 3, 4], 2), burg_case(noise, 6), burg_case(wave, 20)]
for model, (rate, size) in zip(models, ((1.0, 8), (250.0, 99), (4.0, 1024))):
    model["density"] = density_case(model, rate, size)
result = {
    "made_with": {"scipy": scipy.__version__, "numpy": numpy.__version__, "mpmath": mpmath.__version__},
    "pairs": [pair_case(700, "constant", "mean", 256, 4.0, 32), pair_case(500, "linear", "line", 128, 4.0, 64),
              pair_case(300, False, "none", 131, 250.0, 43)],
    "hilbert": [hilbert_case(400), hilbert_case(401), hilbert_case(512)],
    "burg": models,
}
pathlib.Path(__file__).with_suffix(".json").write_text(json.dumps(result) + "\n")
