import type { Goal } from '../../../shared/schemas/verdict.ts';
import type { Random } from '../numbers/random.ts';
import type { MakerTask } from './make-faulty.ts';

export type PracticeLevel = 1 | 2 | 3;

/** Draws a task of a topic; every number comes from the random source. */
type DrawTask = (draw: Draw, level: PracticeLevel) => MakerTask;

interface Draw {
  /** From low to high, both included. */
  readonly between: (low: number, high: number) => number;
  /** Not zero, of either sign, up to a size. */
  readonly signed: (size: number) => number;
  readonly one: <T>(items: readonly T[]) => T;
}

export function drawFrom(random: Random): Draw {
  return {
    between: (low, high) => low + random(high - low + 1),
    signed: (size) => (random(2) === 0 ? 1 : -1) * (1 + random(size)),
    one: (items) => items[random(items.length)] as (typeof items)[number],
  };
}

function task(given: string, goal: Goal, assumptions: readonly string[] = []): MakerTask {
  return { given, goal, assumptions, settings: {} };
}

const forX: Goal = { kind: 'solved', letter: 'x' };
const r = String.raw;

/** `+5`, `-3`: a number as it stands after another term. */
function plus(value: number): string {
  return value < 0 ? `${value}` : `+${value}`;
}

/** `+x`, `-3x`. */
function plusTimes(value: number, what: string): string {
  if (Math.abs(value) === 1) return `${value < 0 ? '-' : '+'}${what}`;
  return `${plus(value)}${what}`;
}

function times(value: number, what: string): string {
  return plusTimes(value, what).replace(/^\+/, '');
}

const brackets: DrawTask = (d, level) => {
  const [a, b, c, e] = [d.between(2, 6), d.signed(7), d.between(2, 5), d.signed(7)];
  const first = `${a}(x${plus(b)})-${c}(x${plus(e)})`;
  if (level === 1) return task(first, { kind: 'expanded' });
  if (level === 2) return task(`(x${plus(b)})(${c}x${plus(e)})-${a}x`, { kind: 'expanded' });
  return task(`(${a}x${plus(b)})^2-(x${plus(e)})(x${plus(c)})`, { kind: 'expanded' });
};

const factoring: DrawTask = (d, level) => {
  const [p, q, a] = [d.signed(7), d.signed(7), d.between(2, 4)];
  if (level === 1)
    return task(`x^2${plusTimes(p + q || 1, 'x')}${plus(p + q ? p * q : -p * p - p)}`, { kind: 'factored' });
  if (level === 2) return task(`${a}x^2-${a * p * p}`, { kind: 'factored' });
  return task(`${a}x^2${plusTimes(a * p + 1, 'x')}${plus(p)}`, { kind: 'factored' });
};

const powers: DrawTask = (d, level) => {
  const [a, m, n, k] = [d.between(2, 4), d.between(2, 5), d.between(2, 3), d.between(2, 6)];
  if (level === 1) return task(`${k}x^${m}\\cdot ${a}x^${n}`, { kind: 'simplified' });
  if (level === 2) return task(`(${a}x^${m})^${n}\\cdot ${k}x^2`, { kind: 'simplified' });
  return task(r`\frac{(${a}x^${m})^${n}}{${a}x^2}+${k}x^${m}`, { kind: 'simplified' });
};

const numericFractions: DrawTask = (d, level) => {
  const [a, b, c, e] = [d.between(1, 7), d.one([3, 5, 7]), d.between(1, 7), d.one([2, 4, 8])];
  const sum = r`\frac{${a}}{${b}}+\frac{${c}}{${e}}`;
  if (level === 1) return task(`${a}-${b}(${c}-${e})+${d.between(2, 9)}`, { kind: 'simplified' });
  if (level === 2) return task(r`${e}(\frac{${a}}{${b}}-${c})-(${b}-${e})`, { kind: 'simplified' });
  return task(r`${b}(${sum})-(${a}-${c})^2`, { kind: 'simplified' });
};

const algebraicFractions: DrawTask = (d, level) => {
  const [a, c, p] = [d.between(2, 6), d.between(2, 6), d.between(1, 5)];
  const q = p + d.between(1, 4);
  if (level === 1) return task(r`\frac{${a}}{x-${p}}+\frac{${c}}{x+${q}}`, { kind: 'simplified' });
  if (level === 2) return task(r`\frac{x^2-${p * p}}{x^2${plusTimes(q - p, 'x')}-${p * q}}`, { kind: 'simplified' });
  return task(r`\frac{x}{x-${p}}-\frac{${a}}{x+${q}}`, { kind: 'simplified' });
};

const surds: DrawTask = (d, level) => {
  const [a, b, k] = [d.one([2, 3, 5]), d.between(1, 6), d.between(2, 4)];
  if (level === 1) return task(r`\sqrt{${a * k * k}}+${b}\sqrt{${a}}`, { kind: 'simplified' });
  if (level === 2) return task(r`(\sqrt{${a}}+${b})^2-\sqrt{${a * k * k}}`, { kind: 'simplified' });
  return task(r`(${k}\sqrt{${a}}-${b})(\sqrt{${a}}+${b})`, { kind: 'simplified' });
};

const linearEquations: DrawTask = (d, level) => {
  const [a, b, x] = [d.between(4, 9), d.signed(6), d.signed(6)];
  const c = d.between(2, 3);
  if (level === 1) return task(`${a}x${plus(b)}=${c}x${plus((a - c) * x + b)}`, forX);
  if (level === 2) return task(`${a}(x${plus(b)})=${c}x${plus((a - c) * x + a * b)}`, forX);
  return task(`${a}(x${plus(b)})-${c}(x-${x + 7})=${(a - c) * x + a * b + c * (x + 7)}`, forX);
};

const quadraticEquations: DrawTask = (d, level) => {
  const [p, q] = [d.signed(6), d.between(1, 7)];
  const s = p + q === 0 ? q + 1 : q;
  if (level === 1) return task(`x^2${plusTimes(-(p + s), 'x')}${plus(p * s)}=0`, forX);
  if (level === 2) return task(`x^2=${times(p + s, 'x')}${plus(-p * s)}`, forX);
  const b = 2 * d.between(2, 5);
  return task(`x^2-${b}x+${d.between(1, (b * b) / 4 - 1)}=0`, forX);
};

const rationalEquations: DrawTask = (d, level) => {
  const [a, c, p] = [d.between(2, 4), d.between(5, 8), d.between(1, 4)];
  const q = p + d.between(1, 4);
  if (level === 1) return task(r`\frac{${a}}{x-${p}}=${c}`, forX);
  if (level === 2) return task(r`\frac{${a}}{x-${p}}=\frac{${c}}{x+${q}}`, forX);
  return task(r`\frac{x}{x-${p}}=\frac{${p}}{x-${p}}+${a}`, forX);
};

const radicalEquations: DrawTask = (d, level) => {
  const [root, b] = [d.between(2, 6), d.between(1, 6)];
  if (level === 1) return task(r`\sqrt{x+${b}}=${root}`, forX);
  if (level === 2) return task(r`\sqrt{${root}x+${b}}-1=${d.between(2, 6)}`, forX);
  return task(r`\sqrt{x+${root * root - root - b}}=x-${b}`, forX);
};

const exponentialEquations: DrawTask = (d, level) => {
  const [base, n, b, k] = [d.one([2, 3, 5]), d.between(2, 4), d.signed(4), d.between(2, 4)];
  if (level === 1) return task(`${base}^{x${plus(b)}}=${base ** n}`, forX);
  if (level === 2) return task(`${k}e^{${n}x}=${k * d.between(2, 9)}`, forX);
  return task(`${base}^{${k}x${plus(b)}}=${base}^{x${plus(n)}}`, forX);
};

const logarithms: DrawTask = (d, level) => {
  const [a, b, n] = [d.between(1, 5), d.between(6, 12), d.between(2, 4)];
  if (level === 1) return task(r`\ln(x-${a})=\ln(${b}-x)`, forX);
  if (level === 2) return task(r`${n}\ln x+\ln(x+${a})-\ln x`, { kind: 'simplified' }, ['x>0']);
  return task(r`\ln(${n}x-${a})=\ln(x+${b})`, forX);
};

const absoluteValues: DrawTask = (d, level) => {
  const [a, b, c] = [d.between(2, 5), d.signed(7), d.between(1, 9)];
  if (level === 1) return task(`|x${plus(b)}|=${c}`, forX);
  if (level === 2) return task(`|${a}x${plus(b)}|=${c}`, forX);
  return task(`${a}|x${plus(b)}|-${c}=${a * c}`, forX);
};

const inequalities: DrawTask = (d, level) => {
  const [a, b, c, e] = [d.between(2, 5), d.signed(9), d.between(1, 6), d.signed(9)];
  const sign = d.one(['<', '>', r`\le `, r`\ge `]);
  if (level === 1) return task(`${b}-${a}x${sign}${c}`, forX);
  if (level === 2) return task(`${b}-${a}x${sign}${c}x${plus(e)}`, forX);
  return task(`${a}(x${plus(b)})${sign}${a + c}(x${plus(e)})`, forX);
};

const formulas: DrawTask = (d, level) => {
  const name = (letter: string): Goal => ({ kind: 'solved', letter });
  if (level === 1) {
    const [given, letter] = d.one<[string, string]>([
      ['v=u+at', 't'],
      ['p=2a+2b', 'b'],
      ['y=mx+c', 'x'],
    ]);
    return task(given, name(letter));
  }
  if (level === 2) {
    const [given, letter] = d.one<[string, string]>([
      ['A=P(1+rt)', 't'],
      [r`A=\frac{h(a+b)}{2}`, 'a'],
      ['S=2ab+2(a+b)c', 'c'],
    ]);
    return task(given, name(letter));
  }
  const [given, letter] = d.one<[string, string]>([
    [r`y=\frac{ax+b}{cx+d}`, 'x'],
    ['ax+b=cx+d', 'x'],
    ['P=at-b(t-c)', 't'],
  ]);
  return task(given, name(letter));
};

const derivatives: DrawTask = (d, level) => {
  const [a, n, m, b] = [d.between(2, 6), d.between(3, 6), d.between(2, 4), d.signed(6)];
  const simplified: Goal = { kind: 'simplified' };
  if (level === 1) return task(r`\frac{d}{dx}(${a}x^${n}${plusTimes(b, 'x')})`, simplified);
  if (level === 2) return task(r`\frac{d}{dx}(x^${n}\sin x)`, simplified);
  return task(r`\frac{d}{dx}((${a}x${plus(b)})^${m}+\cos(${a}x))`, simplified);
};

const integrals: DrawTask = (d, level) => {
  const [a, b, n] = [d.between(2, 6), d.between(2, 6), d.between(2, 4)];
  const simplified: Goal = { kind: 'simplified' };
  if (level === 1) return task(r`\int (${a}x^${n}+${b}x)\,dx`, simplified);
  if (level === 2) return task(r`\int_{1}^{${n}} (${a}x-${b})\,dx`, simplified);
  return task(r`\int_{0}^{${n}} (x^2-${b}x+${a})\,dx`, simplified);
};

const trigonometry: DrawTask = (d, level) => {
  const [a, k] = [d.between(2, 6), d.between(2, 5)];
  if (level === 1) return task(r`${a}(1-\sin^2 x)+${k}\cos^2 x`, { kind: 'simplified' });
  if (level === 2) return task(r`(\sin x+\cos x)^2-${a}`, { kind: 'simplified' });
  return task(r`(\sin x-${k}\cos x)^2+(${k}\sin x+\cos x)^2`, { kind: 'simplified' });
};

/** One letter has the number 1 or -1 in front of it somewhere, so that no fractions come in on the way. */
const systems: DrawTask = (d, level) => {
  const [x, y, a, b] = [d.signed(6), d.signed(6), d.between(2, 5), d.between(2, 4)];
  const free: Goal = { kind: 'free' };
  if (level === 1) return task(`y=${times(a, 'x')}${plus(y - a * x)},\\ x+y=${x + y}`, free);
  const c = d.between(2, 6);
  if (level === 2) return task(`x${plusTimes(a, 'y')}=${x + a * y},\\ ${c}x-${b}y=${c * x - b * y}`, free);
  return task(`${a}(x${plus(c)})-y=${a * (x + c) - y},\\ ${b}x+${a + b}(y-1)=${b * x + (a + b) * (y - 1)}`, free);
};

const quadraticInequalities: DrawTask = (d, level) => {
  const p = d.signed(6);
  const q = p + d.between(1, 6);
  const sign = d.one(['<', '>', '\\le ', '\\ge ']);
  if (level === 1) return task(`x^2${sign}${p * p}`, forX);
  const middle = p + q === 0 ? '' : plusTimes(-p - q, 'x');
  const last = p * q === 0 ? '' : plus(p * q);
  if (level === 2) return task(`x^2${middle}${last}${sign}0`, forX);
  return task(`${times(p + q || 1, 'x')}-x^2${sign}${p + q ? p * q : p * q - p - 1}`, forX);
};

const trigonometricEquations: DrawTask = (d, level) => {
  const [a, own] = [d.between(2, 6), d.one(['\\sin', '\\cos'])];
  const turn = [r`0\le x<2\pi`];
  if (level === 1) {
    const [k, value] = d.one<[number, string]>([
      [2, '1'],
      [2, '-1'],
      [2, r`\sqrt{3}`],
      [2, r`\sqrt{2}`],
      [1, '0'],
      [1, '-1'],
    ]);
    const left = `${times(k, ` ${own} x`)}${plus(a)}`.trim();
    return task(value.startsWith('\\') ? `${left}=${a}+${value}` : `${left}=${a + Number(value)}`, forX, turn);
  }
  if (level === 2) return task(`2${own}^2 x=${d.one(['', '-'])}${own} x`, forX, turn);
  const [b, c] = d.one<[number, number]>([
    [1, -1],
    [-1, -1],
    [3, 1],
    [-3, 1],
  ]);
  return task(`2${own}^2 x${plusTimes(b, `${own} x`)}=${-c}`, forX, turn);
};

/** The topics of practice, each with its three levels. */
export const practiceTopics = {
  brackets,
  factoring,
  powers,
  'numeric-fractions': numericFractions,
  'algebraic-fractions': algebraicFractions,
  surds,
  'linear-equations': linearEquations,
  'quadratic-equations': quadraticEquations,
  'rational-equations': rationalEquations,
  'radical-equations': radicalEquations,
  'exponential-equations': exponentialEquations,
  logarithms,
  'absolute-values': absoluteValues,
  inequalities,
  formulas,
  systems,
  'quadratic-inequalities': quadraticInequalities,
  trigonometry,
  'trigonometric-equations': trigonometricEquations,
  derivatives,
  integrals,
} as const satisfies Record<string, DrawTask>;

export type PracticeTopic = keyof typeof practiceTopics;
