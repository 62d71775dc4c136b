"""Both routes of separation by a plain scipy pipeline, on a mixture anyone can make again.

Mixture: offset 1500 uV, slow wave 100 uV at 3 cpm, breathing 40 uV at 15 a minute, beats of 300 uV
(Gaussian bells of 12 ms) at 75 a minute, and noise of up to 10 uV from a linear congruential generator.
Each step is done on its own and at the full rate: firwin (Kaiser), oaconvolve with the Gruenwald-Letnikov
weights, savgol_filter, then picked at the output's instants. Run with /usr/bin/python3; writes
separate-scipy.json beside this file.
"""
import json
import pathlib

import numpy
import scipy
from scipy import signal

SECONDS = 400
MEMORY_S = 20
CLEAN = (160.0, 240.0)


def mixture(rate):
    t = numpy.arange(SECONDS * rate) / rate
    state, noise = 1, numpy.empty(len(t))
    for i in range(len(t)):
        state = (state * 1103515245 + 12345) % 2147483648
        noise[i] = 20.0 * (state / 2147483648 - 0.5)
    beat = (t + 0.4) % 0.8 - 0.4
    return (1500 + 100 * numpy.sin(2 * numpy.pi * 0.05 * t) + 40 * numpy.sin(2 * numpy.pi * 0.25 * t)
            + 300 * numpy.exp(-0.5 * (beat / 0.012) ** 2) + noise)


def low_pass(rate, pass_hz, stop_hz, attenuation):
    taps, beta = signal.kaiserord(attenuation, (stop_hz - pass_hz) / (rate / 2))
    taps += 1 - taps % 2
    return signal.firwin(taps, (pass_hz + stop_hz) / 2, window=("kaiser", beta), fs=rate)


def high_pass(rate, stop_hz, pass_hz, attenuation):
    taps = -low_pass(rate, stop_hz, pass_hz, attenuation)
    taps[len(taps) // 2] += 1
    return taps


def at_instants(x, rate):
    """The low-pass 0.25-0.8 Hz of 66 dB, its weights for each instant k/4 s, by numpy.i0 and numpy.sinc."""
    n, beta = signal.kaiserord(66, (0.8 - 0.25) / (rate / 2))
    n += 1 - n % 2
    half = (n - 1) / 2
    out = []
    for k in range(int((len(x) - 1) * 4 / rate) + 1):
        place = k * rate / 4
        i = numpy.arange(max(0, int(numpy.ceil(place - half))), min(len(x), int(place + half) + 1))
        u = i - place
        w = numpy.i0(beta * numpy.sqrt(numpy.maximum(0, 1 - (u / half) ** 2))) * numpy.sinc(2 * 0.525 * u / rate)
        out.append(w @ x[i] / w.sum())
    return numpy.array(out)


def band(x, rate, step):
    recorded = at_instants(x, rate)
    low, high, width = 0.8 / 60, 10 / 60, 0.4 / 60
    taps, beta = signal.kaiserord(44 + 20 * numpy.log10(2), 2 * width / 2)
    taps += 1 - taps % 2
    make = lambda edge: signal.firwin(taps, edge, window=("kaiser", beta), fs=4)
    slow = signal.oaconvolve(recorded, make(high) - make(low), mode="same")
    heart = signal.oaconvolve(x - x.mean(), high_pass(rate, 0.25, 0.75, 60), mode="same")
    heart = signal.oaconvolve(heart, low_pass(rate, 32, 48, 60), mode="same")[::step]
    return recorded, slow, heart


def derivative(x, rate, order):
    count = MEMORY_S * rate + 1
    k = numpy.arange(1, count)
    weights = numpy.concatenate([[1.0], numpy.cumprod(1 - (order + 1) / k)]) * float(rate) ** order
    return signal.oaconvolve(x, weights)[: len(x)], weights


def smooth(x, rate, ms):
    return signal.savgol_filter(x, 2 * int(ms * rate / 2000) + 1, 2)


def gain(weights, window, hz, rate):
    n = numpy.arange(len(weights))
    g = abs(numpy.sum(weights * numpy.exp(-2j * numpy.pi * hz / rate * n)))
    c = signal.savgol_coeffs(window, 2)
    m = numpy.arange(window) - window // 2
    return g * abs(numpy.sum(c * numpy.exp(-2j * numpy.pi * hz / rate * m)))


def fractional(x, rate, step, order):
    x = x - x.mean()
    slow, weights = derivative(x, rate, order)
    slow = smooth(slow, rate, 1000)
    heart, _ = derivative(smooth(x, rate, 40), rate, order)
    if step > 1:
        folding = low_pass(rate, 80, 125, 60)
        slow = signal.oaconvolve(slow, folding, mode="same")
        heart = signal.oaconvolve(heart, folding, mode="same")
    slow = at_instants(slow[::step], rate // step) / gain(weights, 2 * (rate // 2) + 1, 0.05, rate)
    window = 2 * int(40 * rate / 2000) + 1
    coefficients = signal.savgol_coeffs(window, 2)
    m = numpy.arange(window) - window // 2
    at_10 = (2 * numpy.sin(numpy.pi * 10 / rate) * rate) ** order
    at_10 *= numpy.sum(coefficients * numpy.cos(2 * numpy.pi * 10 / rate * m))
    return slow, heart[::step] / at_10, [gain(weights, 2 * (rate // 2) + 1, f / 60, rate) for f in (1, 3, 6, 9)]


def every(x, rate, stride):
    first, last = int(CLEAN[0] * rate), int(CLEAN[1] * rate)
    return x[first:last:stride].tolist()


def case(rate):
    step = max(1, rate // 250)
    x = mixture(rate)
    recorded, slow, heart = band(x, rate, step)
    d_slow, d_heart, gains = fractional(x, rate, step, 0.5)
    return {
        "rate_hz": rate, "step": step,
        "band": {"recorded": every(recorded, 4, 1), "slow": every(slow, 4, 1), "heart": every(heart, rate // step, 37)},
        "fractional": {"order": 0.5, "memory_s": MEMORY_S, "slow": every(d_slow, 4, 1),
                       "heart": every(d_heart, rate // step, 37), "gain_at_1_3_6_9_cpm": gains},
    }


result = {
    "made_by": "test/reference/separate-scipy.py",
    "versions": {"numpy": numpy.__version__, "scipy": scipy.__version__},
    "seconds": SECONDS, "clean_s": CLEAN, "heart_stride": 37,
    "cases": [case(250), case(1000)],
}
pathlib.Path(__file__).with_suffix(".json").write_text(json.dumps(result, indent=None) + "\n")
