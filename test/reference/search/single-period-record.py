"""Posterior of the period of a single transit by brute force, recorded for the tests.

    python3 single-period-record.py            writes single-period.json beside this file
    python3 single-period-record.py --check    recomputes, compares, exits with 1 on a difference

Independent of the kernel: a double sum over the log of the density and the impact parameter of the forward formula for
T14 (Seager & Mallen-Ornelas 2003, ApJ 585, 1038, eq. 3), with the prior of Kipping (2018, RNAAS 2, 223): even in ln P,
1/P for the window, R/a for the geometry. In the limit of an exact density and duration the posterior is that of
u = (Pmin/P)^(2/3) distributed as Beta(7/2, 1/2), Pmin the period of a central transit (derived here: with
T = Tc(P) sqrt(1 - b^2/(1+k)^2), Tc as P^(1/3), p(ln P) is P^(-5/3) u / sqrt(1 - u)).
"""
import json
import math
import os
import sys

import numpy as np
from scipy.stats import beta

HERE = os.path.dirname(os.path.abspath(__file__))
PATH = os.path.join(HERE, "single-period.json")
TOLERANCE = 1e-7
# CODATA 2018 and the nominal Sun of IAU 2015 Resolution B3.
G = 6.6743e-11
DAY = 86400.0

CASES = [
    {"name": "well-known star", "duration": 0.3, "durationLogError": 0.02, "density": 1.41, "densityLogError": 0.1,
     "k": 0.1},
    {"name": "unknown star", "duration": 0.25, "durationLogError": 0.1, "density": 1.41,
     "densityLogError": math.log(5), "k": 0.05},
    {"name": "exact star", "duration": 0.4, "durationLogError": 0.03, "density": 0.5, "densityLogError": 0.0,
     "k": 0.12},
    {"name": "short orbit", "duration": 0.12, "durationLogError": 0.05, "density": 2.0, "densityLogError": 0.2,
     "k": 0.15},
]
FACTORS = [0.3, 0.6, 0.9, 1.0, 1.2, 2.0, 5.0, 20.0]


def scaled_axis(period, density):
    return np.cbrt(G * density * 1000.0 * (period * DAY) ** 2 / (3 * math.pi))


def transit_duration(period, density, k, b):
    axis = scaled_axis(period, density)
    with np.errstate(invalid="ignore"):
        ratio = np.sqrt(((1 + k) ** 2 - b * b) / (axis * axis - b * b))
    inside = (axis > 1 + k) & (ratio < 1)
    return np.where(inside, period / math.pi * np.arcsin(np.where(inside, ratio, 0.0)), np.nan)


def central_period(case):
    """By bisection: the period whose central transit lasts as long as the observed one."""
    low, high = 3 * case["duration"], 1e9
    for _ in range(200):
        middle = math.sqrt(low * high)
        longer = transit_duration(middle, case["density"], case["k"], 0.0)
        low, high = (low, middle) if not longer < case["duration"] else (middle, high)
    return math.sqrt(low * high)


def posterior(period, case, width=8.0):
    k = case["k"]
    if case["densityLogError"] > 0:
        offsets = np.linspace(-width, width, 161)
        weights = np.exp(-0.5 * offsets**2)
        densities = case["density"] * np.exp(offsets * case["densityLogError"])
        nodes = 800
    else:
        weights, densities, nodes = np.ones(1), np.array([case["density"]]), 40000
    angle = (np.arange(nodes) + 0.5) / nodes * math.pi / 2
    b = (1 + k) * np.sin(angle)
    total = 0.0
    for weight, density in zip(weights, densities):
        predicted = transit_duration(period, density, k, b)
        miss = (np.log(case["duration"]) - np.log(predicted)) / case["durationLogError"]
        likelihood = np.where(np.isfinite(miss), np.exp(-0.5 * miss**2), 0.0)
        total += weight * np.sum(likelihood * np.cos(angle)) / nodes / scaled_axis(period, density)
    return total / (np.sum(weights) * period)


def quantiles(case):
    """Of the posterior of an event with no other data at all, on a log grid that the result hardly depends on."""
    edges = np.geomspace(3 * case["duration"], 36525.0, 601)
    middles = np.sqrt(edges[1:] * edges[:-1])
    values = np.array([posterior_fast(period, case) for period in middles])
    cumulative = np.concatenate([[0.0], np.cumsum(values)]) / np.sum(values)
    return [float(np.exp(np.interp(part, cumulative, np.log(edges)))) for part in (0.16, 0.5, 0.84)]


def posterior_fast(period, case):
    offsets = np.linspace(-6, 6, 49) if case["densityLogError"] > 0 else np.zeros(1)
    nodes = 300 if case["densityLogError"] > 0 else 4000
    angle = (np.arange(nodes) + 0.5) / nodes * math.pi / 2
    density = (case["density"] * np.exp(offsets * case["densityLogError"]))[:, None]
    predicted = transit_duration(period, density, case["k"], ((1 + case["k"]) * np.sin(angle))[None, :])
    miss = (math.log(case["duration"]) - np.log(predicted)) / case["durationLogError"]
    likelihood = np.where(np.isfinite(miss), np.exp(-0.5 * miss**2), 0.0) * np.cos(angle)[None, :]
    each = np.exp(-0.5 * offsets**2) / scaled_axis(period, density[:, 0])
    return float(np.sum(each * likelihood.sum(axis=1)) / period)


def record():
    cases = []
    for case in CASES:
        central = central_period(case)
        periods = [factor * central for factor in FACTORS if factor * central > 3 * case["duration"]]
        values = [float(posterior(period, case)) for period in periods]
        reference = values[periods.index(central)]
        cases.append({**case, "centralPeriod": central, "periods": periods,
                      "relative": [value / reference for value in values], "quantiles": quantiles(case)})
    # P = Pmin u^(-3/2): a low period is a high u.
    limit = [float(beta.ppf(part, 3.5, 0.5) ** -1.5) for part in (0.84, 0.5, 0.16)]
    return {"source": "numpy double sum; scipy.stats.beta for the limit", "cases": cases, "limitQuantiles": limit}


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
