import type { Expr } from '../../../shared/maths/expression.ts';
import { bigMod, inverseMod, mulMod, powMod } from '../numbers/modular.ts';
import * as Q from '../numbers/rational.ts';
import type { Rational } from '../numbers/rational.ts';
import { boundNumber, boundProduct, boundSum, inverted, letterBound, scaled } from './size-bounds.ts';
import type { SizeBound } from './size-bounds.ts';

/**
 * Quotients of polynomials as operations on a stack. It holds as much as the graph of values does for such expressions,
 * but costs a tenth to make, which is what counts where it is evaluated only a few times.
 */
export interface StackProgram {
  /** Operation and operand in turn. */
  readonly code: number[];
  readonly numbers: Rational[];
  readonly letters: string[];
  /** How many factors of denominators it comes by. */
  needs: number;
}

const pushNumber = 0;
const pushLetter = 1;
/** Of the uppermost so many. */
const sum = 2;
const product = 3;
const quotient = 4;
const negative = 5;
const power = 6;
/** What is uppermost divides something. */
const need = 7;

const mostOperations = 600;
const largestExponent = 10_000;

export function createProgram(letters: string[]): StackProgram {
  return { code: [], numbers: [], letters, needs: 0 };
}

/** Adds an expression's operations; false where it is more than numbers and letters joined by the four operations and whole powers. */
export function addOperations(expr: Expr, to: StackProgram): boolean {
  if (to.code.length > 2 * mostOperations) return false;
  switch (expr.kind) {
    case 'number':
      return add(to, pushNumber, to.numbers.push({ num: expr.numerator, den: expr.denominator }) - 1);
    case 'letter': {
      const at = to.letters.indexOf(expr.name);
      return add(to, pushLetter, at >= 0 ? at : to.letters.push(expr.name) - 1);
    }
    case 'sum':
      for (const { sign, expr: part } of expr.terms) {
        if ((sign !== 'plus' && sign !== 'minus') || !addOperations(part, to)) return false;
        if (sign === 'minus') add(to, negative, 0);
      }
      return expr.terms.length === 1 || add(to, sum, expr.terms.length);
    case 'product':
      for (const factor of expr.factors) if (!addOperations(factor, to)) return false;
      return add(to, product, expr.factors.length);
    case 'quotient':
      return addOperations(expr.numerator, to) && addDivisor(expr.denominator, to) && add(to, quotient, 0);
    case 'power':
      return addPower(expr.base, expr.exponent, to);
    default:
      return false;
  }
}

function add({ code }: StackProgram, operation: number, operand: number): true {
  code.push(operation, operand);
  return true;
}

function addPower(base: Expr, exponent: Expr, to: StackProgram): boolean {
  const whole = wholeOf(exponent);
  if (whole > 0) return addOperations(base, to) && add(to, power, whole);
  if (whole === 0) return false;
  add(to, pushNumber, to.numbers.push(Q.one) - 1);
  return addDivisor(base, to) && add(to, power, -whole) && add(to, quotient, 0);
}

/** The exponent where it is a whole number written as such, else 0. */
function wholeOf(expr: Expr): number {
  if (expr.kind === 'number') {
    if (expr.denominator !== 1n || expr.written !== 'integer') return 0;
    return expr.numerator <= BigInt(largestExponent) ? Number(expr.numerator) : 0;
  }
  if (expr.kind !== 'sum' || expr.terms.length !== 1) return 0;
  const [term] = expr.terms;
  return term?.sign === 'minus' ? -wholeOf(term.expr) : 0;
}

/** A product is zero where one of its factors is: each is noted by itself. */
function addDivisor(expr: Expr, to: StackProgram): boolean {
  if (expr.kind === 'product') {
    for (const factor of expr.factors) if (!addDivisor(factor, to)) return false;
    return add(to, product, expr.factors.length);
  }
  if (expr.kind === 'power') {
    const whole = wholeOf(expr.exponent);
    return whole > 0 && addDivisor(expr.base, to) && add(to, power, whole);
  }
  if (!addOperations(expr, to)) return false;
  if (expr.kind === 'number') return expr.numerator !== 0n;
  to.needs += 1;
  return add(to, need, 0);
}

const stack = new Float64Array(2 * mostOperations);

/**
 * The value modulo the prime p at the residues of the letters, -1 where a denominator vanishes there; what the factors of
 * denominators are worth goes into `needs` from `from` on.
 */
export function residueOf(
  { code, numbers }: StackProgram,
  at: Float64Array,
  p: number,
  needs: Float64Array,
  from: number,
): number {
  let top = -1;
  let met = from;
  for (let k = 0; k < code.length; k += 2) {
    const operand = code[k + 1] as number;
    switch (code[k]) {
      case pushNumber: {
        const value = numberResidue(numbers[operand] as Rational, p);
        if (value < 0) return -1;
        stack[(top += 1)] = value;
        break;
      }
      case pushLetter:
        stack[(top += 1)] = at[operand] as number;
        break;
      case sum: {
        let total = stack[(top -= operand - 1)] as number;
        for (let j = 1; j < operand; j += 1) total += stack[top + j] as number;
        stack[top] = total - Math.floor(total / p) * p;
        break;
      }
      case product: {
        let total = stack[(top -= operand - 1)] as number;
        for (let j = 1; j < operand; j += 1) total = mulMod(total, stack[top + j] as number, p);
        stack[top] = total;
        break;
      }
      case quotient: {
        const bottom = stack[top] as number;
        if (bottom === 0) return -1;
        top -= 1;
        stack[top] = mulMod(stack[top] as number, inverseMod(bottom, p), p);
        break;
      }
      case negative:
        stack[top] = stack[top] === 0 ? 0 : p - (stack[top] as number);
        break;
      case power:
        stack[top] = powMod(stack[top] as number, operand, p);
        break;
      default:
        needs[met] = stack[top] as number;
        met += 1;
    }
  }
  return stack[0] as number;
}

function numberResidue({ num, den }: Rational, p: number): number {
  const top = bigMod(num, p);
  if (den === 1n) return top;
  const bottom = bigMod(den, p);
  return bottom === 0 ? -1 : mulMod(top, inverseMod(bottom, p), p);
}

/** The exact value at whole numbers; null where it has none. */
export function valueOf({ code, numbers }: StackProgram, at: readonly number[]): Rational | null {
  const values: Rational[] = [];
  for (let k = 0; k < code.length; k += 2) {
    const operand = code[k + 1] as number;
    const upper = values[values.length - 1] as Rational;
    switch (code[k]) {
      case pushNumber:
        values.push(numbers[operand] as Rational);
        break;
      case pushLetter:
        values.push(Q.rational(at[operand] as number));
        break;
      case sum:
        values.push(values.splice(values.length - operand).reduce(Q.add));
        break;
      case product:
        values.push(values.splice(values.length - operand).reduce(Q.mul));
        break;
      case quotient:
        if (Q.isZero(upper)) return null;
        values.pop();
        values.push(Q.div(values.pop() as Rational, upper));
        break;
      case negative:
        values[values.length - 1] = Q.negate(upper);
        break;
      case power:
        values[values.length - 1] = Q.pow(upper, operand);
        break;
      default:
    }
  }
  return values[0] as Rational;
}

/** Bounds that hold for every value the operations come by, as a quotient of polynomials. */
export interface ProgramBound {
  /** The degrees of top and bottom together. */
  readonly degree: number;
  /** Bits of the sums of the sizes of their coefficients, together. */
  readonly bits: number;
}

export function boundOf({ code, numbers }: StackProgram): ProgramBound {
  const bounds: SizeBound[] = [];
  let degree = 0;
  let bits = 0;
  for (let k = 0; k < code.length; k += 2) {
    const operand = code[k + 1] as number;
    const upper = bounds[bounds.length - 1] as SizeBound;
    switch (code[k]) {
      case pushNumber:
        bounds.push(boundNumber(numbers[operand] as Rational));
        break;
      case pushLetter:
        bounds.push(letterBound);
        break;
      case sum:
        bounds.push(boundSum(bounds.splice(bounds.length - operand)));
        break;
      case product:
        bounds.push(bounds.splice(bounds.length - operand).reduce(boundProduct));
        break;
      case quotient:
        bounds.pop();
        bounds.push(boundProduct(bounds.pop() as SizeBound, inverted(upper)));
        break;
      case power:
        bounds[bounds.length - 1] = scaled(upper, operand);
        break;
      default:
    }
    const last = bounds[bounds.length - 1] as SizeBound;
    degree = Math.max(degree, last.topDegree + last.bottomDegree);
    bits = Math.max(bits, last.topBits + last.bottomBits);
  }
  return { degree, bits };
}
