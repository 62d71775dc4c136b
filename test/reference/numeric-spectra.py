"""Fourier transforms, periodogram, Welch and Lomb-Scargle spectra by numpy and scipy.

Run with /usr/bin/python3; writes numeric-spectra.json beside this file.
"""
import json
import pathlib

import numpy
import scipy
from scipy import signal

random = numpy.random.RandomState(3)


def complex_case(n):
    z = numpy.round(random.standard_normal(2 * n), 6)
    spectrum = numpy.fft.fft(z[0::2] + 1j * z[1::2])
    return {"size": n, "input": z.tolist(), "output": numpy.column_stack([spectrum.real, spectrum.imag]).ravel().tolist()}


def periodogram_case(n, size, rate):
    x = numpy.round(random.standard_normal(n), 6)
    _, density = signal.periodogram(x, fs=rate, window="hann", nfft=size, detrend=False, scaling="density")
    return {"rate": rate, "size": size, "x": x.tolist(), "density": density.tolist()}


def welch_case(detrend, name):
    x = numpy.round(random.standard_normal(500).cumsum() * 0.2 + numpy.arange(500) * 0.03, 6)
    _, density = signal.welch(x, fs=4, window="hann", nperseg=128, noverlap=96, nfft=256, detrend=detrend)
    return {"detrend": name, "x": x.tolist(), "density": density.tolist()}


def lomb_case(n, freqs):
    times = numpy.round(numpy.cumsum(0.8 + 0.1 * random.standard_normal(n)) + 1000, 6)
    values = numpy.round(20 * numpy.sin(2 * numpy.pi * 0.1 * times) + random.standard_normal(n) + 800, 6)
    power = signal.lombscargle(times, values - values.mean(), 2 * numpy.pi * freqs)
    return {"times": times.tolist(), "values": values.tolist(), "freqs": freqs.tolist(), "power": power.tolist()}


times = numpy.array([0, 0.8, 1.7, 2.5, 3.6, 4.4, 5.1, 6.3, 7.0, 8.2])
result = {
    "made_with": {"scipy": scipy.__version__, "numpy": numpy.__version__},
    "fft": [complex_case(n) for n in (2, 4, 8, 16, 32, 64, 128)],
    "dft": [complex_case(n) for n in (1, 3, 5, 12, 60, 97)],
    "periodogram": [periodogram_case(60, 256, 4.0), periodogram_case(60, 60, 4.0), periodogram_case(45, 45, 250.0)],
    "welch": [welch_case("constant", "mean"), welch_case("linear", "line"), welch_case(False, "none")],
    "lombScargle": [lomb_case(40, numpy.linspace(0.005, 0.6, 120)), lomb_case(33, numpy.array([0.01, 0.05, 0.31, 0.4]))],
}
pathlib.Path(__file__).with_suffix(".json").write_text(json.dumps(result, indent=1) + "\n")
