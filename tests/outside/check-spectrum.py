"""Power spectral density against scipy.signal.periodogram, with and without gaps; Parseval's and the window's figures (Harris 1978)."""
from asking import Checks, ask, skip, text

try:
    import numpy as np
except ImportError:
    skip("numpy")
try:
    from scipy import signal
except ImportError:
    skip("scipy")

rng = np.random.default_rng(20260102)
STEP_D = 60 / 86400
N = 3000  # 2^3 3 5^3: transforms need no padding, so that their ordinates are ours


def series(gaps):
    y = signal.lfilter([1], [1, -0.9], rng.normal(0, 20, N)).astype(np.float32).astype(float)
    if gaps:
        for start in range(200, N, 700):
            y[start : start + 150] = np.nan
    return y


def taper_of(y):
    """Hann's window at half places between the first and the last sample, nothing in gaps."""
    seen = np.flatnonzero(np.isfinite(y))
    w = np.zeros(len(y))
    w[seen[0] : seen[-1] + 1] = np.sin(np.pi * (np.arange(seen[-1] + 1 - seen[0]) + 0.5) / (seen[-1] + 1 - seen[0])) ** 2
    w[~np.isfinite(y)] = 0
    return w


def by_scipy(y):
    """Ordinates 1.. below Nyquist, one-sided density, the taper-weighted mean removed."""
    w = taper_of(y)
    y = np.where(w > 0, y, 0)
    y = np.where(w > 0, y - np.sum(w * y) / np.sum(w), 0)
    f, p = signal.periodogram(y, fs=1 / STEP_D, window=w, detrend=False, scaling="density")
    below = (len(y) + 1) // 2
    return f[1:below], p[1:below]


def bins_of(count):
    """First ordinate of every bin, 6 an octave."""
    octant = np.floor(6 * np.log2(np.arange(1, count + 1)) + 0.5)
    return np.append(np.flatnonzero(np.diff(octant, prepend=-1)), count)


checks = Checks()
for gaps in (False, True):
    y = series(gaps)
    ours = np.array(ask(["spectrum %r %s" % (STEP_D, text(y))])[0], dtype=float).reshape(-1, 3)
    f, p = by_scipy(y)
    edges = bins_of(len(p))
    power = np.array([p[a:b].mean() for a, b in zip(edges[:-1], edges[1:])])
    frequency = np.array([np.exp(np.log(f[a:b]).mean()) for a, b in zip(edges[:-1], edges[1:])])
    where = "through gaps" if gaps else "without gaps"
    checks.within("binned density %s equals scipy.signal.periodogram" % where, np.max(np.abs(ours[:, 1] / power - 1)), 1e-9)
    checks.within("frequencies %s are the logarithmic means of the bins" % where, np.max(np.abs(ours[:, 0] / frequency - 1)), 1e-12)
    if not gaps:
        # Parseval: density times bandwidth sums to the variance under the taper (numpy), less the ordinates 0 and Nyquist.
        w = taper_of(y)
        deviation = y - np.sum(w * y) / np.sum(w)
        variance = np.sum((w * deviation) ** 2) / np.sum(w**2)
        width = 1 / (N * STEP_D)
        whole = np.fft.rfft(w * deviation)
        ends = (np.abs(whole[0]) ** 2 + np.abs(whole[-1]) ** 2) / N / np.sum(w**2)
        total = np.sum(ours[:, 1] * np.diff(edges)) * width
        checks.within("the density sums to the variance (Parseval)", abs((total + ends) / variance - 1), 1e-9)
        # Neighbouring ordinates of Hann's window are correlated: 2/3 and 1/6 in amplitude, so K of them count as about K/1.9444.
        widest = np.argmax(np.diff(edges))
        k = np.diff(edges)[widest]
        independent = k**2 / (k + 2 * ((k - 1) * (2 / 3) ** 2 + (k - 2) * (1 / 6) ** 2))
        checks.within("independent ordinates are those of Hann's window", abs(ours[widest, 2] / independent - 1), 1e-3)
checks.end()
