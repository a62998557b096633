"""Makes labelled steps of calculus: derivatives, antiderivatives, integrals between bounds, limits and sums.

Right lines come from SymPy (Debian's python3-sympy) and are confirmed by numbers from mpmath; wrong ones are right ones with
a small change, kept only where mpmath shows that they differ. Writes JSON lines {"topic", "lines", "right"}.

    python3 make_calculus_steps.py COUNT SEED
"""
import json
import random
import sys

import mpmath
import sympy as sp

x, n, k, t, h, a = sp.symbols("x n k t h a")
mpmath.mp.dps = 30


def tex(expr):
    return sp.latex(expr, ln_notation=True, inv_trig_style="full")


def whole(rng, low=1, high=6):
    return sp.Integer(rng.choice([v for v in range(low, high + 1)]))


def signed(rng, high=5):
    return sp.Integer(rng.choice([v for v in range(-high, high + 1) if v != 0]))


def inner(rng):
    return rng.choice([x, x, signed(rng) * x, whole(rng) * x + signed(rng), x**2, x**2 + whole(rng), x**3 - x])


def part(rng, smooth=False):
    u = inner(rng)
    plain = [
        lambda: signed(rng) * x ** whole(rng, 1, 5),
        lambda: sp.sin(u),
        lambda: sp.cos(u),
        lambda: sp.exp(signed(rng, 3) * x),
        lambda: sp.exp(u) if u != x**3 - x else sp.exp(x),
        lambda: sp.atan(u),
        lambda: (u + 1) ** whole(rng, 2, 4),
        lambda: sp.sqrt(x**2 + whole(rng)),
        lambda: sp.log(x**2 + whole(rng)),
        lambda: sp.Integer(1) / (x**2 + whole(rng)),
    ]
    rough = [
        lambda: sp.log(x),
        lambda: sp.sqrt(x),
        lambda: sp.Integer(1) / x ** whole(rng, 1, 3),
        lambda: sp.tan(x),
        lambda: x ** sp.Rational(rng.choice([1, 2, 4, 5]), 3),
        lambda: sp.Integer(1) / (x - signed(rng)),
        lambda: sp.asin(x / whole(rng, 2, 4)),
        lambda: whole(rng, 2, 5) ** x,
        lambda: sp.sinh(x),
    ]
    return rng.choice(plain if smooth else plain + rough)()


def whole_expr(rng, smooth=False):
    p, q = part(rng, smooth), part(rng, smooth)
    shape = rng.randrange(5)
    if shape == 0:
        return signed(rng) * p
    if shape == 1:
        return p + signed(rng) * q
    if shape == 2:
        return p * q
    if shape == 3:
        return p / (x**2 + whole(rng)) if smooth else p / q
    return p + q + signed(rng) * x


def changed(rng, expr):
    """One number, sign or term of the expression changed."""
    choices = []
    if expr.is_Add and len(expr.args) > 1:
        choices.append(expr - 2 * rng.choice(expr.args))
        choices.append(expr - rng.choice(expr.args))
    choices += [2 * expr, -expr, expr + x, expr * x, expr + 1]
    numbers = [v for v in expr.atoms(sp.Integer, sp.Rational) if v not in (0, 1)]
    if numbers:
        old = rng.choice(sorted(numbers, key=str))
        choices.insert(0, expr.xreplace({old: old + 1}))
        choices.insert(0, expr.xreplace({old: -old}))
    return rng.choice(choices[:4])


POINTS = [mpmath.mpf("0.37"), mpmath.mpf("1.21"), mpmath.mpf("2.6"), mpmath.mpf("-0.73"), mpmath.mpf("-1.9"), mpmath.mpf("0.05"), mpmath.mpf("4.2")]


def values(expr, symbol=x):
    f = sp.lambdify(symbol, expr, "mpmath")
    result = []
    for point in POINTS:
        try:
            v = mpmath.mpc(f(point))
            result.append(v.real if abs(v.imag) < 1e-20 and abs(v.real) < 1e15 else None)
        except Exception:
            result.append(None)
    return result


def agree(p, q):
    """True, False, or None where too few values tell."""
    pairs = [(u, v) for u, v in zip(values(p), values(q)) if u is not None and v is not None]
    if len(pairs) < 2:
        return None
    apart = [abs(u - v) > 1e-12 * (1 + abs(u)) for u, v in pairs]
    return False if sum(apart) >= 1 and all(abs(u - v) > 1e-6 * (1 + abs(u)) or abs(u - v) < 1e-15 * (1 + abs(u)) for u, v in pairs) else (True if not any(apart) else None)


def derivative(rng):
    e = whole_expr(rng)
    slope = sp.diff(e, x)
    line = slope if rng.random() < 0.5 else sp.together(slope) if rng.random() < 0.5 else sp.simplify(slope)
    right = rng.random() < 0.5
    if not right:
        line = changed(rng, line)
    if agree(slope, line) is not right:
        return None
    return "derivative", ["\\frac{d}{dx}\\left(%s\\right)" % tex(e), tex(line)], right


def antiderivative(rng):
    F = whole_expr(rng)
    f = sp.diff(F, x)
    if rng.random() < 0.4:
        f = sp.expand(f)
    right = rng.random() < 0.5
    line = F if right else changed(rng, F)
    if agree(sp.diff(line, x), f) is not right:
        return None
    return "antiderivative", ["\\int\\left(%s\\right)\\,dx" % tex(f), tex(line) + "+C"], right


def parted(rng):
    u, v = part(rng, True), part(rng, True)
    f = u * sp.diff(v, x)
    rest = v * sp.diff(u, x)
    sign = "-" if rng.random() < 0.5 else "+"
    right = sign == "-"
    if rest == 0 or f == 0:
        return None
    return "parts", ["\\int\\left(%s\\right)\\,dx" % tex(f), "%s%s\\int\\left(%s\\right)\\,dx" % (tex(u * v), sign, tex(rest))], right


def definite(rng):
    F = whole_expr(rng, smooth=True)
    f = sp.diff(F, x)
    low, high = sorted(rng.sample([-2, -1, 0, 1, 2, 3], 2))
    value = sp.simplify(F.subs(x, high) - F.subs(x, low))
    try:
        number = mpmath.quad(sp.lambdify(x, f, "mpmath"), [low, (low + high) / 2, high])
        exact = mpmath.mpf(sp.N(value, 30))
    except Exception:
        return None
    if abs(number - exact) > 1e-12 * (1 + abs(exact)):
        return None
    right = rng.random() < 0.5
    if not right:
        value = value + rng.choice([1, -1, sp.Rational(1, 2)]) if rng.random() < 0.5 else sp.simplify(F.subs(x, high) + F.subs(x, low))
        if abs(mpmath.mpf(sp.N(value, 30)) - exact) < 1e-6:
            return None
    return "definite", ["\\int_{%s}^{%s}\\left(%s\\right)\\,dx" % (low, high, tex(f)), tex(value)], right


def pole(rng):
    c = signed(rng, 3)
    power = whole(rng, 1, 3)
    f = signed(rng) / (x - c) ** power
    low, high = c - whole(rng, 1, 3), c + whole(rng, 1, 3)
    F = sp.integrate(f, x).subs(sp.log(x - c), sp.log(sp.Abs(x - c)))
    return "pole", ["\\int_{%s}^{%s}%s\\,dx" % (low, high, tex(f)), tex(sp.simplify(F.subs(x, high) - F.subs(x, low)))], False


def improper(rng):
    c, p, low = whole(rng), whole(rng, 2, 4), whole(rng, 1, 3)
    f, start = rng.choice([(c / x**p, low), (sp.exp(-c * x), 0), (c * x * sp.exp(-x), 0), (c / (x**2 + 1), 0), (c / (x**2 + 4), 0), (c / (x * (x + 1)), low), (c * x / (x**2 + 1) ** 2, 0)])
    value = sp.integrate(f, (x, start, sp.oo))
    number = mpmath.quad(sp.lambdify(x, f, "mpmath"), [start, start + 1, start + 10, mpmath.inf])
    if abs(number - mpmath.mpf(sp.N(value, 30))) > 1e-8:
        return None
    right = rng.random() < 0.5
    if not right:
        value = value * 2 if rng.random() < 0.5 else value + 1
    return "improper", ["\\int_{%s}^{\\infty}%s\\,dx" % (start, tex(f)), tex(value)], right


def limit(rng):
    c = signed(rng, 3)
    p, q = signed(rng), whole(rng)
    at, e = rng.choice([
        (c, (x**2 - c**2) / (x - c)),
        (c, (x**3 - c**3) / (x**2 - c**2)),
        (0, sp.sin(p * x) / (q * x)),
        (0, (1 - sp.cos(p * x)) / x**2),
        (0, (sp.exp(p * x) - 1) / (q * x)),
        (0, sp.log(1 + p * x) / x),
        (0, sp.tan(p * x) / sp.sin(q * x)),
        (0, (sp.sqrt(q**2 + x) - q) / x),
        (sp.oo, (p * x**2 + x) / (q * x**2 - 1)),
        (sp.oo, (p * x + 1) / (x**2 + q)),
        (sp.oo, sp.sqrt(x**2 + p * x) - x),
        (sp.oo, (1 + p / x) ** x),
        (sp.oo, x**q * sp.exp(-x)),
        (sp.oo, sp.log(x) / x),
        (-sp.oo, x / sp.sqrt(x**2 + q)),
        (0, x * sp.cot(p * x)),
        (0, (sp.atan(p * x) - p * x) / x**3),
        (0, (sp.sin(p * x) - p * x) / x**3),
        (c, (sp.exp(x) - sp.exp(c)) / (x - c)),
        (1, sp.log(x) / (x**2 - 1)),
        (sp.oo, x * sp.sin(p / x)),
        (sp.oo, x * sp.log(1 + p / x)),
        (0, (sp.cos(p * x) - sp.cos(q * x)) / x**2),
        (sp.oo, sp.atan(q * x)),
        (sp.pi / 2, sp.cos(x) / (x - sp.pi / 2)),
    ])
    value = sp.limit(e, x, at)
    if not value.is_finite:
        return None
    f = sp.lambdify(x, e, "mpmath")
    near = mpmath.mpf(10) ** 7 if at in (sp.oo, -sp.oo) else mpmath.mpf(10) ** -7
    point = near if at == sp.oo else -near if at == -sp.oo else mpmath.mpf(sp.N(at, 30)) + near
    if abs(f(point) - mpmath.mpf(sp.N(value, 30))) > 1e-4:
        return None
    right = rng.random() < 0.5
    if not right:
        value = rng.choice([value + 1, -value if value != 0 else sp.Integer(2), 2 * value if value != 0 else sp.Integer(1), sp.Integer(0) if value != 0 else sp.Integer(1)])
    return "limit", ["\\lim_{x\\to %s}\\left(%s\\right)" % (tex(at), tex(e)), tex(value)], right


def series(rng):
    p, q, c = signed(rng), signed(rng), whole(rng, 2, 4)
    low = rng.choice([0, 1, 2])
    body = rng.choice([p * k + q, k**2 + p * k, k**3, p * k**2 + q, c**k, p * c**k + q, k * c**k, sp.Rational(1, c) ** k, (-1) ** k * k, k * (k + 1)])
    value = sp.simplify(sp.summation(body, (k, low, n)))
    line = sp.factor(value) if rng.random() < 0.5 else value
    right = rng.random() < 0.5
    if not right:
        line = rng.choice([line + 1, line.subs(n, n - 1), line * 2, line.subs(n, n + 1)])
    known = [(sum(body.subs(k, j) for j in range(low, m + 1)), line.subs(n, m)) for m in range(low, low + 6)]
    if all(sp.simplify(u - v) == 0 for u, v in known) is not right:
        return None
    return "sum", ["\\sum_{k=%s}^{n}\\left(%s\\right)" % (low, tex(body)), tex(line)], right


def infinite(rng):
    p, c, low = signed(rng), whole(rng, 2, 5), rng.choice([0, 1, 2])
    body = rng.choice([p * sp.Rational(1, c) ** k, p * sp.Rational(-1, c) ** k, k * sp.Rational(1, c) ** k, p / ((k + 1) * (k + 2)), p / ((k + 1) * (k + 3))])
    value = sp.summation(body, (k, low, sp.oo))
    number = mpmath.nsum(sp.lambdify(k, body, "mpmath"), [low, mpmath.inf])
    if abs(number - mpmath.mpf(sp.N(value, 30))) > 1e-8:
        return None
    right = rng.random() < 0.5
    if not right:
        value = rng.choice([value + 1, 2 * value, -value])
    return "infinite sum", ["\\sum_{k=%s}^{\\infty}%s" % (low, "\\left(%s\\right)" % tex(body)), tex(value)], right


MAKERS = [derivative] * 5 + [antiderivative] * 4 + [parted, definite, definite, definite, pole, improper, limit, limit, limit, series, series, infinite]


def main():
    count, seed = int(sys.argv[1]), int(sys.argv[2])
    rng = random.Random(seed)
    made = 0
    while made < count:
        try:
            row = rng.choice(MAKERS)(rng)
        except (ZeroDivisionError, TypeError, ValueError, NotImplementedError):
            continue
        if row is None or any(bad in line for line in row[1] for bad in ("nan", "zoo", "\\operatorname{Si}", "begin", "polar", "\\Gamma")):
            continue
        topic, lines, right = row
        print(json.dumps({"topic": topic, "lines": lines, "right": right}), flush=True)
        made += 1


main()
