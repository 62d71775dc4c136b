"""Quantiles of the moving-block bootstrap, drawn with a Mersenne Twister written out here.

The generator is that of Matsumoto & Nishimura 1998, seeded as they do; its first numbers are checked against numpy's
RandomState, which is seeded alike. Run with /usr/bin/python3; writes numeric-bootstrap.json beside this file.
"""
import json
import math
import pathlib

import numpy


class Twister:
    def __init__(self, seed):
        self.words = [seed]
        for i in range(1, 624):
            last = self.words[-1]
            self.words.append((1812433253 * (last ^ (last >> 30)) + i) % 2 ** 32)
        self.place = 624

    def uint32(self):
        if self.place == 624:
            for i in range(624):
                y = (self.words[i] & 0x80000000) | (self.words[(i + 1) % 624] & 0x7FFFFFFF)
                self.words[i] = self.words[(i + 397) % 624] ^ (y >> 1) ^ (0x9908B0DF if y % 2 else 0)
            self.place = 0
        y = self.words[self.place]
        self.place += 1
        y ^= y >> 11
        y ^= (y << 7) & 0x9D2C5680
        y ^= (y << 15) & 0xEFC60000
        return y ^ (y >> 18)

    def below(self, count):
        limit = 2 ** 32 - 2 ** 32 % count
        while True:
            drawn = self.uint32()
            if drawn < limit:
                return drawn % count


STATISTICS = {
    "mean": lambda x: float(numpy.add.accumulate(x)[-1] / len(x)),
    "median": lambda x: float(numpy.median(x)),
    "largest step": lambda x: float(max(abs(numpy.diff(x)))),
    "odd ones only": lambda x: math.nan if x[0] < 0 else float(x[-1]),
}


def case(x, block, replicates, seed, statistic):
    draw, n, found = Twister(seed), len(x), []
    for _ in range(replicates):
        places = []
        while len(places) < n:
            first = draw.below(n - block + 1)
            places += range(first, first + block)
        found.append(STATISTICS[statistic](x[places[:n]]))
    found = [value for value in found if math.isfinite(value)]
    quantiles = [0.025, 0.5, 0.9, 0.975, 1.0]
    return {"x": x.tolist(), "block": block, "replicates": replicates, "seed": seed, "statistic": statistic,
            "used": len(found), "quantiles": [[q, float(numpy.quantile(found, q))] for q in quantiles]}


check, ours = numpy.random.RandomState(1974), Twister(1974)
theirs = numpy.frombuffer(check.bytes(4 * 1300), dtype="<u4")
assert [ours.uint32() for _ in range(1300)] == theirs.tolist()
walk = numpy.round(numpy.random.RandomState(8).standard_normal(57).cumsum(), 3)
result = {
    "made_with": {"numpy": numpy.__version__},
    "cases": [case(walk, 5, 400, 1, "mean"), case(walk, 1, 300, 20, "median"), case(walk, 57, 20, 3, "mean"),
              case(walk, 8, 500, 4294967295, "largest step"), case(walk, 10, 250, 77, "odd ones only")],
}
pathlib.Path(__file__).with_suffix(".json").write_text(json.dumps(result) + "\n")
