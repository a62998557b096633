"""Makes labelled steps over the topics of school and first-year college, true ones and near misses.

    python3 make_steps.py COUNT SEED > steps.jsonl

A label is kept when at least two of SymPy, Maxima and PARI/GP give it; what they disagree on is dropped and counted (on
standard error at the end). Rows: id, topic, kind, lines (TeX), right (whether the step follows), by (the deciding programs),
plain (both lines in Python's notation), and assume and settings where there are any.
"""
import json
import random
import sys
import time
from collections import Counter

import sympy as sp

import calculus
import statements as st
from expr import edited, names_in, tex
from programs import gp, gp_compare, maxima, maxima_apart, maxima_zero, sympy_apart, sympy_of, sympy_zero
from expr import parse
from topics import EXPRESSIONS, signed, whole

COUNT, SEED = int(sys.argv[1]), int(sys.argv[2])
rng = random.Random(SEED)
VALUES = ['1/3', '-5/7', '13/4', '17/10', '-29/8', '2/9', '41/5', '7/11', '-1/13', '3/8', '101/9', '-77/6', '5/6', '9/14', '19/3', '-2/5']
dropped = Counter()


def points_for(names, topic):
    if not names:
        return [()]
    if topic == 'factorials' or names == ['n']:
        return [(k + 1,) * len(names) for k in range(9)] if len(names) == 1 else [(k + 2, 1 + k % 3) for k in range(9)]
    return [tuple(VALUES[(5 * k + 7 * j * (k + 1) + j * j) % len(VALUES)] for j in range(len(names))) for k in range(len(VALUES))]


def label(above, below, topic, loose=False):
    """(whether the two agree, the programs that say so), or None with the reason counted."""
    names = sorted(set(names_in(above)) | set(names_in(below)))
    names = [n for n in names if n not in ('k',) or topic not in ('sums',)]
    points = points_for(names, topic)
    seen = gp_compare(above, below, names, points, topic != 'complex', loose)
    if not seen or seen == 'x' or set(seen) == {'u'}:
        return miss('no common value' if seen else 'time')
    if 'd' in seen:
        at = points[seen.index('d')]
        by = ['pari'] + [n for n, apart in (('maxima', maxima_apart), ('sympy', sympy_apart)) if apart(above, below, names, at)]
        return (False, by) if len(by) > 1 else miss('only one says different')
    if seen.count('e') < min(len(points), 4):
        return miss('few common values')
    by = ['pari'] + (['maxima'] if maxima_zero(above, below) else [])
    if len(by) == 1 or rng.random() < 0.1:
        by += ['sympy'] if sympy_zero(above, below) else []
    return (True, by) if len(by) > 1 else miss('only one says equal')


def miss(reason):
    dropped[reason] += 1
    return None


def row(topic, kind, lines, right, by, plain, **more):
    return {'topic': topic, 'kind': kind, 'lines': lines, 'right': right, 'by': by, 'plain': plain, **more}


def dressed(above, below):
    """The same done to both lines, so that a step changes a part of a longer line."""
    pick = rng.random()
    if pick < 0.55:
        return above, below
    more = rng.choice([f'{whole(rng)}*x', f'{whole(rng)}', 'x**2', f'{signed(rng)}'])
    if pick < 0.75:
        return f'{above}+{more}', f'{more}+{below}'
    if pick < 0.9:
        k = whole(rng, 2, 7)
        return f'{k}*({above})', f'{k}*({below})'
    return f'({above})-({more})', f'({below})-({more})'


def expression_rows(topic):
    above, below = EXPRESSIONS[topic][0](rng)
    if topic not in ('complex', 'factorials'):
        above, below = dressed(above, below)
    yield from pair_rows(topic, above, below, {'numbers': 'complex'} if topic == 'complex' else None)


def pair_rows(topic, above, below, settings=None, loose=False, count=3):
    if rng.random() < 0.3:
        above, below = below, above
    for candidate in [below] + [edited(below, rng) for _ in range(rng.randint(1, count))]:
        found = candidate and label(above, candidate, topic, loose)
        if found:
            more = {'settings': settings} if settings else {}
            yield row(topic, 'expression', [tex(above), tex(candidate)], *found, [above, candidate], **more)


def statement_rows(topic):
    maker, domain = {'equations': (st.equation, None), 'inequalities': (st.inequality, None), 'interval': (st.circular, 1)}[topic]
    above, below = maker(rng)
    for candidate in [below] + [st.nearly(below, rng) for _ in range(2)]:
        # A true line without the letter is a remark and holds (rule 6c).
        if candidate is None or any(not names_in(left) + names_in(right) for left, _, right in candidate):
            continue
        if domain:
            seen = [st.gp_sets(above, candidate, '0', '(2*Pi-1e-12)'),
                    st.sympy_sets(above, candidate, sp.Interval.Ropen(0, 2 * sp.pi))]
        else:
            seen = [st.gp_sets(above, candidate), st.sympy_sets(above, candidate)]
        if seen[0] is None or seen[1] is None:
            miss('no set found')
            continue
        if seen[0] != seen[1]:
            miss('sets disagree')
            continue
        more = {'settings': {'reversible': True}} if seen[0] == 'gained' or rng.random() < 0.5 else {}
        if domain:
            more['assume'] = ['0\\le x<2\\pi']
        yield row(topic, 'statement', [st.line_tex(above), st.line_tex(candidate)], seen[0] == 'same', ['pari', 'sympy'],
                  [above, candidate], **more)


def system_rows(topic):
    above, below, values = st.system(rng)
    for candidate in [below, st.nearly(below, rng), st.nearly(below, rng)]:
        if candidate is None or (len(candidate) < len(below)):
            continue
        at = {st.symbol(name): value for name, value in values.items()}
        true = all(sympy_of(parse(l)).subs(at) == sympy_of(parse(r)).subs(at) for l, _, r in candidate)
        also = [gp.ask(f'print("@@",iferr({st.gp_text(parse(l))}==({st.gp_text(parse(r))}),e,"x"))'.replace('v_x', f'({values["x"]})')
                       .replace('v_y', f'({values["y"]})')) for l, _, r in candidate]
        if ('0' not in also) != true or 'x' in also:
            miss('systems disagree')
            continue
        yield row(topic, 'system', [st.line_tex(above, '\\text{ and }'), st.line_tex(candidate, '\\text{ and }')], true,
                  ['pari', 'sympy'], [above, candidate])


def formula_rows(topic):
    (left, sign, right), letter, value = st.formula(rng)
    for candidate in [value, edited(value, rng), edited(value, rng)]:
        if candidate is None or letter in names_in(candidate):
            continue
        put = lambda side: str(sp.sympify(side, locals=st.LOCAL).subs(st.LOCAL[letter], sp.sympify(candidate, locals=st.LOCAL)))
        found = label(put(left), put(right), topic)
        if found:
            yield row(topic, 'formula', [st.line_tex([(left, sign, right)]), f'{tex(letter)}={tex(candidate)}'], *found,
                      [[left, right], [letter, candidate]])


def calculus_rows(topic):
    yield from calculus.rows(topic, rng, row, label, pair_rows, miss)


TOPICS = {name: (expression_rows, weight) for name, (_, weight) in EXPRESSIONS.items()}
TOPICS |= {'equations': (statement_rows, 5), 'inequalities': (statement_rows, 2), 'interval': (statement_rows, 1),
           'systems': (system_rows, 2), 'formulas': (formula_rows, 2)}
TOPICS |= {name: (calculus_rows, weight) for name, weight in calculus.WEIGHTS.items()}

names = [name for name, (_, weight) in TOPICS.items() for _ in range(weight)]
made, began = 0, time.time()
seen_lines = set()
while made < COUNT:
    topic = rng.choice(names)
    try:
        found = list(TOPICS[topic][0](topic))
    except (ZeroDivisionError, SyntaxError, RecursionError, TypeError, ValueError, AttributeError, KeyError, IndexError) as cause:
        dropped[f'{topic}: {type(cause).__name__} {str(cause)[:50]}'] += 1
        continue
    for one in found:
        key = tuple(one['lines'])
        if key in seen_lines or one['lines'][0] == one['lines'][1] or made >= COUNT or '\\text{or}' in key:
            continue
        seen_lines.add(key)
        made += 1
        print(json.dumps({'id': f's{SEED}-{made}', **one}), flush=True)
print(json.dumps({'made': made, 'seconds': round(time.time() - began), 'dropped': dropped,
                  'timeouts': {'pari': gp.timeouts, 'maxima': maxima.timeouts}}), file=sys.stderr)
gp.stop()
maxima.stop()
