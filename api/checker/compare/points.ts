import type { Expr, Line } from '../../../shared/maths/expression.ts';
import type { CheckContext } from '../context.ts';
import { createRandom } from '../numbers/random.ts';
import type { Random } from '../numbers/random.ts';
import * as Q from '../numbers/rational.ts';
import type { Rational } from '../numbers/rational.ts';
import { fromParts, fromPi, fromRational, isKnown } from '../values/arithmetic.ts';
import { evaluatePrepared, prepare } from '../values/evaluate.ts';
import type { Prepared } from '../values/evaluate.ts';
import { prepareLine } from '../values/truth.ts';
import type { PreparedLine } from '../values/truth.ts';
import type { KnownValue, Point } from '../values/value.ts';

/** Where two lines may be compared: letters, what is assumed of them, and numbers of interest. */
export interface Region {
  readonly names: readonly string[];
  readonly whole: ReadonlySet<string>;
  /** Whether a point meets the assumptions; false too where that cannot be told. */
  readonly admits: (point: Point) => boolean;
  /** Equations among the assumptions, each solved for one of its letters where it is linear in it. */
  readonly equations: readonly Equation[];
  /** Numbers near which the lines may change their behaviour. */
  readonly marks: readonly Rational[];
  readonly traits: Traits;
  readonly context: CheckContext;
}

export interface Traits {
  /** Multiples of pi are tried as well. */
  readonly turns: boolean;
  /** Exponentials: large numbers would only cost. */
  readonly gentle: boolean;
}

interface Equation {
  /** In order of preference. */
  readonly letters: readonly string[];
  readonly left: Prepared;
  readonly right: Prepared;
}

const assumptionBits = 128;

export function createRegion(
  names: readonly string[],
  whole: ReadonlySet<string>,
  marks: readonly Rational[],
  traits: Traits,
  context: CheckContext,
): Region {
  const tests: PreparedLine[] = [];
  const equations: Equation[] = [];
  const all = [...names];
  for (const line of context.assumptions) {
    const letters = lettersOf(line);
    if (!letters.some((letter) => all.includes(letter))) continue;
    for (const letter of letters) if (!all.includes(letter)) all.push(letter);
  }
  for (const line of flattenLines(context.assumptions)) {
    const letters = lettersOf(line);
    if (letters.length === 0 || !letters.every((letter) => all.includes(letter))) continue;
    tests.push(prepareLine(line, context));
    if (line.kind !== 'relation' || line.sign !== '=') continue;
    equations.push({
      letters: inOrder(line.left, letters),
      left: prepare(line.left, context),
      right: prepare(line.right, context),
    });
  }
  const numbers = marksOfLines(context.assumptions);
  return {
    names: all,
    whole,
    admits: (point) => tests.every((test) => test(point, assumptionBits) === true),
    equations,
    marks: [...marks, ...numbers],
    traits,
    context,
  };
}

/** Conditions joined by *and* one by one. */
export function flattenLines(lines: readonly Line[]): Line[] {
  return lines.flatMap((line) => {
    if (line.kind === 'all') return flattenLines(line.parts);
    return [line];
  });
}

/** A letter that stands alone on the left is the one to solve for. */
function inOrder(left: Expr, letters: readonly string[]): string[] {
  if (left.kind !== 'letter') return [...letters].reverse();
  return [left.name, ...letters.filter((letter) => letter !== left.name)];
}

/** Letters that the context or an assumption makes whole numbers. */
export function wholeLettersOf(context: CheckContext): ReadonlySet<string> {
  const whole = new Set(context.wholeLetters);
  for (const line of flattenLines(context.assumptions)) {
    if (line.kind !== 'membership' || line.negated || line.letter?.kind !== 'letter') continue;
    if (line.set.kind === 'integers' || line.set.kind === 'naturals') whole.add(line.letter.name);
  }
  return whole;
}

/** Every letter in a tree of plain data, in order of appearance. */
export function lettersOf(tree: unknown, found: string[] = []): string[] {
  if (Array.isArray(tree)) for (const part of tree) lettersOf(part, found);
  else if (typeof tree === 'object' && tree !== null) {
    if ('kind' in tree && tree.kind === 'letter' && 'name' in tree && typeof tree.name === 'string') {
      if (!found.includes(tree.name)) found.push(tree.name);
    } else for (const part of Object.values(tree)) lettersOf(part, found);
  }
  return found;
}

function marksOfLines(tree: unknown, found: Rational[] = []): Rational[] {
  if (Array.isArray(tree)) for (const part of tree) marksOfLines(part, found);
  else if (typeof tree === 'object' && tree !== null) {
    if (
      'numerator' in tree &&
      typeof tree.numerator === 'bigint' &&
      'denominator' in tree &&
      typeof tree.denominator === 'bigint'
    ) {
      found.push({ num: tree.numerator, den: tree.denominator });
    } else for (const part of Object.values(tree)) marksOfLines(part, found);
  }
  return found;
}

/** The first points of a complex comparison are real all the same. */
const firstComplex = 12;
const friendlyNumbers = [1, 2, 3, -1, -2, 0, 4, 5, -3, 6, 7, -4, 10];
const friendly = friendlyNumbers.map((n) => Q.rational(n));
const friendlyWhole = [1, 2, 3, 4, 5, 6, 0, 7, 8, 10, -1, -2].map((n) => Q.rational(n));
const scales = [1, 1, 3, 1, 30, 300, 3_000, 30_000];
const gentleScales = [1, 1, 3, 1, 6, 10, 10, 30];

/** Points of a region, small whole numbers first, then fractions, near the marks and at several scales. */
export function* pointsOf(region: Region, seed: number, most: number, from = 0): Generator<Point> {
  const random = createRandom(seed ^ 0x5bd1e995);
  if (region.names.length === 0) {
    if (from === 0) yield new Map();
    return;
  }
  for (let k = from; k < most; k += 1) {
    const point = new Map<string, KnownValue>();
    region.names.forEach((name, position) => {
      point.set(name, pickValue(k, position, name, region, random));
    });
    const settled = settleEquations(point, region);
    if (settled !== null && region.admits(settled)) yield settled;
  }
}

function isComplex(name: string, { context }: Region): boolean {
  return context.numbers === 'complex' && context.realLetters?.has(name) !== true;
}

/**
 * The value of the letter in that position at the first points of all, which depend on nothing else; null after them. The
 * first points of several letters are small and mostly distinct: (1, 2, 3), (2, 3, 1), ...
 */
export function friendlyNumber(k: number, position: number, letters: number): number | null {
  if (letters > 1) return k < 3 ? ((k + position) % 3) + 1 : null;
  return friendlyNumbers[k] ?? null;
}

function pickValue(k: number, position: number, name: string, region: Region, random: Random): KnownValue {
  const whole = region.whole.has(name);
  const several = region.names.length > 1;
  const list = whole ? friendlyWhole : friendly;
  const small = whole && !several ? null : friendlyNumber(k, position, region.names.length);
  if (small !== null) return fromRational(Q.rational(small));
  if (k < list.length && !several) return fromRational(list[k] ?? Q.one);
  if (k < 14 && several) return fromRational(list[random(list.length)] ?? Q.one);
  if (whole) return fromRational(Q.rational(k % 5 === 0 ? random(30) : k % 5 === 1 ? -random(8) : random(12)));
  if (isComplex(name, region) && k % 2 === 0 && k >= firstComplex) return complexValue(k, region, random);
  if (region.traits.turns && k % 4 === 1) return fromPi(Q.rational(random(49) - 24, [12, 6, 4, 3, 1][random(5)] ?? 1));
  if (region.marks.length > 0 && k % 4 === 3)
    return nearMark(region.marks[random(region.marks.length)] ?? Q.one, random);
  const range = region.traits.gentle ? gentleScales : scales;
  return fromRational(scattered(range[random(range.length)] ?? 1, random));
}

/** Small parts, or parts as large as the written numbers: the logarithm of e^(z/100) goes on differently from 100 pi i on. */
function complexValue(k: number, region: Region, random: Random): KnownValue {
  const re = Q.rational(random(15) - 7, 1 + random(3));
  const im = Q.rational(random(15) - 7, 1 + random(3));
  if (k % 8 === 2 || region.marks.length === 0) return fromParts(re, im);
  const mark = Q.absolute(region.marks[random(region.marks.length)] ?? Q.one);
  const scale = mark.num < mark.den ? Q.div(Q.one, mark) : mark;
  return k % 8 === 0
    ? fromParts(re, Q.mul(im, Q.mul(scale, Q.rational(5))))
    : fromParts(Q.mul(re, scale), Q.mul(im, scale));
}

function nearMark(mark: Rational, random: Random): KnownValue {
  const signed = random(2) === 0 ? mark : Q.negate(mark);
  const steps = [
    Q.zero,
    Q.rational(1),
    Q.rational(-1),
    Q.rational(1, 2),
    Q.rational(-1, 2),
    Q.rational(1, 7),
    Q.rational(-1, 9),
  ];
  return fromRational(Q.add(signed, steps[random(steps.length)] ?? Q.zero));
}

function scattered(scale: number, random: Random): Rational {
  const den = 1 + random(scale > 100 ? 7 : 97);
  const size = Q.rational(1 + random(scale * den), den);
  return random(2) === 0 ? size : Q.negate(size);
}

/** Solves each equation for a letter that occurs linearly; null where there is none. */
function settleEquations(point: Map<string, KnownValue>, region: Region): Point | null {
  const settled = new Set<string>();
  for (const equation of region.equations) {
    const found = equation.letters.find((letter) => {
      if (settled.has(letter)) return false;
      const value = solveLinear(equation, letter, point, region.context);
      if (value !== null) point.set(letter, fromRational(value));
      return value !== null;
    });
    if (found === undefined) return null;
    settled.add(found);
  }
  return point;
}

function solveLinear(equation: Equation, letter: string, point: Point, context: CheckContext): Rational | null {
  const at = (n: number): Rational | null => {
    const trial = new Map(point).set(letter, fromRational(Q.rational(n)));
    const left = evaluatePrepared(equation.left, trial, assumptionBits, context);
    const right = evaluatePrepared(equation.right, trial, assumptionBits, context);
    if (!isKnown(left) || !isKnown(right) || left.kind !== 'rational' || right.kind !== 'rational') return null;
    return Q.sub(left.value, right.value);
  };
  const [f0, f1, f2] = [at(0), at(1), at(2)];
  if (f0 === null || f1 === null || f2 === null) return null;
  const slope = Q.sub(f1, f0);
  if (Q.isZero(slope) || !Q.equals(Q.sub(f2, f1), slope)) return null;
  return Q.negate(Q.div(f0, slope));
}
