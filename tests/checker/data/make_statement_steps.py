"""Writes steps between statements in x with the truth found by SymPy, one JSON line each.

Usage: make_statement_steps.py SEED COUNT
Each step is labelled "same" or "different": whether both lines have the same real solutions (within 0 <= x < 2 pi for
the circular ones). Steps whose lines are never or always true, or that SymPy cannot solve, are left out.
"""
import json
import random
import sys

import sympy as sp
from sympy.calculus.util import continuous_domain

x = sp.Symbol('x', real=True)
rng = random.Random(int(sys.argv[1]))
COUNT = int(sys.argv[2])


def tex(expr):
    return sp.latex(expr, ln_notation=True).replace('|{', '|').replace('}\\right|', '\\right|')


def small(low=-6, high=6, zero=False):
    while True:
        value = rng.randint(low, high)
        if value or zero:
            return value


def poly_pair():
    roots = [small(zero=True) for _ in range(rng.choice([1, 2, 2, 2, 3]))]
    lead = rng.choice([1, 1, 1, 2, -1, 3])
    p = lead * sp.prod([x - r for r in roots])
    if rng.random() < 0.2:
        p = p * (x**2 - rng.choice([2, 3, 5]))
    e = sp.expand(p)
    shift = sp.expand(e - rng.randint(-5, 5) - rng.randint(-3, 3) * x)
    left, right = e - shift, -shift
    return (left, '=', right), other_poly(p, roots)


def other_poly(p, roots):
    kind = rng.choice(['expand', 'scale', 'factor', 'list', 'drop', 'sign', 'bump', 'wronglist'])
    if kind == 'expand':
        return sp.expand(p), '=', sp.Integer(0)
    if kind == 'scale':
        return sp.expand(p * rng.choice([2, -3, sp.Rational(1, 2)])), '=', sp.Integer(0)
    if kind == 'factor':
        return sp.factor(p), '=', sp.Integer(0)
    if kind == 'drop' and len(roots) > 1:
        return sp.expand(sp.prod([x - r for r in roots[1:]])), '=', sp.Integer(0)
    if kind == 'sign':
        return sp.expand(p.subs(x, -x)), '=', sp.Integer(0)
    if kind == 'bump':
        return sp.expand(p + small(-2, 2)), '=', sp.Integer(0)
    if kind == 'wronglist':
        wrong = list(roots)
        wrong[0] += rng.choice([-1, 1, 2])
        return [(x, '=', sp.Integer(r)) for r in sorted(set(wrong))]
    values = sorted(sp.solveset(p, x, sp.S.Reals), key=float)
    return [(x, '=', r) for r in values]


def radical_pair():
    a, b, c, d = small(1, 4), small(-6, 9), small(-3, 3, True), small(-5, 5)
    first = (sp.sqrt(a * x + b), '=', c * x + d)
    square = sp.expand(a * x + b - (c * x + d) ** 2)
    return first, rng.choice([(square, '=', sp.Integer(0)), (sp.sqrt(a * x + b) - c * x, '=', sp.Integer(d)), listed(first)])


def absolute_pair():
    a, b, c, d = small(1, 4), small(), small(1, 8), small(-3, 3)
    first = rng.choice([(sp.Abs(a * x + b), '=', sp.Integer(c)), (sp.Abs(a * x + b), '=', sp.Abs(x + d)), (sp.Abs(x + b), '=', d * x + c)])
    return first, rng.choice([listed(first), (a * x + b, '=', sp.Integer(c)), (first[0] ** 2, '=', first[2] ** 2)])


def rational_pair():
    a, b, c, d, e = small(), small(), small(), small(), small(-4, 4, True)
    first = (a / (x - b) + c / (x - d), '=', sp.Integer(e))
    cleared = sp.expand(a * (x - d) + c * (x - b) - e * (x - b) * (x - d))
    return first, rng.choice([(cleared, '=', sp.Integer(0)), (sp.expand(cleared + rng.choice([0, 1, x])), '=', sp.Integer(0)), listed(first)])


def exponential_pair():
    kind = rng.randint(0, 2)
    if kind == 0:
        base, c, d = rng.choice([2, 3, 5]), small(1, 3), small(-4, 4)
        first = (sp.Pow(base, x + d, evaluate=False), '=', sp.Pow(base, c * x - 1, evaluate=False))
        return first, rng.choice([(x + d, '=', c * x - 1), (x + d, '=', c * x + 1), listed(first)])
    p, q = small(1, 6), small(1, 6)
    first = (sp.exp(2 * x) - (p + q) * sp.exp(x) + p * q, '=', sp.Integer(0))
    wrong = rng.choice([0, 0, 1])
    return first, rng.choice([
        [(sp.exp(x), '=', sp.Integer(p + wrong)), (sp.exp(x), '=', sp.Integer(q))],
        [(x, '=', sp.log(p + wrong)), (x, '=', sp.log(q))],
        (sp.exp(x), '=', sp.Integer(p)),
    ])


def logarithm_pair():
    a, b, c = small(-4, 4, True), small(-4, 4, True), small(1, 12)
    first = (sp.log(x - a) + sp.log(x - b), '=', sp.log(c))
    return first, rng.choice([
        (sp.expand((x - a) * (x - b) - c), '=', sp.Integer(0)),
        (sp.log((x - a) * (x - b)), '=', sp.log(c)),
        (2 * x - a - b, '=', sp.Integer(c)),
        listed(first),
    ])


def inequality_pair():
    r, s = small(zero=True), small(zero=True)
    p = rng.choice([1, 1, -1, 2]) * (x - r) * (x - s)
    rel = rng.choice(['<', '<=', '>', '>='])
    flip = {'<': '>', '>': '<', '<=': '>=', '>=': '<='}
    strict = {'<': '<=', '<=': '<', '>': '>=', '>=': '>'}
    first = (sp.expand(p), rel, sp.Integer(0))
    return first, rng.choice([
        (sp.expand(-p), flip[rel], sp.Integer(0)),
        (sp.expand(-2 * p), rel, sp.Integer(0)),
        (sp.factor(p), rel, sp.Integer(0)),
        (sp.expand(p), strict[rel], sp.Integer(0)),
        (x - r, rel, sp.Integer(0)),
    ])


def quotient_inequality_pair():
    a, b, c = small(), small(), small(-3, 3)
    rel = rng.choice(['<', '<=', '>', '>='])
    first = ((x + a) / (x + b), rel, sp.Integer(c))
    return first, rng.choice([
        (sp.expand((x + a) * (x + b) - c * (x + b) ** 2), rel, sp.Integer(0)),
        (x + a, rel, sp.expand(c * (x + b))),
        (sp.together((x + a) / (x + b) - c), rel, sp.Integer(0)),
    ])


def circular_pair():
    value = rng.choice([0, sp.Rational(1, 2), -sp.Rational(1, 2), 1, -1, sp.sqrt(3) / 2, -sp.sqrt(2) / 2])
    f = rng.choice([sp.sin, sp.cos])
    first = (rng.choice([2, 3]) * f(x), '=', None)
    first = (first[0], '=', first[0].subs(x, 0) * 0 + first[0].coeff(f(x)) * value)
    g = rng.choice([(sp.sin(2 * x), '=', f(x)), first])
    pool = [listed(g), (sp.sin(x) * (2 * sp.cos(x) - 1), '=', sp.Integer(0)), (f(x), '=', value), (2 * sp.cos(x), '=', sp.Integer(1))]
    return g, rng.choice(pool)


def listed(relation):
    """All solutions, sometimes with one left out or moved."""
    found = solutions(relation, relation_domain(relation))
    if not isinstance(found, sp.FiniteSet) or len(found) == 0 or len(found) > 8:
        return None
    values = sorted(found, key=lambda v: float(v))
    trick = rng.random()
    if trick < 0.25 and len(values) > 1:
        values = values[1:]
    elif trick < 0.4:
        values[0] = values[0] + 1
    return [(x, '=', v) for v in values]


def relation_domain(relation):
    parts = relation if isinstance(relation, list) else [relation]
    circular = any(side.has(sp.sin, sp.cos) for part in parts for side in (part[0], part[2]))
    return sp.Interval.Ropen(0, 2 * sp.pi) if circular else sp.S.Reals


def solutions(relation, domain):
    if isinstance(relation, list):
        return sp.Union(*[solutions(part, domain) for part in relation])
    left, rel, right = relation
    f = left - right
    inside = continuous_domain(left, x, domain).intersect(continuous_domain(right, x, domain))
    if rel == '=':
        return sp.solveset(sp.Eq(left, right), x, inside)
    kinds = {'<': sp.Lt, '<=': sp.Le, '>': sp.Gt, '>=': sp.Ge}
    return sp.solveset(kinds[rel](f, 0), x, inside)


def line(relation):
    signs = {'=': '=', '<': '<', '>': '>', '<=': '\\le ', '>=': '\\ge '}
    parts = relation if isinstance(relation, list) else [relation]
    return '\\text{ or }'.join(f'{tex(left)}{signs[rel]}{tex(right)}' for left, rel, right in parts)


MAKERS = [poly_pair, poly_pair, poly_pair, radical_pair, absolute_pair, rational_pair, exponential_pair, logarithm_pair,
          inequality_pair, inequality_pair, quotient_inequality_pair, circular_pair]


def same_sets(a, b):
    if a == b:
        return True
    if isinstance(a, sp.FiniteSet) and isinstance(b, sp.FiniteSet):
        near = [sp.N(v, 30) for v in a], [sp.N(v, 30) for v in b]
        return all(any(abs(p - q) < 1e-20 for q in near[1]) for p in near[0]) and all(
            any(abs(p - q) < 1e-20 for q in near[0]) for p in near[1])
    difference = sp.SymmetricDifference(a, b) if a.is_subset(sp.S.Reals) else None
    return difference is not None and difference.simplify() == sp.S.EmptySet


made = 0
tries = 0
while made < COUNT and tries < 20 * COUNT:
    tries += 1
    maker = rng.choice(MAKERS)
    try:
        above, below = maker()
        if below is None:
            continue
        circular = maker is circular_pair
        domain = sp.Interval.Ropen(0, 2 * sp.pi) if circular else sp.S.Reals
        a, b = solutions(above, domain), solutions(below, domain)
        if a.has(sp.ConditionSet) or b.has(sp.ConditionSet):
            continue
        if a in (sp.S.EmptySet, domain) and b in (sp.S.EmptySet, domain):
            continue
        label = 'same' if same_sets(a, b) else 'different'
    except (NotImplementedError, TypeError, ValueError, AttributeError, RecursionError):
        continue
    made += 1
    row = {'id': made, 'topic': maker.__name__, 'lines': [line(above), line(below)], 'label': label,
           'settings': {'reversible': True}, 'above': str(a), 'below': str(b)}
    if circular:
        row['assume'] = ['0\\le x<2\\pi']
    print(json.dumps(row), flush=True)
