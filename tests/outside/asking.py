"""asking - ask the program's own functions (answers.c) and print the outcome of checks as TAP."""
import os
import subprocess
import sys


def ask(questions):
    """The answers to many questions, as lists of words."""
    done = subprocess.run([os.environ["ANT_ANSWERS"]], input="\n".join(questions) + "\n", capture_output=True, text=True, check=True)
    answers = [line.split() for line in done.stdout.splitlines()]
    assert len(answers) == len(questions), "the helper answered %d of %d questions" % (len(answers), len(questions))
    return answers


def text(values):
    return " ".join(repr(float(value)) for value in values)


class Checks:
    """Counts checks; each is one promise with the largest departure found."""

    def __init__(self):
        self.count = self.failed = 0

    def within(self, what, departure, bound):
        good = departure <= bound  # a NaN is no success
        self.count += 1
        self.failed += not good
        print("%s %d - %s (%.3g, bound %.3g)" % ("ok" if good else "not ok", self.count, what, departure, bound))

    def end(self):
        print("1..%d" % self.count)
        sys.exit(1 if self.failed else 0)


def skip(module):
    print("1..0 # SKIP %s is not installed" % module)
    sys.exit(0)
