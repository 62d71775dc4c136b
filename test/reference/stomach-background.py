"""False alarms of the test that a peak stands out of its epoch's own 1/f background.

An independent numpy version of the rule in src/stomach/background.ts, run on many epochs of 1/f^b
noise: how often the highest peak of 1-9 cpm is taken for a rhythm where 5 % are asked for. Also a few
epochs with every number of the rule, and the power to find a tone. Run with /usr/bin/python3 (about
two minutes); writes stomach-background.json beside this file.
"""
import json
import pathlib

import numpy

RATE = 4
EULER = 0.5772156649015329
random = numpy.random.RandomState(20260101)


def noise(exponent, seconds, count):
    """Epochs cut from long stretches of Gaussian noise whose power falls as 1/f^exponent."""
    n, out = seconds * RATE, []
    while len(out) < count:
        m = 1 << 19
        spectrum = random.standard_normal(m // 2 + 1) + 1j * random.standard_normal(m // 2 + 1)
        f = numpy.fft.rfftfreq(m, 1 / RATE)
        f[0] = f[1]
        x = numpy.fft.irfft(spectrum / f ** (exponent / 2), m)
        x *= 30 / x.std()
        out += [x[i:i + n] for i in range(0, m - n, n)]
    return out[:count]


def density(x):
    n = len(x)
    i = numpy.arange(n) - (n - 1) / 2
    x = x - x.mean()
    x = x - i * (x @ i) / (i @ i)
    taper = 0.5 - 0.5 * numpy.cos(2 * numpy.pi * numpy.arange(n) / n)
    size = 1 << int(numpy.ceil(numpy.log2(4 * n)))
    return 2 * numpy.abs(numpy.fft.rfft(x * taper, size)) ** 2 / (RATE * (taper @ taper)), 60 * RATE / size


def peaks(p, df):
    k = numpy.arange(1, len(p) - 1)
    k = k[(p[k] > p[k - 1]) & (p[k] > p[k + 1]) & (k * df < 10)]
    a, b, c = numpy.log(p[k - 1]), numpy.log(p[k]), numpy.log(p[k + 1])
    offset = 0.5 * (a - c) / (a - 2 * b + c)
    cpm, height = (k + offset) * df, numpy.exp(b - 0.25 * (a - c) * offset)
    inside = (cpm >= 1) & (cpm < 9)
    return cpm[inside], height[inside]


def judge(p, df, seconds, false_alarm=0.05):
    cpm, height = peaks(p, df)
    if len(cpm) == 0:
        return None
    best = numpy.argmax(height)
    peak, top = cpm[best], height[best]
    wide = 240 / seconds
    f = numpy.arange(len(p)) * df
    use = (f >= 0.5) & (f <= 15) & (numpy.abs(f - peak) >= 0.75 * wide)
    for ratio in (0.5, 2, 3):
        if ratio * peak >= wide:
            use &= numpy.abs(f - ratio * peak) >= 0.5 * wide
    x, y = numpy.log(f[use]), numpy.log(p[use])
    keep = numpy.ones(len(x), bool)
    for turn in range(2):
        mx, my = x[keep].mean(), y[keep].mean()
        squares = ((x[keep] - mx) ** 2).sum()
        slope = -min(3, max(0, -((x[keep] - mx) * (y[keep] - my)).sum() / squares))
        line = lambda at: my + slope * (at - mx)
        if turn == 0:
            keep = y - line(x) < 3
    per_value = 1.5 * 60 / seconds / df
    flanks = keep & (numpy.abs(f[use] - peak) <= 2.75 * wide)
    raised = 0
    if flanks.sum() >= 4 * per_value:
        raised = max(0, numpy.median((y - line(x))[flanks]) - numpy.log(numpy.log(2)) - EULER)
    leverage = per_value * (1 / keep.sum() + (numpy.log(peak) - mx) ** 2 / squares)
    cells = 8 * seconds / 60
    threshold = numpy.log(-numpy.log(1 - (1 - false_alarm) ** (1 / cells)))
    threshold += 0.12 * (numpy.log(false_alarm) / numpy.log(0.05)) ** 2 + 1.25 * leverage
    ratio = numpy.log(top) - line(numpy.log(peak)) - EULER - raised
    return {"peak_cpm": float(peak), "log_ratio": float(ratio), "leverage": float(leverage),
            "threshold": float(threshold), "raised": float(raised), "rhythm": bool(ratio > threshold)}


def alarms(exponent, seconds, count, false_alarm=0.05):
    judged = [judge(*density(x), seconds, false_alarm) for x in noise(exponent, seconds, count)]
    return sum(bool(one and one["rhythm"]) for one in judged) / count


def found(exponent, cpm, line_over_background, count):
    """Share of epochs in which a tone is found whose line stands so far above the mean background."""
    epochs = noise(exponent, 240, count)
    level = numpy.mean([density(x)[0] for x in epochs], axis=0)
    df = density(epochs[0])[1]
    amplitude = numpy.sqrt(line_over_background * level[int(round(cpm / df))] * 1.5 * 2 / 240)
    hits = 0
    for x in epochs:
        t = numpy.arange(len(x)) / RATE
        judged = judge(*density(x + amplitude * numpy.sin(2 * numpy.pi * cpm / 60 * t + random.uniform(0, 2 * numpy.pi))), 240)
        hits += bool(judged and judged["rhythm"] and abs(judged["peak_cpm"] - cpm) < 0.3)
    return hits / count


examples = []
for exponent in (0, 1, 2):
    for k, x in enumerate(noise(exponent, 240, 4)):
        x = numpy.round(x + (12 * numpy.sin(2 * numpy.pi * 0.05 * numpy.arange(960) / RATE) if k > 1 else 0), 2)
        examples.append({"exponent": exponent, "x": x.tolist(), "judged": judge(*density(x), 240)})

rates = [{"exponent": b, "epoch_s": s, "asked": 0.05, "epochs": 8000, "false_alarms": alarms(b, s, 8000)}
         for s in (180, 240, 300) for b in (0, 0.5, 1, 1.5, 2, 2.5)]
rates += [{"exponent": b, "epoch_s": 240, "asked": p, "epochs": 8000, "false_alarms": alarms(b, 240, 8000, p)}
          for p in (0.01, 0.1) for b in (0, 1, 2)]
power = [{"exponent": b, "cpm": c, "line_over_background": r, "found": found(b, c, r, 1000)}
         for b in (0, 1) for c in (1.5, 3, 5.5) for r in (10, 25, 50)]
result = {"made_by": "test/reference/stomach-background.py", "versions": {"numpy": numpy.__version__},
          "false_alarms": rates, "power": power, "examples": examples}
pathlib.Path(__file__).with_suffix(".json").write_text(json.dumps(result) + "\n")
for one in rates:
    print(one)
for one in power:
    print(one)
