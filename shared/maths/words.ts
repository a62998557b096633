import type { Expr, Line, RelationSign, SetExpr } from './expression.ts';
import { exprInWords } from './words-expression.ts';

const RELATIONS: Record<RelationSign, string> = {
  '=': 'equals',
  '<': 'is less than',
  '>': 'is greater than',
  '<=': 'is less than or equal to',
  '>=': 'is greater than or equal to',
  '!=': 'is not equal to',
  approx: 'is approximately',
};

/** The line as English words, for the eye and for screen readers. */
export function lineInWords(line: Line): string {
  switch (line.kind) {
    case 'expression':
      return exprInWords(line.expr);
    case 'relation':
      return `${exprInWords(line.left)} ${RELATIONS[line.sign]} ${exprInWords(line.right)}`;
    case 'chain':
      return line.members
        .map((member, at) => (at > 0 ? linkInWords(line.signs[at - 1]!, member) : exprInWords(member)))
        .join(' ');
    case 'continuation':
      return `which ${line.members.map((member, at) => linkInWords(line.signs[at]!, member)).join(' ')}`;
    case 'any':
    case 'all':
      return line.parts.map(lineInWords).join(line.kind === 'any' ? ', or ' : ', and ');
    case 'membership':
      return line.letter
        ? `${exprInWords(line.letter)} is ${line.negated ? 'not ' : ''}in ${setInWords(line.set)}`
        : setInWords(line.set);
    case 'none':
      return 'no solution';
    case 'always':
      return line.letter ? `true for all real ${line.letter}` : 'always true';
    case 'definition':
      return line.params.length > 0
        ? `${line.name} of ${line.params.join(' and ')} is defined as ${exprInWords(line.value)}`
        : `let ${line.name} be ${exprInWords(line.value)}`;
  }
}

function linkInWords(sign: RelationSign, member: Expr): string {
  return `${RELATIONS[sign]} ${exprInWords(member)}`;
}

const NAMED = {
  empty: 'the empty set',
  reals: 'the real numbers',
  integers: 'the whole numbers',
  naturals: 'the natural numbers',
  rationals: 'the rational numbers',
  complex: 'the complex numbers',
} as const;

function setInWords(set: SetExpr): string {
  switch (set.kind) {
    case 'finite':
      return `the set of ${set.items.map(exprInWords).join(', ')}`;
    case 'interval': {
      const from = set.from ? `${exprInWords(set.from)}, ${included(set.fromClosed)},` : 'minus infinity';
      const to = set.to ? `${exprInWords(set.to)}, ${included(set.toClosed)}` : 'infinity';
      return `the interval from ${from} to ${to}`;
    }
    case 'union':
      return set.parts.map(setInWords).join(', together with ');
    case 'intersection':
      return set.parts.map(setInWords).join(', in common with ');
    case 'without':
      return `${setInWords(set.from)} without ${setInWords(set.removed)}`;
    default:
      return NAMED[set.kind];
  }
}

function included(isClosed: boolean): string {
  return isClosed ? 'included' : 'left out';
}
