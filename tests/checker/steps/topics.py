"""Random true steps from one expression to another, by topic: pairs of texts in Python's notation.

Identities are school and college ones; expanding, factoring and the like are done by SymPy.
"""
import sympy as sp

from programs import sympy_of
from expr import parse


def whole(rng, low=1, high=9):
    return rng.randint(low, high)


def signed(rng, high=9):
    return rng.choice([v for v in range(-high, high + 1) if v])


def lin(rng, letter='x', high=6):
    a, b = rng.choice([1, 1, 1, 2, 3, 4, 5]), signed(rng, high)
    head = letter if a == 1 else f'{a}*{letter}'
    return f'({head}+{b})' if b > 0 else f'({head}-{-b})'


def poly(rng, letter='x', degree=2):
    x = sp.Symbol(letter)
    return str(sum(rng.randint(-6, 6) * x**k for k in range(degree)) + signed(rng, 4) * x**degree)


def by_sympy(text, change):
    local = {name: sp.Symbol(name) for name in 'abcuvxyzt'}
    return str(change(sp.sympify(text, locals=local)))


def algebra(rng):
    x, y = rng.choice([('x', 'y'), ('a', 'b'), ('t', 'u'), ('x', 'z')])
    a, b, c, d = whole(rng), whole(rng), whole(rng), whole(rng)
    p, q, r = lin(rng, x), lin(rng, x), lin(rng, y)
    kind = rng.randrange(16)
    if kind == 0:
        return f'{p}*{q}', by_sympy(f'{p}*{q}', sp.expand)
    if kind == 1:
        n = rng.choice([2, 3, 3, 4])
        return f'{p}**{n}', by_sympy(f'{p}**{n}', sp.expand)
    if kind == 2:
        s = by_sympy(f'{p}*{q}*{a}', sp.expand)
        return s, by_sympy(s, sp.factor)
    if kind == 3:
        s = f'{a}*{p}-{b}*{q}'
        return s, by_sympy(s, sp.expand)
    if kind == 4:
        s = f'({x}+{a}*{y})*({b}*{x}-{y})-{c}*{x}*{y}'
        return s, by_sympy(s, sp.expand)
    if kind == 5:
        s = f'({a}*{x}+{b}*{y}-{c})**2'
        return s, by_sympy(s, sp.expand)
    if kind == 6:
        return f'{a}**2*{x}**2-{b}**2*{y}**2', f'({a}*{x}-{b}*{y})*({a}*{x}+{b}*{y})'
    if kind == 7:
        return f'{x}**3+{a**3}', f'({x}+{a})*({x}**2-{a}*{x}+{a * a})'
    if kind == 8:
        s = f'{a}/{b}+{c}/{d}'
        return s, by_sympy(s, sp.together)
    if kind == 9:
        return f'{x}**2+{2 * a}*{x}+{b}', f'({x}+{a})**2+({b - a * a})'
    if kind == 10:
        m, n = whole(rng, 2, 5), whole(rng, 2, 4)
        return f'({a}*{x}**{m}*{y})**{n}', f'{a ** n}*{x}**{m * n}*{y}**{n}'
    if kind == 11:
        s = f'{a}*({x}-{b}*({x}-{c}*({y}-{d})))'
        return s, by_sympy(s, sp.expand)
    if kind == 12:
        s = f'{p}*{q}-{p}*{r}'
        return s, f'{p}*({q[1:-1]}-{r})'
    if kind == 13:
        return f'({x}+{y})**3', f'{x}**3+3*{x}**2*{y}+3*{x}*{y}**2+{y}**3'
    if kind == 14:
        s = f'{poly(rng, x, 3)}-({poly(rng, x, 2)})'
        return s, by_sympy(s, sp.expand)
    return f'{a}*{x}*{y}+{b}*{x}+{c}*{y}-{d}*{x}*{y}', f'{a - d}*{x}*{y}+{b}*{x}+{c}*{y}'.replace('+-', '-')


def fractions(rng):
    x = rng.choice(['x', 'x', 't', 'a'])
    y = rng.choice(['y', 'b'])
    a, b, c, d = whole(rng), whole(rng), whole(rng), whole(rng)
    p, q, r = lin(rng, x), lin(rng, x), lin(rng, y)
    kind = rng.randrange(12)
    if kind == 0:
        s = f'{a}/{p}+{b}/{q}'
        return s, by_sympy(s, sp.together)
    if kind == 1:
        s = f'{a}/{p}-{b}/{q}'
        return s, by_sympy(s, lambda e: sp.factor(sp.together(e)))
    if kind == 2:
        s = by_sympy(f'{p}*{q}', sp.expand)
        return f'({s})/{p}', q
    if kind == 3:
        n = by_sympy(f'{p}*{q}', sp.expand)
        m = by_sympy(f'{p}*({x}+{c})', sp.expand)
        return f'({n})/({m})', f'{q}/({x}+{c})'
    if kind == 4:
        return f'({a}/{x})/({b}/{y})', f'{a}*{y}/({b}*{x})'
    if kind == 5:
        return f'({p}/{q})*({q}/{r})', f'{p}/{r}'
    if kind == 6:
        return f'(1/{x}+1/{y})/(1/{x}-1/{y})', f'({y}+{x})/({y}-{x})'
    if kind == 7:
        s = f'{a}/({p}*{q})' if p != q else f'{a}/({p}*({x}+10))'
        return s, by_sympy(s, lambda e: sp.apart(e, sp.Symbol(x)))
    if kind == 8:
        return f'({a}*{x}+{b}*{y})/({x}*{y})', f'{a}/{y}+{b}/{x}'
    if kind == 9:
        return f'{x}**(-{a})*{y}**{b}', f'{y}**{b}/{x}**{a}'
    if kind == 10:
        s = f'({poly(rng, x, 2)})/{p}'
        return s, by_sympy(s, lambda e: sp.apart(e, sp.Symbol(x)))
    return f'{a}/({x}-{b})+{c}/({b}-{x})', f'({a}-{c})/({x}-{b})'


def roots(rng):
    x, y = rng.choice([('x', 'y'), ('a', 'b')])
    a, b, c, k = whole(rng), whole(rng), whole(rng), whole(rng, 2, 6)
    u = lin(rng, x)
    kind = rng.randrange(18)
    pairs = [
        (f'sqrt({k * k * b})', f'{k}*sqrt({b})'),
        (f'sqrt({k * k * a})+sqrt({a})', f'{k + 1}*sqrt({a})'),
        (f'1/(sqrt({x})+{a})', f'(sqrt({x})-{a})/({x}-{a * a})'),
        (f'(sqrt({x})+{a})**2', f'{x}+{2 * a}*sqrt({x})+{a * a}'),
        (f'sqrt({x}**2)', f'Abs({x})'),
        (f'sqrt({u}**2)', f'Abs({u})'),
        (f'sqrt({x})*sqrt({y})', f'sqrt({x}*{y})'),
        (f'(sqrt({x})-sqrt({y}))*(sqrt({x})+sqrt({y}))', f'{x}-{y}'),
        (f'sqrt({k * k}*{x})', f'{k}*sqrt({x})'),
        (f'{x}/sqrt({x})', f'sqrt({x})'),
        (f'{x}**(1/2)*{x}**(1/3)', f'{x}**(5/6)'),
        (f'{x}*sqrt({x})', f'{x}**(3/2)'),
        (f'cbrt({k ** 3}*{x})', f'{k}*cbrt({x})'),
        (f'(sqrt({a})+sqrt({b}))**2', f'{a + b}+2*sqrt({a * b})'),
        (f'sqrt({x}+{a})*sqrt({x}+{a})', f'{x}+{a}'),
        (f'{a}/sqrt({k})', f'{a}*sqrt({k})/{k}'),
        (f'(sqrt({x}+{a})-sqrt({x}))*(sqrt({x}+{a})+sqrt({x}))', f'{a}'),
        (f'sqrt({x}**4*{a * a})', f'{a}*{x}**2'),
    ]
    return pairs[kind]


def exponentials(rng):
    x, y = rng.choice([('x', 'y'), ('t', 'u'), ('a', 'b')])
    a, b, k = whole(rng), whole(rng), whole(rng, 2, 5)
    pairs = [
        (f'exp({x})*exp({y})', f'exp({x}+{y})'),
        (f'exp({a}*{x})/exp({b}*{x})', f'exp({a}*{x}-{b}*{x})'),
        (f'(exp({x}))**{k}', f'exp({k}*{x})'),
        (f'{k}**{x}*{k}**{b}', f'{k}**({x}+{b})'),
        (f'{k * k}**{x}', f'{k}**(2*{x})'),
        (f'(exp({x})+exp(-{x}))**2', f'exp(2*{x})+2+exp(-2*{x})'),
        (f'exp(2*{x})-{k * k}', f'(exp({x})-{k})*(exp({x})+{k})'),
        (f'{k}**({x}+1)-{k}**{x}', f'{k - 1}*{k}**{x}'),
        (f'exp(-{x})', f'1/exp({x})'),
        (f'exp({a}*log({x}))', f'{x}**{a}'),
        (f'(exp({x})-1)/(exp({x})+1)', f'(1-exp(-{x}))/(1+exp(-{x}))'),
        (f'{k}**{x}*{b}**{x}', f'{k * b}**{x}'),
    ]
    return rng.choice(pairs)


def logarithms(rng):
    x, y = rng.choice([('x', 'y'), ('a', 'b')])
    a, b, k = whole(rng), whole(rng, 2, 9), whole(rng, 2, 5)
    u = lin(rng, x)
    pairs = [
        (f'log({x})+log({y})', f'log({x}*{y})'),
        (f'log({x})-log({y})', f'log({x}/{y})'),
        (f'{k}*log({x})', f'log({x}**{k})'),
        (f'log({b}*{x})', f'log({b})+log({x})'),
        (f'log(sqrt({x}))', f'log({x})/2'),
        (f'log({b ** k})', f'{k}*log({b})'),
        (f'log({u}**2)', f'2*log(Abs({u}))'),
        (f'logb({b},{x})', f'log({x})/log({b})'),
        (f'logb({b},{b ** k})', f'{k}'),
        (f'logb({b},{b}**{x})', f'{x}'),
        (f'log(1/{x})', f'-log({x})'),
        (f'log({x}**{k}*sqrt({y}))', f'{k}*log({x})+log({y})/2'),
        (f'log(exp({x})*{y})', f'{x}+log({y})'),
        (f'logb({b},{x})+logb({b},{y})', f'logb({b},{x}*{y})'),
        (f'log({x}**2-{a * a})', f'log(({x}-{a})*({x}+{a}))'),
        (f'log(exp({a}*{x}+{b}))', f'{a}*{x}+{b}'),
    ]
    return rng.choice(pairs)


def trigonometry(rng):
    x, y = rng.choice([('x', 'y'), ('theta', 'alpha'), ('alpha', 'beta'), ('t', 'u')])
    u = rng.choice([x, x, f'2*{x}', f'{x}/2', f'3*{x}'])
    pairs = [
        (f'sin({u})**2', f'1-cos({u})**2'),
        (f'sin({x}+{y})', f'sin({x})*cos({y})+cos({x})*sin({y})'),
        (f'cos({x}-{y})', f'cos({x})*cos({y})+sin({x})*sin({y})'),
        (f'sin(2*{u})', f'2*sin({u})*cos({u})'),
        (f'cos(2*{u})', f'cos({u})**2-sin({u})**2'),
        (f'cos(2*{u})', f'1-2*sin({u})**2'),
        (f'tan({u})', f'sin({u})/cos({u})'),
        (f'1+tan({u})**2', f'1/cos({u})**2'),
        (f'(1-cos({u}))*(1+cos({u}))', f'sin({u})**2'),
        (f'(sin({u})+cos({u}))**2', f'1+sin(2*({u}))'),
        (f'sin({x})/(1+cos({x}))', f'(1-cos({x}))/sin({x})'),
        (f'cos(3*{x})', f'4*cos({x})**3-3*cos({x})'),
        (f'sin({x})*sin({y})', f'(cos({x}-{y})-cos({x}+{y}))/2'),
        (f'sin({x})+sin({y})', f'2*sin(({x}+{y})/2)*cos(({x}-{y})/2)'),
        (f'tan({x}+{y})', f'(tan({x})+tan({y}))/(1-tan({x})*tan({y}))'),
        (f'sin(pi/2-{x})', f'cos({x})'),
        (f'cos({x}+pi)', f'-cos({x})'),
        (f'sin(-{x})', f'-sin({x})'),
        (f'sec({u})**2-1', f'tan({u})**2'),
        (f'tan({x})+cot({x})', f'sec({x})*csc({x})'),
        (f'cos({u})**4-sin({u})**4', f'cos(2*({u}))'),
        (f'cos({u})**2', f'(1+cos(2*({u})))/2'),
        (f'1/(1-sin({x}))+1/(1+sin({x}))', f'2*sec({x})**2'),
    ]
    return rng.choice(pairs)


def inverses(rng):
    x, k = rng.choice(['x', 't']), whole(rng, 2, 6)
    pairs = [
        (f'sin(asin({x}))', x), (f'cos(asin({x}))', f'sqrt(1-{x}**2)'), (f'sin(acos({x}))', f'sqrt(1-{x}**2)'),
        (f'asin({x})+acos({x})', 'pi/2'), (f'tan(atan({k}*{x}))', f'{k}*{x}'), (f'asin(-{x})', f'-asin({x})'),
        (f'cos(atan({x}))', f'1/sqrt(1+{x}**2)'), (f'sin(2*atan({x}))', f'2*{x}/(1+{x}**2)'),
        (f'sinh(2*{x})', f'2*sinh({x})*cosh({x})'), (f'cosh({x})**2-sinh({x})**2', '1'),
        (f'cosh({x})+sinh({x})', f'exp({x})'), (f'tanh({x})', f'(exp({x})-exp(-{x}))/(exp({x})+exp(-{x}))'),
        (f'acos(-{x})', f'pi-acos({x})'), (f'tan(asin({x}))', f'{x}/sqrt(1-{x}**2)'), (f'asin(1/2)', 'pi/6'),
        (f'cos(2*asin({x}))', f'1-2*{x}**2'), ('atan(1/2)+atan(1/3)', 'pi/4'), (f'cosh(2*{x})', f'2*cosh({x})**2-1'),
    ]
    return rng.choice(pairs)


def bars(rng):
    x, y, a, k = 'x', 'y', whole(rng), whole(rng, 2, 6)
    u = lin(rng, x)
    pairs = [
        (f'Abs({k}*{x})', f'{k}*Abs({x})'), (f'Abs({x}*{y})', f'Abs({x})*Abs({y})'), (f'Abs({x}-{a})', f'Abs({a}-{x})'),
        (f'Abs({u})**2', f'{u}**2'), (f'Abs({x}/{y})', f'Abs({x})/Abs({y})'), (f'Abs(-{u})', f'Abs({u})'),
        (f'Abs({x}**2)', f'{x}**2'), (f'Abs({x})*Abs({x})', f'{x}**2'), (f'Abs({x}**2+{a})', f'{x}**2+{a}'),
        (f'({x}+{y}+Abs({x}-{y}))*2', f'2*{x}+2*{y}+2*Abs({y}-{x})'), (f'Abs({x})**3', f'{x}**2*Abs({x})'),
    ]
    return rng.choice(pairs)


def factorials(rng):
    n, k = 'n', whole(rng, 2, 5)
    pairs = [
        (f'factorial({n}+1)/factorial({n})', f'{n}+1'), (f'factorial({n}+2)/factorial({n})', f'({n}+2)*({n}+1)'),
        (f'{n}*factorial({n}-1)', f'factorial({n})'), (f'factorial({n}+1)-factorial({n})', f'{n}*factorial({n})'),
        (f'binomial({n},2)', f'{n}*({n}-1)/2'), (f'binomial({n},1)+binomial({n},2)', f'binomial({n}+1,2)'),
        (f'factorial({k + 3})/factorial({k + 1})', f'{(k + 3) * (k + 2)}'), (f'binomial({k + 4},{k})', f'binomial({k + 4},4)'),
        (f'1/factorial({n})-1/factorial({n}+1)', f'{n}/factorial({n}+1)'), (f'binomial({n}+1,{n})', f'{n}+1'),
        (f'(-1)**(2*{n})', '1'), (f'{k}**({n}+1)/{k}**{n}', f'{k}'), (f'factorial(2*{n})/factorial(2*{n}-1)', f'2*{n}'),
    ]
    return rng.choice(pairs)


def complexes(rng):
    a, b, c, d = signed(rng), signed(rng), signed(rng), signed(rng)
    s = rng.choice([f'({a}+{b}*I)*({c}+{d}*I)', f'({a}+{b}*I)-({c}-{d}*I)', f'({a}+{b}*I)**2', f'({a}+{b}*I)/({c}+{d}*I)',
                    f'({a}+{b}*I)**3', f'I**{whole(rng, 3, 30)}', f'{a}/({c}+{d}*I)+I'])
    if rng.random() < 0.3:
        return f'(z+{abs(a)}*I)*(z-{abs(a)}*I)', f'z**2+{a * a}'
    return s.replace('+-', '-'), str(sp.expand(sp.expand_complex(sympy_of(parse(s)))))


EXPRESSIONS = {
    'algebra': (algebra, 5), 'fractions': (fractions, 4), 'roots': (roots, 3), 'exponentials': (exponentials, 2),
    'logarithms': (logarithms, 2), 'trigonometry': (trigonometry, 4), 'inverses': (inverses, 1), 'bars': (bars, 1),
    'factorials': (factorials, 1), 'complex': (complexes, 1),
}
