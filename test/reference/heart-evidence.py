"""Weights of the evidence that a place is a beat (src/heart/evidence.ts), by logistic regression (Cox 1958).

Run with /usr/bin/python3; reads heart-evidence-places.csv beside this file and writes heart-evidence.json.
The places are 10000 drawn at random from the 426118 that the first passes weighed in the 48 invented surface ECGs of
`npm run bench -- heartbeats` (seeds 1 to 48, 600 s each) as recorded and at 100, 50 and 25 uV; all data invented. A place
is a beat where it has the greatest evidence within 0.1 s of a true one; other places within 0.13 s of one are left out.
They were drawn while the detector was built; `EVIDENCE_PLACES=PATH npm run bench -- evidence` draws the like anew, from shapes
learned of the beats found in the end (2026-12-01, 24 records of 300 s: unlike -5.2, small 2.6, share 0.78, quick 0.8, over
noise 0.61, energy 0.92, wave cost 0.40).
Columns: beat (1 or 0), unlike (log of the part of the window's amplitude that the shape leaves over, from -3.5), size
(log, beside the beats near it), share (log), like_wave (0 to 1), quick (log of QRS over shape band), over_noise (log, -2 to
5), energy (log, beside the usual beat), wave_cost (of the T wave's time and energy).
Weights of all 426118 places were: constant -2.81, unlike -4.02, small 2.46, large -0.52, share 0.47, like wave -17.87,
quick 3.24, over noise 0.63, energy 1.25, more energy -3.22, wave cost 0.36; the program rounds these.
"""
import json
import pathlib

import numpy

HERE = pathlib.Path(__file__).parent
RIDGE = 1e-5
rows = numpy.genfromtxt(HERE / "heart-evidence-places.csv", delimiter=",", names=True)
beat = rows["beat"]


def above(x, least):
    return numpy.maximum(0, x - least)


features = {
    "constant": numpy.ones(len(beat)),
    "unlike": rows["unlike"],
    "small": numpy.minimum(rows["size"], 0),
    "large": above(rows["size"], 0),
    "share": rows["share"],
    "likeWave": above(rows["like_wave"], 0.8),
    "quick": above(rows["quick"], -0.3),
    "overNoise": rows["over_noise"],
    "energy": above(rows["energy"], -1.2),
    "moreEnergy": above(rows["energy"], 0),
    "waveCost": rows["wave_cost"],
}
x = numpy.stack(list(features.values()), 1)
scale = x.std(0)
scale[0] = 1
z = x / scale
b = numpy.zeros(z.shape[1])
for _ in range(40):
    p = 1 / (1 + numpy.exp(-z @ b))
    slope = z.T @ (p - beat) + RIDGE * len(beat) * b
    bend = (z * (p * (1 - p))[:, None]).T @ z + RIDGE * len(beat) * numpy.eye(len(b))
    b -= numpy.linalg.solve(bend, slope)
covariance = numpy.linalg.inv(bend)
weights = {name: round(float(w), 4) for name, w in zip(features, b / scale)}
errors = {name: round(float(e), 4) for name, e in zip(features, numpy.sqrt(numpy.diag(covariance)) / scale)}
out = {
    "made by": f"heart-evidence.py, numpy {numpy.__version__}",
    "places": len(beat),
    "weights": weights,
    "standardErrors": errors,
}
(HERE / "heart-evidence.json").write_text(json.dumps(out, indent=1) + "\n")
