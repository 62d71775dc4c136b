"""A low-pass at the output's instants by scipy.signal.upfirdn, and the Gruenwald-Letnikov operator of fixed memory.

Instants: Kaiser window times sinc on a grid `up` times finer than the input, run over the samples and over ones, and
the first divided by the second (weights that sum to 1 over the samples there are). Rates whose ratio to 4 Hz is no
ratio of small numbers are summed at each instant with scipy.special.i0 instead.
Derivative of fixed memory: scipy.signal.lfilter with weights of mpmath's binomials; its gain and phase summed by
mpmath at 40 digits. Run with /usr/bin/python3; writes numeric-instants.json beside this file.
"""
import json
import math
import pathlib

import mpmath
import numpy
import scipy
from scipy import signal, special

mpmath.mp.dps = 40
random = numpy.random.RandomState(31)
PASS, STOP, DB = 0.5, 1.5, 66


def reach(rate):
    taps = math.ceil((DB - 7.95) / (2.285 * 2 * math.pi * (STOP - PASS) / rate) + 1)
    return (taps + 1 - taps % 2 - 1) // 2


def rational_case(rate, up, down, out_rate, seconds):
    n = int(seconds * rate) + 1
    x = numpy.round(random.standard_normal(n).cumsum(), 3)
    half = reach(rate)
    k = numpy.arange(-half * up, half * up + 1)
    window = signal.windows.kaiser(2 * half * up + 1, signal.kaiser_beta(DB), sym=True)
    weights = window * numpy.sinc((PASS + STOP) * k / (rate * up))
    run = lambda series: signal.upfirdn(weights, series, up, 1)[half * up:half * up + (n - 1) * up + 1:down]
    return {"rate": rate, "outputRate": out_rate, "x": x.tolist(), "y": (run(x) / run(numpy.ones(n))).tolist()}


def irrational_case(rate, out_rate, seconds):
    n = int(seconds * rate) + 1
    x = numpy.round(random.standard_normal(n).cumsum(), 3)
    half, beta, y = reach(rate), signal.kaiser_beta(DB), []
    for k in range(int((n - 1) * out_rate / rate) + 1):
        offset = numpy.arange(n) - k * rate / out_rate
        inside = numpy.abs(offset) <= half
        u = offset[inside]
        w = special.i0(beta * numpy.sqrt(1 - (u / half) ** 2)) * numpy.sinc((PASS + STOP) * u / rate)
        y.append(float(w @ x[inside] / w.sum()))
    return {"rate": rate, "outputRate": out_rate, "x": x.tolist(), "y": y}


def gl_case(n, order, step, memory):
    x = numpy.round(random.standard_normal(n).cumsum(), 4)
    weights = [(-1) ** k * mpmath.binomial(mpmath.mpf(order), k) * mpmath.mpf(step) ** -mpmath.mpf(order)
               for k in range(memory + 1)]
    y = signal.lfilter([float(w) for w in weights], [1.0], x)
    response = []
    for hz in (0.0, 0.017, 0.05, 0.11):
        h = mpmath.fsum(w * mpmath.expj(-2 * mpmath.pi * mpmath.mpf(hz) * mpmath.mpf(step) * k) for k, w in enumerate(weights))
        response.append([hz, float(h.real), float(h.imag)])
    return {"order": order, "step": step, "memory": memory, "x": x.tolist(), "y": y.tolist(), "response": response}


result = {
    "made_with": {"scipy": scipy.__version__, "numpy": numpy.__version__, "mpmath": mpmath.__version__},
    "design": {"passHz": PASS, "stopHz": STOP, "attenuationDb": DB},
    "instants": [rational_case(250, 2, 125, 4, 8), rational_case(128, 1, 32, 4, 8), rational_case(90, 2, 45, 4, 9),
                 rational_case(10, 5, 12, 25 / 6, 60), irrational_case(40 * math.pi, 4, 8)],
    "glMemory": [gl_case(700, 0.5, 0.25, 240), gl_case(900, 0.3, 0.004, 500), gl_case(400, 0.8, 0.02, 60), gl_case(300, 0.5, 1.0, 0)],
}
pathlib.Path(__file__).with_suffix(".json").write_text(json.dumps(result) + "\n")
