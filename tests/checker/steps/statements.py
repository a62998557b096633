"""Random steps from one statement to another (equations, inequalities, on an interval, systems, formulas) with their labels.

A statement is a list of relations (left, sign, right), joined by or; for systems by and.
"""
import ast

import sympy as sp
from sympy.calculus.util import continuous_domain

from expr import edited, parse, tex
from programs import Late, Limit, gp, gp_text, symbol, sympy_of
from topics import by_sympy, lin, poly, signed, whole

SIGNS = {'=': 0, '<': 1, '<=': 2, '>': 3, '>=': 4}
TEX_SIGNS = {'=': '=', '<': '<', '<=': '\\le ', '>': '>', '>=': '\\ge '}
FLIP = {'=': '=', '<': '>', '>': '<', '<=': '>=', '>=': '<='}

gp.setup += '''holds(v,op)={my(t=1e-25);if(op==0,abs(v)<t,op==1,v<-t,op==2,v<t,op==3,v>t,v>-t)};
truth(R,x)={for(i=1,#R,my(v=iferr(R[i][1](x),e,oo));if(v!=oo&&imag(v)==0&&holds(real(v),R[i][2]),return(1)));0};
pieces(f)={my(r=iferr(f('x),e,0));if(type(r)=="t_POL",[r],type(r)=="t_RFRAC",[numerator(r),denominator(r)],0)};
exact(P)={my(q,s);if(type(P)!="t_POL"||poldegree(P)<1,return([]));q=nfroots(,P);s=polrootsreal(P);
concat(Vec(q),select(v->#select(w->abs(w-v)<1e-30,q)==0,Vec(s)))};
scan(f,lo,hi)={my(r=[],n=600,h=(hi-lo)/n,a,b,x,y);a=iferr(f(lo*1.),e,oo);for(k=1,n,x=lo+h*(k-1);y=lo+h*k;b=iferr(f(y*1.),e,oo);
if(a!=oo&&b!=oo&&imag(a)==0&&imag(b)==0,if(b==0,r=concat(r,y),if(a*b<0,r=concat(r,iferr([solve(u=x*1.,y*1.,f(u))],e,[])))));a=b);r};
critical(F,lo,hi)={my(c=[],p);for(i=1,#F,p=pieces(F[i]);if(p,for(j=1,#p,c=concat(c,exact(p[j]))),c=concat(c,scan(F[i],lo,hi))));c};
sets(A,B,F,lo,hi)={my(c=Set(critical(F,lo,hi)),p=[],s="");c=select(v->v>=lo&&v<=hi,Vec(c));c=vecsort(c);
my(q=[]);for(i=1,#c,if(#q==0||c[i]-q[#q]>1e-20,q=concat(q,c[i])));c=q;if(#c==0,return("0"));
p=[(lo+c[1])/2];for(i=1,#c,p=concat(p,c[i]);if(i<#c,p=concat(p,(c[i]+c[i+1])/2)));if(c[#c]<hi,p=concat(p,(c[#c]+hi)/2));
for(i=1,#p,s=Str(s,truth(A,p[i]),truth(B,p[i])," "));s};
'''


def inner_parts(node):
    """What the domain depends on: denominators, radicands, arguments of logarithms and bars."""
    for part in ast.walk(node):
        if isinstance(part, ast.BinOp) and isinstance(part.op, ast.Div):
            yield part.right
        if isinstance(part, ast.Call) and part.func.id in ('sqrt', 'log', 'Abs'):
            yield part.args[0]


def gp_sets(above, below, low='-60', high='61'):
    closures, relations = [], []
    for statement in (above, below):
        row = []
        for left, sign, right in statement:
            body = f'v_x->{gp_text(parse(left))}-({gp_text(parse(right))})'
            row.append(f'[({body}),{SIGNS[sign]}]')
            closures.append(f'({body})')
            for side in (left, right):
                closures += [f'(v_x->{gp_text(part)})' for part in inner_parts(parse(side))]
        relations.append('[' + ','.join(row) + ']')
    answer = gp.ask(f'print("@@",iferr(sets({relations[0]},{relations[1]},[{",".join(closures)}],{low},{high}),e,"x"))')
    if not answer or answer in ('x', '0'):
        return None
    pairs = answer.split()
    if all(p[0] == pairs[0][0] for p in pairs):
        return None
    return kind_of(any(p == '10' for p in pairs), any(p == '01' for p in pairs))


def kind_of(lost, gained):
    return 'different' if lost and gained else 'lost' if lost else 'gained' if gained else 'same'


def solutions(statement, domain):
    x = symbol('x')
    parts = []
    for left, sign, right in statement:
        a, b = sympy_of(parse(left)), sympy_of(parse(right))
        inside = continuous_domain(a, x, domain).intersect(continuous_domain(b, x, domain))
        relation = {'=': sp.Eq, '<': sp.Lt, '<=': sp.Le, '>': sp.Gt, '>=': sp.Ge}[sign](a, b)
        if relation in (sp.true, sp.false):
            parts.append(inside if relation == sp.true else sp.S.EmptySet)
        else:
            parts.append(sp.solveset(relation, x, inside))
    return sp.Union(*parts)


def sympy_sets(above, below, domain=sp.S.Reals):
    try:
        with Limit(3):
            a, b = solutions(above, domain), solutions(below, domain)
            if a.has(sp.ConditionSet) or b.has(sp.ConditionSet) or a.has(sp.Complement) or b.has(sp.Complement):
                return None
            if isinstance(a, sp.FiniteSet) and isinstance(b, sp.FiniteSet):
                near = [[sp.N(v, 30) for v in s] for s in (a, b)]
                missing = lambda s, t: any(all(abs(p - q) > 1e-18 for q in t) for p in s)
                return kind_of(missing(near[0], near[1]), missing(near[1], near[0]))
            lost, gained = sp.Complement(a, b).simplify(), sp.Complement(b, a).simplify()
            if any(isinstance(part, sp.Complement) for part in (lost, gained)):
                return None
            return kind_of(lost != sp.S.EmptySet, gained != sp.S.EmptySet)
    except (Late, Exception):
        return None


def line_tex(statement, joint='\\text{ or }'):
    return joint.join(f'{tex(left)}{TEX_SIGNS[sign]}{tex(right)}' for left, sign, right in statement)


def listed(values):
    return [('x', '=', value) for value in values]


def equation(rng):
    """A true step of an equation in x."""
    kind = rng.randrange(13)
    a, b, c, d, k = whole(rng), whole(rng), signed(rng), whole(rng), whole(rng, 2, 5)
    r, s = signed(rng), signed(rng)
    square = by_sympy(f'(x-{r})*(x-{s})', sp.expand).replace('--', '+')
    square = by_sympy(f'(x-({r}))*(x-({s}))', sp.expand)
    if kind == 0:
        first = (f'{a}*x+{b}', '=', f'{c}*x+{d}')
        return [first], rng.choice([[(f'{a - c}*x', '=', str(d - b))], [(f'{a}*x', '=', f'{c}*x+{d}-{b}')]])
    if kind == 1:
        return [(f'{a}*(x+{b})', '=', str(c))], rng.choice([[(f'{a}*x+{a * b}', '=', str(c))], [(f'x+{b}', '=', f'{c}/{a}')]])
    if kind == 2:
        return [(square, '=', '0')], [(f'(x-({r}))*(x-({s}))', '=', '0')]
    if kind == 3:
        return [(f'(x-({r}))*(x-({s}))', '=', '0')], listed(sorted({str(r), str(s)}))
    if kind == 4:
        return [(square, '=', '0')], listed(sorted({str(r), str(s)}))
    if kind == 5:
        return [(f'x**2', '=', str(d * d))], listed([str(d), f'-{d}'])
    if kind == 6:
        p = 2 * whole(rng, 1, 5)
        return [(f'x**2+{p}*x', '=', str(d))], [(f'(x+{p // 2})**2', '=', str(d + p * p // 4))]
    if kind == 7:
        return [(f'{a}/(x-{b})', '=', str(c))], rng.choice([[(str(a), '=', f'{c}*(x-{b})')], listed([f'{a + b * c}/{c}'])])
    if kind == 8:
        return [(f'sqrt({a}*x+{b})', '=', str(d))], rng.choice([[(f'{a}*x+{b}', '=', str(d * d))], listed([f'{d * d - b}/{a}'])])
    if kind == 9:
        return [(f'Abs({a}*x-{b})', '=', str(d))], rng.choice([
            [(f'{a}*x-{b}', '=', str(d)), (f'{a}*x-{b}', '=', f'-{d}')], listed([f'{b + d}/{a}', f'{b - d}/{a}'])])
    if kind == 10:
        return [(f'{k}**(x+{b})', '=', str(k ** whole(rng, 1, 6)))] if False else [(f'exp({a}*x)', '=', str(d))], listed([f'log({d})/{a}'])
    if kind == 11:
        return [(f'{k}**({a}*x+{b})', '=', f'{k}**{d}')], rng.choice([[(f'{a}*x+{b}', '=', str(d))], listed([f'{d - b}/{a}'])])
    return [(f'log({a}*x+{b})', '=', '0')], rng.choice([[(f'{a}*x+{b}', '=', '1')], listed([f'{1 - b}/{a}'])])


def inequality(rng):
    kind = rng.randrange(6)
    sign = rng.choice(['<', '<=', '>', '>='])
    a, b, c, d = signed(rng), whole(rng), signed(rng), whole(rng)
    r, s = sorted((signed(rng), signed(rng)))
    if kind == 0 and a != c:
        turn = sign if a > c else FLIP[sign]
        return [(f'{a}*x+{b}', sign, f'{c}*x+{d}')], rng.choice([
            [(f'{a - c}*x', sign, str(d - b))], [('x', turn, f'{d - b}/{a - c}'.replace('/-', '/(-') + (')' if a < c else ''))]])
    if kind == 1:
        return [(f'-{b}*x', sign, str(d))], [('x', FLIP[sign], f'-{d}/{b}')]
    if kind == 2:
        square = by_sympy(f'(x-({r}))*(x-({s}))', sp.expand)
        return [(square, sign, '0')], [(f'(x-({r}))*(x-({s}))', sign, '0')]
    if kind == 3 and r < s:
        return [(f'(x-({r}))*(x-({s}))', rng.choice(['>', '>=']), '0')], [('x', '<=', str(r)), ('x', '>=', str(s))]
    if kind == 4:
        return [(f'(x+{b})/(x-{d})', sign, '0')], [(f'(x+{b})*(x-{d})', sign, '0')] if sign in '<>' else [(f'1+{b + d}/(x-{d})', sign, '0')]
    return [(f'{poly(rng)}', sign, f'{lin(rng)}')], [(by_sympy(f'{poly(rng)}', sp.expand), sign, '0')]


def circular(rng):
    f = rng.choice(['sin', 'cos'])
    values = {'sin': {'1/2': ['pi/6', '5*pi/6'], '-1/2': ['7*pi/6', '11*pi/6'], 'sqrt(3)/2': ['pi/3', '2*pi/3'], '1': ['pi/2'],
                      '0': ['0', 'pi'], 'sqrt(2)/2': ['pi/4', '3*pi/4']},
              'cos': {'1/2': ['pi/3', '5*pi/3'], '-1/2': ['2*pi/3', '4*pi/3'], 'sqrt(3)/2': ['pi/6', '11*pi/6'], '0': ['pi/2', '3*pi/2'],
                      '-1': ['pi'], 'sqrt(2)/2': ['pi/4', '7*pi/4']}}[f]
    value = rng.choice(list(values))
    k = whole(rng, 2, 5)
    return rng.choice([
        ([(f'{f}(x)', '=', value)], listed(values[value])), ([(f'{k}*{f}(x)-{k}*{value}', '=', '0')], [(f'{f}(x)', '=', value)]),
        ([('sin(2*x)', '=', f'{f}(x)')], [('2*sin(x)*cos(x)', '=', f'{f}(x)')]),
        ([('2*sin(x)*cos(x)', '=', 'cos(x)')], [('cos(x)', '=', '0'), ('sin(x)', '=', '1/2')]),
        ([(f'2*{f}(x)**2-{f}(x)-1', '=', '0')], [(f'{f}(x)', '=', '1'), (f'{f}(x)', '=', '-1/2')]),
        ([('2*cos(x)**2+sin(x)', '=', '2')], [('2-2*sin(x)**2+sin(x)', '=', '2')]),
    ])


def nearly(statement, rng):
    """One relation with a small change, or one left out of several."""
    if len(statement) > 1 and rng.random() < 0.35:
        return [r for k, r in enumerate(statement) if k != rng.randrange(len(statement))] or None
    at = rng.randrange(len(statement))
    left, sign, right = statement[at]
    pick = rng.random()
    if sign != '=' and pick < 0.4:
        sign = rng.choice([s for s in SIGNS if s not in ('=', sign)])
    elif pick < 0.7 and left != 'x':
        left = edited(left, rng)
    else:
        right = edited(right, rng)
    return None if left is None or right is None else statement[:at] + [(left, sign, right)] + statement[at + 1:]


def system(rng):
    x, y = signed(rng), signed(rng)
    rows = []
    while len(rows) < 2:
        a, b = signed(rng, 5), signed(rng, 5)
        if not rows or rows[0][0] * b != rows[0][1] * a:
            rows.append((a, b))
    text = lambda a, b: (f'{a}*x+{b}*y', '=', str(a * x + b * y))
    above = [text(*row) for row in rows]
    (a, b), (c, d) = rows
    m, n = signed(rng, 4), signed(rng, 4)
    below = rng.choice([
        [text(m * a + n * c, m * b + n * d)], [('x', '=', str(x)), ('y', '=', str(y))], [('y', '=', str(y))],
        [('y', '=', f'({a * x + b * y}-({a})*x)/({b})')], [(f'{a * d - b * c}*x', '=', str((a * d - b * c) * x))]])
    return above, below, {'x': x, 'y': y}


FORMULAS = [
    ('A', 'P*(1+r*t)', ['P', 'r', 't']), ('V', 'pi*r**2*h', ['h']), ('F', '9*C/5+32', ['C']), ('y', 'm*x+b', ['m', 'x', 'b']),
    ('S', 'n*(a+b)/2', ['a', 'b']), ('1/R', '1/u+1/v', ['R', 'u']), ('E', 'm*v**2/2', ['m']), ('p', '2*a+2*b', ['a', 'b']),
    ('y', '(a*x+b)/(c*x+d)', ['x', 'a']), ('T', '2*pi*sqrt(h/g)', ['h']), ('a*x+b*y', 'c', ['x', 'y']), ('A', 'h*(a+b)/2', ['h', 'a']),
    ('v', 'u+a*t', ['a', 't']), ('N', 'N0*exp(k*t)'.replace('N0', 'C'), ['t', 'k']), ('y', 'log(a*x)/b', ['x', 'b']),
]


def formula(rng):
    left, right, letters = rng.choice(FORMULAS)
    letter = rng.choice(letters)
    found = sp.solve(sp.sympify(left, locals=LOCAL) - sp.sympify(right, locals=LOCAL), LOCAL[letter])
    return (left, '=', right), letter, str(rng.choice([sp.expand, sp.together, lambda e: e])(found[0])).replace('**', '**')


LOCAL = {name: sp.Symbol(name, positive=True) for name in 'APVFCSRENTabcdghkmnprtuvxy'}
