"""FIR designs, Savitzky-Golay smoothing and Gruenwald-Letnikov derivatives by scipy, numpy and mpmath.

Run with /usr/bin/python3; writes numeric-filters.json beside this file.
"""
import json
import math
import pathlib

import mpmath
import numpy
import scipy
from scipy import signal

mpmath.mp.dps = 40
random = numpy.random.RandomState(7)


def low_pass(rate, pass_hz, stop_hz, attenuation):
    taps, beta = signal.kaiserord(attenuation, (stop_hz - pass_hz) / (rate / 2))
    taps += 1 - taps % 2
    return signal.firwin(taps, (pass_hz + stop_hz) / 2, window=("kaiser", beta), fs=rate).tolist()


def band_pass(rate, low_stop, low_pass_hz, high_pass, high_stop, attenuation):
    width = min(low_pass_hz - low_stop, high_stop - high_pass)
    taps, beta = signal.kaiserord(attenuation, width / (rate / 2))
    taps += 1 - taps % 2
    edges = [(low_stop + low_pass_hz) / 2, (high_pass + high_stop) / 2]
    return signal.firwin(taps, edges, window=("kaiser", beta), pass_zero=False, scale=False, fs=rate).tolist()


def savgol(n, window, order, derivative):
    x = numpy.round(random.standard_normal(n).cumsum(), 6)
    y = signal.savgol_filter(x, window, order, deriv=derivative, mode="interp")
    return {"window": window, "order": order, "derivative": derivative, "x": x.tolist(), "y": y.tolist()}


def gram_weights(window, order, places):
    """Exact least squares in rational-free high precision: normal equations at 200 digits."""
    with mpmath.workdps(200):
        half = (window - 1) // 2
        sums = [mpmath.mpf(sum(i ** k for i in range(-half, half + 1))) for k in range(2 * order + 1)]
        normal = mpmath.matrix(order + 1, order + 1)
        for a in range(order + 1):
            for b in range(order + 1):
                normal[a, b] = sums[a + b]
        right = mpmath.matrix(order + 1, 1)
        right[0] = 1
        c = mpmath.lu_solve(normal, right)
        return {
            "window": window,
            "order": order,
            "places": places,
            "weights": [float(sum(c[k] * mpmath.mpf(i - half) ** k for k in range(order + 1))) for i in places],
        }


def gl_weights(order, count):
    return [float((-1) ** k * mpmath.binomial(mpmath.mpf(order), k)) for k in range(count)]


def gl_response(order, step, memory, freq):
    w = numpy.ones(memory + 1)
    w[1:] = numpy.cumprod(1 - (order + 1) / numpy.arange(1, memory + 1))
    h = numpy.sum(w * numpy.exp(-2j * math.pi * freq * step * numpy.arange(memory + 1))) / step ** order
    return {"order": order, "step": step, "memory": memory, "freq": freq, "re": h.real, "im": h.imag}


x = numpy.round(random.standard_normal(400), 6)
taps = numpy.round(random.standard_normal(61), 6)
result = {
    "made_with": {"scipy": scipy.__version__, "numpy": numpy.__version__, "mpmath": mpmath.__version__},
    "kaiser": {"beta": 7.857, "window": signal.get_window(("kaiser", 7.857), 31, fftbins=False).tolist()},
    "kaiserBeta": [[a, signal.kaiser_beta(a)] for a in (10, 21, 21.5, 35, 50, 50.5, 60, 80, 100)],
    "hann": signal.get_window("hann", 12, fftbins=True).tolist(),
    "lowPass": {"spec": [250, 40, 45, 60], "taps": low_pass(250, 40, 45, 60)},
    "bandPass": {"spec": [250, 0.5, 5, 15, 25, 60], "taps": band_pass(250, 0.5, 5, 15, 25, 60 + 20 * math.log10(2))},
    "convolve": {"x": x.tolist(), "taps": taps.tolist(), "y": numpy.convolve(x, taps, "same").tolist()},
    "convolveOdd": {"y": numpy.convolve(numpy.pad(x, 30, "reflect", reflect_type="odd"), taps, "valid").tolist()},
    "padOdd": {"x": [1.0, 2.5, -1.0, 4.0], "pad": 9,
               "y": numpy.pad([1.0, 2.5, -1.0, 4.0], 9, "reflect", reflect_type="odd").tolist()},
    "savgol": [savgol(60, 11, 2, 0), savgol(60, 21, 4, 0), savgol(60, 15, 3, 1), savgol(60, 9, 3, 2),
               savgol(45, 45, 3, 0), savgol(9, 7, 6, 0)],
    "longWeights": [gram_weights(5001, 4, [0, 1, 17, 1250, 2500, 4000, 5000]),
                    gram_weights(1001, 2, [0, 250, 500, 999]),
                    gram_weights(41, 10, [0, 5, 20, 33])],
    "glWeights": [{"order": a, "weights": gl_weights(a, 40)} for a in (0.25, 0.3, 0.5, 0.7, -0.5, 1.0)],
    "glResponse": [gl_response(0.5, 0.25, 40, 0.05), gl_response(0.5, 0.25, 240, 0.05),
                   gl_response(0.3, 0.004, 15000, 1.25), gl_response(0.7, 0.001, 60000, 0.05)],
    "truncation": [[a, L, float(mpmath.mpf(L) ** -mpmath.mpf(a) * mpmath.rgamma(1 - mpmath.mpf(a)))]
                   for a, L in ((0.3, 903), (0.5, 31.8), (0.5, 60), (0.7, 150.4), (1.0, 60))],
}
pathlib.Path(__file__).with_suffix(".json").write_text(json.dumps(result, indent=1) + "\n")
