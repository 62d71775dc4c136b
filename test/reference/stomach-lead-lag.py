"""Two invented leads of one slow wave, the second 1.6 s later, with noise of their own: coherence and cross-phase at DF by
scipy.signal, the segments' worth by the definitions, the gains of a Gaussian band by numpy's transform.

Run with python3 (numpy, scipy); writes stomach-lead-lag.json.
"""
import json
import pathlib

import numpy
import scipy
from scipy import signal

RATE, LAG, MINUTES = 4.0, 1.6, 10
random = numpy.random.RandomState(11)
fine = numpy.arange(int((MINUTES * 60 + 4) * 40)) / 40
wander = numpy.convolve(random.standard_normal(len(fine)), numpy.ones(2400) / 2400, "same")
wander *= 0.1 / wander.std()
cycles = numpy.cumsum((3 + wander) / 60 / 40)
wave = 100 * numpy.cos(2 * numpy.pi * cycles)
at = numpy.arange(int(MINUTES * 60 * RATE)) / RATE


def lead(delay, noise):
    clean = numpy.interp(at + 2 - delay, fine, wave)
    coloured = signal.lfilter([1], [1, -0.97], random.standard_normal(len(at)))
    return numpy.round(clean + noise * coloured / coloured.std(), 2)


def worth(taper, count, step, power):
    squares = (taper ** 2).sum()
    excess = sum((1 - j / count) * ((taper[:len(taper) - j * step] * taper[j * step:]).sum() / squares) ** power
                 for j in range(1, count) if j * step < len(taper))
    return count / (1 + 2 * excess)


def pair_case(x, y, segment_s, step_s, nfft):
    length, step = int(segment_s * RATE), int(step_s * RATE)
    options = dict(fs=RATE, window="hann", nperseg=length, noverlap=length - step, nfft=nfft, detrend="linear")
    frequencies, cross = signal.csd(x, y, **options)
    _, coherence = signal.coherence(x, y, **options)
    k = int(round(0.05 * nfft / RATE))
    count = (len(x) - length) // step + 1
    taper = signal.get_window("hann", length)
    averages, looks = worth(taper, count, step, 2), worth(taper, count, step, 1)
    c = float(coherence[k])
    return {"segmentS": segment_s, "stepS": step_s, "segments": count, "averages": averages, "looks": looks, "freqHz": float(frequencies[k]), "coherence": c,
            "phaseRad": float(numpy.angle(cross[k])), "lagS": float(-numpy.angle(cross[k]) / (2 * numpy.pi * frequencies[k])),
            "level": 1 - 0.05 ** (1 / (averages - 1)), "phaseSd": ((1 - c) / (2 * c * looks)) ** 0.5}


def band_case(centre, half_width):
    """Gains of the Gaussian band about its centre, from its definition in frequency."""
    offsets = numpy.array([-2, -1, -0.5, 0, 0.5, 1, 2]) * half_width
    return {"centreHz": centre, "halfWidthHz": half_width, "freqsHz": (centre + offsets).tolist(),
            "gains": (2.0 ** -((offsets / half_width) ** 2)).tolist()}


first, second = lead(0, 30), lead(LAG, 40)
result = {
    "made_with": {"scipy": scipy.__version__, "numpy": numpy.__version__},
    "lagS": LAG, "first": first.tolist(), "second": second.tolist(),
    "pairs": [pair_case(first, second, 120, 30, 2048), pair_case(first, second, 60, 15, 2048),
              pair_case(second, first, 120, 30, 2048)],
    "bands": [band_case(0.05, 0.5 / 60), band_case(0.1, 0.5 / 60)],
}
pathlib.Path(__file__).with_suffix(".json").write_text(json.dumps(result) + "\n")
