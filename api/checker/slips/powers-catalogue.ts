import { memory, ruled, type Slip } from './slip.ts';

const schechter = 'Schechter, The Most Common Errors in Undergraduate Mathematics';
const portland = 'Portland State University, Common Errors in Algebra and Calculus';
const matz = 'Matz 1980/1982, process model for high-school algebra errors (from memory)';
const cancelling = 'Brown University, Algebra Pitfalls (partial cancelling)';
const cangelosi = 'Cangelosi, Madrid, Cooper, Olson & Hartter 2013, The negative sign and exponential expressions';

const exponents: readonly Slip[] = [
  ruled('the exponents of a product were multiplied', 'powers-and-roots', portland, ['a^b a^c -> a^{bc}'], 6),
  ruled(
    'the exponents of a power of a power were added',
    'powers-and-roots',
    memory,
    [
      '(a^b)^c -> a^{b+c}',
      '(ka^m)^n -> k^n a^{m+n}',
      '(a^m b^p)^n -> a^{m+n} b^{p+n}',
      '(ka^m b)^n -> k^n a^{m+n} b^n',
    ],
    6,
  ),
  ruled(
    'the exponent was raised to a power',
    'powers-and-roots',
    memory,
    ['(a^m)^n -> a^{m^n}', '(ka^m)^n -> k^n a^{m^n}'],
    6,
  ),
  ruled(
    'the exponents of a quotient were divided',
    'powers-and-roots',
    memory,
    ['\\frac{a^m}{a^n} -> a^{m/n}', '\\frac{ka^m}{a^n} -> ka^{m/n}', '\\frac{ka^m}{pa^n} -> \\frac{k}{p}a^{m/n}'],
    6,
  ),
  ruled('a negative exponent was read as a negative number', 'powers-and-roots', cangelosi, ['a^{-n} -> -a^n'], 6),
  ruled(
    'a negative exponent moved the coefficient as well',
    'powers-and-roots',
    memory,
    ['ka^{-n} -> \\frac{1}{ka^n}'],
    6,
  ),
  ruled('a zero exponent gave zero', 'powers-and-roots', memory, ['a^0 -> 0'], 6),
  ruled(
    'the bases were multiplied and the exponents added together',
    'powers-and-roots',
    matz,
    ['a^b a^c -> (aa)^{b+c}'],
    6,
  ),
  ruled(
    'a fractional exponent was turned upside down',
    'powers-and-roots',
    memory,
    ['a^{m/n} -> a^{n/m}', 'a^{\\frac{m}{n}} -> a^{\\frac{n}{m}}'],
    6,
  ),
  ruled('an exponent was brought down as a factor', 'powers-and-roots', memory, ['k^n -> kn', 'a^n -> na'], 3),
  { ...ruled('an exponent was lost', 'powers-and-roots', memory, ['a^n -> a'], 2), alsoExpanded: true },
];

const radicals: readonly Slip[] = [
  ruled(
    'the root of a square was taken without the absolute value',
    'powers-and-roots',
    `${schechter} (square-root errors)`,
    ['\\sqrt{a^2} -> a'],
    7,
  ),
  ruled(
    'a root of a product was split over two negatives',
    'powers-and-roots',
    `${schechter} (Euler's square-root error)`,
    ['\\sqrt{-a}\\sqrt{-b} -> \\sqrt{ab}'],
    7,
  ),
  ruled(
    'the root in a denominator was dropped on rationalising',
    'powers-and-roots',
    memory,
    ['\\frac{a}{\\sqrt{b}} -> a\\sqrt{b}'],
    6,
  ),
  ruled(
    'a coefficient went under the root without being squared',
    'powers-and-roots',
    memory,
    ['k\\sqrt{b} -> \\sqrt{kb}'],
    6,
  ),
  ruled(
    'a number came out of the root without being rooted',
    'powers-and-roots',
    memory,
    ['\\sqrt{k} -> k', '\\sqrt{k} -> \\frac{k}{2}'],
    4,
  ),
];

const fractions: readonly Slip[] = [
  ruled(
    'a term was cancelled instead of a factor',
    'fractions',
    cancelling,
    ['\\frac{a+b}{a} -> b', '\\frac{a}{a+b} -> b', '\\frac{a}{a+b} -> \\frac{1}{b}', '\\frac{a-b}{a} -> -b'],
    7,
  ),
  ruled(
    'a matching piece was cancelled across sums',
    'fractions',
    `${schechter} (undistributed cancellations)`,
    ['\\frac{a+c}{b+c} -> \\frac{a}{b}', '\\frac{a-c}{b-c} -> \\frac{a}{b}', '\\frac{c-a}{c-b} -> \\frac{a}{b}'],
    7,
  ),
  ruled(
    'a factor was cancelled into only one term of the numerator',
    'fractions',
    cancelling,
    ['\\frac{a+b}{c} -> \\frac{a}{c}+b', '\\frac{a-b}{c} -> \\frac{a}{c}-b'],
    6,
  ),
  ruled(
    'numerators and denominators were added',
    'fractions',
    'Brown & Burton 1978 (from memory)',
    ['\\frac{a}{b}+\\frac{c}{d} -> \\frac{a+c}{b+d}', '\\frac{a}{b}-\\frac{c}{d} -> \\frac{a-c}{b-d}'],
    7,
  ),
  ruled(
    'the numerators were not adjusted to the common denominator',
    'fractions',
    memory,
    ['\\frac{a}{b}+\\frac{c}{d} -> \\frac{a+c}{bd}', '\\frac{a}{b}-\\frac{c}{d} -> \\frac{a-c}{bd}'],
    7,
  ),
  ruled(
    'a fraction was multiplied at top and bottom by a number',
    'fractions',
    memory,
    ['k\\cdot\\frac{a}{b} -> \\frac{ka}{kb}'],
    6,
  ),
  ruled(
    'the divisor was not turned over',
    'fractions',
    'Brown & Burton 1978 (from memory)',
    ['\\frac{\\frac{a}{b}}{\\frac{c}{d}} -> \\frac{ac}{bd}'],
    6,
  ),
  ruled('everything cancelled to nothing', 'fractions', memory, ['\\frac{a}{a} -> 0'], 6),
  ruled(
    'a fraction bar was read in two ways',
    'fractions',
    `${schechter} (ambiguously written fractions)`,
    ['\\frac{a}{bc} -> \\frac{a}{b}c'],
    5,
  ),
  ruled('a sign was changed on cancelling', 'fractions', memory, ['\\frac{ab}{ac} -> \\frac{b}{-c}'], 3),
];

/** Sign changes inside a denominator or numerator that stays after cancelling. */
const cancelled: readonly Slip[] = [
  ruled(
    'the wrong factor was cancelled',
    'fractions',
    memory,
    ['\\frac{ab}{ac} -> \\frac{b}{a}', '\\frac{ab}{ac} -> \\frac{a}{c}'],
    6,
  ),
];

export const powerSlips: readonly Slip[] = [...exponents, ...radicals, ...fractions, ...cancelled];
