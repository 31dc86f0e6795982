"""Judges from outside: whether the column `identity` of tests/data/identities.tsv is right.

Install and run, from the root of the repository:

    python3 -m venv target/judges
    target/judges/bin/pip install python-flint==0.9.0 mpmath==1.4.1
    target/judges/bin/python tests/judges/judge_identities.py

Two judges read each entry on their own and evaluate both sides at 8 random points of their domain:
python-flint in balls of 200 bits, which contain the value for certain, and mpmath in 50 digits. For an
identity every difference contains zero, in a ball small enough to tell; for a non-identity at least
one difference excludes zero. Ends with 1 and the names of the entries where a judge disagrees with the
file.
"""

import ast
import operator
import random
import re
import sys
from fractions import Fraction
from pathlib import Path

import flint
import mpmath

POINTS = 8
TRIES = 4000
BITS = 200
DIGITS = 50
DATA = Path(__file__).resolve().parent.parent / "data" / "identities.tsv"
COLUMNS = ["name", "identity", "number", "positive", "left", "right"]


class NoValue(Exception):
    """A side has no real value at a point."""


def entries():
    """The rows of the file, as dictionaries."""
    lines = [line for line in DATA.read_text().splitlines() if not line.startswith("#")]
    assert lines[0].split("\t") == COLUMNS, "the columns have other names"
    return [dict(zip(COLUMNS, line.split("\t"), strict=True)) for line in lines[1:]]


def points(entry, judge):
    """Random rational points, other ones for each judge, with the signs that the entry asks for."""
    draw = random.Random(f"{judge} {entry['name']} {entry['left']}")
    names = sorted(set(re.findall(r"\b[xyzab]\b", entry["left"] + " " + entry["right"])))
    positive = set(entry["positive"].split(",")) - {"-"}
    assert positive <= set(names), f"{entry['name']}: a positive symbol does not occur"
    for _ in range(TRIES if names else 1):
        widest = draw.choice([1, 4, 7])
        point = {name: Fraction(draw.randint(1, 997), 997) * widest for name in names}
        yield {
            name: value if name in positive else value * draw.choice([-1, 1])
            for name, value in point.items()
        }


class Balls:
    """Values as balls, from the syntax tree."""

    functions = {
        "sin": flint.arb.sin, "cos": flint.arb.cos, "tan": flint.arb.tan,
        "sinh": flint.arb.sinh, "cosh": flint.arb.cosh, "tanh": flint.arb.tanh,
        "asin": flint.arb.asin, "acos": flint.arb.acos, "atan": flint.arb.atan,
        "exp": flint.arb.exp, "ln": flint.arb.log, "sqrt": flint.arb.sqrt,
        "abs": abs, "sign": flint.arb.sgn,
    }
    operators = {ast.Add: operator.add, ast.Sub: operator.sub, ast.Mult: operator.mul, ast.Div: operator.truediv}

    def value(self, text, point):
        flint.ctx.prec = BITS
        tree = ast.parse(text.replace("^", "**"), mode="eval").body
        numbers = {name: flint.arb(flint.fmpq(v.numerator, v.denominator)) for name, v in point.items()}
        return self.of(tree, numbers)

    def of(self, node, numbers):
        match node:
            case ast.Constant(value=int(number)):
                value = flint.arb(number)
            case ast.Name(id="pi"):
                value = flint.arb.pi()
            case ast.Name(id=name):
                value = numbers[name]
            case ast.UnaryOp(op=ast.USub(), operand=inner):
                value = -self.of(inner, numbers)
            case ast.BinOp(left=base, op=ast.Pow(), right=exponent):
                value = self.power(self.of(base, numbers), self.exponent(exponent))
            case ast.BinOp(left=left, op=op, right=right):
                value = self.operators[type(op)](self.of(left, numbers), self.of(right, numbers))
            case ast.Call(func=ast.Name(id=function), args=[argument]):
                value = self.functions[function](self.of(argument, numbers))
            case _:
                raise SyntaxError(ast.dump(node))
        if not value.is_finite():
            raise NoValue
        return value

    def exponent(self, node):
        match node:
            case ast.Constant(value=int(number)):
                return Fraction(number)
            case ast.UnaryOp(op=ast.USub(), operand=inner):
                return -self.exponent(inner)
            case ast.BinOp(left=above, op=ast.Div(), right=below):
                return self.exponent(above) / self.exponent(below)
        raise SyntaxError(f"an exponent is a number: {ast.dump(node)}")

    def power(self, base, exponent):
        if exponent.denominator > 1:
            if not base >= 0:
                raise NoValue
            base = base.root(exponent.denominator)
        return base**exponent.numerator

    def vanishes(self, left, right):
        difference = left - right
        if not difference.contains(0):
            return False
        if difference.rad() > flint.arb(2) ** (-BITS // 2):
            raise NoValue  # Too wide a ball tells nothing.
        return True


class Digits:
    """Values with many digits, through the language's own evaluation of the text."""

    functions = {
        "sin": mpmath.sin, "cos": mpmath.cos, "tan": mpmath.tan,
        "sinh": mpmath.sinh, "cosh": mpmath.cosh, "tanh": mpmath.tanh,
        "asin": mpmath.asin, "acos": mpmath.acos, "atan": mpmath.atan,
        "exp": mpmath.exp, "ln": mpmath.log, "sqrt": mpmath.sqrt,
        "abs": mpmath.fabs, "sign": mpmath.sign,
    }

    def value(self, text, point):
        mpmath.mp.dps = DIGITS
        source = re.sub(r"\b\d+\b", lambda number: f"number({number.group()})", text).replace("^", "**")
        numbers = {name: mpmath.mpf(v.numerator) / v.denominator for name, v in point.items()}
        names = {**self.functions, **numbers, "number": mpmath.mpf, "pi": +mpmath.pi, "__builtins__": {}}
        # A function that leaves the real numbers on the way is refused, even if it comes back.
        for name, function in self.functions.items():
            names[name] = self.real(function)
        try:
            value = eval(compile(source, "entry", "eval"), names)
        except (ZeroDivisionError, ValueError) as error:
            raise NoValue from error
        return self.checked(value)

    def real(self, function):
        return lambda argument: self.checked(function(self.checked(argument)))

    def checked(self, value):
        if isinstance(value, mpmath.mpc) or not mpmath.isfinite(value):
            raise NoValue
        return value

    def vanishes(self, left, right):
        size = max(1, abs(left), abs(right))
        return abs(left - right) < size * mpmath.mpf(10) ** (-DIGITS + 12)


def judged(judge, entry):
    """How many of the points make the difference vanish, and how many points there were."""
    vanishing = found = 0
    for point in points(entry, type(judge).__name__):
        try:
            left, right = (judge.value(entry[side], point) for side in ("left", "right"))
            vanishing += judge.vanishes(left, right)
        except NoValue:
            continue
        found += 1
        if found == POINTS:
            break
    return vanishing, found


def main():
    rows = entries()
    names = [row["name"] for row in rows]
    assert len(set(names)) == len(names), "a name occurs twice"
    wrong = []
    for judge in (Balls(), Digits()):
        everywhere = somewhere = held = 0
        for row in rows:
            vanishing, found = judged(judge, row)
            enough = POINTS if re.search(r"\b[xyzab]\b", row["left"] + " " + row["right"]) else 1
            identity = vanishing == found
            if found < enough or identity != (row["identity"] == "true"):
                wrong.append(f"{type(judge).__name__}: {row['name']}: zero at {vanishing} of {found} points")
            elif identity:
                held += 1
            elif vanishing == 0:
                everywhere += 1
            else:
                somewhere += 1
        print(
            f"{type(judge).__name__}: {held} identities; {everywhere} non-identities that differ at every "
            f"point, {somewhere} that differ at some"
        )
    print("\n".join(wrong) or f"both judges agree with the file on all {len(rows)} entries")
    return 1 if wrong else 0


if __name__ == "__main__":
    sys.exit(main())
