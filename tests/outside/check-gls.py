"""Generalised least squares (Aitken 1936) through gaps against dense algebra by numpy, and the likelihood against scipy.stats."""
from asking import Checks, ask, skip, text

try:
    import numpy as np
except ImportError:
    skip("numpy")
try:
    from scipy import stats
except ImportError:
    skip("scipy")

rng = np.random.default_rng(20260104)
checks = Checks()


def covariance(parts, lag):
    total = np.zeros_like(lag)
    for kind, rms, time, quality in parts:
        if kind == "exponential":
            total += rms**2 * np.exp(-lag / time)
        else:  # a damped oscillator driven by white noise, its undamped period `time`
            phase, damping = 2 * np.pi * lag / time, 0.5 / quality
            eta = np.sqrt(1 - damping**2)
            total += rms**2 * np.exp(-damping * phase) * (np.cos(eta * phase) + damping / eta * np.sin(eta * phase))
    return total


def question(white, step, parts, first, length, y):
    inner = " ".join("%s %r %r %r" % part for part in parts)
    return "gls %r %r %d %s %d %d %s" % (white, step, len(parts), inner, first, length, text(y))


# The worked example of the method's check values: C = 400 0.6^|i-j|, a box over places 4..7, no white noise.
d = np.array([12, -5, 8, 3, -40, -61, -55, -38, 9, 2, -7, 11.0])
ar = [("exponential", 20.0, float(-1 / np.log(0.6)), 1.0)]
energy, moment, _ = np.array(ask([question(0.0, 1.0, ar, 4, 4, d)])[0], dtype=float)
s = np.zeros(12)
s[4:8] = -1
C = 400 * 0.6 ** np.abs(np.subtract.outer(np.arange(12), np.arange(12)))
solved = np.linalg.solve(C, np.array([s, d]).T)
checks.within("energy of the worked example equals numpy.linalg.solve", abs(energy / (s @ solved[:, 0]) - 1), 1e-12)
checks.within("depth of the worked example equals numpy.linalg.solve", abs((moment / energy) / ((s @ solved[:, 1]) / (s @ solved[:, 0])) - 1), 1e-12)
checks.within("SNR of the worked example is that of 30-digit arithmetic, 3.91826998482", abs(moment / np.sqrt(energy) - 3.91826998482), 1e-10)

# A solar mixture on a minute grid with gaps of an orbit.
parts = [("oscillator", 40.0, 2 * np.pi * 250 / 86400, float(np.sqrt(0.5))), ("oscillator", 3.0, 1 / 3.1e-3 / 86400, 4.0),
         ("oscillator", 28.0, 2 * np.pi * 3 / 24, float(np.sqrt(0.5))), ("exponential", 28.0, 3 / 24, 1.0)]
step, n = 60 / 86400, 900
y = rng.normal(0, 60, n).astype(np.float32).astype(float)
y[np.arange(n) % 96 < 35] = np.nan
seen = np.flatnonzero(np.isfinite(y))
C = covariance(parts, np.abs(np.subtract.outer(seen, seen)) * step) + 100.0 * np.eye(len(seen))
worst = np.zeros(2)
cases = [(300, 360), (10, 40), (-50, 200), (700, 400)]
answers = np.array(ask([question(10.0, step, parts, first, length, y) for first, length in cases]), dtype=float)
for (first, length), answer in zip(cases, answers):
    s = -((seen >= first) & (seen < first + length)).astype(float)
    solved = np.linalg.solve(C, np.array([s, y[seen]]).T)
    worst = np.maximum(worst, [abs(answer[0] / (s @ solved[:, 0]) - 1), abs((answer[1] - s @ solved[:, 1]) / np.sqrt(answer[0]))])
checks.within("energies through gaps equal numpy.linalg.solve", worst[0], 1e-6)
checks.within("dip SNR through gaps equals numpy.linalg.solve", worst[1], 1e-6)
density = stats.multivariate_normal(mean=np.zeros(len(seen)), cov=C).logpdf(y[seen])
checks.within("ln likelihood through gaps equals scipy.stats.multivariate_normal", abs(answers[0, 2] / density - 1), 1e-11)
checks.end()
