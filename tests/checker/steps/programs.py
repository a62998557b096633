"""SymPy, Maxima and PARI/GP, each one long-running process (SymPy inside this one), asked whether two expressions agree.

Points outside the real domain are left out as the checker's rules have it: functions are only taken where they have a real
value, and rational exponents with an odd denominator have one at negative bases.
"""
import ast
import os
import select
import signal
import subprocess

import mpmath
import sympy as sp

from expr import parse

mpmath.mp.dps = 40


class Late(Exception):
    pass


class Limit:
    def __init__(self, seconds):
        self.seconds = seconds

    def __enter__(self):
        signal.signal(signal.SIGALRM, self.end)
        signal.setitimer(signal.ITIMER_REAL, self.seconds)

    def end(self, *_):
        raise Late()

    def __exit__(self, *_):
        signal.setitimer(signal.ITIMER_REAL, 0)


class Program:
    """A process that answers one line, begun with a mark, to each line that it is sent; started anew after a time-out."""

    MARK = '@@'

    def __init__(self, command, setup, seconds):
        self.command, self.setup, self.seconds = command, setup, seconds
        self.process = None
        self.timeouts = 0

    def start(self):
        self.process = subprocess.Popen(self.command, stdin=subprocess.PIPE, stdout=subprocess.PIPE,
                                        stderr=subprocess.DEVNULL, bufsize=0)
        self.rest = b''
        self.process.stdin.write(self.setup.encode())

    def ask(self, line):
        if self.process is None or self.process.poll() is not None:
            self.start()
        self.process.stdin.write((line + '\n').encode())
        with_mark = self.read_until_mark()
        if with_mark is None:
            self.timeouts += 1
            self.stop()
        return with_mark

    def read_until_mark(self):
        while True:
            while b'\n' in self.rest:
                line, self.rest = self.rest.split(b'\n', 1)
                text = line.decode(errors='replace').strip()
                if text.startswith(self.MARK):
                    return text[len(self.MARK):].strip()
            ready, _, _ = select.select([self.process.stdout], [], [], self.seconds)
            if not ready:
                return None
            piece = os.read(self.process.stdout.fileno(), 65536)
            if not piece:
                return None
            self.rest += piece

    def stop(self):
        if self.process is not None:
            self.process.kill()
            self.process.wait()
        self.process = None


GP_SETUP = '''default(realprecision,60);default(breakloop,0);
E=exp(1);
Abs(x)=abs(x);
rsqrt(x)=if(imag(x)!=0||x<0,error("domain"));sqrt(x);
rlog(x)=if(imag(x)!=0||x<=0,error("domain"));log(x);
logb(b,x)=rlog(x)/rlog(b);
rasin(x)=if(abs(x)>1,error("domain"));asin(x);
racos(x)=if(abs(x)>1,error("domain"));acos(x);
cbrt(x)=sign(x)*abs(x)^(1/3);
sec(x)=1/cos(x);
csc(x)=1/sin(x);
cot(x)=cos(x)/sin(x);
fac(n)=if(type(n)=="t_REAL",n=round(n));n!;
bin(n,k)=binomial(round(n),round(k));
rpow(a,b)={if(type(b)=="t_INT",if(b==0&&a==0,error("domain"));return(a^b));
if(imag(a)==0&&a<0,if(type(b)=="t_FRAC"&&denominator(b)%2==1,return(if(numerator(b)%2,-1,1)*abs(a)^b),error("domain")));
if(a==0,if(b>0,return(0.),error("domain")));a^b};
same(f,g,p)={my(s="",a,b);for(k=1,#p,a=iferr(call(f,p[k]),e,oo);b=iferr(call(g,p[k]),e,oo);
s=Str(s,if(a==oo||b==oo,"u",abs(a-b)<=1e-38*(1+abs(a)+abs(b)),"e","d")));s};
'''


def gp_text(node, real=True):
    go = lambda part: gp_text(part, real)
    if isinstance(node, ast.Constant):
        return str(node.value)
    if isinstance(node, ast.Name):
        return {'pi': 'Pi', 'I': 'I', 'E': 'E'}.get(node.id, 'v_' + node.id)
    if isinstance(node, ast.UnaryOp):
        return f'(-{go(node.operand)})'
    if isinstance(node, ast.List):
        rows = [r.elts if isinstance(r, ast.List) else [r] for r in node.elts]
        return '[' + ';'.join(','.join(map(go, r)) for r in rows) + ']'
    if isinstance(node, ast.Call):
        name, args = node.func.id, node.args
        if name == 'D':
            return f"(deriv({go(args[1])}->{go(args[0])},{go(args[1])}))".replace('deriv(', 'dnum(')
        if name == 'Int':
            return f'intnum({go(args[1])}={go(args[2])},{go(args[3])},{go(args[0])})'
        if name == 'Sum':
            return f'sum({go(args[1])}={go(args[2])},round({go(args[3])}),{go(args[0])})'
        if name == 'det':
            return f'matdet({go(args[0])})'
        names = {'factorial': 'fac', 'binomial': 'bin'}
        if real:
            names.update({'sqrt': 'rsqrt', 'log': 'rlog', 'asin': 'rasin', 'acos': 'racos'})
        return f'{names.get(name, name)}({",".join(map(go, args))})'
    left, right = go(node.left), go(node.right)
    if isinstance(node.op, ast.Pow):
        return f'rpow({left},{right})' if real else f'({left})^({right})'
    sign = {ast.Add: '+', ast.Sub: '-', ast.Mult: '*', ast.Div: '/'}[type(node.op)]
    return f'({left}{sign}{right})'


MAXIMA_SETUP = '''display2d:false$ ratprint:false$ errormsg:false$ fpprec:40$ logexpand:false$
cbrt(u):=signum(u)*abs(u)^(1/3)$ Abs(u):=abs(u)$ logb(b,u):=log(u)/log(b)$
zero(d):=block([r],r:ratsimp(d),if r=0 then return(true),r:radcan(d),if r=0 then return(true),
r:radcan(minfactorial(makefact(d))),if r=0 then return(true),
r:ratsimp(trigsimp(trigexpand(d))),if r=0 then return(true),r:radcan(exponentialize(d)),if r=0 then return(true),
r:radcan(rootscontract(trigexpand(d))),if r=0 then return(true),r:ratsimp(rectform(d)),is(r=0))$
apart(d,at):=block([v],v:abs(rectform(bfloat(ev(d,at)))),if numberp(v) or bfloatp(v) then is(v>1.0b-20) else unknown)$
'''


def maxima_text(node):
    go = maxima_text
    if isinstance(node, ast.Constant):
        return str(node.value)
    if isinstance(node, ast.Name):
        return {'pi': '%pi', 'I': '%i', 'E': '%e', 'oo': 'inf'}.get(node.id, 'v_' + node.id)
    if isinstance(node, ast.UnaryOp):
        return f'(-{go(node.operand)})'
    if isinstance(node, ast.List):
        rows = [r.elts if isinstance(r, ast.List) else [r] for r in node.elts]
        return 'matrix(' + ','.join('[' + ','.join(map(go, r)) + ']' for r in rows) + ')'
    if isinstance(node, ast.Call):
        name, args = node.func.id, [go(arg) for arg in node.args]
        if name == 'D':
            return f'diff({args[0]},{args[1]})'
        if name == 'Int':
            return f'integrate({",".join(args)})'
        if name == 'Lim':
            return f'limit({",".join(args)})'
        if name == 'Sum':
            return f'nusum({",".join(args)})'
        if name == 'det':
            return f'determinant({args[0]})'
        return f'{name}({",".join(args)})'
    sign = {ast.Add: '+', ast.Sub: '-', ast.Mult: '*', ast.Div: '/', ast.Pow: '^'}[type(node.op)]
    if sign == '*' and any(isinstance(side, (ast.List,)) for side in (node.left, node.right)):
        sign = '.'
    return f'({go(node.left)}{sign}({go(node.right)}))'


SYMBOLS = {}


def symbol(name):
    if name not in SYMBOLS:
        SYMBOLS[name] = sp.Symbol(name, real=True) if name not in 'nmk' else sp.Symbol(name, integer=True, positive=True)
    return SYMBOLS[name]


def sympy_of(node):
    go = sympy_of
    if isinstance(node, ast.Constant):
        return sp.Integer(node.value)
    if isinstance(node, ast.Name):
        return {'pi': sp.pi, 'I': sp.I, 'E': sp.E, 'oo': sp.oo}.get(node.id) or symbol(node.id)
    if isinstance(node, ast.UnaryOp):
        return -go(node.operand)
    if isinstance(node, ast.List):
        return sp.Matrix([[go(c) for c in (r.elts if isinstance(r, ast.List) else [r])] for r in node.elts])
    if isinstance(node, ast.Call):
        name, args = node.func.id, [go(arg) for arg in node.args]
        if name == 'D':
            return sp.diff(args[0], args[1])
        if name == 'Int':
            return sp.integrate(args[0], tuple(args[1:]))
        if name == 'Lim':
            return sp.limit(*args)
        if name == 'Sum':
            return sp.summation(args[0], tuple(args[1:]))
        if name == 'det':
            return args[0].det()
        if name == 'cbrt':
            return sp.real_root(args[0], 3)
        if name == 'logb':
            return sp.log(args[1]) / sp.log(args[0])
        return getattr(sp, name)(*args)
    left, right = go(node.left), go(node.right)
    return {ast.Add: lambda: left + right, ast.Sub: lambda: left - right, ast.Mult: lambda: left * right,
            ast.Div: lambda: left / right, ast.Pow: lambda: left ** right}[type(node.op)]()


def sympy_zero(above, below, seconds=1.5):
    """True where SymPy shows the difference to be zero; None where it does not or takes too long."""
    try:
        with Limit(seconds):
            difference = sympy_of(parse(above)) - sympy_of(parse(below))
            if isinstance(difference, sp.MatrixBase):
                return difference.applyfunc(sp.simplify).is_zero_matrix or None
            for change in (sp.expand, sp.together, sp.simplify, lambda d: sp.simplify(d.rewrite(sp.exp)), sp.expand_log):
                if change(difference) == 0:
                    return True
            return None
    except (Late, Exception):
        return None


GP_SETUP += '''dnum(f,a)={my(h=1e-15);(f(a-2*h)-8*f(a-h)+8*f(a+h)-f(a+2*h))/(12*h)};
'''
gp = Program(['gp', '-q', '-f', '--default', 'parisize=64000000'], GP_SETUP, 3)
maxima = Program(['maxima', '--very-quiet'], MAXIMA_SETUP, 1.5)


def gp_compare(above, below, names, points, real=True, loose=False):
    """One letter for each point: e (equal), d (different), u (no value); None where PARI gives no answer."""
    args = ','.join('v_' + name for name in names)
    rows = ','.join('[' + ','.join(str(v) if isinstance(v, int) else f'{v}*1.' for v in p) + ']' for p in points)
    f, g = gp_text(parse(above), real), gp_text(parse(below), real)
    tolerance = GP_LOOSE if loose else 'same'
    return gp.ask(f'print("@@",iferr({tolerance}(({args})->{f},({args})->{g},[{rows}]),e,"x"))')


GP_LOOSE = 'cmpl'
gp.setup += '''cmpl(f,g,p)={my(s="",a,b);for(k=1,#p,a=iferr(call(f,p[k]),e,oo);b=iferr(call(g,p[k]),e,oo);
s=Str(s,if(a==oo||b==oo,"u",abs(a-b)<=1e-16*(1+abs(a)+abs(b)),"e","d")));s};
'''


def maxima_zero(above, below):
    answer = maxima.ask(f'print("@@",errcatch(zero({maxima_text(parse(above))}-({maxima_text(parse(below))}))))$')
    return True if answer is not None and 'true' in answer else None


def maxima_apart(above, below, names, point):
    at = '[' + ','.join(f'v_{name}={value}' for name, value in zip(names, point)) + ']'
    answer = maxima.ask(f'print("@@",errcatch(apart({maxima_text(parse(above))}-({maxima_text(parse(below))}),{at})))$')
    return True if answer is not None and 'true' in answer else None


def sympy_apart(above, below, names, point):
    try:
        with Limit(1.5):
            at = {symbol(n): sp.Rational(str(v)) for n, v in zip(names, point)}
            value = (sympy_of(parse(above)) - sympy_of(parse(below))).subs(at)
            if isinstance(value, sp.MatrixBase):
                return any(abs(sp.N(entry, 25)) > 1e-15 for entry in value) or None
            return True if abs(sp.N(value, 25)) > 1e-15 else None
    except (Late, Exception):
        return None
