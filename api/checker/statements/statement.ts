import type { Expr, Line, RelationSign, SetExpr, TermSign } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { childrenOf, exprsOfSet, mapChildren } from '../../../shared/maths/walk.ts';

/** What a line claims about its letters. */
export type Statement =
  | CompareStatement
  | { readonly kind: 'all' | 'any'; readonly parts: readonly Statement[] }
  | MemberStatement
  | { readonly kind: 'never' }
  | { readonly kind: 'always' };

export interface CompareStatement {
  readonly kind: 'compare';
  readonly left: Expr;
  readonly sign: RelationSign;
  readonly right: Expr;
}

export interface MemberStatement {
  readonly kind: 'member';
  /** null: the set of solutions itself was written. */
  readonly letter: Expr | null;
  readonly set: SetExpr;
  readonly negated: boolean;
}

/** The claim of a line; null for an expression, a continuation or a definition. */
export function toStatement(line: Line): Statement | null {
  switch (line.kind) {
    case 'relation':
      return withChoices([line.left, line.right], ([left, right]) => toCompare(left as Expr, line.sign, right as Expr));
    case 'chain':
      return withChoices(line.members, (members) => toLinks(members, line.signs));
    case 'any':
    case 'all': {
      const parts = withFurtherValues(line.parts).map((part) => toStatement(part) ?? toPoint(part));
      return parts.includes(null) ? null : { kind: line.kind, parts: parts as Statement[] };
    }
    case 'membership':
      return { kind: 'member', letter: line.letter, set: line.set, negated: line.negated };
    case 'none':
      return { kind: 'never' };
    case 'always':
      return { kind: 'always' };
    default:
      return null;
  }
}

/** `z=2e^{2k\\pi i/3}, k=0,1,2`: numbers after letter = number are further values of the letter. */
function withFurtherValues(parts: readonly Line[]): readonly Line[] {
  const joined: Line[] = [];
  for (const part of parts) {
    const last = joined[joined.length - 1];
    const first = last?.kind === 'any' ? last.parts[0] : last;
    const isNumber = (expr: Expr): boolean => expr.kind !== 'matrix' && lettersOf(expr).length === 0;
    if (
      last &&
      part.kind === 'expression' &&
      isNumber(part.expr) &&
      first?.kind === 'relation' &&
      first.sign === '=' &&
      first.left.kind === 'letter' &&
      isNumber(first.right)
    ) {
      const further: Line = { ...first, right: part.expr, span: part.span };
      joined[joined.length - 1] = {
        kind: 'any',
        parts: [...(last.kind === 'any' ? last.parts : [last]), further],
        span: first.span,
      };
    } else joined.push(part);
  }
  return joined;
}

/** `(3,4)` among other points: a pair as an open interval is written, which is how a point alone is read. */
function toPoint(line: Line): Statement | null {
  if (line.kind !== 'expression' || line.expr.kind !== 'matrix') return null;
  const [from, to, ...others] = line.expr.rows.flat();
  if (line.expr.rows.length !== 1 || !from || !to || others.length > 0) return null;
  return {
    kind: 'member',
    letter: null,
    set: { kind: 'interval', from, to, fromClosed: false, toClosed: false, span: line.expr.span },
    negated: false,
  };
}

/** An equation of two written vectors or matrices says that their entries are equal: (x,y)=(3,1). */
function toCompare(left: Expr, sign: RelationSign, right: Expr): Statement {
  const whole: Statement = { kind: 'compare', left, sign, right };
  if (sign !== '=' || left.kind !== 'matrix' || right.kind !== 'matrix') return whole;
  const [a, b] = [left.rows.flat(), right.rows.flat()];
  if (left.rows.length !== right.rows.length || a.length !== b.length) return whole;
  return { kind: 'all', parts: a.map((entry, k) => toCompare(entry, '=', b[k] as Expr)) };
}

function toLinks(members: readonly Expr[], signs: readonly RelationSign[]): Statement {
  const parts = signs.map((sign, k): Statement => {
    return { kind: 'compare', left: members[k] as Expr, sign, right: members[k + 1] as Expr };
  });
  return parts.length === 1 ? (parts[0] as Statement) : { kind: 'all', parts };
}

/** A chain that goes on from the last member of the line above. */
export function continueFrom(first: Expr, members: readonly Expr[], signs: readonly RelationSign[]): Statement {
  return withChoices([first, ...members], (all) => toLinks(all, signs));
}

const mostSigns = 4;

/**
 * One statement for each choice of the plus-or-minus signs, joined by or. A minus-or-plus belongs to the plus-or-minus
 * of its line; without one, several plus-or-minus signs are chosen apart.
 */
function withChoices(exprs: readonly Expr[], build: (chosen: readonly Expr[]) => Statement): Statement {
  const choices = chooseAll(exprs);
  return choices.length === 1 ? build(exprs) : { kind: 'any', parts: choices.map(build) };
}

/** The expressions that one with plus-or-minus signs stands for; itself where it has none. */
export function choicesOf(expr: Expr): Expr[] {
  return chooseAll([expr]).flat();
}

function chooseAll(exprs: readonly Expr[]): (readonly Expr[])[] {
  const signs = exprs.flatMap(listChoices);
  if (signs.length === 0) return [exprs];
  const together = signs.includes('minusplus');
  const count = together ? 1 : Math.min(signs.length, mostSigns);
  return Array.from({ length: 2 ** count }, (_, choice) => {
    let seen = 0;
    const isUpper = (): boolean => {
      const bit = together ? 0 : Math.min(seen, mostSigns - 1);
      seen += 1;
      return ((choice >> bit) & 1) === 0;
    };
    return exprs.map((expr) => chooseSigns(expr, isUpper));
  });
}

function listChoices(expr: Expr): TermSign[] {
  const own =
    expr.kind === 'sum' ? expr.terms.map((t) => t.sign).filter((s) => s === 'plusminus' || s === 'minusplus') : [];
  return [...own, ...childrenOf(expr).flatMap(listChoices)];
}

function chooseSigns(expr: Expr, isUpper: () => boolean): Expr {
  if (expr.kind !== 'sum') return mapChildren(expr, (child) => chooseSigns(child, isUpper));
  const own = expr.terms.map((term): TermSign => {
    if (term.sign === 'plus' || term.sign === 'minus') return term.sign;
    return isUpper() === (term.sign === 'plusminus') ? 'plus' : 'minus';
  });
  return {
    ...expr,
    terms: expr.terms.map((term, k) => ({ ...term, sign: own[k] as TermSign, expr: chooseSigns(term.expr, isUpper) })),
  };
}

/** The expressions that a statement is written with, sets aside. */
export function exprsOfStatement(statement: Statement): Expr[] {
  switch (statement.kind) {
    case 'compare':
      return [statement.left, statement.right];
    case 'all':
    case 'any':
      return statement.parts.flatMap(exprsOfStatement);
    case 'member':
      return [...(statement.letter ? [statement.letter] : []), ...exprsOfSet(statement.set)];
    default:
      return [];
  }
}

/** The comparisons of a statement. */
export function comparesOf(statement: Statement): CompareStatement[] {
  if (statement.kind === 'compare') return [statement];
  return statement.kind === 'all' || statement.kind === 'any' ? statement.parts.flatMap(comparesOf) : [];
}

/** Whether the statement says outright which values the letter has: x=3 or x=-1, x in {3,-1}, no solution. */
export function isListOfValues(statement: Statement, letter: string): boolean {
  switch (statement.kind) {
    case 'compare':
      return statement.sign === '=' && isLetter(statement.left, letter) && !lettersOf(statement.right).includes(letter);
    case 'any':
    case 'all':
      return statement.parts.every((part) => isListOfValues(part, letter));
    case 'member':
      return statement.set.kind === 'finite' && !statement.negated;
    default:
      return statement.kind === 'never';
  }
}

export function isLetter(expr: Expr, name: string): boolean {
  return expr.kind === 'letter' && expr.name === name;
}
