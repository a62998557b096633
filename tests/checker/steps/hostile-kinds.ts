import type { Random } from '../../../api/checker/numbers/random.ts';
import type { DerivationInput } from '../../../shared/schemas/verdict.ts';
import { damaged, hostileInput, pick, small, type Maker } from './hostile-inputs.ts';
import { stallingInput } from './stalling-kinds.ts';
import { createRandom } from '../../../api/checker/numbers/random.ts';

/** The input of a seed: from the first generator, from the kinds below or from those that stall. */
export function inputOf(seed: number): DerivationInput {
  const random = createRandom(seed);
  if (seed % 3 === 2) return stallingInput(random);
  return seed % 2 === 0 ? hostileInput(random) : furtherInput(random);
}

/** Kinds that aim at one part of the checker each; the same for the same random source. */
export function furtherInput(random: Random): DerivationInput {
  const make = pick(random, kinds);
  const above = make(random).slice(0, 4000);
  const below = random(4) === 0 ? make(random).slice(0, 4000) : damaged(above, random);
  const more = random(6) === 0 ? [damaged(below, random), above] : [];
  return {
    lines: [above, below, ...more],
    assume: random(8) === 0 ? [pick(random, ['x>0', 'n\\in\\mathbb{N}', 'a>b', 'x\\ne 0'])] : [],
    settings: pick(random, settings),
  };
}

const settings: readonly DerivationInput['settings'][] = [
  {},
  {},
  {},
  {},
  { numbers: 'complex' },
  { decimal: 'comma' },
  { goal: { kind: 'factored' } },
  { goal: { kind: 'expanded' } },
  { unknown: 'x' },
  { reversible: true },
  { constant: true },
];

function times(count: number, make: (k: number) => string): string[] {
  return Array.from({ length: count }, (_, k) => make(k));
}

function wrapped(random: Random, deepest: number, core: string, wrap: (inner: string) => string): string {
  let text = core;
  for (let depth = 1 + random(deepest); depth > 0 && text.length < 3900; depth -= 1) text = wrap(text);
  return text;
}

function digitsOf(random: Random, most: number): string {
  return String(1 + random(9)) + times(random(most), () => String(random(10))).join('');
}

const part: Maker = (random) => pick(random, small)(random);
const letters = ['x', 'y', 'z', 't', 'u', 'v', 'w', 'a', 'b', 'c', 'p', 'q', 'r', 's'];

const deepFractions: Maker = (random) => {
  const plain = random(2) === 0;
  return wrapped(random, 58, part(random), (inner) =>
    plain ? `1+\\frac{1}{${inner}}` : `\\frac{${part(random)}}{${part(random)}-\\frac{${part(random)}}{${inner}}}`,
  );
};

const nestedRadicals: Maker = (random) =>
  wrapped(random, 50, part(random), (inner) =>
    pick(random, [
      `\\sqrt{2+${inner}}`,
      `\\sqrt{x+${inner}}`,
      `\\sqrt[3]{${inner}-1}`,
      `\\sqrt{5-2\\sqrt{${inner}}}`,
      `\\frac{1}{\\sqrt{${inner}}-\\sqrt{3}}`,
    ]),
  );

const towers: Maker = (random) => {
  const base = pick(random, ['10', '2', 'x', 'n', '(-2)', '\\frac12', '1.0000001', 'i']);
  return pick(random, ['', '\\ln ', '\\sin ', '\\lim_{x\\to\\infty}', '\\lim_{n\\to\\infty}', '\\frac{d}{dx}']).concat(
    wrapped(random, 9, part(random), (inner) => `${base}^{${inner}}`),
  );
};

const bigCounts: Maker = (random) => {
  const n = pick(random, [
    'n',
    '100',
    '1000',
    '3000',
    '2999',
    '10^6',
    '(10^{9})',
    '123456789',
    '(n^2)',
    '(-5)',
    '\\frac12',
  ]);
  const k = pick(random, ['k', '2', '50', '1500', 'n', '(n-1)', '-3', '10^{5}']);
  return pick(random, [
    `\\frac{${n}!}{(${n}-${k})!}`,
    `\\binom{${n}}{${k}}+\\binom{${n}}{${k}+1}`,
    `${n}!!`,
    `(${n}!)!`,
    `\\frac{${n}!}{${k}!}\\cdot ${n}!`,
    `\\binom{${n}}{${k}}\\binom{${k}}{${n}}`,
    `\\binom{\\binom{${n}}{${k}}}{${k}}`,
    `x^{${n}!}-x`,
  ]);
};

const bigSums: Maker = (random) => {
  const sign = pick(random, ['\\sum', '\\prod']);
  const bound = pick(random, [
    '10',
    '400',
    '1999',
    '2001',
    '10^{7}',
    '10^{12}',
    '10^{400}',
    'n',
    '\\infty ',
    'n^2',
    '2^n',
  ]);
  const body = pick(random, [
    'k',
    '\\frac{1}{k}',
    'k!',
    'x^k',
    '\\binom{n}{k}x^k',
    '\\frac{x^k}{k!}',
    '(-1)^k k^{20}',
    '\\sin(kx)',
    'k^k',
    '\\sqrt{k}',
  ]);
  return wrapped(random, 3, `${sign}_{k=${pick(random, ['0', '1', '-5', 'm'])}}^{${bound}}${body}`, (inner) =>
    random(2) === 0 ? inner : `\\sum_{j=1}^{${bound}}\\left(${inner}\\right)`,
  );
};

const matrices: Maker = (random) => {
  const size = 1 + random(random(3) === 0 ? 9 : 4);
  const entry = (): string =>
    pick(random, [
      digitsOf(random, 60),
      part(random),
      'x',
      '0',
      `\\frac{${digitsOf(random, 20)}}{${digitsOf(random, 20)}}`,
    ]);
  const rows = (): string => times(size, () => times(size, entry).join('&')).join('\\\\');
  const matrix = (): string => `\\begin{pmatrix}${rows()}\\end{pmatrix}`;
  return pick(random, [
    `\\det${matrix()}`,
    `${matrix()}${matrix()}`,
    `${matrix()}^{${pick(random, ['2', '-1', '50', '10^6', 'T'])}}`,
    `\\begin{vmatrix}${rows()}\\end{vmatrix}`,
    `${matrix()}+${matrix()}`,
  ]);
};

const chains: Maker = (random) => {
  const sign = pick(random, ['=', '=', '<', '\\le ', '\\approx ']);
  const member = part(random);
  return times(2 + random(random(3) === 0 ? 300 : 20), () => (random(3) === 0 ? part(random) : member)).join(sign);
};

const systems: Maker = (random) => {
  const unknowns = letters.slice(0, 2 + random(12));
  const power = (): string => pick(random, ['', '', '', '^2', '^3', '^{10}']);
  const equation = (): string =>
    `${unknowns.map((letter) => `${1 + random(random(3) === 0 ? 999_999 : 9)}${letter}${power()}`).join(pick(random, ['+', '-', '']))}=${random(100)}`;
  return times(unknowns.length - random(2), equation).join(pick(random, [',', '\\text{ and }']));
};

const plusOrMinus: Maker = (random) =>
  `x=${times(1 + random(12), () => `\\pm ${pick(random, ['\\sqrt{2}', '1', 'a', '\\sqrt{x}', 'b^2'])}`).join('')}`;

const bars: Maker = (random) =>
  wrapped(random, 40, 'x', (inner) =>
    pick(random, [`|${inner}|-1`, `\\left|${inner}-${1 + random(9)}\\right|`, `||${inner}|-a|`]),
  ).concat(pick(random, ['', '=0', '=x', '<1', '=a']));

const highDegrees: Maker = (random) => {
  const degree = pick(random, ['7', '40', '99', '200', '399', '401', '1000', '10000']);
  const by = pick(random, ['a', '2', `${digitsOf(random, 300)}`, 'a^2b', '\\pi ', '\\sqrt2']);
  return pick(random, [
    `x^{${degree}}-${by}x+1=0`,
    `${by}x^{${degree}}+bx^{3}=c`,
    `(x-1)^{${degree}}=${by}`,
    `${times(40, (k) => `${digitsOf(random, 30)}x^{${k}}`).join('+')}=0`,
    `\\prod_{k=1}^{${degree}}(x-k)=0`,
    `(x^{${degree}}+${by})(x^2-${by})>0`,
    `\\sin(${degree}x)=\\frac12`,
    `${times(12, (k) => `(x-${digitsOf(random, 12)}${k})`).join('')}=0`,
  ]);
};

const integrals: Maker = (random) => {
  const n = pick(random, ['5', '20', '99', '300', '10000', 'n', '\\frac{17}{3}']);
  const body = pick(random, [
    `x^{${n}}e^{x}`,
    `\\sin^{${n}}x`,
    `(x^2+1)^{${n}}`,
    `\\frac{1}{(x^2+1)^{${n}}}`,
    `\\ln^{${n}}x`,
    `x^{${n}}\\cos(${n}x)`,
    `\\sqrt[7]{x^{${n}}+1}`,
    `\\frac{x^{${n}}}{x^5-x+1}`,
  ]);
  const ends = pick(random, ['', '_0^1', '_{-1}^{1}', '_0^{\\infty}', '_{0}^{10^{9}}', '_a^b']);
  return `\\int${ends}${body}\\,dx${pick(random, ['', '+C', `+\\int${ends}${body}\\,dx`])}`;
};

const limits: Maker = (random) => {
  const to = pick(random, ['0', '\\infty ', '0^+', '1', '-\\infty ', 'a']);
  const body = pick(random, [
    'x^{x^{x}}',
    '(1+\\frac1x)^{x^2}',
    '\\frac{e^{x}-1-x-\\frac{x^2}{2}}{x^{30}}',
    '\\frac{\\sin^{20}x}{x^{20}}',
    '\\frac{x^{1000}}{2^x}',
    '\\frac{x!}{x^x}',
    '\\ln(\\ln(\\ln x))',
    '\\frac{\\sqrt[9]{1+x}-1}{x}',
  ]);
  return wrapped(random, 4, `\\lim_{x\\to ${to}}${body}`, (inner) =>
    random(2) === 0 ? inner : `\\lim_{x\\to ${to}}\\left(${inner}+${body}\\right)`,
  );
};

const longNumbers: Maker = (random) => {
  const long = digitsOf(random, random(2) === 0 ? 1900 : 100);
  const other = digitsOf(random, random(3) === 0 ? 1900 : 60);
  return pick(random, [
    `${long}.${other}`,
    `0.${long}x=0.${other}`,
    `0.${'0'.repeat(random(1900))}${long}y^2+${other}y=1`,
    `${long}\\%+${other}\\%`,
    `${long}\\frac{${other}}{7}`,
    `\\frac{${long}}{${other}}+\\frac{1}{${long}}`,
    `0.\\overline{${long.slice(0, 200)}}+0.${other}`,
    `${long}\\cdot ${other}`,
    `\\sqrt{${long}}+\\sqrt[3]{${other}}`,
    `x^2-${long}x+${other}=0`,
    `\\gcd(${long},${other})`,
    `${long}^{${other.slice(0, 3)}}`,
    `2^{${long.slice(0, 5)}}x<${other}`,
    `e^{${other.slice(0, 40)}}=${long}`,
  ]);
};

const unbalanced: Maker = (random) =>
  times(1 + random(random(4) === 0 ? 3900 : 60), () =>
    pick(random, [
      '{',
      '}',
      '(',
      ')',
      '\\left(',
      '\\right)',
      '\\frac{',
      '\\sqrt{',
      '|',
      '^',
      '_',
      '[',
      '\\{',
      '\\left|',
      'x',
      '1',
      '+',
      '\\begin{cases}',
      '&',
      '\\\\',
      '$',
      '^{',
      '_{',
    ]),
  ).join(random(5) === 0 ? ' ' : '');

const strange: Maker = (random) => {
  const one = (): string =>
    random(3) === 0
      ? String.fromCodePoint(random(0x11_0000))
      : pick(random, [
          '\u0000',
          '\u0007',
          '\u200b',
          '\u202e',
          '\ud800',
          '\udc00',
          '\ufeff',
          'x\u0301',
          '𝑥',
          '√',
          '∫',
          '²',
          '½',
          '−',
          '×',
          '٣',
          '５',
          'é',
          '\r',
          '\t',
          '\u2028',
          'x',
          '2',
          '+',
          '=',
        ]);
  return times(1 + random(random(5) === 0 ? 3900 : 40), one).join('');
};

const joined: Maker = (random) =>
  times(2 + random(60), () => `x=${part(random)}`).join(pick(random, ['\\text{ or }', ',', '\\text{ and }', '\\ ']));

const identities: Maker = (random) => {
  const angle = wrapped(random, 20, 'x', (inner) => `2(${inner})`);
  return pick(random, [
    `\\sin(${angle})^2+\\cos(${angle})^2`,
    times(1 + random(30), (k) => `\\sin(${k + 1}x)\\cos(${k}x)`).join('+'),
    times(1 + random(40), (k) => `\\ln(x+${k})`).join('+'),
    times(1 + random(60), (k) => `|x-${k}|`).join('+'),
    times(1 + random(40), (k) => `\\sqrt{x+${k}}`).join('\\cdot '),
    times(1 + random(40), (k) => `e^{${k}x}`)
      .join('-')
      .concat('=0'),
    times(1 + random(25), (k) => `\\frac{${letters[k % 14]}}{${letters[(k + 1) % 14]}+${k}}`).join('+'),
    times(1 + random(14), (k) => `(${letters.slice(0, k + 1).join('+')})^{${2 + random(9)}}`).join('-'),
  ]);
};

const kinds: readonly Maker[] = [
  deepFractions,
  nestedRadicals,
  towers,
  bigCounts,
  bigSums,
  matrices,
  chains,
  systems,
  plusOrMinus,
  bars,
  highDegrees,
  integrals,
  limits,
  longNumbers,
  unbalanced,
  strange,
  joined,
  identities,
];
