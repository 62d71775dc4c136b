"""Lomb-Scargle and the spectra of epochs by scipy, for `npm run bench`: times on standard output.

Arguments: files of float64 values: times and lengths of RR intervals (s, ms), the lead at 4 Hz (uV); how often each
pipeline is run within one time. Each line of standard input names a pipeline, each answer is one JSON line.

  lomb    lombscargle of every 5 min segment on the same grid as ours, 1 / T from 0.04 Hz to 0.4 Hz
  epochs  line taken off, Hann, 4096 points: periodogram of every epoch of 240 s, a minute apart
"""
import json
import sys
import time

import numpy
from scipy import signal

SEGMENT_S, LOW_HZ, HIGH_HZ = 300, 0.04, 0.4
RATE, EPOCH, STEP, POINTS = 4, 960, 240, 4096
TAPER = signal.get_window("hann", EPOCH)


def lomb(times, intervals, _lead):
    powers = []
    for k in range(int(times[-1] // SEGMENT_S)):
        inside = (times >= k * SEGMENT_S) & (times < (k + 1) * SEGMENT_S)
        t, y = times[inside], intervals[inside]
        y = y - numpy.polyval(numpy.polyfit(t - t[0], y, 1), t - t[0])
        length = (t[-1] - t[0]) * len(t) / (len(t) - 1)
        grid = numpy.arange(numpy.floor(LOW_HZ * length), numpy.ceil(HIGH_HZ * length) + 1) / length
        powers.append(signal.lombscargle(t - t[0], y, 2 * numpy.pi * grid))
    return powers


def epochs(_times, _intervals, lead):
    return [signal.periodogram(signal.detrend(lead[first:first + EPOCH]), RATE, TAPER, POINTS, False)
            for first in range(0, len(lead) - EPOCH + 1, STEP)]


def main():
    data = [numpy.fromfile(path, dtype="<f8") for path in sys.argv[1:4]]
    repeats = int(sys.argv[4])
    pipelines = {"lomb": lomb, "epochs": epochs}
    for line in sys.stdin:
        work = pipelines[line.strip()]
        processor, clock = time.process_time(), time.perf_counter()
        for _ in range(repeats):
            work(*data)
        print(json.dumps({"processor_ms": 1000 * (time.process_time() - processor) / repeats,
                          "clock_ms": 1000 * (time.perf_counter() - clock) / repeats}), flush=True)


main()
