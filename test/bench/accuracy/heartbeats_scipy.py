"""A plain detector of heartbeats, for a sanity level beside our own: scipy's zero-phase band-pass of 5-20 Hz, the running
root mean square over 0.1 s, crests over a running threshold, a refractory period, a rule for T waves, and a second look
with half of the threshold where an interval is over 1.66 times the usual. The steps are those of textbooks (Pan and
Tompkins 1985, from memory); the code is this project's own.

usage: heartbeats_scipy.py RATE FILE...   each FILE one lead as float64 in uV
prints one line of JSON a file: the times of its beats in s
"""

import json
import sys

import numpy as np
from scipy import ndimage, signal

REFRACTORY_S = 0.25
T_WAVE_S = 0.36


def thresholds(energy, crests, rate):
    """Part of the usual height of the greatest crest in 2 s, over some 20 s, but over the level between beats."""
    width = int(2 * rate)
    greatest = ndimage.maximum_filter1d(energy, width)[:: width // 2]
    usual = ndimage.median_filter(greatest, 21, mode="nearest")
    usual = np.repeat(usual, width // 2)[: len(energy)]
    usual = np.pad(usual, (0, len(energy) - len(usual)), mode="edge")
    quiet = ndimage.percentile_filter(energy[:: rate // 10], 25, size=21)
    quiet = np.repeat(quiet, rate // 10)[: len(energy)]
    quiet = np.pad(quiet, (0, len(energy) - len(quiet)), mode="edge")
    return np.maximum(0.35 * usual, quiet + 0.15 * usual)[crests]


def accept(crests, height, limit, slope, rate):
    """Crests over the limit, T waves and what comes within the refractory period left out."""
    taken = []
    for k, at in enumerate(crests):
        if height[k] < limit[k]:
            continue
        if taken:
            last = taken[-1]
            apart = (at - crests[last]) / rate
            if apart < REFRACTORY_S:
                if height[k] > height[last]:
                    taken[-1] = k
                continue
            if apart < T_WAVE_S and slope[k] < 0.55 * slope[last]:
                continue
        taken.append(k)
    return taken


def beats_of(lead, rate):
    sos = signal.butter(3, [5, 20], btype="bandpass", fs=rate, output="sos")
    band = signal.sosfiltfilt(sos, lead)
    energy = np.sqrt(ndimage.uniform_filter1d(band**2, int(0.1 * rate)))
    crests, _ = signal.find_peaks(energy, distance=int(0.12 * rate))
    height = energy[crests]
    steep = ndimage.maximum_filter1d(np.abs(np.diff(band, append=band[-1])), int(0.1 * rate))
    slope = steep[crests]
    limit = thresholds(energy, crests, rate)
    taken = accept(crests, height, limit, slope, rate)
    for _ in range(2):
        more = set(taken)
        times = crests[taken]
        for i in range(1, len(taken)):
            rr = np.diff(times[max(0, i - 8) : i + 8])
            if len(rr) < 2 or times[i] - times[i - 1] < 1.66 * np.median(rr):
                continue
            between = [
                k
                for k in range(taken[i - 1] + 1, taken[i])
                if crests[k] - times[i - 1] > T_WAVE_S * rate
                and times[i] - crests[k] > REFRACTORY_S * rate
                and height[k] > 0.5 * limit[k]
            ]
            if between:
                more.add(max(between, key=lambda k: height[k]))
        taken = sorted(more)
    return [round(float(at) / rate, 4) for at in crests[taken]]


def main():
    rate = int(sys.argv[1])
    for path in sys.argv[2:]:
        print(json.dumps(beats_of(np.fromfile(path), rate)), flush=True)


main()
