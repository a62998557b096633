import type { Random } from '../../../api/checker/numbers/random.ts';
import type { DerivationInput } from '../../../shared/schemas/verdict.ts';
import { damaged, pick, type Maker } from './hostile-inputs.ts';

/*
 * What somebody would hand in who wants to keep the server busy: lines that are ordinary in each part and dense as a
 * whole, close to the limits, and many of them.
 */

export function stallingInput(random: Random): DerivationInput {
  const make = pick(random, kinds);
  const above = make(random).slice(0, 4000);
  const count = random(8) === 0 ? 2 + random(6) : 1;
  const lines = [above];
  for (let k = 0; k < count; k += 1) {
    lines.push((random(4) === 0 ? make(random) : damaged(lines[random(lines.length)] ?? above, random)).slice(0, 4000));
  }
  return {
    lines,
    assume: random(6) === 0 ? [pick(random, ['x>0', 'a>b,b>c', 'n\\in\\mathbb{N}', 'x^2+y^2<1', '0<x<2\\pi'])] : [],
    settings: pick(random, [
      {},
      {},
      {},
      { unknown: 'x' },
      { numbers: 'complex' as const },
      { reversible: true },
      { goal: { kind: 'factored' as const } },
    ]),
  };
}

function listed(count: number, join: string, part: (k: number) => string): string {
  return Array.from({ length: count }, (_, k) => part(k)).join(join);
}

function digits(random: Random, count: number): string {
  return String(1 + random(9)) + listed(count, '', () => String(random(10)));
}

const relation: Maker = (random) => pick(random, ['=', '<', '\\ge ', '\\ne ']);
const end: Maker = (random) => `${relation(random)}${pick(random, ['0', '1', 'x', 'a', '\\frac12'])}`;
const letters = ['x', 'y', 'z', 't', 'u', 'v', 'w', 'a', 'b', 'c', 'p', 'q'];

/** A polynomial of a high degree with random coefficients, sparse or full. */
const polynomial: Maker = (random) => {
  const degree = 5 + random(random(3) === 0 ? 500 : 60);
  const step = random(2) === 0 ? 1 : 1 + random(20);
  const long = random(3) === 0 ? random(40) : random(3);
  return listed(Math.min(180, Math.ceil(degree / step)), '+', (k) => `${digits(random, long)}x^{${degree - k * step}}`)
    .slice(0, 3800)
    .concat('+1', end(random));
};

/** Powers of polynomials beside each other, expanded by nobody. */
const powers: Maker = (random) =>
  listed(1 + random(6), pick(random, ['+', '-', '\\cdot ']), () => {
    const terms = listed(1 + random(6), '+', (k) => `${1 + random(30)}${letters[k]}^{${random(9)}}`);
    return `(${terms}+${random(5)})^{${pick(random, ['2', '3', '7', '20', '99', '-5', '\\frac12', 'n'])}}`;
  }).concat(random(2) === 0 ? end(random) : '');

const decimals: Maker = (random) => {
  const number = (): string => `${digits(random, random(5))}.${digits(random, 10 + random(60))}`;
  return pick(random, [
    `${number()}x^2-${number()}x+${number()}=0`,
    `x^3+${number()}x=${number()}`,
    `${number()}\\sin(${number()}x)=${number()}`,
    `${number()}^{${number()}}`,
    `\\sqrt{${number()}}\\approx ${number()}`,
    listed(30, '+', number),
    listed(20, '\\cdot ', number),
    `${number()}x+${number()}y=${number()},${number()}x-${number()}y=${number()}`,
    `e^{${number()}x}=${number()}`,
  ]);
};

const signsOften: Maker = (random) =>
  pick(random, [
    `x=${listed(20, '', (k) => `\\pm ${k + 1}`)}`,
    `x^2=${listed(5 + random(15), '', (k) => `\\pm \\sqrt{${k + 2}}`)}`,
    `x=\\pm \\sqrt{1${listed(1 + random(10), '', (k) => `\\pm \\sqrt{${k + 2}}`)}}`,
    listed(1 + random(12), '+', () => `\\sin(a\\pm b)`),
    `(x\\pm 1)^{${1 + random(20)}}=${listed(random(9), '', () => '\\mp x')}1`,
  ]);

const cases: Maker = (random) => {
  const rows = 2 + random(100);
  return pick(random, [
    `\\begin{cases}${listed(rows, '\\\\', (k) => `x+${k}y=${random(9)}`)}\\end{cases}`,
    `|x|=\\begin{cases}${listed(rows, '\\\\', (k) => `x+${k}&x>${k}`)}\\end{cases}`,
    listed(rows, '\\text{ or }', (k) => `x=${k}`),
    listed(rows, '\\text{ and }', (k) => `x\\ne ${k}`),
    listed(rows, '\\text{ or }', (k) => `(x>${2 * k}\\text{ and }x<${2 * k + 1})`),
    `x\\in\\{${listed(rows, ',', (k) => String(k * k))}\\}`,
    `x\\in${listed(Math.min(rows, 60), '\\cup ', (k) => `(${3 * k},${3 * k + 1}]`)}`,
  ]);
};

const bars: Maker = (random) => {
  const count = 2 + random(30);
  const inner = (k: number): string =>
    pick(random, [`x-${k}`, `${k + 1}x+${random(20)}`, `x^2-${k}`, `\\sin x-\\frac{1}{${k + 2}}`, `x-a`]);
  return listed(count, pick(random, ['+', '-']), (k) => `|${inner(k)}|`).concat(end(random));
};

const trigonometry: Maker = (random) => {
  const call = (): string =>
    `${pick(random, ['\\sin', '\\cos', '\\tan'])}${pick(random, ['', '^2', '^3'])}(${pick(random, ['', '2', '3', '7', '19', '\\frac12', '\\pi '])}x${pick(random, ['', '+1', '-\\frac{\\pi}{3}'])})`;
  const sum = (): string => listed(1 + random(8), pick(random, ['+', '-']), () => `${1 + random(9)}${call()}`);
  return pick(random, [
    `${sum()}=${sum()}`,
    `${sum()}<${random(3)}`,
    `(${sum()})(${sum()})=0`,
    `x=\\frac{\\pi}{${2 + random(30)}}+\\frac{k\\pi}{${1 + random(30)}}\\text{ or }x=${1 + random(5)}+k\\pi`,
    `\\frac{${sum()}}{${sum()}}`,
    `\\sin(\\cos(\\sin(${sum()})))=0`,
    `${call()}e^{${call()}}=${pick(random, ['1', 'x', '0'])}`,
  ]);
};

const exponentials: Maker = (random) => {
  const power = (): string =>
    `${pick(random, ['2', '3', '10', 'e', '0.5'])}^{${pick(random, ['x', '2x', '-x', 'x^2', '17x', '\\frac{x}{3}'])}}`;
  const log = (): string =>
    `${pick(random, ['\\ln', '\\log_2', '\\log'])}(${pick(random, ['x', 'x+1', 'x^2+1', '3-x'])})`;
  const part = (): string => pick(random, [power, log, () => `x^{${random(5)}}`, () => '\\sqrt{x+2}'])();
  return listed(2 + random(7), pick(random, ['+', '-', '\\cdot ']), part).concat(end(random));
};

const radicals: Maker = (random) => {
  const root = (): string =>
    `${pick(random, ['\\sqrt', '\\sqrt[3]', '\\sqrt[4]', '\\sqrt[5]'])}{${pick(random, ['', '2', '7'])}x+${random(50)}}`;
  return listed(1 + random(7), pick(random, ['+', '-', '\\cdot ']), root).concat(end(random));
};

const numbersOnly: Maker = (random) =>
  listed(2 + random(25), pick(random, ['+', '-', '\\cdot ']), () =>
    pick(random, [
      `\\sqrt{${digits(random, 3)}}`,
      `\\sqrt[${2 + random(8)}]{${digits(random, 2)}+\\sqrt{${digits(random, 2)}}}`,
      `\\frac{${digits(random, 30)}}{${digits(random, 30)}}`,
      `\\sin ${random(99)}`,
      `\\binom{${random(400)}}{${random(200)}}`,
      `${random(500)}!`,
      `${1 + random(99)}^{${random(999)}}`,
      `\\ln ${1 + random(99)}`,
    ]),
  ).concat(random(2) === 0 ? '' : relation(random) + digits(random, 5));

const series: Maker = (random) => {
  const body = pick(random, [
    'k^3',
    '\\frac{1}{k(k+1)}',
    '\\binom{20}{k}x^k',
    '\\frac{x^k}{k!}',
    'k\\cdot k!',
    'x^{k^2}',
  ]);
  const one = (): string =>
    `\\${pick(random, ['sum', 'prod'])}_{k=${random(3)}}^{${pick(random, ['9', '60', '400', '1999', 'n', '2n'])}}${body}`;
  return pick(random, [
    listed(1 + random(5), '+', one),
    `\\sum_{i=1}^{40}\\sum_{j=1}^{40}\\frac{1}{i+j+x}`,
    `\\sum_{i=1}^{12}\\sum_{j=1}^{12}\\sum_{k=1}^{12}(i+jx)^k`,
    `(${one()})^{${2 + random(20)}}`,
    `${one()}=${random(9)}`,
  ]);
};

const system: Maker = (random) => {
  const count = 2 + random(7);
  const used = letters.slice(0, count);
  const term = (name: string): string =>
    pick(random, [
      `${1 + random(99)}${name}`,
      `${name}^2`,
      `${name}${pick(random, used)}`,
      `${name}^3`,
      `\\sqrt{${name}}`,
    ]);
  const dense = random(2) === 0;
  return listed(
    count,
    ',',
    () => `${used.map((name) => (dense ? `${1 + random(999)}${name}` : term(name))).join('+')}=${random(50)}`,
  );
};

const calculus: Maker = (random) => {
  const inner = listed(2 + random(8), pick(random, ['+', '\\cdot ']), () =>
    pick(random, [
      'x^{7}',
      '\\sin(3x)',
      'e^{-x^2}',
      '\\ln(x^2+1)',
      '\\frac{1}{x^2+4}',
      '\\sqrt{x+5}',
      '(x^2+1)^{9}',
      '\\arctan x',
    ]),
  );
  return pick(random, [
    `\\frac{d}{dx}(${inner})`,
    `\\frac{d^{${2 + random(9)}}}{dx^{${2 + random(9)}}}(${inner})`,
    `\\int(${inner})\\,dx`,
    `\\int_0^{${1 + random(9)}}(${inner})\\,dx`,
    listed(2 + random(8), '+', (k) => `\\int_{0}^{${k + 1}}\\frac{x^{${random(9)}}}{x^2+${k + 1}}\\,dx`),
    `\\lim_{x\\to 0}\\frac{${inner}}{x^{${random(6)}}}`,
    `\\lim_{x\\to\\infty}(${inner})`,
    `\\int_0^1\\int_0^1(${inner})\\,dx\\,dy`,
  ]);
};

/** Formulas in many letters, solved for one. */
const formula: Maker = (random) => {
  const side = (): string =>
    listed(1 + random(5), pick(random, ['+', '-', '']), () =>
      pick(random, [
        `\\frac{${pick(random, letters)}}{${pick(random, letters)}+${pick(random, letters)}}`,
        `(${pick(random, letters)}+${random(9)}${pick(random, letters)})^{${1 + random(5)}}`,
        `\\sqrt{${pick(random, letters)}^2+${pick(random, letters)}}`,
        `e^{${pick(random, letters)}${pick(random, letters)}}`,
        pick(random, letters),
      ]),
    );
  return `${pick(random, ['x', side()])}=${side()}`;
};

const matrices: Maker = (random) => {
  const size = 2 + random(5);
  const matrix = (): string =>
    `\\begin{pmatrix}${listed(size, '\\\\', () => listed(size, '&', () => pick(random, [digits(random, random(20)), 'x', `a+${random(9)}`, '\\sqrt2', '\\frac{1}{x}'])))}\\end{pmatrix}`;
  return pick(random, [
    listed(2 + random(3), '', matrix),
    `\\det${matrix()}${end(random)}`,
    `${matrix()}^{${2 + random(30)}}`,
    `${matrix()}^{-1}`,
    `${matrix()}\\begin{pmatrix}${listed(size, '\\\\', (k) => letters[k] ?? 'x')}\\end{pmatrix}=\\begin{pmatrix}${listed(size, '\\\\', () => String(random(9)))}\\end{pmatrix}`,
  ]);
};

const kinds: readonly Maker[] = [
  polynomial,
  powers,
  decimals,
  signsOften,
  cases,
  bars,
  trigonometry,
  exponentials,
  radicals,
  numbersOnly,
  series,
  system,
  calculus,
  formula,
  matrices,
];
