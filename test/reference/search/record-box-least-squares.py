"""Box least squares of seeded series by astropy's brute-force method (unbinned), recorded for the tests.

    python3 record-box-least-squares.py            writes box-least-squares.json beside this file
    python3 record-box-least-squares.py --check    recomputes, compares, exits with 1 on a difference

Random numbers: Lehmer generator of Park & Miller (1988, Comm. ACM 31, 1192), x <- 16807 x mod (2^31 - 1), exact in
double arithmetic in any language; normal deviates by Box & Muller (1958), cosine branch, two uniforms each.
`seeded-series.ts` makes the same series.
"""
import json
import math
import os
import sys

import numpy as np
from astropy.timeseries import BoxLeastSquares

HERE = os.path.dirname(os.path.abspath(__file__))
PATH = os.path.join(HERE, "box-least-squares.json")
TOLERANCE = 1e-9

# Signal: period, epoch, duration, depth; errors are drawn between low and high.
SERIES = [
    {"name": "even", "seed": 42, "kind": "even", "points": 1500, "low": 0.001, "high": 0.001,
     "period": 3.3, "epoch": 1.1, "duration": 0.12, "depth": 0.004},
    {"name": "irregular", "seed": 101, "kind": "uniform", "points": 600, "span": 40.0, "low": 0.0005, "high": 0.002,
     "period": 2.7183, "epoch": 0.7, "duration": 0.16, "depth": 0.003},
    {"name": "nights", "seed": 202, "kind": "nights", "points": 720, "nights": 12, "every": 4.3, "low": 0.001,
     "high": 0.004, "period": 1.6234, "epoch": 0.05, "duration": 0.11, "depth": 0.006},
    {"name": "noise", "seed": 303, "kind": "uniform", "points": 500, "span": 25.0, "low": 0.001, "high": 0.0015,
     "period": 2.0, "epoch": 0.0, "duration": 0.1, "depth": 0.0},
]
DURATIONS = [0.08, 0.12, 0.18]
OVERSAMPLE = 20


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
    each = n // spec["nights"]
    return sorted(spec["every"] * (i // each) + 0.33 * random.uniform() for i in range(n))


def make(spec):
    random = Lehmer(spec["seed"])
    time = times_of(spec, random)
    half = 0.5 * spec["period"]
    flux, error = [], []
    for t in time:
        sigma = spec["low"]
        if spec["high"] > spec["low"]:
            sigma += (spec["high"] - spec["low"]) * random.uniform()
        x = (t - spec["epoch"] + half) % spec["period"] - half
        dip = spec["depth"] if abs(x) <= 0.5 * spec["duration"] else 0.0
        flux.append(1.0 - dip + sigma * random.normal())
        error.append(sigma)
    return np.array(time), np.array(flux), np.array(error)


def periods_of(spec):
    random = Lehmer(spec["seed"] + 7)
    near = [spec["period"] * (1 + 0.0005 * k) for k in range(-1, 2)]
    return sorted(near + [0.8 + 9.0 * random.uniform() for _ in range(5)])


def search(spec):
    time, flux, error = make(spec)
    model = BoxLeastSquares(time, flux, dy=error)
    periods = np.array(periods_of(spec))
    out = {"spec": spec, "durations": DURATIONS, "oversample": OVERSAMPLE, "sum": float(np.sum(flux)),
           "last": [float(time[-1]), float(flux[-1]), float(error[-1])], "periods": periods.tolist()}
    for objective in ("snr", "likelihood"):
        # Empty boxes divide by zero there and lose every comparison.
        with np.errstate(all="ignore"):
            found = model.power(periods, DURATIONS, objective=objective, method="slow", oversample=OVERSAMPLE)
        out[objective] = {
            "power": found.power.tolist(), "depth": found.depth.tolist(), "depthError": found.depth_err.tolist(),
            "signalToNoise": found.depth_snr.tolist(), "duration": found.duration.tolist(),
            "epoch": found.transit_time.tolist()}
    return out


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
    recorded = {"source": "astropy BoxLeastSquares, method='slow'", "series": [search(spec) for spec in SERIES]}
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
