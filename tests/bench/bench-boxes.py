#!/usr/bin/python3
"""bench-boxes.py - what astropy.timeseries.BoxLeastSquares would take for the search of bench-repeats in white noise, projected.

A million samples of 60 s; eight durations of 0.2 to 2 crossing times at each period; at least 50 trial periods a call; trial
periods as far apart as lets the ends of the record slip by a quarter of the shortest duration. Full resolution, and binned to a
sixth of the shortest duration. usage: bench-boxes.py [WHITE_SECONDS]"""
import sys
import time

import numpy as np
from astropy.timeseries import BoxLeastSquares

SPAN, SAMPLES, PER_CALL = 730.0, 1051200, 50
rng = np.random.default_rng(1)
t = np.arange(SAMPLES) * (SPAN / SAMPLES)
y = rng.normal(0, 1, SAMPLES)


def crossing(period):
    return 13 / 24 * np.cbrt(period / 365.25)


def seconds_a_trial(period, binned):
    shortest = 0.2 * crossing(period)
    fold = max(1, int(shortest / 6 / (SPAN / SAMPLES))) if binned else 1
    n = SAMPLES // fold
    model = BoxLeastSquares(t[:n * fold].reshape(n, fold).mean(1), y[:n * fold].reshape(n, fold).mean(1))
    durations = crossing(period) * np.geomspace(0.2, 2, 8)
    begin = time.thread_time()
    model.power(np.linspace(period, period * 1.0001, PER_CALL), durations, objective="snr")
    return (time.thread_time() - begin) / PER_CALL


edges = np.geomspace(0.5, 365, 7)
total = {False: 0.0, True: 0.0}
for low, high in zip(edges[:-1], edges[1:]):
    middle = np.sqrt(low * high)
    grid = np.geomspace(low, high, 500)
    trials = np.trapz(SPAN / grid / (0.2 * crossing(grid) / 4), grid)
    for binned in total:
        total[binned] += trials * seconds_a_trial(middle, binned)
print("astropy, projected: %.0f s at full resolution, %.0f s on binned data" % (total[False], total[True]))
if len(sys.argv) > 1:
    ours = float(sys.argv[1])
    print("over %.2f s: %.0f times and %.0f times" % (ours, total[False] / ours, total[True] / ours))
