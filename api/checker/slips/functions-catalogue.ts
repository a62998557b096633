import { memory, ruled, type Slip } from './slip.ts';

const schechter = 'Schechter, The Most Common Errors in Undergraduate Mathematics';
const openstax = 'OpenStax Algebra and Trigonometry 2e, m49365 Logarithmic Properties, Q&A note 15';

/** The same rules for ln, log and logarithms to a written base. */
function forLogarithms(rules: readonly string[]): string[] {
  return rules.flatMap((text) => ['\\ln', '\\log', '\\log_{f}'].map((name) => text.replaceAll('L', name)));
}

export const functionSlips: readonly Slip[] = [
  ruled(
    'the log of a sum was taken as a sum of logs',
    'functions',
    openstax,
    forLogarithms(['L(a+b) -> L(a)+L(b)', 'L(a-b) -> L(a)-L(b)']),
    6,
  ),
  ruled(
    'a quotient of logs was taken as the log of a quotient',
    'functions',
    memory,
    forLogarithms(['\\frac{L(a)}{L(b)} -> L(\\frac{a}{b})']),
    6,
  ),
  ruled(
    'the log of a product was taken as a product of logs',
    'functions',
    memory,
    forLogarithms(['L(ab) -> L(a)L(b)']),
    6,
  ),
  ruled(
    'the log of a quotient was taken as a quotient of logs',
    'functions',
    memory,
    forLogarithms(['L(\\frac{a}{b}) -> \\frac{L(a)}{L(b)}']),
    6,
  ),
  ruled(
    'a product of logs was taken as the log of a product',
    'functions',
    memory,
    forLogarithms(['L(a)L(b) -> L(ab)']),
    6,
  ),
  ruled(
    'a sum of logs was taken as the log of a sum',
    'functions',
    memory,
    forLogarithms(['L(a)+L(b) -> L(a+b)', 'L(a)-L(b) -> L(a-b)']),
    6,
  ),
  ruled('a power of a log was brought down', 'functions', memory, [...forLogarithms(['(L(a))^n -> nL(a)'])], 6),
  ruled(
    'the exponent of an argument became a factor of it',
    'functions',
    memory,
    forLogarithms(['L(a^n) -> L(na)', 'L(a^n) -> (L(a))^n']),
    6,
  ),
  ruled(
    'the name of the function was cancelled',
    'functions',
    `${schechter} (notation / cancellation family)`,
    [
      ...forLogarithms(['\\frac{L(a)}{L(b)} -> \\frac{a}{b}']),
      '\\frac{\\sin(a)}{\\sin(b)} -> \\frac{a}{b}',
      '\\frac{\\cos(a)}{\\cos(b)} -> \\frac{a}{b}',
      '\\frac{\\sin(a)}{a} -> \\sin(1)',
    ],
    7,
  ),
  ruled('a factor was multiplied into the base of a power', 'functions', memory, ['k a^b -> (ka)^b'], 5),
  ruled(
    'a function of a sum was taken term by term',
    'functions',
    `${schechter} (everything is additive)`,
    [
      '\\sin(a+b) -> \\sin(a)+\\sin(b)',
      '\\sin(a-b) -> \\sin(a)-\\sin(b)',
      '\\cos(a+b) -> \\cos(a)+\\cos(b)',
      '\\cos(a-b) -> \\cos(a)-\\cos(b)',
      '\\tan(a+b) -> \\tan(a)+\\tan(b)',
      '\\tan(a-b) -> \\tan(a)-\\tan(b)',
    ],
    6,
  ),
  ruled(
    'a multiple angle was pulled out as a factor',
    'functions',
    memory,
    ['\\sin(ka) -> k\\sin(a)', '\\cos(ka) -> k\\cos(a)', '\\tan(ka) -> k\\tan(a)'],
    6,
  ),
  ruled(
    'the double angle took in too much',
    'functions',
    memory,
    ['\\sin(a)\\cos(a) -> \\sin(2a)', '\\sin(a)\\cos(a) -> 2\\sin(2a)'],
    6,
  ),
  ruled(
    'an inverse function was read as a reciprocal',
    'functions',
    `${schechter} (idiosyncratic inverses)`,
    ['\\arcsin(a) -> \\frac{1}{\\sin(a)}', '\\arccos(a) -> \\frac{1}{\\cos(a)}', '\\arctan(a) -> \\frac{1}{\\tan(a)}'],
    7,
  ),
  ruled(
    'the squares of sine and cosine were added to the wrong number',
    'functions',
    memory,
    [
      '\\sin^2(a)-\\cos^2(a) -> 1',
      '\\cos^2(a)-\\sin^2(a) -> 1',
      '1-\\sin^2(a) -> \\cos(a)',
      '1-\\cos^2(a) -> \\sin(a)',
      '\\sin(a)+\\cos(a) -> 1',
    ],
    6,
  ),
];
