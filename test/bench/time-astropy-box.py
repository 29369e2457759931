"""Astropy's compiled box search (method='fast') on series and groups of periods with the durations tried at them.

Reads one JSON line on standard input for each run, and answers with one: CPU milliseconds, and of the best trial the
S/N, the period, the duration and the mid-time. One call a group, as astropy tries all durations at all periods.
"""
import json
import sys
import time

import numpy as np
from astropy import __version__
from astropy.timeseries import BoxLeastSquares

given = json.loads(sys.stdin.readline())
series = [np.array(given[name]) for name in ("time", "flux", "error")]
groups = [(np.array(g["periods"]), np.array(g["durations"])) for g in given["groups"]]
for _ in sys.stdin:
    start = time.process_time()
    search = BoxLeastSquares(series[0], series[1], dy=series[2])
    best = (0.0, 0.0, 0.0, 0.0)
    for periods, durations in groups:
        found = search.power(
            periods, durations, objective="snr", method="fast", oversample=given["oversample"]
        )
        at = int(np.argmax(found.power))
        if found.power[at] > best[0]:
            best = tuple(
                float(x)
                for x in (found.power[at], periods[at], found.duration[at], found.transit_time[at])
            )
    spent = 1000 * (time.process_time() - start)
    print(json.dumps({"ms": spent, "best": best, "version": __version__}), flush=True)
