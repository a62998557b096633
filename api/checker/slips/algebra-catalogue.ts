import type { Expr, Line, SumExpr } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { neg, power, sum, termsOf, whole } from '../evidence/build.ts';
import { expanded, monomialExpr } from '../evidence/monomials.ts';
import { factorsOf, type Bindings } from './match.ts';
import { bothWays, relation, signedTerm } from './relations.ts';
import { rule } from './rewrite.ts';
import { memory, ruled, slip, type Slip } from './slip.ts';

const schechter = 'Schechter, The Most Common Errors in Undergraduate Mathematics';
const portland = 'Portland State University, Common Errors in Algebra and Calculus';
const matz = 'Matz 1980/1982, process model for high-school algebra errors (from memory)';
const pitfalls = 'Brown University, Algebra Pitfalls';
const detachment =
  'Linchevski & Herscovics 1996; Herscovics & Linchevski 1994, detachment from the minus sign (from memory)';
const cangelosi = 'Cangelosi, Madrid, Cooper, Olson & Hartter 2013, The negative sign and exponential expressions';
const booth = 'L. Booth 1984 / Kuchemann 1981 (CSMS), letters and concatenation (from memory)';

function hasLetter(expr: Expr | undefined): boolean {
  return expr !== undefined && lettersOf(expr).length > 0;
}

function isNumeric(bound: Bindings): boolean {
  return ![...bound.values()].some(hasLetter);
}

/** The second of two terms in a bracket has no minus. */
function isAdded(bound: Bindings): boolean {
  const [first] = termsOf(bound.get('c') ?? whole(0));
  return first?.sign === 'plus';
}

/** Terms that come to nothing together were not joined in this way. */
function areLetterTerms(bound: Bindings): boolean {
  const [k, m] = [bound.get('k'), bound.get('m')];
  const isNothing = k !== undefined && m !== undefined && expanded(sum(k, m))?.length === 0;
  return hasLetter(bound.get('a')) && hasLetter(bound.get('b')) && !isNothing;
}

/** a - b + c read as a - (b + c): the term behind a subtracted one with its sign turned. */
function* detached(part: Expr): Generator<Expr> {
  if (part.kind !== 'sum') return;
  for (const [k, { sign }] of part.terms.entries()) {
    const next = part.terms[k + 1];
    if (sign === 'minus' && next) yield withTurned(part, k + 1);
  }
}

/** -(a+b)(a-b) multiplied out as -a^2-b^2: the minus meets the first term of the product only. */
function* firstOfProduct(part: Expr): Generator<Expr> {
  if (part.kind !== 'sum') return;
  for (const [k, { sign, expr }] of part.terms.entries()) {
    const factors = expr.kind === 'product' ? expr.factors : expr.kind === 'power' ? [expr.base] : [];
    const isOfSums = factors.length > 0 && factors.every((factor) => factor.kind === 'sum' && factor.terms.length > 1);
    const [first, ...others] = (sign === 'minus' && isOfSums && expanded(expr)) || [];
    if (!first || others.length === 0) continue;
    const terms = part.terms.map(signedTerm);
    yield sum(...terms.slice(0, k), neg(monomialExpr(first)), ...others.map(monomialExpr), ...terms.slice(k + 1));
  }
}

/**
 * Both sides squared, of which the first has one term and the second is squared term by term; `wants` looks at the two
 * terms of the second.
 */
function squaredTermByTerm(sign: 'plus' | 'minus', wantsRoot: boolean): (above: Line) => Generator<Line> {
  return function* lines(above) {
    for (const { left, sign: equals, right } of bothWays(above)) {
      const [first, second, ...more] = right.kind === 'sum' ? right.terms : [];
      if (equals !== '=' || !first || !second || more.length > 0 || termsOf(left).length > 1) continue;
      // Nobody squares without a root.
      if (!wantsRoot && left.kind !== 'root') continue;
      const hasRoot = [first, second].some(({ expr }) => factorsOf(expr).some((factor) => factor.kind === 'root'));
      if (hasRoot !== wantsRoot || first.sign !== 'plus' || (second.sign === 'plus' && sign === 'minus' && !wantsRoot))
        continue;
      const [a, b] = [squareOf(first.expr), squareOf(second.expr)];
      yield relation(squareOf(left), '=', sum(a, sign === 'minus' ? neg(b) : b));
    }
  };
}

function squareOf(expr: Expr): Expr {
  return expr.kind === 'root' && !expr.degree ? expr.radicand : power(expr, whole(2));
}

/** -a^n read as (-a)^n, at the front of a sum, where the minus is that of a number or letter. */
function* drawnIn(part: Expr): Generator<Expr> {
  const [first] = part.kind === 'sum' ? part.terms : [];
  if (part.kind !== 'sum' || first?.sign !== 'minus' || first.expr.kind !== 'power') return;
  const drawn = power(neg(first.expr.base), first.expr.exponent);
  yield { ...part, terms: [{ ...first, sign: 'plus', expr: drawn }, ...part.terms.slice(1)] };
}

function withTurned(part: SumExpr, place: number): Expr {
  const turned = { plus: 'minus', minus: 'plus', plusminus: 'minusplus', minusplus: 'plusminus' } as const;
  return { ...part, terms: part.terms.map((term, k) => (k === place ? { ...term, sign: turned[term.sign] } : term)) };
}

/** Signs. */
const signs: readonly Slip[] = [
  ruled(
    'the minus in front of a fraction reached only its first term',
    'sign',
    `${schechter} (lost parentheses)`,
    ['-\\frac{b+c}{d} -> \\frac{-b+c}{d}', '-\\frac{b-c}{d} -> \\frac{-b-c}{d}'],
    7,
  ),
  slip(
    'the minus in front of a bracket reached only its first term',
    'sign',
    `${schechter} (sign errors; lost parentheses)`,
    {
      rank: 6,
      rewrites: [rule('-(a+b)', '-a+b'), rule('-(a-b)', '-a-b'), rule('-a(b+c)', '-ab+ac', isAdded), firstOfProduct],
    },
  ),
  ruled('a product of two negatives was left negative', 'sign', `${schechter} (sign errors)`, [
    '-a(b-c) -> -ab-ac',
    '(a-b)(c-d) -> ac-ad-bc-bd',
    '-(a-b) -> -a-b',
    '(-a)(-b) -> -ab',
  ]),
  ruled(
    'a product of a positive and a negative was made positive',
    'sign',
    `${schechter} (sign errors)`,
    [
      'a(b-c) -> ab+ac',
      '(a-b)(c+d) -> ac+ad+bc-bd',
      '(a-b)(c+d) -> ac+ad-bc+bd',
      '(a+b)(c-d) -> ac+ad+bc-bd',
      '(a+b)(c-d) -> ac-ad+bc+bd',
    ],
    4,
  ),
  ruled('two negatives were added as if they made a plus', 'sign', `Vlassis 2004; ${detachment}`, ['-a-b -> a+b'], 4),
  ruled('subtracting a negative was treated as subtracting', 'sign', memory, ['-(-b) -> -b'], 6),
  slip('a term was detached from the minus in front of it', 'sign', detachment, { rank: 4, rewrites: [detached] }),
  ruled('the square of a negative was taken as negative', 'sign', cangelosi, ['(-a)^n -> -a^n'], 6),
  slip('the minus sign was drawn into the power', 'sign', portland, { rank: 6, rewrites: [drawnIn] }),
  ruled(
    'a sign was lost on taking out a common factor',
    'sign',
    memory,
    ['ab-ac -> a(b+c)', '-ab+ac -> a(b+c)', '-ab-ac -> -a(b-c)'],
    4,
  ),
];

/** Brackets and everything taken term by term. */
const brackets: readonly Slip[] = [
  ruled(
    'only the first term was multiplied',
    'brackets',
    `${matz}; Sleeman 1984, Cognitive Science 8:387-412`,
    ['a(b+c) -> ab+c', '-a(b+c) -> -ab+c', '-a(b-c) -> -ab-c'],
    6,
  ),
  ruled(
    'only the first and last terms were multiplied',
    'brackets',
    matz,
    ['(a+b)(c+d) -> ac+bd', '(a-b)(c-d) -> ac+bd', '(a+b)(c-d) -> ac-bd'],
    6,
  ),
  ruled('the multiplier was applied to each factor of a product', 'brackets', memory, ['k(bc) -> (kb)(kc)']),
  ruled('the multiplier went in before squaring', 'brackets', portland, ['k(a+b)^n -> (ka+kb)^n'], 6),
  ruled(
    'the power reached only the letter',
    'brackets',
    `Dawkins, bad/lost parentheses; ${schechter}`,
    ['(ka)^n -> ka^n'],
    6,
  ),
  slip('the square of a difference was taken with a minus kept', 'brackets', matz, {
    rank: 7,
    rewrites: [rule('(a-b)^2', 'a^2-b^2')],
    lines: squaredTermByTerm('minus', false),
  }),
  ruled(
    'the cube of a sum was taken term by term',
    'brackets',
    `${pitfalls} (general power)`,
    ['(a+b)^3 -> a^3+b^3', '(a-b)^3 -> a^3-b^3'],
    7,
  ),
  slip('a sum of a root and a number was squared term by term', 'powers-and-roots', `${pitfalls} (same family)`, {
    rank: 8,
    rewrites: [rule('(\\sqrt{a}+b)^2', 'a+b^2'), rule('(\\sqrt{a}-b)^2', 'a+b^2'), rule('(\\sqrt{a}-b)^2', 'a-b^2')],
    *lines(above) {
      yield* squaredTermByTerm('plus', true)(above);
      yield* squaredTermByTerm('minus', true)(above);
    },
  }),
  slip('the square of a sum was taken term by term', 'brackets', pitfalls, {
    rank: 6,
    rewrites: [rule('(a+b)^2', 'a^2+b^2'), rule('(a-b)^2', 'a^2+b^2')],
    lines: squaredTermByTerm('plus', false),
  }),
  ruled('a power of a sum was taken term by term', 'brackets', `${pitfalls} (general power)`, [
    '(a+b)^n -> a^n+b^n',
    '(a-b)^n -> a^n-b^n',
  ]),
  ruled('the middle term was not doubled', 'brackets', memory, ['(a+b)^2 -> a^2+ab+b^2', '(a-b)^2 -> a^2-ab+b^2'], 6),
  ruled('the last sign of a squared difference was wrong', 'sign', memory, ['(a-b)^2 -> a^2-2ab-b^2'], 6),
  ruled(
    'the pythagorean identity was rooted term by term',
    'functions',
    memory,
    ['\\sqrt{1-\\cos^2 a} -> 1-\\cos a', '\\sqrt{1-\\sin^2 a} -> 1-\\sin a'],
    8,
  ),
  ruled(
    'the root of a sum was taken term by term',
    'powers-and-roots',
    pitfalls,
    [
      '\\sqrt{a+b} -> \\sqrt{a}+\\sqrt{b}',
      '\\sqrt{a-b} -> \\sqrt{a}-\\sqrt{b}',
      '\\sqrt{a^2+b^2} -> a+b',
      '\\sqrt{a^2+b} -> a+\\sqrt{b}',
      '\\sqrt{a^2-b} -> a-\\sqrt{b}',
      '\\sqrt{a^2-b^2} -> a-b',
    ],
    6,
  ),
  ruled(
    'a sum of roots was put under one root',
    'powers-and-roots',
    portland,
    ['\\sqrt{a}+\\sqrt{b} -> \\sqrt{a+b}', '\\sqrt{a}-\\sqrt{b} -> \\sqrt{a-b}'],
    6,
  ),
  ruled(
    'the reciprocal of a sum was taken term by term',
    'fractions',
    `${matz}; ${schechter} (everything is additive)`,
    ['\\frac{1}{a+b} -> \\frac{1}{a}+\\frac{1}{b}'],
    7,
  ),
  ruled('a denominator was split', 'fractions', matz, ['\\frac{a}{b+c} -> \\frac{a}{b}+\\frac{a}{c}'], 6),
  ruled('a power with a sum above was taken as a sum of powers', 'powers-and-roots', matz, ['c^{a+b} -> c^a+c^b'], 6),
  ruled('an absolute value was taken term by term', 'functions', memory, ['|a+b| -> |a|+|b|', '|a-b| -> |a|-|b|'], 6),
];

/** Like terms. */
const likeTerms: readonly Slip[] = [
  ruled('a letter minus itself left the letter', 'like-terms', memory, ['ka-ka -> a', 'a-a -> 1'], 7),
  ruled('the letter was taken away instead of the term', 'like-terms', booth, ['ka-a -> k'], 7),
  ruled(
    'the exponents were added along with like terms',
    'like-terms',
    memory,
    ['ka^n+ma^n -> (k+m)a^{2n}', 'ka+ma -> (k+m)a^2'],
    6,
  ),
  ruled(
    'terms of different degree were added',
    'like-terms',
    memory,
    ['a^m+a^n -> a^{m+n}', 'ka^m+pa^n -> (k+p)a^{m+n}', 'ka^m+pa -> (k+p)a^{m+1}'],
    6,
  ),
  slip('a number and a letter term were joined', 'like-terms', `${booth}; Sleeman 1984, Cognitive Science 8:387-412`, {
    rank: 7,
    rewrites: [rule('k+ma', '(k+m)a', (bound) => hasLetter(bound.get('a')))],
  }),
  slip('an addition was done before a multiplication', 'brackets', memory, {
    rank: 7,
    rewrites: [rule('a+kb', '(a+k)b', isNumeric), rule('a-kb', '(a-k)b', isNumeric)],
  }),
  slip('unlike terms were joined', 'like-terms', booth, {
    rank: 5,
    rewrites: [rule('ka+mb', '(k+m)ab', areLetterTerms), rule('a+b', 'ab', areLetterTerms)],
  }),
];

export const algebraSlips: readonly Slip[] = [
  ...signs,
  ...brackets,
  ...likeTerms.map((one) => ({ ...one, alsoExpanded: true })),
];
