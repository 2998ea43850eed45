"""Time scales against astropy.time (which asks ERFA) over 1972-2030 and around every leap second."""
import calendar
import datetime
import time
import warnings

from asking import Checks, ask, skip

try:
    import numpy as np
except ImportError:
    skip("numpy")
try:
    import astropy.time
    from astropy.utils import iers
except ImportError:
    skip("astropy")

iers.conf.auto_download = False
warnings.simplefilter("ignore")
SECOND = 1 / 86400

# Days after which a leap second was inserted (IERS Bulletin C).
leap_days = ["1972-06-30", "1972-12-31", "1973-12-31", "1974-12-31", "1975-12-31", "1976-12-31", "1977-12-31", "1978-12-31",
             "1979-12-31", "1981-06-30", "1982-06-30", "1983-06-30", "1985-06-30", "1987-12-31", "1989-12-31", "1990-12-31",
             "1992-06-30", "1993-06-30", "1994-06-30", "1995-12-31", "1997-06-30", "1998-12-31", "2005-12-31", "2008-12-31",
             "2012-06-30", "2015-06-30", "2016-12-31"]
stamps = []
for day in leap_days:
    stamps += [day + "T23:59:59.000", day + "T23:59:60.000", day + "T23:59:60.750"]
    after = datetime.date.fromisoformat(day) + datetime.timedelta(days=1)
    stamps += ["%sT00:00:00.000" % after, "%sT12:34:56.789" % after]
for year in range(1972, 2030):
    stamps += ["%d-%02d-%02dT%02d:%02d:%06.3f" % (year, 1 + year * 7 % 12, 1 + year * 11 % 28, year % 24, year * 13 % 60, year * 17.123 % 60)]
utc = astropy.time.Time(stamps, format="isot", scale="utc")


def apart_s(answers, jd1, jd2):
    ours = np.array(answers, dtype=float)
    return np.max(np.abs((ours[:, 0] - jd1) + (ours[:, 1] - jd2))) / SECOND


checks = Checks()
fields = [stamp.replace("T", "-").replace(":", "-").split("-") for stamp in stamps]
dates = ask(["calendar UTC " + " ".join(f) for f in fields])
checks.within("calendar to JD(UTC) equals astropy.time, leap seconds too, s", apart_s(dates, utc.jd1, utc.jd2), 1e-8)

for name, bound in (("tai", 1e-8), ("tt", 1e-8), ("tdb", 1e-6)):
    theirs = getattr(utc, name)
    there = ask(["convert UTC %s %r %r" % (name.upper(), float(a), float(b)) for a, b in zip(utc.jd1, utc.jd2)])
    back = ask(["convert %s UTC %r %r" % (name.upper(), float(a), float(b)) for a, b in zip(theirs.jd1, theirs.jd2)])
    checks.within("UTC to %s equals astropy.time, s" % name.upper(), apart_s(there, theirs.jd1, theirs.jd2), bound)
    checks.within("%s to UTC equals astropy.time, s" % name.upper(), apart_s(back, utc.jd1, utc.jd2), bound)

# GPS time counts from 1980-01-06 and is TAI - 19 s (astropy's format "gps" is its seconds).
later = utc[utc.jd > 2444244.5]
gps = ask(["convert UTC GPS %r %r" % (float(a), float(b)) for a, b in zip(later.jd1, later.jd2)])
seconds = (np.array(gps, dtype=float) - [2444244.5, 0]).sum(axis=1) * 86400
checks.within("UTC to GPS equals astropy.time's gps, s", np.max(np.abs(seconds - later.gps)), 2e-6)

# Unix time counts every day as 86400 s (POSIX): Python's calendar.timegm. astropy's "unix" stretches days with a leap second
# (its documentation says so), so that it is asked for the other days only.
plain = [":60." not in stamp for stamp in stamps]
ordinary = np.array([stamp[:10] not in leap_days for stamp in stamps])[plain]
unix = ask(["convert UTC UNIX %r %r" % (float(a), float(b)) for a, b in zip(utc.jd1[plain], utc.jd2[plain])])
seconds = (np.array(unix, dtype=float) - [2440587.5, 0]).sum(axis=1) * 86400
posix = np.array([calendar.timegm(time.strptime(stamp[:19], "%Y-%m-%dT%H:%M:%S")) + float(stamp[19:])
                  for stamp, one in zip(stamps, plain) if one])
checks.within("UTC to Unix time equals calendar.timegm, s", np.max(np.abs(seconds - posix)), 2e-6)
checks.within("UTC to Unix time equals astropy.time's unix, s", np.max(np.abs(seconds - utc[plain].unix)[ordinary]), 2e-6)

refused = ask(["calendar UTC 2017 2 29 0 0 0", "calendar UTC 2017 1 1 23 59 60.5", "calendar TT 2016 12 31 23 59 60.5"])
checks.within("days and leap seconds that never were are refused", sum(answer != ["refused"] for answer in refused), 0)
checks.end()
