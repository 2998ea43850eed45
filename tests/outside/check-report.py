"""The report asked back of poppler: fonts embedded, words to be found, an outline, the paper asked for, no page half empty, the same
bytes twice; for a record with no dips and for one with many."""
import os
import pathlib
import re
import shutil
import subprocess
import sys
import tempfile

from asking import Checks, skip

for tool in ("pdffonts", "pdftotext", "pdfinfo", "pdftohtml", "pdftoppm"):
    if not shutil.which(tool):
        skip(tool)

HEADINGS = ["The record", "What was found", "The whole record", "The noise", "What would have been missed", "Repeats", "Settings", "Where this comes from"]


def recipe(n_dips):
    text = "[record]\nstart = 2041-03-03T00:00:00\ndays = %d\ncadence_s = 1800\nseed = 5\n[noise]\npreset = quiet-sun\nwhite_ppm = 8\n" % (
        16 + 1.5 * n_dips)
    for i in range(n_dips):
        hours = 60 + 36 * i
        text += "[planet p%d]\nmiddle = 2041-%s:00:00\ndepth_ppm = %d\nimpact = 0.3\nduration_h = 6\n" % (
            i, "%02d-%02dT%02d" % (3 + (2 + hours // 24) // 31, (2 + hours // 24) % 31 + 1, hours % 24), 500 + 100 * (i % 4))
    return text


def said(*command):
    return subprocess.run([str(word) for word in command], check=True, capture_output=True, text=True).stdout


def filled(path, page):
    """How far down the page something stands above its foot, as a fraction of what may hold anything."""
    image = subprocess.run(["pdftoppm", "-gray", "-r", "30", "-f", str(page), "-l", str(page), path], check=True, capture_output=True).stdout
    width, height = (int(n) for n in re.match(rb"P5\s+(\d+)\s+(\d+)\s+255\s", image).groups())
    pixels = image[-width * height:]
    top, foot = int(height * 46 / 842), int(height * (1 - 56 / 792))
    inked = [y for y in range(top, foot) if min(pixels[y * width:(y + 1) * width]) < 245]
    return (max(inked) - top) / (foot - top) if inked else 0


def scan(folder, out, paper):
    said(os.environ["ANT_CLI"], "scan", folder / "record.csv", "--out", folder / out, "--set", "paper=" + paper)


def check(checks, folder, n_dips):
    name = "%d planted" % n_dips
    (folder / "small.recipe").write_text(recipe(n_dips))
    said(os.environ["ANT_CLI"], "simulate", folder / "small.recipe", "--out", folder / "record.csv", "--force")
    scan(folder, "one", "A4")
    path = folder / "one" / "report.pdf"
    fonts = [line.split() for line in said("pdffonts", path).split("\n")[2:] if line]
    checks.within("%s: every font is embedded: not" % name, sum(line[-5] != "yes" for line in fonts) + (not fonts), 0)
    text, info = said("pdftotext", "-layout", path, "-"), said("pdfinfo", path)
    rows = [line for line in (folder / "one" / "dips.csv").read_text().split("\n") if line[:1].isdigit()]
    checks.within("%s: the dips that were planted are listed: departures" % name, abs(len(rows) - n_dips), n_dips // 10)
    utc = [row.split(",")[5][:16].replace("T", " ") for row in rows]
    checks.within("%s: each middle stands in the list and over its close-up: missing" % name, sum(text.count(t) < 2 for t in utc), 0)
    checks.within("%s: the headings can be searched: missing" % name, sum(h not in text for h in HEADINGS), 0)
    sha = re.search(r"# SHA-256: (\w+)", (folder / "one" / "dips.csv").read_text()).group(1)
    checks.within("%s: checksum, version and chance are told: missing" % name, sum(w not in text for w in (sha, "Antumbra 0.", "Noise alone")), 0)
    outline = said("pdftohtml", "-xml", "-i", "-stdout", path).partition("<outline>")[2]
    checks.within("%s: the headings are in the outline: missing" % name, sum(h not in outline for h in HEADINGS), 0)
    pages = int(re.search(r"Pages:\s+(\d+)", info).group(1))
    checks.within("%s: every page is numbered: missing" % name, sum("%d of %d" % (p, pages) not in text for p in range(1, pages + 1)), 0)
    checks.within("%s: A4 is A4: not" % name, "595.276 x 841.89" not in info, 0)
    check_filled(checks, name, path)


def check_filled(checks, name, report):
    n = int(re.search(r"Pages:\s+(\d+)", said("pdfinfo", report)).group(1))
    checks.within("%s: no page but the last is half empty: emptiest part" % name, 1 - min(filled(report, p) for p in range(1, n)), 0.5)


def check_again(checks, folder):
    scan(folder, "two", "A4")
    scan(folder, "letter", "letter")
    one, two, letter = (folder / out / "report.pdf" for out in ("one", "two", "letter"))
    checks.within("two reports have the same bytes: differ", one.read_bytes() != two.read_bytes(), 0)
    checks.within("letter is letter: not", "612 x 792" not in said("pdfinfo", letter), 0)
    check_filled(checks, "on letter paper", letter)


def main():
    os.environ["SOURCE_DATE_EPOCH"] = "2240000000"
    checks = Checks()
    for n_dips in (0, 1, 13):
        with tempfile.TemporaryDirectory() as folder:
            check(checks, pathlib.Path(folder), n_dips)
            if n_dips > 1:
                check_again(checks, pathlib.Path(folder))
    checks.end()


if __name__ == "__main__":
    sys.exit(main())
