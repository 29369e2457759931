"""What a common pipeline finds: running median of the flux, then astropy's BoxLeastSquares (method='fast').

Reads one JSON line for each light curve (time, flux, error, periods, durations, windowDays); answers with the period,
mid-time, duration and depth S/N of the strongest trial.
"""
import json
import sys

import numpy as np
from astropy.timeseries import BoxLeastSquares
from scipy.ndimage import median_filter

for line in sys.stdin:
    given = json.loads(line)
    time, flux, error = (np.array(given[name]) for name in ("time", "flux", "error"))
    window = max(3, int(round(given["windowDays"] / np.median(np.diff(time))))) | 1
    flat = flux / median_filter(flux, size=window, mode="nearest")
    found = BoxLeastSquares(time, flat, dy=error).power(
        np.array(given["periods"]), np.array(given["durations"]), objective="snr", method="fast", oversample=10
    )
    best = int(np.argmax(found.power))
    print(
        json.dumps(
            [float(x) for x in (found.period[best], found.transit_time[best], found.duration[best], found.power[best])]
        ),
        flush=True,
    )
