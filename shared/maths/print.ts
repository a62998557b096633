import type { Expr, Line, ReadSettings, RelationSign, SetExpr } from './expression.ts';
import { bracket, glue, printExpr } from './print-expression.ts';

export { printExpr };

type Decimal = ReadSettings['decimal'];

const SIGNS: Record<RelationSign, string> = {
  '=': '=',
  '<': '<',
  '>': '>',
  '<=': '\\le',
  '>=': '\\ge',
  '!=': '\\ne',
  approx: '\\approx',
};

/** A line as TeX; read again, with the same decimal mark, it is the same line. */
export function printLine(line: Line, decimal: Decimal = 'point'): string {
  const show = (expr: Expr) => printExpr(expr, decimal);
  switch (line.kind) {
    case 'expression':
      return show(line.expr);
    case 'relation':
      return relate(show(line.left), line.sign, show(line.right));
    case 'chain':
      return line.members
        .slice(1)
        .reduce((text, member, at) => relate(text, line.signs[at]!, show(member)), show(line.members[0]!));
    case 'continuation':
      return line.members.reduce((text, member, at) => relate(text, line.signs[at]!, show(member)), '');
    case 'any':
    case 'all':
      return line.parts
        .map((part) => statement(part, decimal))
        .join(line.kind === 'any' ? '\\text{ or }' : '\\text{ and }');
    case 'membership': {
      const set = printSet(line.set, decimal);
      return line.letter ? glue(show(line.letter) + (line.negated ? '\\notin' : '\\in'), set) : set;
    }
    case 'none':
      return '\\text{no solution}';
    case 'always':
      return line.letter === null ? '\\text{always true}' : `\\text{all real }${line.letter}`;
    case 'definition': {
      const params = line.params.length > 0 ? bracket(line.params.join(',')) : '';
      const isUsual = params !== '' && 'fghFGH'.includes(line.name);
      return `${isUsual ? '' : '\\text{let }'}${line.name}${params}=${show(line.value)}`;
    }
  }
}

function relate(text: string, sign: RelationSign, member: string): string {
  return glue(glue(text, SIGNS[sign]), member);
}

function statement(part: Line, decimal: Decimal): string {
  const text = printLine(part, decimal);
  return part.kind === 'any' || part.kind === 'all' ? bracket(text) : text;
}

const NAMED = {
  empty: '\\varnothing',
  reals: '\\mathbb{R}',
  integers: '\\mathbb{Z}',
  naturals: '\\mathbb{N}',
  rationals: '\\mathbb{Q}',
  complex: '\\mathbb{C}',
} as const;

function printSet(set: SetExpr, decimal: Decimal): string {
  const separator = decimal === 'comma' ? ';' : ',';
  switch (set.kind) {
    case 'finite':
      return `\\left\\{${set.items.map((item) => printExpr(item, decimal)).join(separator)}\\right\\}`;
    case 'interval': {
      const from = set.from ? printExpr(set.from, decimal) : '-\\infty';
      const to = set.to ? printExpr(set.to, decimal) : '\\infty';
      return `\\left${set.fromClosed ? '[' : '('}${from}${separator}${to}\\right${set.toClosed ? ']' : ')'}`;
    }
    case 'union':
    case 'intersection':
      return set.parts
        .map((part) => simpleSet(part, decimal))
        .reduce((text, part) => glue(text + (set.kind === 'union' ? '\\cup' : '\\cap'), part));
    case 'without':
      return glue(`${simpleSet(set.from, decimal)}\\setminus`, simpleSet(set.removed, decimal));
    default:
      return NAMED[set.kind];
  }
}

function simpleSet(set: SetExpr, decimal: Decimal): string {
  const text = printSet(set, decimal);
  return set.kind === 'union' || set.kind === 'intersection' || set.kind === 'without' ? bracket(text) : text;
}
