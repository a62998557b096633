"""Steps of calculus, sums and matrices."""
import sympy as sp

from expr import edited, parse, tex
from programs import Late, Limit, maxima, maxima_text, symbol, sympy_of
from topics import lin, signed, whole

WEIGHTS = {'derivatives': 3, 'antiderivatives': 2, 'integrals': 1, 'limits': 1, 'sums': 1, 'matrices': 2}


def function(rng, smooth=False):
    a, b, n = whole(rng, 1, 5), signed(rng, 5), whole(rng, 2, 5)
    parts = [f'{a}*x**{n}', f'sin({a}*x)', f'cos(x)', f'exp({a}*x)', f'x**{n}', f'{a}*x', f'x*exp(x)', f'x*sin(x)', f'(x**2+{a})**{n}']
    if not smooth:
        parts += ['log(x)', 'sqrt(x)', f'1/x**{n}', f'log({lin(rng)})', f'x/({lin(rng)})', 'tan(x)', f'sin(x)**{n}', 'atan(x)', f'exp(x)/x']
    first, second = rng.choice(parts), rng.choice(parts)
    return rng.choice([first, f'{first}+{second}', f'{first}-{b}*x'.replace('--', '+'), first if smooth else f'{first}*{second}'])


def text(expr):
    return str(expr)


def rows(topic, rng, row, label, pair_rows, miss):
    x = symbol('x')
    if topic == 'derivatives':
        f = function(rng)
        with_limit = derivative(f, x)
        yield from pair_rows_one_way(topic, f'D({f},x)', with_limit, rng, row, label, True)
    elif topic == 'antiderivatives':
        yield from antiderivative_rows(topic, function(rng, True), rng, row, label, x)
    elif topic == 'integrals':
        a, b = sorted((whole(rng, 0, 3), whole(rng, 1, 5)))
        f = function(rng, True)
        value = solved(lambda: sp.integrate(sympy_of(parse(f)), (x, a, b)))
        if value is not None and not value.has(sp.Integral):
            yield from pair_rows_one_way(topic, f'Int({f},x,{a},{b})', text(value), rng, row, label, True)
    elif topic == 'limits':
        yield from limit_rows(topic, rng, row, miss)
    elif topic == 'sums':
        f = rng.choice(['k', 'k**2', 'k**3', f'{whole(rng)}*k+{whole(rng)}', '2**k', f'{whole(rng, 2, 4)}**k', '1/(k*(k+1))', f'k*(k+{whole(rng)})'])
        value = solved(lambda: sp.factor(sp.summation(sympy_of(parse(f)), (symbol('k'), 1, symbol('n')))))
        if value is not None and not value.has(sp.Sum, sp.Piecewise):
            yield from pair_rows_one_way(topic, f'Sum({f},k,1,n)', text(value), rng, row, label, False)
    else:
        yield from matrix_rows(topic, rng, row)


def solved(make):
    try:
        with Limit(2):
            return make()
    except (Late, Exception):
        return None


def derivative(f, x):
    value = sp.diff(sympy_of(parse(f)), x)
    return text(solved(lambda: sp.simplify(value)) or value)


def pair_rows_one_way(topic, above, below, rng, row, label, loose):
    for candidate in [below] + [edited(below, rng) for _ in range(rng.randint(1, 2))]:
        found = candidate and label(above, candidate, topic, loose)
        if found:
            yield row(topic, 'calculus', [tex(above), tex(candidate)], *found, [above, candidate])


def antiderivative_rows(topic, f, rng, row, label, x):
    found = solved(lambda: sp.integrate(sp.expand(sympy_of(parse(f))), x))
    if found is None or found.has(sp.Integral, sp.Piecewise):
        return
    for candidate in [text(found)] + [edited(text(found), rng) for _ in range(rng.randint(1, 2))]:
        verdict = candidate and label(f'D({candidate},x)', f, topic, True)
        if verdict:
            yield row(topic, 'calculus', [tex(f'Int({f},x)'), tex(candidate) + '+C'], *verdict, [f'Int({f},x)', candidate])


def limit_rows(topic, rng, row, miss):
    a, b, n = whole(rng, 1, 6), whole(rng, 1, 6), whole(rng, 2, 4)
    f, to = rng.choice([
        (f'(x**2-{a * a})/(x-{a})', str(a)), (f'sin({a}*x)/x', '0'), (f'({a}*x**2+{b})/({b}*x**2+x)', 'oo'),
        (f'(exp({a}*x)-1)/x', '0'), (f'(1-cos({a}*x))/x**2', '0'), (f'x**{n}*exp(-x)', 'oo'), (f'(1+{a}/x)**x', 'oo'),
        (f'(sqrt(x+{a * a})-{a})/x', '0'), (f'({a}*x+{b})/(x**2+1)', 'oo'), (f'log(1+{a}*x)/x', '0'),
        (f'tan({a}*x)/sin({b}*x)', '0'), (f'(x**3-{a ** 3})/(x**2-{a * a})', str(a)),
    ])
    value = solved(lambda: sp.limit(sympy_of(parse(f)), symbol('x'), sympy_of(parse(to))))
    answer = maxima.ask(f'print("@@",errcatch(limit({maxima_text(parse(f))},v_x,{maxima_text(parse(to))})))$')
    if value is None or not answer:
        miss('limit not found')
        return
    other = answer.strip('[] ').replace('%e', 'E').replace('%pi', 'pi').replace('^', '**')
    if other in ('inf', 'und', 'ind') or not value.is_finite or sp.simplify(sp.sympify(other) - value) != 0:
        miss('limits disagree')
        return
    for candidate in [text(value), edited(text(value), rng), edited(text(value), rng)]:
        if candidate:
            is_right = solved(lambda: bool(sp.simplify(sp.sympify(candidate) - value) == 0))
            if is_right is not None and sp.sympify(candidate).is_finite:
                yield row(topic, 'calculus', [tex(f'Lim({f},x,{to})'), tex(candidate)], is_right, ['maxima', 'sympy'],
                          [f'Lim({f},x,{to})', candidate])


def matrix_rows(topic, rng, row):
    entry = lambda: rng.choice([str(signed(rng, 5)), str(whole(rng, 0, 5)), rng.choice(['a', 'b', 'x'])])
    matrix = lambda r, c: '[' + ','.join('[' + ','.join(entry() for _ in range(c)) + ']' for _ in range(r)) + ']'
    kind = rng.randrange(4)
    if kind == 0:
        above = f'{matrix(2, 2)}*{matrix(2, rng.choice([1, 2]))}'
    elif kind == 1:
        above = f'{matrix(2, 2)}+{matrix(2, 2)}'
    elif kind == 2:
        above = f'{whole(rng, 2, 5)}*{matrix(2, 2)}'
    else:
        above = f'det({matrix(*rng.choice([(2, 2), (3, 3)]))})'
    value = sympy_of(parse(above))
    below = text(value.tolist()) if isinstance(value, sp.MatrixBase) else text(sp.expand(value))
    for candidate in [below, edited(below, rng), edited(below, rng)]:
        other = candidate and solved(lambda: sympy_of(parse(candidate)))
        if other is None or isinstance(other, sp.MatrixBase) != isinstance(value, sp.MatrixBase):
            continue
        difference = value - other
        is_right = difference.expand().is_zero_matrix if isinstance(value, sp.MatrixBase) else sp.expand(difference) == 0
        answer = maxima.ask(f'print("@@",errcatch(ratsimp({maxima_text(parse(above))}-({maxima_text(parse(candidate))}))))$')
        if not answer or answer in ('[]',):
            continue
        nonzero = any(c in '123456789abx' for c in answer.replace('matrix', '').replace('v_', ''))
        if nonzero != (not is_right):
            continue
        yield row(topic, 'calculus', [tex(above), tex(candidate)], bool(is_right), ['maxima', 'sympy'], [above, candidate])
