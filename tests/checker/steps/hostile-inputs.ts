import type { Random } from '../../../api/checker/numbers/random.ts';
import type { DerivationInput } from '../../../shared/schemas/verdict.ts';

/** Inputs made to be hard: deep, long, steep, broken. The same for the same random source. */
export function hostileInput(random: Random): DerivationInput {
  const make = pick(random, makers);
  const above = make(random).slice(0, 4000);
  const below = random(3) === 0 ? make(random).slice(0, 4000) : damaged(above, random);
  const joined = random(4) === 0 ? [`${above}=${pick(random, small)(random)}`, `${below}=0`] : [above, below];
  const lines = random(8) === 0 ? [...joined, damaged(below, random), above] : joined;
  return {
    lines,
    assume: random(10) === 0 ? [pick(random, ['x>0', 'n\\in\\mathbb{N}', 'a\\ne b', above.slice(0, 50)])] : [],
    settings: random(12) === 0 ? { numbers: 'complex' } : random(12) === 0 ? { goal: { kind: 'expanded' } } : {},
  };
}

export type Maker = (random: Random) => string;

export function pick<T>(random: Random, items: readonly T[]): T {
  return items[random(items.length)] as T;
}

const letters = ['x', 'y', 'n', 't', '\\alpha ', 'x_1', 'a'];
const numbers = ['0', '1', '2', '7', '10', '0.1', '999999', '10^{6}', '\\frac13', '\\pi ', 'e', 'i', '\\infty '];
const functions = [
  '\\sin',
  '\\cos',
  '\\tan',
  '\\ln',
  '\\arcsin',
  '\\arctan',
  '\\sinh',
  '\\exp',
  '\\log_2',
  '\\sin^{-1}',
];
const signs = ['+', '-', '\\cdot ', '', '/', '\\pm ', '^', '=', '<', '\\le ', '\\to ', '!', ',', '_'];
const words = [
  '\\frac',
  '\\sqrt',
  '{',
  '}',
  '(',
  ')',
  '[',
  ']',
  '|',
  '\\left(',
  '\\right)',
  '\\left|',
  '\\right|',
  '\\int_0^1',
  '\\,dx',
  '\\sum_{k=1}^{n}',
  '\\lim_{x\\to 0}',
  '\\begin{cases}',
  '\\end{cases}',
  '\\\\',
  '&',
  '\\text{ or }',
  '\\in',
  '\\{',
  '\\}',
  '\\frac{d}{dx}',
  '\\binom',
  '\\prod_{k=1}^{9}',
  '\\mathbb{R}',
  '\\cup',
  "f'",
  'f(x)',
  '\\begin{pmatrix}',
  '\\end{pmatrix}',
  '\\unknown',
  '\u0000',
  '\ud83d',
  '\u2264',
  '%',
  '$',
  '#',
  '\\',
  '~',
];

const atom: Maker = (random) => pick(random, random(2) === 0 ? letters : numbers);

export const small: readonly Maker[] = [
  atom,
  (random) => `${atom(random)}+${atom(random)}`,
  (random) => `\\frac{${atom(random)}}{${atom(random)}}`,
  (random) => `${pick(random, functions)}(${atom(random)})`,
  (random) => `${atom(random)}^{${atom(random)}}`,
];

const wraps: readonly ((inner: string, random: Random) => string)[] = [
  (inner) => `(${inner})`,
  (inner) => `\\sqrt{${inner}+1}`,
  (inner, random) => `\\sqrt[${2 + random(9)}]{${inner}}`,
  (inner, random) => `\\frac{${atom(random)}}{1+${inner}}`,
  (inner) => `\\left|${inner}-1\\right|`,
  (inner, random) => `${pick(random, functions)}(${inner})`,
  (inner, random) => `(${inner})^{${pick(random, ['2', '3', '99', '\\frac12', '-1', 'x'])}}`,
  (inner, random) => `${atom(random)}^{${inner}}`,
  (inner) => `e^{${inner}}`,
  (inner) => `\\ln(${inner})`,
  (inner) => `\\int_{0}^{1}(${inner})\\,dx`,
  (inner) => `\\sum_{k=1}^{n}(${inner})`,
  (inner) => `\\frac{d}{dx}(${inner})`,
  (inner) => `\\lim_{x\\to 0}(${inner})`,
  (inner) => `(${inner})!`,
  (inner) => `\\lfloor ${inner}\\rfloor `,
];

/** One kind of wrapping, or all of them, around a small core. */
const nesting: Maker = (random) => {
  const single = random(2) === 0 ? pick(random, wraps) : null;
  let text = pick(random, small)(random);
  for (let depth = random(random(3) === 0 ? 70 : 14); depth > 0 && text.length < 3900; depth -= 1) {
    text = (single ?? pick(random, wraps))(text, random);
  }
  return text;
};

const tower: Maker = (random) => {
  let text = atom(random);
  for (let height = 1 + random(12); height > 0; height -= 1)
    text = `${pick(random, ['9', '10', 'x', 'e', '2', '(1+x)'])}^{${text}}`;
  return text;
};

/** Many terms or factors, up to the length of a line. */
const long: Maker = (random) => {
  const join = pick(random, ['+', '-', '\\cdot ', '']);
  const part = pick(random, small);
  const wanted = random(3) === 0 ? 3990 : 60 + random(600);
  let text = part(random);
  while (text.length < wanted) text += join + (join === '' ? `(${part(random)})` : part(random));
  return text;
};

const steep: Maker = (random) => {
  const n = pick(random, [
    '40',
    '99',
    '1000',
    '100000',
    '1000000',
    '9999999',
    '-1000000',
    '\\frac{999}{1000}',
    '1000!',
  ]);
  const base = pick(random, [
    '(x+1)',
    '(x+y+z+1)',
    '(x^{100}+y^{99}-1)',
    '(\\sin x+\\cos y)',
    '2',
    '(1+\\sqrt{2})',
    '(1+i)',
    '0.999',
  ]);
  const other = pick(random, ['', '-1', `+${base}^{${n}}`, '\\cdot 0', `!`]);
  return `${base}^{${n}}${other}`;
};

const digits: Maker = (random) => {
  let text = String(1 + random(9));
  for (let count = random(random(4) === 0 ? 3900 : 200); count > 0; count -= 1) text += random(10);
  return pick(random, [
    text,
    `${text}x+${text}`,
    `\\sqrt{${text}}`,
    `\\sin(${text}x)`,
    `0.${text}`,
    `${text}!`,
    `\\ln(${text})`,
    `x=${text}`,
  ]);
};

const counted: Maker = (random) => {
  const big = pick(random, ['10', '100', '1000', '100000', '10^{9}', '10^{10^{10}}', 'n', '\\infty ']);
  return pick(random, [
    `\\sum_{k=1}^{${big}}\\frac{1}{k^2}`,
    `\\prod_{k=1}^{${big}}(x+k)`,
    `\\binom{${big}}{k}`,
    `${big}!`,
    `\\sum_{k=1}^{${big}}\\sum_{j=1}^{k}j`,
    `\\int_{-${big}}^{${big}}\\sin(x^2)\\,dx`,
    `\\lim_{x\\to ${big}}x\\sin(\\frac1x)`,
    `\\gcd(${big},${big}-1)`,
  ]);
};

/** Words of TeX in any order. */
const garbage: Maker = (random) => {
  let text = '';
  for (let count = 1 + random(random(4) === 0 ? 500 : 30); count > 0; count -= 1)
    text += pick(random, [words, letters, numbers, signs, functions, signs][random(6)] ?? words);
  return text;
};

const equation: Maker = (random) => {
  const side = (): string => pick(random, [nesting, pick(random, small), steep, tower])(random).slice(0, 900);
  const relation = pick(random, ['=', '<', '\\ge ', '\\ne ', '\\approx ']);
  const one = `${side()}${relation}${side()}`;
  return random(3) === 0 ? `${one}${pick(random, ['\\text{ or }', '\\text{ and }', ','])}${side()}=${side()}` : one;
};

const makers: readonly Maker[] = [
  nesting,
  nesting,
  tower,
  long,
  steep,
  digits,
  counted,
  garbage,
  garbage,
  equation,
  equation,
];

/** The text with a small change, which may break it. */
export function damaged(text: string, random: Random): string {
  const at = random(text.length + 1);
  const cut = random(Math.min(12, text.length - at + 1));
  switch (random(5)) {
    case 0:
      return text;
    case 1:
      return text.slice(0, at) + text.slice(at + cut);
    case 2:
      return text.slice(0, at) + pick(random, [...words, ...numbers, ...signs]) + text.slice(at);
    case 3:
      return `${text}+1`;
    default:
      return text.replace(/\d/, (digit) => String((Number(digit) + 1) % 10));
  }
}
