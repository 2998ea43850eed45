"""NetCDF files against netCDF4-python, which reads them by its own code for scaling, masks and calendars."""
import glob
import os
import subprocess
import tempfile

from asking import Checks, skip

try:
    import numpy as np
except ImportError:
    skip("numpy")
try:
    import netCDF4
except ImportError:
    skip("netCDF4")

N = 500
rng = np.random.default_rng(11)


def rows(path, columns="", index=""):
    """Origin of time, scale, and the rows, as the program reads them."""
    done = subprocess.run([os.environ["ANT_ROWS"], path, columns, index], capture_output=True, text=True)
    assert done.returncode == 0, done.stderr
    head, *lines = done.stdout.splitlines()
    jd1, jd2, scale, n = head.split()
    table = np.array([[float(word) for word in line.split()] for line in lines])
    assert len(table) == int(n)
    return float(jd1) + float(jd2), scale, table


def write(path, kind, units, calendar, times, dtype, values, attributes):
    with netCDF4.Dataset(path, "w", format=kind) as file:
        file.createDimension("time", None)
        file.createDimension("band", 3)
        time = file.createVariable("time", "f8", ("time",))
        time.units = units
        if calendar:
            time.calendar = calendar
        time[:] = times
        fill = attributes.pop("_FillValue", None)
        value = file.createVariable("tsi", dtype, ("time",), fill_value=fill)
        value.setncatts(attributes)
        value.units = "W m-2"
        value.set_auto_maskandscale(False)
        value[:] = values
        bands = file.createVariable("bands", "f4", ("time", "band"))
        bands[:] = rng.normal(1, 0.01, (N, 3))


def their_values(path, name="tsi", index=None):
    with netCDF4.Dataset(path) as file:
        values = file.variables[name][:] if index is None else file.variables[name][:, index]
        return np.ma.filled(values.astype("f8"), np.nan)


def their_seconds(path, origin_jd):
    """Elapsed days of 86400 s from the origin by num2date."""
    with netCDF4.Dataset(path) as file:
        time = file.variables["time"]
        calendar = getattr(time, "calendar", "standard")
        dates = netCDF4.num2date(np.asarray(time[:]), time.units, calendar)
        zero = netCDF4.num2date(0, "days since 1858-11-17", calendar)
        return np.array([(date - zero).total_seconds() for date in dates]) - (origin_jd - 2400000.5) * 86400


def differ(ours, theirs):
    """How many values are not the same to the last bit, or missing in one alone."""
    return int(np.sum(~((ours == theirs) | (np.isnan(ours) & np.isnan(theirs)))))


checks = Checks()
integers = rng.integers(-400, 400, N)
integers[[5, 77]] = -999
integers[[8, 300]] = 390
doubles = 1361 + rng.normal(0, 0.3, N)
doubles[[3, 4]] = -99.5
CASES = [
    ("NETCDF4", "days since 2003-02-25 00:00:00", None, np.arange(N) / 24 + 0.013, "i2", integers,
     dict(_FillValue=np.int16(-999), scale_factor=0.0013, add_offset=1361.07)),
    ("NETCDF3_CLASSIC", "seconds since 2003-02-25 12:30:00.5", "gregorian", np.arange(N) * 131.0, "i4", integers,
     dict(missing_value=np.int32(-999), valid_range=np.array([-400, 380], "i4"), scale_factor=1e-3, add_offset=1360.0)),
    ("NETCDF3_64BIT_OFFSET", "hours since 1996-1-1 05:30:00 +05:30", "standard", np.arange(N) * 1.0 + 1 / 3, "f8", doubles,
     dict(_FillValue=-99.5)),
    ("NETCDF4_CLASSIC", "minutes since 1970-01-01", "proleptic_gregorian", np.arange(N) * 10.0 + 2e7, "f4", doubles,
     dict(missing_value=np.float32(-99.5))),
    ("NETCDF3_64BIT_DATA", "days since 1610-01-01 00:00:00", "gregorian", np.arange(N) + 143541.5, "i8", integers + 1000000,
     dict(valid_min=np.int64(999500), valid_max=np.int64(1000380))),
    ("NETCDF4", "milliseconds since 2010-06-01", None, np.arange(N) * 1000.0 + 0.25, "u2", integers + 1000,
     dict(_FillValue=np.uint16(1), scale_factor=2.0, add_offset=0.5)),
]
with tempfile.TemporaryDirectory() as folder:
    path = os.path.join(folder, "record.nc")
    for kind, units, calendar, times, dtype, values, attributes in CASES:
        write(path, kind, units, calendar, times, dtype, values, dict(attributes))
        origin, scale, ours = rows(path)
        name = "%s, %s, %s" % (kind, dtype, units)
        checks.within("values equal netCDF4's to the last bit: " + name, differ(ours[:, 1], their_values(path)), 0)
        apart = ours[:, 0] * 86400 - their_seconds(path, origin)
        checks.within("times equal num2date's, leap seconds aside: " + name, np.max(np.abs(apart - np.round(apart))), 1e-6)
        checks.within("leap seconds of the span are few: " + name, np.max(np.abs(np.round(apart))), 3)
    origin, scale, ours = rows(path, "value=bands", "band=2")
    checks.within("one place along a further dimension equals netCDF4's to the last bit",
                  differ(ours[:, 1], their_values(path, "bands", 1)), 0)

FILES = sorted(glob.glob("/usr/lib/python3/dist-packages/sunpy/data/test/*.nc"))
for path in FILES:
    name = os.path.basename(path)
    with netCDF4.Dataset(path) as file:
        variable = next(v for v in file.variables if v.endswith("flux"))
    origin, scale, ours = rows(path, "value=" + variable)
    checks.within("%s of %s equals netCDF4's to the last bit" % (variable, name), differ(ours[:, 1], their_values(path, variable)), 0)
    checks.within("times of %s equal num2date's, s" % name, np.max(np.abs(ours[:, 0] * 86400 - their_seconds(path, origin))), 1e-6)
checks.end()
