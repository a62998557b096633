import type { Expr } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { readLine } from '../../../shared/maths/read.ts';
import { product } from '../evidence/build.ts';
import { countNodes, mapExpr } from '../../../shared/maths/walk.ts';

/** Names that mean nothing else to the library. */
const plainNames = ['x', 'y', 'z', 'w'] as const;
const mostNodes = 30;
const largestNumber = 10_000n;
const largestExponent = 4n;

export interface NerdamerText {
  readonly text: string;
  /** The letters of the line, each under the name that it goes by in the question. */
  readonly names: ReadonlyMap<string, string>;
}

/** An expression in the library's own notation; null for what is too large or of another kind. */
export function toNerdamer(expr: Expr): NerdamerText | null {
  const letters = lettersOf(expr);
  if (countNodes(expr) > mostNodes || letters.length > plainNames.length) return null;
  const names = new Map(letters.map((letter, k) => [letter, plainNames[k] as string]));
  const text = write(expr, names);
  return text === null ? null : { text, names };
}

function write(expr: Expr, names: ReadonlyMap<string, string>): string | null {
  const inside = (part: Expr): string | null => write(part, names);
  switch (expr.kind) {
    case 'number': {
      if (expr.numerator > largestNumber || expr.denominator > largestNumber) return null;
      return expr.denominator === 1n ? String(expr.numerator) : `(${expr.numerator}/${expr.denominator})`;
    }
    case 'letter':
      return names.get(expr.name) ?? null;
    case 'constant':
      return expr.name === 'pi' || expr.name === 'e' ? expr.name : null;
    case 'sum': {
      const parts = expr.terms.map(({ sign, expr: part }) => {
        const text = sign === 'plus' || sign === 'minus' ? inside(part) : null;
        return text === null ? null : `${sign === 'minus' ? '-' : '+'}(${text})`;
      });
      return parts.includes(null) ? null : `(${parts.join('')})`;
    }
    case 'product': {
      const parts = expr.factors.map(inside);
      return parts.includes(null) ? null : parts.map((part) => `(${part})`).join('*');
    }
    case 'quotient': {
      const [top, bottom] = [inside(expr.numerator), inside(expr.denominator)];
      return top !== null && bottom !== null ? `(${top})/(${bottom})` : null;
    }
    case 'power':
      return writePower(expr, inside);
    case 'root': {
      const radicand = expr.degree ? null : inside(expr.radicand);
      return radicand === null ? null : `sqrt(${radicand})`;
    }
    case 'call': {
      const known: Partial<Record<string, string>> = { sin: 'sin', cos: 'cos', ln: 'log', exp: 'exp' };
      const name = known[expr.name];
      const argument = expr.args[0] && expr.args.length === 1 ? inside(expr.args[0]) : null;
      return name && argument !== null ? `${name}(${argument})` : null;
    }
    default:
      return null;
  }
}

function writePower(expr: Extract<Expr, { kind: 'power' }>, inside: (part: Expr) => string | null): string | null {
  const { base, exponent } = expr;
  const isSmall = exponent.kind === 'number' && exponent.denominator === 1n && exponent.numerator <= largestExponent;
  const isExponential = base.kind === 'constant' && base.name === 'e';
  const [below, above] = [inside(base), isSmall || isExponential ? inside(exponent) : null];
  return below !== null && above !== null ? `(${below})^(${above})` : null;
}

/** The library's TeX as an expression in the letters of the line; its log is the natural one. */
export function fromNerdamer(tex: string, names: ReadonlyMap<string, string>): Expr | null {
  const cleaned = tex.replaceAll('\\mathrm{log}', '\\ln').replaceAll(/\\mathrm\{(sin|cos|exp)\}/g, '\\$1');
  const reading = readLine(cleaned);
  if (!reading.ok || reading.line.kind !== 'expression' || reading.alternatives.length > 0) return null;
  const back = new Map([...names].map(([own, plain]) => [plain, own]));
  return mapExpr(reading.line.expr, (node) => {
    if (node.kind === 'letter') return { ...node, name: back.get(node.name) ?? node.name };
    return node.kind === 'product' ? product(...[...node.factors].sort((a, b) => rankOf(a) - rankOf(b))) : node;
  });
}

/** Numbers, then powers of letters, then functions, then brackets. */
function rankOf(factor: Expr): number {
  const order = ['number', 'quotient', 'constant', 'letter', 'power', 'root', 'call', 'sum'];
  return order.indexOf(factor.kind);
}
