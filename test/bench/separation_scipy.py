"""The separation of one lead at 1 kHz by scipy, for `npm run bench`: times on standard output, results as float64 files.

Arguments: file of float64 samples, folder for the results. Each line of standard input names a pipeline, each answer is
one JSON line. The parameters are those of the bench: order 0.5, memory 60 s, Savitzky-Golay windows of 1001 and 41
samples, polynomial 2; weights and taps are made once, before any clock runs.

  plain  oaconvolve with the Gruenwald-Letnikov weights and savgol_filter, in both orders
  fft    the same with both steps by oaconvolve
  band   the filters of route `band`, each output by one scipy call: upfirdn to 4 Hz, oaconvolve
  write  untimed: the results of `plain` and `band`, low-passed, picked and scaled as ours are

Only standard names of scipy are used; every tap is designed here, none comes from the program under test.
"""
import json
import pathlib
import sys
import time

import numpy
from scipy import signal

RATE, STEP, SLOW_RATE = 1000, 4, 4
ORDER, MEMORY_S, SLOW_WINDOW, HEART_WINDOW, POLYNOMIAL = 0.5, 60, 1001, 41, 2
SLOW_SCALE_HZ, HEART_SCALE_HZ = 0.05, 10.0


def low_pass(rate, pass_hz, stop_hz, attenuation):
    taps, beta = signal.kaiserord(attenuation, (stop_hz - pass_hz) / (rate / 2))
    return signal.firwin(taps + 1 - taps % 2, (pass_hz + stop_hz) / 2, window=("kaiser", beta), fs=rate)


def high_pass(rate, stop_hz, pass_hz, attenuation):
    taps = -low_pass(rate, stop_hz, pass_hz, attenuation)
    taps[len(taps) // 2] += 1
    return taps


def weights_of_derivative():
    k = numpy.arange(1, MEMORY_S * RATE + 1)
    return numpy.concatenate([[1.0], numpy.cumprod(1 - (ORDER + 1) / k)]) * float(RATE) ** ORDER


def slow_band():
    low, high, width = 0.8 / 60, 10 / 60, 0.4 / 60
    taps, beta = signal.kaiserord(44 + 20 * numpy.log10(2), 2 * width / 2)
    make = lambda edge: signal.firwin(taps + 1 - taps % 2, edge, window=("kaiser", beta), fs=SLOW_RATE)
    return make(high) - make(low)


WEIGHTS = weights_of_derivative()
SLOW_SMOOTHING = signal.savgol_coeffs(SLOW_WINDOW, POLYNOMIAL)
HEART_SMOOTHING = signal.savgol_coeffs(HEART_WINDOW, POLYNOMIAL)
TO_4_HZ = low_pass(RATE, 0.25, 0.8, 66)
TO_4_HZ /= TO_4_HZ.sum()
SLOW_BAND = slow_band()
HEART_BAND = signal.convolve(high_pass(RATE, 0.25, 0.75, 60), low_pass(RATE, 32, 48, 60))
FOLDING = low_pass(RATE, 80, 125, 60)


def derived(x):
    return signal.oaconvolve(x, WEIGHTS)[: len(x)]


def plain(x):
    x = x - x.mean()
    return (signal.savgol_filter(derived(x), SLOW_WINDOW, POLYNOMIAL),
            derived(signal.savgol_filter(x, HEART_WINDOW, POLYNOMIAL)))


def fft(x):
    x = x - x.mean()
    return (signal.oaconvolve(derived(x), SLOW_SMOOTHING, mode="same"),
            derived(signal.oaconvolve(x, HEART_SMOOTHING, mode="same")))


def every_quarter_second(x, rate, taps):
    """A symmetric low-pass at the instants k / 4 s of a signal whose rate is a multiple of 4 Hz."""
    step, half = rate // SLOW_RATE, len(taps) // 2
    ahead = -half % step
    made = signal.upfirdn(numpy.concatenate([numpy.zeros(ahead), taps]), x, 1, step)
    first = (half + ahead) // step
    return made[first: first + (len(x) - 1) // step + 1]


def band(x):
    recorded = every_quarter_second(x, RATE, TO_4_HZ)
    slow = signal.oaconvolve(recorded, SLOW_BAND, mode="same")
    heart = signal.oaconvolve(x - x.mean(), HEART_BAND, mode="same")[::STEP]
    return recorded, slow, heart


def at_instants(x, rate):
    """The low-pass before 4 Hz at the instants k / 4 s, whatever the rate, by numpy.i0 and numpy.sinc."""
    taps, beta = signal.kaiserord(66, (0.8 - 0.25) / (rate / 2))
    half = (taps - taps % 2) / 2
    out = []
    for k in range(int((len(x) - 1) * SLOW_RATE / rate) + 1):
        place = k * rate / SLOW_RATE
        i = numpy.arange(max(0, int(numpy.ceil(place - half))), min(len(x), int(place + half) + 1))
        u = i - place
        w = numpy.i0(beta * numpy.sqrt(numpy.maximum(0, 1 - (u / half) ** 2))) * numpy.sinc(2 * 0.525 * u / rate)
        out.append(w @ x[i] / w.sum())
    return numpy.array(out)


def slow_gain():
    n, m = numpy.arange(len(WEIGHTS)), numpy.arange(SLOW_WINDOW) - SLOW_WINDOW // 2
    turn = -2j * numpy.pi * SLOW_SCALE_HZ / RATE
    return abs(WEIGHTS @ numpy.exp(turn * n)) * abs(SLOW_SMOOTHING @ numpy.exp(turn * m))


def heart_gain():
    m = numpy.arange(HEART_WINDOW) - HEART_WINDOW // 2
    derivative = (2 * numpy.sin(numpy.pi * HEART_SCALE_HZ / RATE) * RATE) ** ORDER
    return derivative * (HEART_SMOOTHING @ numpy.cos(2 * numpy.pi * HEART_SCALE_HZ / RATE * m))


def write(x, folder):
    slow, heart = plain(x)
    slow, heart = (signal.oaconvolve(part, FOLDING, mode="same")[::STEP] for part in (slow, heart))
    recorded, band_slow, band_heart = band(x)
    parts = {
        "fractional-slow": at_instants(slow, RATE // STEP) / slow_gain(), "fractional-heart": heart / heart_gain(),
        "band-recorded": recorded, "band-slow": band_slow, "band-heart": band_heart,
    }
    for name, part in parts.items():
        numpy.ascontiguousarray(part, dtype="<f8").tofile(folder / f"{name}.f64")


def main():
    x = numpy.fromfile(sys.argv[1], dtype="<f8")
    folder = pathlib.Path(sys.argv[2])
    pipelines = {"plain": plain, "fft": fft, "band": band, "write": lambda one: write(one, folder)}
    for line in sys.stdin:
        work = pipelines[line.strip()]
        processor, clock = time.process_time(), time.perf_counter()
        work(x)
        print(json.dumps({"processor_ms": 1000 * (time.process_time() - processor),
                          "clock_ms": 1000 * (time.perf_counter() - clock)}), flush=True)


main()
