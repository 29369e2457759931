"""Milliseconds that astropy's compiled box search takes (method='fast'), the series and the groups of periods with
the durations tried at them as JSON on standard input. One call a group, as astropy tries all durations at all periods.
"""
import json
import sys
import time

import numpy as np
from astropy.timeseries import BoxLeastSquares

given = json.load(sys.stdin)
search = BoxLeastSquares(np.array(given["time"]), np.array(given["flux"]), dy=np.array(given["error"]))
groups = [(np.array(g["periods"]), np.array(g["durations"])) for g in given["groups"]]
took = []
for _ in range(given["rounds"]):
    start = time.process_time()
    for periods, durations in groups:
        search.power(periods, durations, objective="snr", method="fast", oversample=given["oversample"])
    took.append(time.process_time() - start)
print(1000 * float(np.median(took)))
