"""Medians and scales against numpy and astropy.stats (Beers, Flynn & Gebhardt 1990 for the biweight)."""
import warnings

from asking import Checks, ask, skip, text

try:
    import numpy as np
except ImportError:
    skip("numpy")
try:
    from astropy import stats
except ImportError:
    skip("astropy")

rng = np.random.default_rng(20260101)
samples = [rng.normal(1361, 0.3, n) for n in (5, 6, 51, 1000)]
samples += [rng.standard_cauchy(n) * 50 for n in (25, 400)]
samples += [np.round(rng.normal(0, 3, 300)), np.concatenate([rng.normal(0, 1, 90), np.full(10, 1e4)]), rng.exponential(2, 77)]
holed = rng.normal(5, 1, 60)
holed[::7] = np.nan
holed[3] = np.inf
samples.append(holed)
quantiles = [0, 0.05, 0.25, 1 / 3, 0.5, 0.9, 0.95, 1, 0.123, 0.77]

answers = ask(["robust %r %s" % (float(q), text(s)) for q, s in zip(quantiles, samples)])
ours = np.array(answers, dtype=float)
finite = [s[np.isfinite(s)] for s in samples]
with warnings.catch_warnings():
    warnings.simplefilter("ignore")
    theirs = np.array([[np.median(s), stats.mad_std(s), np.quantile(s, q), stats.biweight_location(s, c=6.0),
                        stats.biweight_scale(s, c=9.0), stats.biweight_midvariance(s, c=9.0)] for q, s in zip(quantiles, finite)])
checks = Checks()
for column, name in enumerate(["median equals numpy.median", "scaled MAD equals astropy.stats.mad_std",
                               "quantile equals numpy.quantile (linear)", "location equals astropy.stats.biweight_location",
                               "scale equals astropy.stats.biweight_scale", "midvariance equals astropy.stats.biweight_midvariance"]):
    size = np.maximum(np.abs(theirs[:, column]), 1e-3)
    checks.within(name, np.max(np.abs(ours[:, column] - theirs[:, column]) / size), 1e-12)
checks.end()
