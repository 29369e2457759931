"""Lomb-Scargle powers of seeded series by astropy's direct sums (method='slow', floating mean), recorded for the tests.

    python3 record-lomb-scargle.py            writes lomb-scargle.json beside this file
    python3 record-lomb-scargle.py --check    recomputes, compares, exits with 1 on a difference

Random numbers: Lehmer generator of Park & Miller (1988, Comm. ACM 31, 1192), x <- 16807 x mod (2^31 - 1), exact in
double arithmetic in any language; normal deviates by Box & Muller (1958), cosine branch, two uniforms each.
`lomb-scargle-series.ts` makes the same series.
"""
import json
import math
import os
import sys

import numpy as np
from astropy import __version__
from astropy.timeseries import LombScargle

HERE = os.path.dirname(os.path.abspath(__file__))
PATH = os.path.join(HERE, "lomb-scargle.json")
TOLERANCE = 1e-9

# Errors are drawn between low and high. Trial frequencies are k * step for k = 1 to count; one in `every` is recorded.
SERIES = [
    {"name": "even", "seed": 11, "kind": "even", "points": 900, "low": 0.001, "high": 0.001,
     "period": 1.7, "amplitude": 0.0008, "step": 0.011, "count": 1000, "record": 23},
    {"name": "errors of many sizes", "seed": 23, "kind": "uniform", "points": 400, "span": 31.0, "low": 0.0002,
     "high": 0.01, "period": 0.83, "amplitude": 0.001, "step": 0.0064, "count": 2000, "record": 41},
    {"name": "two runs and a gap", "seed": 37, "kind": "gap", "points": 500, "gap": 160.0, "low": 0.001,
     "high": 0.002, "period": 4.1, "amplitude": 0.002, "step": 0.001, "count": 3000, "record": 67},
    {"name": "irregular nights", "seed": 53, "kind": "nights", "points": 600, "nights": 30, "every": 2.0,
     "low": 0.001, "high": 0.004, "period": 0.617, "amplitude": 0.003, "step": 0.0033, "count": 4000, "record": 83},
    {"name": "few points", "seed": 71, "kind": "uniform", "points": 12, "span": 9.0, "low": 0.001, "high": 0.003,
     "period": 2.2, "amplitude": 0.004, "step": 0.022, "count": 200, "record": 7},
]
POWERS = [0.02, 0.1, 0.35]
PROBABILITIES = [0.1, 0.01, 0.001]


class Lehmer:
    def __init__(self, seed):
        self.x = seed

    def uniform(self):
        self.x = (16807 * self.x) % 2147483647
        return self.x / 2147483647

    def normal(self):
        radius = math.sqrt(-2.0 * math.log(self.uniform()))
        return radius * math.cos(2.0 * math.pi * self.uniform())


def times_of(spec, random):
    n = spec["points"]
    if spec["kind"] == "even":
        return [i / 48.0 for i in range(n)]
    if spec["kind"] == "uniform":
        return sorted(spec["span"] * random.uniform() for _ in range(n))
    if spec["kind"] == "gap":
        return [i / 48.0 + (spec["gap"] if 2 * i >= n else 0.0) for i in range(n)]
    each = n // spec["nights"]
    return sorted(spec["every"] * (i // each) + 0.33 * random.uniform() for i in range(n))


def make(spec):
    random = Lehmer(spec["seed"])
    time = times_of(spec, random)
    flux, error = [], []
    for t in time:
        sigma = spec["low"]
        if spec["high"] > spec["low"]:
            sigma += (spec["high"] - spec["low"]) * random.uniform()
        flux.append(1.0 + spec["amplitude"] * math.cos(2.0 * math.pi * t / spec["period"]) + sigma * random.normal())
        error.append(sigma)
    return np.array(time), np.array(flux), np.array(error)


def search(spec):
    time, flux, error = make(spec)
    model = LombScargle(time, flux, error, fit_mean=True, center_data=True, normalization="standard")
    trials = np.arange(1, spec["count"] + 1)
    power = model.power(trials * spec["step"], method="slow")
    best = int(np.argmax(power[1:])) + 1
    recorded = trials[spec["record"] - 1::spec["record"]]
    highest = spec["count"] * spec["step"]
    offset, sine, cosine = model.model_parameters(trials[best] * spec["step"])
    return {
        "spec": spec,
        "last": [float(time[-1]), float(flux[-1]), float(error[-1])],
        "trials": recorded.tolist(),
        "power": power[recorded - 1].tolist(),
        "best": {"trial": int(trials[best]), "power": float(power[best]), "amplitude": float(math.hypot(sine, cosine))},
        # astropy takes the end of its own grid for the highest frequency.
        "highest": float(np.max(model.autofrequency(maximum_frequency=highest))),
        "falseAlarms": [float(model.false_alarm_probability(z, method="baluev", maximum_frequency=highest))
                        for z in POWERS],
        "levels": [float(model.false_alarm_level(p, method="baluev", maximum_frequency=highest))
                   for p in PROBABILITIES],
    }


def differences(old, new, where=""):
    if isinstance(new, dict):
        if sorted(old) != sorted(new):
            return ["%s: keys differ" % where]
        return [line for key in new for line in differences(old[key], new[key], where + "/" + key)]
    if isinstance(new, list):
        if len(old) != len(new):
            return ["%s: lengths differ" % where]
        return [line for i, (a, b) in enumerate(zip(old, new)) for line in differences(a, b, "%s/%d" % (where, i))]
    if isinstance(new, float):
        return [] if abs(old - new) <= TOLERANCE * max(1.0, abs(new)) else ["%s: %r, now %r" % (where, old, new)]
    return [] if old == new else ["%s: %r, now %r" % (where, old, new)]


def main():
    recorded = {
        "source": "astropy %s LombScargle, fit_mean=True, method='slow'" % __version__,
        "powers": POWERS,
        "probabilities": PROBABILITIES,
        "series": [search(spec) for spec in SERIES],
    }
    if "--check" not in sys.argv:
        with open(PATH, "w") as file:
            json.dump(recorded, file, indent=1)
        return 0
    with open(PATH) as file:
        found = differences(json.load(file), recorded)
    print("\n".join(found[:20]) or "no difference")
    return 1 if found else 0


if __name__ == "__main__":
    sys.exit(main())
