"""Smoothing filters, splines and principal components by scipy and numpy, recorded for the tests.

    python3 record-trends.py            writes trends.json beside this file
    python3 record-trends.py --check    recomputes, compares, exits with 1 on a difference

Random numbers: Lehmer generator of Park & Miller (1988, Comm. ACM 31, 1192) and normal deviates by Box & Muller (1958),
as in `../search/seeded-series.ts`.
"""
import json
import math
import os
import sys

import numpy as np
from scipy.interpolate import BSpline, make_smoothing_spline
from scipy.ndimage import median_filter
from scipy.signal import savgol_filter

HERE = os.path.dirname(os.path.abspath(__file__))
PATH = os.path.join(HERE, "trends.json")
TOLERANCE = 1e-9
POINTS = 240


class Lehmer:
    def __init__(self, seed):
        self.x = seed

    def uniform(self):
        self.x = (16807 * self.x) % 2147483647
        return self.x / 2147483647

    def normal(self):
        radius = math.sqrt(-2.0 * math.log(self.uniform()))
        return radius * math.cos(2.0 * math.pi * self.uniform())


def series(kind, seed):
    random = Lehmer(seed)
    time, flux, at = [], [], 0.0
    for i in range(POINTS):
        at = i / 48.0 if kind == "even" else at + (0.4 + 1.2 * random.uniform()) / 48.0
        time.append(at)
        flux.append(1.0 + 0.01 * math.sin(2.0 * math.pi * at / 1.3) + 0.002 * random.normal())
    return np.array(time), np.array(flux)


def local_polynomial(time, flux, half, degree):
    """Least squares through the points within `half` on each side, at each time."""
    values = []
    for at in time:
        near = np.abs(time - at) <= half
        values.append(np.polyfit(time[near] - at, flux[near], degree)[-1])
    return values


def savitzky_golay(time, flux):
    rows = []
    for points, degree in ((5, 2), (11, 3), (25, 4), (49, 5)):
        half = points // 2
        inner = slice(half, POINTS - half)
        rows.append({"points": points, "degree": degree,
                     "inner": savgol_filter(flux, points, degree)[inner].tolist(),
                     "all": local_polynomial(time, flux, (half + 0.25) / 48.0, degree)})
    return rows


def medians(flux):
    rows = []
    for points in (5, 31, 101):
        half = points // 2
        rows.append({"points": points, "inner": median_filter(flux, size=points)[half:POINTS - half].tolist()})
    return rows


def penalty_of(time, knot):
    return (knot / math.pi) ** 4 / float(np.median(np.diff(time)))


def penalised(time, flux, knot, per_knot):
    """Cubic B-splines on even knots, dense, the bending integral by Gauss-Legendre quadrature."""
    length = time[-1] - time[0]
    count = max(1, math.ceil(length / knot * per_knot))
    width = length / count
    knots = time[0] + width * np.arange(-3, count + 4)
    size = count + 3
    basis = np.empty((len(time), size))
    bend = np.zeros((size, size))
    nodes, weights = np.polynomial.legendre.leggauss(3)
    places = np.concatenate([time[0] + width * (i + (nodes + 1) / 2) for i in range(count)])
    second = np.empty((len(places), size))
    for k in range(size):
        spline = BSpline(knots, np.eye(size)[k], 3, extrapolate=False)
        basis[:, k] = np.nan_to_num(spline(np.minimum(time, knots[-4] - 1e-12)))
        second[:, k] = np.nan_to_num(spline.derivative(2)(places))
    bend = second.T @ (second * np.tile(weights * width / 2, count)[:, None])
    normal = basis.T @ basis + penalty_of(time, knot) * bend
    return (1.0 + basis @ np.linalg.solve(normal, basis.T @ (flux - 1.0))).tolist()


def splines():
    rows = []
    for kind, seed in (("even", 7), ("uneven", 8)):
        time, flux = series(kind, seed)
        for knot in (0.3, 0.8):
            penalty = penalty_of(time, knot)
            rows.append({"kind": kind, "seed": seed, "knotDays": knot, "penalty": penalty,
                         "smoothing": make_smoothing_spline(time, flux, lam=penalty)(time).tolist(),
                         "penalised": penalised(time, flux, knot, 4)})
    return rows


def components():
    random = Lehmer(11)
    rows = np.array([[random.normal() + (k + 1) * 0.4 * math.sin(i / 7.0) + (k - 2.5) * 0.3 * math.cos(i / 3.0)
                      for i in range(100)] for k in range(6)])
    centred = rows - rows.mean(axis=1, keepdims=True)
    left, values, right = np.linalg.svd(centred, full_matrices=False)
    modes = []
    for k in range(3):
        sign = 1.0 if left[:, k].sum() >= 0 else -1.0
        mode = sign * right[k]
        modes.append({"mode": (mode / math.sqrt(np.mean(mode ** 2))).tolist(), "loading": (sign * left[:, k]).tolist(),
                      "explained": float(values[k] ** 2 / np.sum(values ** 2))})
    return {"seed": 11, "rows": 6, "length": 100, "modes": modes}


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
    time, flux = series("even", 7)
    uneven = series("uneven", 8)
    recorded = {
        "source": "scipy.signal.savgol_filter, scipy.ndimage.median_filter, scipy.interpolate.make_smoothing_spline, "
                  "numpy.polyfit, numpy.linalg.svd",
        "evenSeed": 7, "unevenSeed": 8, "points": POINTS,
        "savitzkyGolay": savitzky_golay(time, flux),
        "unevenPolynomial": {"windowDays": 0.5, "degree": 2, "all": local_polynomial(*uneven, 0.25, 2)},
        "medians": medians(flux),
        "splines": splines(),
        "components": components(),
    }
    if "--check" not in sys.argv:
        with open(PATH, "w") as file:
            json.dump(recorded, file)
            file.write("\n")
        return 0
    with open(PATH) as file:
        found = differences(json.load(file), recorded)
    print("\n".join(found[:20]) or "no difference")
    return 1 if found else 0


if __name__ == "__main__":
    sys.exit(main())
