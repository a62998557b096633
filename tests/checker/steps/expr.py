"""Expressions as text in Python's own notation, with what is needed beside: TeX, other programs' notation, small edits."""
import ast

BARE = {'sin', 'cos', 'tan', 'sinh', 'cosh', 'tanh', 'log'}
TEX_NAMES = {
    'asin': 'arcsin', 'acos': 'arccos', 'atan': 'arctan', 'log': 'ln',
    **{name: name for name in ('sin', 'cos', 'tan', 'sec', 'csc', 'cot', 'sinh', 'cosh', 'tanh')},
}
GREEK = {'pi': '\\pi ', 'theta': '\\theta ', 'alpha': '\\alpha ', 'beta': '\\beta ', 'I': 'i'}


def parse(text):
    return ast.parse(str(text).replace('^', '**').strip(), mode='eval').body


def text_of(node):
    return ast.unparse(node)


def names_in(text):
    found = {n.id for n in ast.walk(parse(text)) if isinstance(n, ast.Name)}
    called = {n.func.id for n in ast.walk(parse(text)) if isinstance(n, ast.Call)}
    return sorted(found - called - {'pi', 'I', 'E', 'oo'})


def tex(source):
    return node_tex(parse(source) if isinstance(source, str) else source)


def is_sum(node):
    return isinstance(node, ast.BinOp) and isinstance(node.op, (ast.Add, ast.Sub))


def is_negative(node):
    return isinstance(node, ast.UnaryOp) and isinstance(node.op, ast.USub)


def bracket(inner):
    return f'({inner})'


def node_tex(node):
    if isinstance(node, ast.Constant):
        return str(node.value)
    if isinstance(node, ast.Name):
        return {'E': 'e', 'oo': '\\infty'}.get(node.id, GREEK.get(node.id, node.id))
    if isinstance(node, ast.UnaryOp):
        inner = node_tex(node.operand)
        return '-' + (bracket(inner) if is_sum(node.operand) or is_negative(node.operand) else inner)
    if isinstance(node, ast.Call):
        return call_tex(node)
    if isinstance(node, ast.List):
        rows = [r.elts if isinstance(r, ast.List) else [r] for r in node.elts]
        return '\\begin{pmatrix}' + '\\\\'.join('&'.join(map(node_tex, r)) for r in rows) + '\\end{pmatrix}'
    left, right = node.left, node.right
    if isinstance(node.op, (ast.Add, ast.Sub)):
        sign = '+' if isinstance(node.op, ast.Add) else '-'
        other = node_tex(right)
        if is_negative(right) or (is_sum(right) and sign == '-') or other.startswith('-'):
            other = bracket(other)
        return node_tex(left) + sign + other
    if isinstance(node.op, ast.Div):
        if is_negative(left):
            return '-' + f'\\frac{{{node_tex(left.operand)}}}{{{node_tex(right)}}}'
        return f'\\frac{{{node_tex(left)}}}{{{node_tex(right)}}}'
    if isinstance(node.op, ast.Pow):
        return power_tex(left, right)
    return product_tex(node)


def factors(node):
    if isinstance(node, ast.BinOp) and isinstance(node.op, ast.Mult):
        return factors(node.left) + factors(node.right)
    return [node]


def product_tex(node):
    parts = factors(node)
    if isinstance(parts[0], ast.Constant) and parts[0].value == 1 and not isinstance(parts[1], ast.Constant):
        return node_tex(parts[1]) if len(parts) == 2 and not is_sum(parts[1]) else product_of(parts[1:])
    return product_of(parts)


def is_bare(node):
    return isinstance(node, ast.Call) and node.func.id in BARE and isinstance(node.args[0], ast.Name)


def product_of(parts):
    out = ''
    for k, factor in enumerate(parts):
        piece = node_tex(factor)
        after = parts[k + 1] if k + 1 < len(parts) else None
        if is_bare(factor) and after is not None and not (isinstance(after, ast.Call) and after.func.id in TEX_NAMES):
            piece = f'\\{TEX_NAMES[factor.func.id]}({node_tex(factor.args[0])})'
        wide = isinstance(factor, ast.Call) and factor.func.id in ('D', 'Int', 'Lim', 'Sum')
        if is_sum(factor) or is_negative(factor) or piece.startswith('-') or (wide and k < len(parts) - 1):
            piece = piece if k == 0 and piece.startswith('-') and not is_sum(factor) else bracket(piece)
        dot = k > 0 and (piece[0].isdigit() or (piece.startswith('\\frac') and out[-1].isdigit())
                         or (piece.startswith('\\frac') and out.endswith('}')) or out.endswith('!'))
        bare = k > 0 and piece.startswith('e^') and out[-1].isalpha()
        out += ('\\cdot ' if dot else ' ' if bare else '') + piece
    return out


def power_tex(base, exponent):
    up = node_tex(exponent)
    if isinstance(base, ast.Call) and base.func.id in TEX_NAMES and base.func.id not in ('log', 'asin', 'acos', 'atan'):
        if isinstance(exponent, ast.Constant) and exponent.value > 1:
            return f'\\{TEX_NAMES[base.func.id]}^{{{up}}}({node_tex(base.args[0])})'
    plain = isinstance(base, (ast.Constant, ast.Name)) or (isinstance(base, ast.Call) and base.func.id in ('sqrt', 'Abs', 'cbrt'))
    return (node_tex(base) if plain else bracket(node_tex(base))) + f'^{{{up}}}'


def call_tex(node):
    name, args = node.func.id, node.args
    inner = [node_tex(arg) for arg in args]
    if name == 'sqrt':
        return f'\\sqrt{{{inner[0]}}}'
    if name == 'cbrt':
        return f'\\sqrt[3]{{{inner[0]}}}'
    if name == 'Abs':
        return f'\\left|{inner[0]}\\right|'
    if name == 'exp':
        return f'e^{{{inner[0]}}}'
    if name == 'logb':
        return f'\\log_{{{inner[0]}}}({inner[1]})'
    if name == 'factorial':
        return (inner[0] if isinstance(args[0], (ast.Name, ast.Constant)) else bracket(inner[0])) + '!'
    if name == 'binomial':
        return f'\\binom{{{inner[0]}}}{{{inner[1]}}}'
    if name == 'D':
        return f'\\frac{{d}}{{d{inner[1]}}}\\left({inner[0]}\\right)'
    if name == 'Int':
        body = bracket(inner[0]) if is_sum(args[0]) else inner[0]
        bounds = f'_{{{inner[2]}}}^{{{inner[3]}}}' if len(args) == 4 else ''
        return f'\\int{bounds} {body}\\,d{inner[1]}'
    if name == 'Lim':
        return f'\\lim_{{{inner[1]}\\to {inner[2]}}}\\left({inner[0]}\\right)'
    if name == 'Sum':
        return f'\\sum_{{{inner[1]}={inner[2]}}}^{{{inner[3]}}}{bracket(inner[0]) if is_sum(args[0]) else inner[0]}'
    if name == 'det':
        return f'\\det {inner[0]}'
    if is_bare(node):
        return f'\\{TEX_NAMES[name]} {inner[0]}'
    return f'\\{TEX_NAMES[name]}({inner[0]})'


SWAPS = {'sin': 'cos', 'cos': 'sin', 'tan': 'sin', 'sinh': 'cosh', 'cosh': 'sinh', 'exp': 'sqrt', 'asin': 'acos',
         'acos': 'asin', 'log': 'sqrt', 'Abs': None, 'sqrt': None}


def edited(text, rng):
    """The expression after one small change: a number, a sign, an exponent, a function, a term or factor left out."""
    tree = parse(text)
    called = {id(n.func) for n in ast.walk(tree) if isinstance(n, ast.Call)}
    kinds = (ast.Constant, ast.BinOp, ast.Call, ast.UnaryOp, ast.Name)
    spots = [n for n in ast.walk(tree) if isinstance(n, kinds) and id(n) not in called]
    if not spots:
        return None
    spot = rng.choice(spots)
    new = changed(spot, rng)
    return None if new is None else text_of(replaced(tree, spot, new))


def changed(node, rng):
    if isinstance(node, ast.Constant):
        return ast.Constant(abs(node.value + rng.choice([-1, 1, 2])))
    if isinstance(node, ast.Name):
        return ast.UnaryOp(ast.USub(), node) if rng.random() < 0.5 else ast.BinOp(ast.Constant(2), ast.Mult(), node)
    if isinstance(node, ast.UnaryOp):
        return node.operand
    if isinstance(node, ast.Call):
        if SWAPS.get(node.func.id, '') is None:
            return node.args[0]
        other = SWAPS.get(node.func.id)
        return ast.Call(ast.Name(other), node.args, []) if other else None
    if isinstance(node.op, ast.Add):
        return rng.choice([ast.BinOp(node.left, ast.Sub(), node.right), node.left, ast.BinOp(node.left, ast.Mult(), node.right)])
    if isinstance(node.op, ast.Sub):
        return rng.choice([ast.BinOp(node.left, ast.Add(), node.right), node.left])
    if isinstance(node.op, ast.Mult):
        return rng.choice([node.left, node.right, ast.BinOp(node.left, ast.Add(), node.right)])
    if isinstance(node.op, ast.Div):
        return rng.choice([node.left, ast.BinOp(node.right, ast.Div(), node.left)])
    if isinstance(node.op, ast.Pow) and isinstance(node.right, ast.Constant):
        return ast.BinOp(node.left, ast.Pow(), ast.Constant(node.right.value + 1))
    return None


def replaced(tree, spot, new):
    class Swap(ast.NodeTransformer):
        def visit(self, node):
            return new if node is spot else super().visit(node)

    return ast.fix_missing_locations(Swap().visit(tree))
