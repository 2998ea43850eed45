"""Decimal numbers against Python's float(), to the bit: random ones of every length and the awkward ones."""
import random
import sys

from asking import Checks, ask

random.seed(20260103)


def digits(n):
    return "".join(random.choice("0123456789") for _ in range(n))


def number():
    whole, part = digits(random.choice([0, 1, 4, 7, 19, 25])), digits(random.choice([0, 1, 3, 9, 17, 30]))
    text = random.choice(["", "-", "+"]) + (whole or ("0" if not part else "")) + ("." + part if part or random.random() < 0.3 else "")
    if random.random() < 0.5:
        text += random.choice("eE") + random.choice(["", "-", "+"]) + str(random.choice([0, 1, 5, 22, 23, 300, 308, 324, random.randrange(400)]))
    return text


awkward = ["2.2250738585072011e-308", "2.2250738585072014e-308", "4.9406564584124654e-324", "2.4703282292062327e-324",
           "2.4703282292062328e-324", "1.7976931348623157e308", "1.7976931348623159e308", "9007199254740993", "9007199254740992.5",
           "8.5e22", "1e23", "6929495644600919.5", "3.518437208883201171875e13", "0." + "0" * 400 + "1", "1" + "0" * 308,
           "1" * 800, "0.1", "-0", "-0.0", "00000000000000000000000001.5", "1e-400", "1e400", "5.", ".5", "+.5e-3"]
# Halfway between two neighbouring doubles, and a hair above: the digits of 2^53 + 1 with a far tail.
awkward += ["9007199254740993." + "0" * 200, "9007199254740993." + "0" * 200 + "1"]
texts = awkward + [number() for _ in range(200000)]
answers = ask(["number " + text for text in texts])

checks = Checks()
wrong = [(text, answer) for text, answer in zip(texts, answers) if len(answer) != 2 or float(text).hex() != float.fromhex(answer[0]).hex()]
short = [(text, answer) for text, answer in zip(texts, answers) if len(answer) == 2 and int(answer[1]) != len(text)]
for text, answer in (wrong + short)[:10]:
    print("# %s: answered %s, float() says %s" % (text, answer, float(text).hex()), file=sys.stderr)
checks.within("%d numbers equal float() to the bit: departures" % len(texts), len(wrong), 0)
checks.within("and are taken to their last character: departures", len(short), 0)

fortran = ["1.5d3", "2D-2", "-7.25d+10"]  # Fortran's exponents
answers = ask(["number " + text for text in fortran])
checks.within("exponents of Fortran: departures",
              sum(float.fromhex(a[0]) != float(t.lower().replace("d", "e")) for t, a in zip(fortran, answers)), 0)
no_numbers = ["nan", "inf", "-", "+", ".", "e5", "x1", "--1"]
checks.within("what is no number: departures", sum(a != ["none"] for a in ask(["number " + text for text in no_numbers])), 0)
checks.end()
