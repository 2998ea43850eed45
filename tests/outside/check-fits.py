"""The FITS reader against astropy.io.fits and astropy.time: tables made here, and those of Debian's sunpy and astropy."""
import gzip
import os
import pathlib
import tempfile
import warnings

from asking import Checks, ask, skip

try:
    import numpy as np
except ImportError:
    skip("numpy")
try:
    from astropy import units
    from astropy.io import fits
    from astropy.table import Table
    from astropy.time import Time, TimeDelta
    from astropy.utils import iers
except ImportError:
    skip("astropy")

iers.conf.auto_download = False
warnings.simplefilter("ignore")
checks = Checks()
rng = np.random.default_rng(11)
N = 200
folder = pathlib.Path(tempfile.mkdtemp())


def read(path, hdu="-", value="-"):
    answer = ask(["record %s %s %s" % (path, hdu, value)])[0]
    assert answer[0] != "refused", path
    rows = np.array(answer[3:], dtype=float).reshape(-1, 2)
    scale = {"unknown": "tt", "GPS": "tai"}.get(answer[0], answer[0].lower())
    return Time(float(answer[1]), float(answer[2]), format="jd", scale=scale), rows[:, 0], rows[:, 1]


def compare(what, path, times, values, hdu="-", value="-"):
    """Values to the last bit, instants to a microsecond."""
    zero, elapsed, ours = read(path, hdu, value)
    values = np.asarray(values, dtype=float)
    same = ours.shape == values.shape and bool(np.all((ours == values) | (np.isnan(ours) & np.isnan(values))))
    checks.within(what + ": values to the last bit", 0.0 if same else 1.0, 0.0)
    off = (zero + TimeDelta(elapsed, format="jd") - times).to_value("s")
    checks.within(what + ": times, s", float(np.max(np.abs(off))), 1e-6)


# Relative times in every unit and scale, with the epoch whole, in a JD and in two parts.
for scale in ("UTC", "TAI", "TT", "TDB"):
    for unit, key in (("s", "MJDREFI"), ("min", "JDREF"), ("h", "DATEREF"), ("d", "MJDREF")):
        step = {"s": 1.0, "min": 0.5, "h": 0.01, "d": 0.3}[unit]
        number = 4.0 + np.cumsum(step * rng.uniform(0.5, 1.5, N))
        table = fits.BinTableHDU.from_columns([fits.Column("TIME", "D", unit, array=number),
                                               fits.Column("RATE", "E", array=rng.normal(1361, 1, N))])
        table.header["TIMESYS"] = scale
        if key == "MJDREFI":
            table.header["MJDREFI"], table.header["MJDREFF"] = 57203, 0.999957285
            epoch = Time(57203 + 2400000.5, 0.999957285, format="jd", scale=scale.lower())
        elif key == "JDREF":
            table.header["JDREF"] = 2457204.25
            epoch = Time(2457204.25, format="jd", scale=scale.lower())
        elif key == "DATEREF":
            table.header["DATEREF"] = "2015-06-30T12:00:00.125"
            epoch = Time("2015-06-30T12:00:00.125", scale=scale.lower())
        else:
            table.header["MJDREF"] = 57203.0
            epoch = Time(57203.0, format="mjd", scale=scale.lower())
        path = folder / ("%s-%s.fits" % (scale, unit))
        table.writeto(path)
        if unit == "d" and scale == "UTC":  # days of the calendar, as a JD counts them
            times = Time(57203.0 + 2400000.5, number, format="jd", scale="utc")
        else:
            times = epoch + TimeDelta(number * units.Unit(unit))
        compare("%s since %s in %s" % (scale, key, unit), path, times, fits.getdata(path)["RATE"])

# What astropy writes itself: times in two parts, and as text.
times = Time(2457203.5, np.sort(rng.uniform(0, 3, N)), format="jd", scale="tdb")
Table({"time": times, "flux": rng.normal(1, 1e-4, N)}).write(folder / "pair.fits")
compare("a pair of parts", folder / "pair.fits", times, fits.getdata(folder / "pair.fits")["flux"])
text = Time(times.utc.isot, scale="utc")
columns = [fits.Column("DATE", "A23", array=text.isot), fits.Column("flux", "D", array=rng.normal(1, 1e-4, N))]
for kind, name in ((fits.BinTableHDU, "binary"), (fits.TableHDU, "ascii")):
    table = kind.from_columns(columns if name == "binary" else
                              [fits.Column("DATE", "A23", array=text.isot), fits.Column("flux", "D25.17", array=rng.normal(1, 1e-4, N))])
    table.header["TIMESYS"] = "UTC"
    table.writeto(folder / (name + ".fits"))
    compare("dates as text, %s" % name, folder / (name + ".fits"), text, fits.getdata(folder / (name + ".fits"))["flux"])

# Scaled and unsigned whole numbers, nulls, a vector of bands, gzip.
counts = rng.integers(0, 65535, N).astype(np.uint16)
columns = [fits.Column("MJD", "D", array=57203 + np.arange(N) / 7), fits.Column("COUNTS", "I", bzero=32768, array=counts),
           fits.Column("TSI", "I", null=-32768, array=np.append(rng.integers(-5000, 5000, N - 1), -32768).astype(np.int16)),
           fits.Column("BANDS", "3E", array=rng.normal(10, 1, (N, 3)))]
fits.BinTableHDU.from_columns(columns, name="ALL").writeto(folder / "all.fits")
fits.setval(folder / "all.fits", "TSCAL3", value=0.001, ext=1)
fits.setval(folder / "all.fits", "TZERO3", value=1361.0, ext=1)
(folder / "all.fits.gz").write_bytes(gzip.compress((folder / "all.fits").read_bytes()))
data = fits.getdata(folder / "all.fits.gz", 1)
theirs_tsi = np.array(data["TSI"], dtype=float)
theirs_tsi[-1] = np.nan  # its null, which astropy scales like any number
for value, theirs in (("COUNTS", data["COUNTS"]), ("TSI", theirs_tsi), ("BANDS[3]", data["BANDS"][:, 2])):
    compare("%s in gzip" % value, folder / "all.fits.gz", Time(data["MJD"], format="mjd", scale="utc"), theirs, "ALL", value)

sunpy = pathlib.Path("/usr/lib/python3/dist-packages/sunpy/data/test")
if (sunpy / "gbm.fits").exists():
    data = fits.open(sunpy / "gbm.fits")
    header, rows = data[2].header, data[2].data
    epoch = Time(header["MJDREFI"] + 2400000.5, header["MJDREFF"], format="jd", scale="tt")
    compare("counts since MJDREFI and MJDREFF", sunpy / "gbm.fits", epoch + TimeDelta(rows["TIME"], format="sec"), rows["COUNTS"][:, 6],
            "-", "COUNTS[7]")
    for name in ("go1520110607.fits", "go1520120601.fits.gz"):
        data = fits.open(sunpy / name)
        rows = data["FLUXES"].data
        compare("%s, series in cells" % name, sunpy / name,
                Time(data["FLUXES"].header["TIMEZERO"] + 2400000.5, rows["TIME"][0] / 86400, format="jd", scale="utc"),
                rows["FLUX"][0][:, 1], "FLUXES", "FLUX[2]")
    rows = fits.getdata(sunpy / "eve_l1_esp_2011046_00_truncated.fits", 1)
    first = Time("%d:%03d" % (rows["YEAR"][0], rows["DOY"][0]), format="yday", scale="utc")
    compare("year, day and second", sunpy / "eve_l1_esp_2011046_00_truncated.fits", first + TimeDelta(rows["SOD"], format="sec"), rows["QD"],
            "1", "QD")
    name = "lyra_20150101-000000_lev3_std_truncated.fits.gz"
    data = fits.open(sunpy / name)
    compare("minutes from DATE-OBS", sunpy / name,
            Time(data[0].header["DATE-OBS"], scale="utc") + TimeDelta(data[1].data["TIME"] * 60.0, format="sec"), data[1].data["CHANNEL3"],
            "-", "CHANNEL3")

for path in folder.iterdir():
    os.unlink(path)
folder.rmdir()
checks.end()
