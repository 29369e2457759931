"""Astropy's fast Lomb-Scargle periodogram (floating mean) of one series on an even grid of frequencies.

Reads the series and the grid as one JSON line on standard input, then one line for each run, and answers with one: CPU
milliseconds. A line "exact" is answered with the powers by direct sums (method='slow') at every n-th frequency, and the
largest difference of the fast method from them.
"""
import json
import sys
import time

import numpy as np
from astropy import __version__
from astropy.timeseries import LombScargle

given = json.loads(sys.stdin.readline())
series = [np.array(given[name]) for name in ("time", "flux", "error")]
frequencies = given["step"] * np.arange(given["first"], given["last"] + 1)


def search():
    model = LombScargle(*series, fit_mean=True, normalization="standard")
    return model.power(frequencies, method="fast", assume_regular_frequency=True)


for line in sys.stdin:
    if line.strip() == "exact":
        picked = np.arange(0, len(frequencies), given["every"])
        model = LombScargle(*series, fit_mean=True, normalization="standard")
        exact = model.power(frequencies[picked], method="slow")
        fast = float(np.max(np.abs(search()[picked] - exact)))
        print(json.dumps({"exact": exact.tolist(), "fastError": fast, "version": __version__}), flush=True)
        continue
    start = time.process_time()
    search()
    print(json.dumps({"ms": 1000 * (time.process_time() - start)}), flush=True)
