"""Tables read back by astropy: FITS and VOTable hold what the CSV says, to its last digit, and their readers complain of nothing."""
import csv
import io
import math
import os
import pathlib
import subprocess
import sys
import tempfile
import warnings

from asking import Checks, skip

try:
    import numpy
    import astropy.io.votable as votable
    from astropy.io import fits
    from astropy.io.votable import ucd
    from astropy.table import Table
except ImportError:
    skip("astropy")

RECIPE = """[record]
start = 2041-03-01T00:00:00
days = 12
cadence_s = 600
seed = 11
[noise]
preset = quiet-sun
white_ppm = 10
[gaps]
mask = l1
[planet crossing]
middle = 2041-03-05T17:00:00
depth_ppm = 900
impact = 0.3
duration_h = 6
[planet other]
middle = 2041-03-09T03:00:00
depth_ppm = 500
impact = 0.1
duration_h = 4
"""
FITS_TABLES = ["dips", "brightenings", "passages", "repeats", "periods", "series"]
VOTABLES = ["dips", "brightenings", "passages", "repeats"]
DIP_UCDS = {"depth_ppm": "phot.flux.bol;arith.ratio;stat.max", "mean_depth_ppm": "phot.flux.bol;arith.ratio;stat.mean",
            "radius_ratio": "phys.size.radius;arith.ratio", "depth_sigma_ppm": "stat.error;phot.flux.bol;arith.ratio;stat.max",
            "snr": "stat.snr;meta.main", "class": "meta.code.class", "start_jd": "time.start", "end_jd": "time.end"}
LEGEND = {"FLAG1": "fill", "FLAG2": "quality", "FLAG4": "duplicate", "FLAG8": "hand", "FLAG16": "excluded", "FLAG32": "dark", "FLAG64": "spike",
          "FLAG128": "no-time"}


def make(folder, form):
    """A record whose time is told in one form, and its scan."""
    cli = os.environ["ANT_CLI"]
    (folder / "small.recipe").write_text(RECIPE)
    subprocess.run([cli, "simulate", folder / "small.recipe", "--out", folder / "record.csv", "--force"], check=True)
    if form == "days":  # no origin, a hole of the quality column, a fill
        lines = [line for line in (folder / "record.csv").read_text().split("\n") if line and not line.startswith("#")]
        rows = [line.split(",") for line in lines[1:]]
        text = "".join("%.6f,%s,%d\n" % (i / 144, row[1] if i % 97 else "-99", i % 53 == 0) for i, row in enumerate(rows))
        (folder / "record.csv").write_text("day,irradiance,quality\n" + text)
    options = ["--time-format", "days"] if form == "days" else []
    subprocess.run([cli, "scan", folder / "record.csv", "--out", folder / "out", "--also", "fits,votable", "--series", *options],
                   check=True, stdout=subprocess.DEVNULL)
    return folder / "out"


def csv_rows(path):
    lines = [line for line in path.read_text(encoding="utf-8").split("\n") if line and not line.startswith("# ")]
    return list(csv.DictReader(io.StringIO("\n".join(lines))))


def digits(display, number):
    """A number as TDISPn asks for it: Fw.d, or Gw.d as printf has it."""
    if math.isnan(number):
        return ""
    return "%.*f" % (int(display.split(".")[1]), number) if display[0] == "F" else "%.*g" % (int(display.split(".")[1]), number)


def names_of(bits, header):
    return "|".join(header["FLAG%d" % (1 << bit)] for bit in range(8) if bits >> bit & 1)


def departures(hdu, rows):
    """Cells of a FITS table that say something else than the CSV."""
    header, data = hdu.header, hdu.data
    if len(data) != len(rows) or data.names != list(rows[0] if rows else data.names):
        return 10**9
    wrong = 0
    for number, name in enumerate(data.names, 1):
        form, cells = header["TFORM%d" % number], data[name]
        for cell, row in zip(cells, rows):
            said = digits(header["TDISP%d" % number], cell) if form == "1D" else names_of(cell, header) if form == "1I" else str(cell)
            wrong += said != row[name]
    return wrong


def check_fits(checks, form, out):
    for name in FITS_TABLES:
        path = out / (name + ".fits")
        with fits.open(path, checksum=True) as file:
            file.verify("exception")
            checks.within("%s: %s.fits holds the digits of the CSV: departures" % (form, name), departures(file[1], csv_rows(out / (name + ".csv"))), 0)
            told = ("TIMESYS" in file[1].header, "JDREF" in file[1].header)
            checks.within("%s: %s.fits tells of its times just if it knows them" % (form, name), sum(t != (form == "utc") for t in told), 0)
            if name == "dips":
                named = {file[1].header["TTYPE%d" % c]: file[1].header.get("TUCD%d" % c) for c in range(1, len(file[1].data.names) + 1)}
                checks.within("%s: FITS names the UCDs of depths and ratio: departures" % form, sum(named[k] != v for k, v in DIP_UCDS.items()), 0)
                checks.within("%s: every UCD is one of the vocabulary: departures" % form, sum(not known_ucd(u) for u in named.values()), 0)
    if form == "utc":
        table = Table.read(out / "dips.fits", hdu=1, astropy_native=True)
        jds = [float(row["mid_jd"]) for row in csv_rows(out / "dips.csv")]
        checks.within("mid_jd is read as an instant of UTC, d", max(abs(t.utc.jd - jd) for t, jd in zip(table["mid_jd"], jds)), 6e-8)


def known_ucd(words):
    try:
        ucd.parse_ucd(words, check_controlled_vocabulary=True)
        return True
    except (ValueError, TypeError):
        return False


def check_mask(checks, form, out):
    with fits.open(out / "flags.fits", checksum=True) as file:
        file.verify("exception")
        header, data = file[1].header, file[1].data
        flagged = [(str(row), time, names_of(bits, header)) for row, time, bits in zip(data["row"], data["time"], data["flags"]) if bits]
        listed = [(row["row"], row["time"], row["flags"]) for row in csv_rows(out / "flags.csv")]
        checks.within("%s: the mask's bits are the CSV's flags: departures" % form, sum(a != b for a, b in zip(flagged, listed)) + abs(len(flagged) - len(listed)), 0)
        checks.within("%s: some rows are flagged: none" % form, len(flagged) == 0 and form == "days", 0)
        checks.within("%s: the legend is in the header: departures" % form, sum(header.get(k) != v for k, v in LEGEND.items()), 0)
        rows = sum(not line.startswith("#") and line[:1].isdigit() for line in (out.parent / "record.csv").read_text().split("\n"))
        checks.within("%s: the mask has every row of the record: missing" % form, abs(len(data) - rows), 0)


def check_votable(checks, form, out):
    for name in VOTABLES:
        rows, path = csv_rows(out / (name + ".csv")), out / (name + ".vot")
        file = votable.parse(path, verify="exception")
        table = file.get_first_table()
        fields = {field.name: field for field in table.fields}
        checks.within("%s: %s.vot has the CSV's columns and rows: departures" % (form, name),
                      (rows != [] and list(fields) != list(rows[0])) + abs(len(rows) - table.nrows), 0)
        wrong = 0
        for row, cells in zip(rows, table.array):
            for key, field in fields.items():
                said, cell = row[key], cells[key]
                if field.datatype == "double":
                    wrong += not (said == "" if numpy.ma.is_masked(cell) or math.isnan(cell) else float(said) == cell)
                else:
                    wrong += str(cell) != said
        checks.within("%s: %s.vot holds the digits of the CSV: departures" % (form, name), wrong, 0)
        checks.within("%s: %s.vot passes the validator: faults" % (form, name), 0 if valid(path) else 1, 0)
        systems = list(file.resources[0].time_systems)
        refers = any(field.ref for field in table.fields)
        checks.within("%s: %s.vot has its time system just if it is known" % (form, name), (len(systems) == 1 and refers) != (form == "utc"), 0)
        if systems:
            told = (systems[0].timescale, systems[0].timeorigin, systems[0].refposition)
            checks.within("and it is that of the record", told not in (("UTC", 0.0, "UNKNOWN"), ("UTC", "JD-origin", "UNKNOWN")), 0)
        if name == "dips":
            checks.within("%s: VOTable names the UCDs of depths and ratio: departures" % form, sum(fields[k].ucd != v for k, v in DIP_UCDS.items()), 0)


def valid(path):
    report = io.StringIO()
    good = votable.validate(path, output=report, xmllint=False)
    if not good:
        print(report.getvalue(), file=sys.stderr)
    return good


def main():
    checks = Checks()
    warnings.simplefilter("error")  # a warning of a reader is a failure
    for form in ("utc", "days"):
        with tempfile.TemporaryDirectory() as folder:
            out = make(pathlib.Path(folder), form)
            check_fits(checks, form, out)
            check_mask(checks, form, out)
            check_votable(checks, form, out)
    checks.end()


if __name__ == "__main__":
    sys.exit(main())
