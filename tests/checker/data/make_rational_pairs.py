"""Writes pairs of rational expressions with SymPy's word on whether they are equal, one JSON object a line.

    /usr/bin/python3 make_rational_pairs.py SEED COUNT

The first of a pair is drawn at random; the second is the first rewritten by SymPy, or that with one number changed.
"""

import json
import random
import sys

from sympy import Integer, Rational, apart, cancel, expand, factor, fraction, latex, symbols, together

LETTERS = symbols("x y a b")


def number(draw):
    return Rational(draw.randint(-9, 9) or 1, draw.choice([1, 1, 1, 2, 3, 5]))


def leaf(draw, letters):
    return draw.choice(letters) if draw.random() < 0.6 else number(draw)


def expression(draw, letters, depth):
    if depth == 0:
        return leaf(draw, letters)
    left = expression(draw, letters, depth - 1)
    kind = draw.random()
    if kind < 0.35:
        return left + expression(draw, letters, depth - 1)
    if kind < 0.55:
        return left - expression(draw, letters, depth - 1)
    if kind < 0.8:
        return left * expression(draw, letters, depth - 1)
    if kind < 0.9:
        return left ** draw.randint(2, 3)
    below = expression(draw, letters, depth - 1)
    return left if cancel(below) == 0 else left / below


def rewritten(draw, expr, letters):
    way = draw.choice([expand, factor, together, cancel, apart])
    if way is apart and len(expr.free_symbols) != 1:
        way = together
    return way(expr)


def changed(draw, expr):
    numbers = sorted(expr.atoms(Integer), key=str)
    if not numbers:
        return expr + draw.choice([-1, 1])
    old = draw.choice(numbers)
    return expr.subs(old, old + draw.choice([-1, 1, 2]))


def pair(draw):
    letters = LETTERS[: draw.randint(1, 4)]
    above = expression(draw, letters, draw.randint(2, 3))
    below = rewritten(draw, above, letters)
    if draw.random() < 0.5:
        below = changed(draw, below)
    if not (above.is_finite is not False and below.is_finite is not False):
        return None
    texts = [latex(above), latex(below)]
    if any("zoo" in text or "nan" in text or "infty" in text for text in texts) or max(map(len, texts)) > 600:
        return None
    # cancel() of SymPy 1.11 leaves (x+1/5)**3 minus its expansion standing, so the numerator is multiplied out instead.
    return {"lines": texts, "equal": expand(fraction(together(above - below))[0]) == 0}


def main(seed, count):
    draw = random.Random(seed)
    made = 0
    while made < count:
        found = pair(draw)
        if found:
            made += 1
            print(json.dumps(found))


main(int(sys.argv[1]), int(sys.argv[2]))
