"""Level, slope and depth of a trapezoid by numpy's least squares, recorded for the tests.

    python3 single-template-record.py            writes single-template.json beside this file
    python3 single-template-record.py --check    recomputes, compares, exits with 1 on a difference

Irregular times and errors from the Lehmer generator of `seeded-series.ts` (Park & Miller 1988, Box & Muller 1958).
"""
import json
import math
import os
import sys

import numpy as np

HERE = os.path.dirname(os.path.abspath(__file__))
PATH = os.path.join(HERE, "single-template.json")
TOLERANCE = 1e-9
SEED, POINTS, SPAN = 5, 400, 8.0
# Centre, duration, ingress (0: box); the window is the event and two durations on either side.
TEMPLATES = [(3.1, 0.8, 0.0), (4.0, 0.5, 0.125), (5.2, 0.9, 0.45), (2.5, 0.4, 0.02), (4.6, 1.0, 0.1)]


class Lehmer:
    def __init__(self, seed):
        self.x = seed

    def uniform(self):
        self.x = (16807 * self.x) % 2147483647
        return self.x / 2147483647

    def normal(self):
        radius = math.sqrt(-2.0 * math.log(self.uniform()))
        return radius * math.cos(2.0 * math.pi * self.uniform())


def make():
    random = Lehmer(SEED)
    time = np.array(sorted(SPAN * random.uniform() for _ in range(POINTS)))
    error, flux = [], []
    for t in time:
        sigma = 0.001 + 0.002 * random.uniform()
        error.append(sigma)
        flux.append(1.0 + 0.004 * t + sigma * random.normal() - (0.01 if abs(t - 4.0) < 0.25 else 0.0))
    return time, np.array(flux), np.array(error)


def fit(time, flux, error, centre, duration, ingress, has_slope):
    inside = duration / 2 - np.abs(time - centre)
    shape = np.where(inside > 0, np.minimum(1.0, inside / ingress) if ingress > 0 else 1.0, 0.0)
    kept = np.abs(time - centre) < 2.5 * duration
    columns = [np.ones_like(time), -shape] + ([time - centre] if has_slope else [])
    design = np.stack(columns, axis=1)[kept] / error[kept, None]
    solution = np.linalg.lstsq(design, flux[kept] / error[kept], rcond=None)[0]
    covariance = np.linalg.inv(design.T @ design)
    return {"depth": float(solution[1]), "depthError": float(math.sqrt(covariance[1, 1])),
            "pointsInside": int(np.sum(inside > 0))}


def record():
    time, flux, error = make()
    fits = []
    for centre, duration, ingress in TEMPLATES:
        base = {"centre": centre, "duration": duration, "ingress": ingress}
        fits.append({**base, "sloped": fit(time, flux, error, centre, duration, ingress, True),
                     "level": fit(time, flux, error, centre, duration, ingress, False)})
    return {"source": "numpy.linalg.lstsq", "seed": SEED, "points": POINTS, "span": SPAN,
            "sum": float(np.sum(flux)), "fits": fits}


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
    recorded = record()
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
