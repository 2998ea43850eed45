"""Trains of boxes against astropy.timeseries.BoxLeastSquares, asked live at the same period, phase and duration."""
import csv
import pathlib

from asking import Checks, ask, skip

try:
    import numpy as np
except ImportError:
    skip("numpy")
try:
    from astropy.timeseries import BoxLeastSquares
except ImportError:
    skip("astropy")

rng = np.random.default_rng(20260311)
checks = Checks()
OVERSAMPLE = 10


def question(n, period, mid, duration, places, y, dy):
    rows = " ".join("%d %r %r" % (p, float(v), float(e)) for p, v, e in zip(places, y, dy))
    return "train %d %r %r %r %s" % (n, float(period), float(mid), float(duration), rows)


def inside(period, mid, duration, shortest, first):
    """Whether the window keeps clear of the end of the period, where astropy's copy of the first bins overwrites the last one."""
    start = (mid - first - duration / 2) % period
    return start + duration < period - 2 * shortest / OVERSAMPLE


# A grid with gaps, values that a float holds, errors that differ; no sample stands on the edge of a bin.
n, step = 4000, 0.0137
places = np.sort(rng.choice(n, 2900, replace=False))
t = places * step
y = rng.normal(0, 50, len(t))
y[((t - 1.31) % 3.77) < 0.31] -= 90
y = y.astype(np.float32).astype(float)
dy = rng.uniform(20, 60, len(t))
durations = [0.123, 0.311]
model = BoxLeastSquares(t, y, dy)
periods = np.exp(rng.uniform(np.log(1.1), np.log(15), 150))
asked, expected = [], []
for objective in ("snr", "likelihood"):
    found = model.power(periods, durations, objective=objective, oversample=OVERSAMPLE)
    for k, period in enumerate(periods):
        if inside(period, found.transit_time[k], found.duration[k], min(durations), t[0]):
            asked.append(question(n, period / step, found.transit_time[k] / step, found.duration[k] / step, places, y, dy))
            expected.append((found.depth[k], found.depth_err[k], found.depth_snr[k]))
answers = np.array(ask(asked), dtype=float)
off = np.abs(answers / np.array(expected) - 1)
checks.within("at least 200 best trains keep clear of the last bin: 200 less their number", 200 - len(asked), 0)
checks.within("depths equal astropy's depth", off[:, 0].max(), 1e-9)
checks.within("errors of the depth equal astropy's depth_err", off[:, 1].max(), 1e-9)
checks.within("SNRs equal astropy's depth_snr", off[:, 2].max(), 1e-9)

# Stored answers (boxes-expected.csv, from astropy 5.2.1) for times on no grid (boxes-data.csv): times are moved to a grid of a
# second and values become floats here, so that 1e-7 is all that can be asked; rows whose window touches the quirk are left out.
def table(name):
    lines = [line for line in (pathlib.Path(__file__).parent / name).read_text().splitlines() if not line.startswith("#")]
    return list(csv.DictReader(lines))


data = np.array([[float(cell) for cell in row.values()] for row in table("boxes-data.csv")])
t, y, dy = data.T
second = 1 / 86400
places = np.round(t / second)
asked, expected, edges = [], [], []
for row in table("boxes-expected.csv"):
    period, mid, duration = (float(row[key]) for key in ("period_d", "transit_time_d", "duration_d"))
    if row["method"] != "fast" or not inside(period, mid, duration, 0.1, t.min()):
        continue
    phase = (t - mid + period / 2) % period - period / 2
    if np.min(np.abs(np.abs(phase) - duration / 2)) < 2 * second:
        continue  # the grid of a second moves a sample across this edge
    asked.append(question(int(places.max()) + 1, period / second, mid / second, duration / second, places, y, dy))
    expected.append([float(row[key]) for key in ("depth_ppm", "depth_err_ppm", "depth_snr")])
off = np.abs(np.array(ask(asked), dtype=float) / np.array(expected) - 1)
checks.within("at least 20 stored answers are asked for: 20 less their number", 20 - len(asked), 0)
checks.within("stored depths, errors and SNRs come out", off.max(), 1e-7)
checks.end()
