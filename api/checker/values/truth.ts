import type { Expr, Line, RelationSign, SetExpr, Span } from '../../../shared/maths/expression.ts';
import type { CheckContext } from '../context.ts';
import * as Q from '../numbers/rational.ts';
import { isExactZero, isKnown, isReal, subKnown, toBall } from './arithmetic.ts';
import { evaluatePrepared, prepare } from './evaluate.ts';
import type { Prepared } from './evaluate.ts';
import { signOf } from './powers.ts';
import type { KnownValue, Point, Value } from './value.ts';
import { isNonZero } from './arithmetic.ts';

/** true or false at a point; 'undefined' where a side has no value; null where it cannot be told. */
export type Truth = boolean | 'undefined' | null;

/** A line made ready to be tried at many points. */
export type PreparedLine = (point: Point, bits: number) => Truth;

/** Decides lines about numbers; a line of another kind answers null everywhere. */
export function prepareLine(line: Line, context: CheckContext): PreparedLine {
  switch (line.kind) {
    case 'relation':
      return prepareRelation(line.left, line.sign, line.right, context);
    case 'chain':
      return prepareEvery(
        line.signs.map((sign, k) =>
          prepareRelation(memberAt(line.members, k), sign, memberAt(line.members, k + 1), context),
        ),
      );
    case 'all':
      return prepareEvery(line.parts.map((part) => prepareLine(part, context)));
    case 'any':
      return prepareSome(line.parts.map((part) => prepareLine(part, context)));
    case 'membership':
      return line.letter === null ? () => null : prepareMembership(line.letter, line.set, line.negated, context);
    case 'none':
      return () => false;
    case 'always':
      return () => true;
    default:
      return () => null;
  }
}

/** Whether a line is true at a point. */
export function truthAt(line: Line, point: Point, bits: number, context: CheckContext): Truth {
  return prepareLine(line, context)(point, bits);
}

function memberAt(members: readonly Expr[], k: number): Expr {
  const member = members[k];
  if (member === undefined) throw new RangeError('a chain with fewer members than signs');
  return member;
}

function prepareEvery(parts: readonly PreparedLine[]): PreparedLine {
  return (point, bits) => {
    let result: Truth = true;
    for (const part of parts) {
      const truth = part(point, bits);
      if (truth === false) return false;
      if (truth === 'undefined' || (truth === null && result !== 'undefined')) result = truth;
    }
    return result;
  };
}

function prepareSome(parts: readonly PreparedLine[]): PreparedLine {
  return (point, bits) => {
    let result: Truth = false;
    for (const part of parts) {
      const truth = part(point, bits);
      if (truth === true) return true;
      if (truth === null || (truth === 'undefined' && result !== null)) result = truth;
    }
    return result;
  };
}

function prepareRelation(left: Expr, sign: RelationSign, right: Expr, context: CheckContext): PreparedLine {
  const a = prepare(left, context);
  const b = prepare(right, context);
  return (point, bits) => relationTruth(valueAt(a, point, bits, context), sign, valueAt(b, point, bits, context), bits);
}

function valueAt(prepared: Prepared, point: Point, bits: number, context: CheckContext): Value {
  return evaluatePrepared(prepared, point, bits, context);
}

/** Order needs real numbers; a comparison of others has no meaning. */
export function relationTruth(a: Value, sign: RelationSign, b: Value, bits: number): Truth {
  if (a.kind === 'undefined' || b.kind === 'undefined') return 'undefined';
  if (!isKnown(a) || !isKnown(b) || sign === 'approx') return null;
  const difference = subKnown(a, b, bits);
  if (sign === '=' || sign === '!=') {
    const same = isZeroValue(difference, bits);
    return same === null ? null : same === (sign === '=');
  }
  if (!isReal(a) || !isReal(b)) return 'undefined';
  const order = signOf(difference);
  if (order === null) return null;
  switch (sign) {
    case '<':
      return order < 0;
    case '>':
      return order > 0;
    case '<=':
      return order <= 0;
    case '>=':
      return order >= 0;
  }
}

/** Null where a ball holds zero. */
export function isZeroValue(value: KnownValue, bits: number): boolean | null {
  if (value.kind !== 'ball') return isExactZero(value);
  return isNonZero(toBall(value, bits)) ? false : null;
}

function prepareMembership(letter: Expr, set: SetExpr, negated: boolean, context: CheckContext): PreparedLine {
  const inside = prepareInside(letter, set, context);
  if (!negated) return inside;
  return (point, bits) => {
    const truth = inside(point, bits);
    return typeof truth === 'boolean' ? !truth : truth;
  };
}

function prepareInside(letter: Expr, set: SetExpr, context: CheckContext): PreparedLine {
  switch (set.kind) {
    case 'finite':
      return prepareSome(set.items.map((item) => prepareRelation(letter, '=', item, context)));
    case 'interval':
      return prepareEvery([
        ...(set.from === null ? [] : [prepareRelation(letter, set.fromClosed ? '>=' : '>', set.from, context)]),
        ...(set.to === null ? [] : [prepareRelation(letter, set.toClosed ? '<=' : '<', set.to, context)]),
      ]);
    case 'union':
      return prepareSome(set.parts.map((part) => prepareInside(letter, part, context)));
    case 'intersection':
      return prepareEvery(set.parts.map((part) => prepareInside(letter, part, context)));
    case 'without': {
      const within = prepareInside(letter, set.from, context);
      const removed = prepareMembership(letter, set.removed, true, context);
      return prepareEvery([within, removed]);
    }
    case 'empty':
      return () => false;
    default:
      return prepareNumberSet(letter, set.kind, context);
  }
}

function prepareNumberSet(
  letter: Expr,
  set: 'reals' | 'integers' | 'naturals' | 'rationals' | 'complex',
  context: CheckContext,
): PreparedLine {
  const prepared = prepare(letter, context);
  return (point, bits) => {
    const value = valueAt(prepared, point, bits, context);
    if (value.kind === 'undefined') return 'undefined';
    if (!isKnown(value)) return null;
    if (set === 'complex') return true;
    if (set === 'reals') return isReal(value) || null;
    if (value.kind !== 'rational') return value.kind === 'ball' ? null : false;
    if (set === 'rationals') return true;
    return Q.isWhole(value.value) && (set === 'integers' || value.value.num >= 0n);
  };
}

/** A relation as a line, for conditions that are made here. */
export function relationLine(left: Expr, sign: RelationSign, right: Expr): Line {
  const span: Span = { start: 0, end: 0 };
  return { kind: 'relation', left, sign, right, span };
}
