/** Lines that say the same with the same domain, and lines by one small edit that do not. */
export interface Forms {
  readonly topic: string;
  readonly same: readonly string[];
  readonly wrong: readonly string[];
  readonly assume?: readonly string[];
  readonly complex?: boolean;
}

/** Whole numbers: a and b from 2 to 9, different; c from 1 to 5. */
export type Numbers = readonly [a: number, b: number, c: number];
export type Make = (x: string, numbers: Numbers) => Forms;

const t = String.raw;

/** Expressions over all topics. */
export const expressionForms: readonly Make[] = [
  (x, [a, b]) => ({
    topic: 'polynomials',
    same: [t`(${x}+${a})(${x}-${b})`, t`${x}^2+${a}${x}-${b}${x}-${a * b}`, t`${x}(${x}+${a})-${b}(${x}+${a})`],
    wrong: [t`${x}^2+${a}${x}-${b}${x}+${a * b}`, t`${x}^2-${a * b}`, t`${x}(${x}+${a})-${b}${x}+${a}`],
  }),
  (x, [a, b, c]) => ({
    topic: 'polynomials in two letters',
    same: [t`(${a}${x}-${b}y)^2`, t`${a * a}${x}^2-${2 * a * b}${x}y+${b * b}y^2`, t`(${b}y-${a}${x})^2`],
    wrong: [t`${a * a}${x}^2-${b * b}y^2`, t`${a}${x}^2-${2 * a * b}${x}y+${b * b}y^2`, t`(${a}${x}-${b}y)^3+${c}`],
  }),
  (x, [a, b]) => ({
    topic: 'fractions',
    same: [
      t`\frac{${a}}{${b}}+\frac{${x}}{3}`,
      t`\frac{${3 * a}+${b}${x}}{${3 * b}}`,
      t`\frac{${x}}{3}+\frac{${a}}{${b}}`,
    ],
    wrong: [t`\frac{${a}+${x}}{${b + 3}}`, t`\frac{${3 * a}+${x}}{${3 * b}}`, t`\frac{${x}}{3}-\frac{${a}}{${b}}`],
  }),
  (x, [a, b]) => ({
    topic: 'rational expressions',
    same: [
      t`\frac{${a}}{${x}-${b}}-\frac{1}{${x}}`,
      t`\frac{${a}${x}-(${x}-${b})}{${x}(${x}-${b})}`,
      t`\frac{${a - 1}${x}+${b}}{${x}^2-${b}${x}}`,
    ],
    wrong: [
      t`\frac{${a}${x}-${x}-${b}}{${x}(${x}-${b})}`,
      t`\frac{${a - 1}}{-${b}}`,
      t`\frac{${a - 1}${x}+${b}}{${x}^2+${b}${x}}`,
    ],
  }),
  (x, [a, b]) => ({
    topic: 'powers',
    same: [t`\left(${a}${x}^{-2}\right)^3`, t`${a ** 3}${x}^{-6}`, t`\frac{${a ** 3}}{${x}^6}`],
    wrong: [t`${a}${x}^{-6}`, t`${a ** 3}${x}`, t`\frac{${a ** 3}}{${x}^{${b + 6}}}`],
  }),
  (x, [a, b]) => ({
    topic: 'rational exponents',
    same: [t`${x}^{\frac{1}{2}}\cdot ${x}^{${a}}`, t`${x}^{\frac{${2 * a + 1}}{2}}`, t`${x}^{${a}}\sqrt{${x}}`],
    wrong: [t`${x}^{\frac{${a}}{2}}`, t`${x}^{\frac{${2 * a + 3}}{2}}`, t`${x}^{${b + a}}\sqrt{${x}}`],
  }),
  (x, [a, b]) => ({
    topic: 'square roots',
    same: [t`\sqrt{${a * a * b}(${x}^2+1)}`, t`${a}\sqrt{${b}${x}^2+${b}}`, t`${a}\sqrt{${b}}\sqrt{${x}^2+1}`],
    wrong: [t`${a}\sqrt{${b}${x}^2+1}`, t`${a * a}\sqrt{${b}${x}^2+${b}}`, t`${a}\sqrt{${b}}(${x}+1)`],
  }),
  (x, [a, b]) => ({
    topic: 'cube roots',
    same: [t`\sqrt[3]{${a ** 3 * b}${x}}`, t`${a}\sqrt[3]{${b}${x}}`, t`${a}\sqrt[3]{${b}}\sqrt[3]{${x}}`],
    wrong: [t`${a}\sqrt{${b}${x}}`, t`${a ** 3}\sqrt[3]{${b}${x}}`, t`${a + 1}\sqrt[3]{${b}${x}}`],
  }),
  (x, [a, b]) => ({
    topic: 'rationalising',
    same: [
      t`\frac{${x}}{\sqrt{${a * a + 1}}-${a}}`,
      t`\frac{${x}(\sqrt{${a * a + 1}}+${a})}{1}`,
      t`${x}\sqrt{${a * a + 1}}+${a}${x}`,
    ],
    wrong: [t`${x}\sqrt{${a * a + 1}}-${a}${x}`, t`\frac{${x}}{1}`, t`${x}\sqrt{${a * a + b}}+${a}${x}+1`],
  }),
  (x, [a, b]) => ({
    topic: 'exponentials',
    same: [t`e^{${a}${x}}e^{-${b}}`, t`e^{${a}${x}-${b}}`, t`\frac{(e^{${x}})^{${a}}}{e^{${b}}}`],
    wrong: [t`e^{-${a * b}${x}}`, t`e^{${a}${x}}-e^{${b}}`, t`\frac{e^{${x}^{${a}}}}{e^{${b}}}`],
  }),
  (x, [a, , c]) => ({
    topic: 'other bases',
    same: [t`${a}^{${x}+${c}}`, t`${a ** c}\cdot ${a}^{${x}}`, t`${a}^{${x}}\cdot ${a}^{${c}}`],
    wrong: [t`${a}^{${x}}+${a}^{${c}}`, t`${a ** (c + 1)}\cdot ${a}^{${x}}`, t`${a ** c + 1}\cdot ${a}^{${x}}`],
  }),
  (x, [a, b]) => ({
    topic: 'logarithms',
    same: [t`\ln(${a}${x})-\ln ${b}`, t`\ln\frac{${a}${x}}{${b}}`, t`\ln ${x}+\ln ${a}-\ln ${b}`],
    wrong: [t`\frac{\ln(${a}${x})}{\ln ${b}}`, t`\ln(${a}${x}-${b})`, t`\ln ${x}\cdot\ln ${a}-\ln ${b}`],
  }),
  (x, [a]) => ({
    topic: 'logarithms to a base',
    same: [t`\log_{${a}}(${a}${x}^3)`, t`1+3\log_{${a}}${x}`, t`1+\frac{3\ln ${x}}{\ln ${a}}`],
    wrong: [t`3\log_{${a}}(${a}${x})`, t`${a}+3\log_{${a}}${x}`, t`1+\log_{${a}}(3${x})`],
  }),
  (x, [a]) => ({
    topic: 'trigonometry',
    same: [t`\sin^2(${a}${x})`, t`1-\cos^2(${a}${x})`, t`\frac{1-\cos(${2 * a}${x})}{2}`],
    wrong: [t`1+\cos^2(${a}${x})`, t`${a * a}\sin^2 ${x}`, t`\frac{1+\cos(${2 * a}${x})}{2}`],
  }),
  (x, [a]) => ({
    topic: 'sums of angles',
    same: [t`\sin(${x}+y)`, t`\sin ${x}\cos y+\cos ${x}\sin y`, t`\sin(${x}-y)+2\cos ${x}\sin y`],
    wrong: [t`\sin ${x}+\sin y`, t`\sin ${x}\cos y-\cos ${x}\sin y`, t`\sin(${x}-y)+${a + 1}\cos ${x}\sin y`],
  }),
  (x, [a]) => ({
    topic: 'tangents',
    same: [t`\frac{${a}\sin ${x}}{\cos ${x}}`, t`${a}\tan ${x}`, t`${a}\sec ${x}\sin ${x}`],
    wrong: [t`${a}\cot ${x}`, t`\tan(${a}${x})`, t`${a}\sec ${x}\cos ${x}`],
  }),
  (x, [a]) => ({
    topic: 'inverse functions',
    same: [t`\cos(\arctan(${a}${x}))`, t`\frac{1}{\sqrt{1+${a * a}${x}^2}}`, t`\left(1+(${a}${x})^2\right)^{-1/2}`],
    wrong: [t`\frac{1}{\sqrt{1+${a}${x}^2}}`, t`\frac{${a}${x}}{\sqrt{1+${a * a}${x}^2}}`, t`\frac{1}{1+${a}${x}}`],
  }),
  (x, [a]) => ({
    topic: 'hyperbolic functions',
    same: [t`\cosh(${2 * a}${x})`, t`1+2\sinh^2(${a}${x})`, t`\frac{e^{${2 * a}${x}}+e^{-${2 * a}${x}}}{2}`],
    wrong: [t`1-2\sinh^2(${a}${x})`, t`2\cosh(${a}${x})`, t`\frac{e^{${2 * a}${x}}-e^{-${2 * a}${x}}}{2}`],
  }),
  (x, [a, b]) => ({
    topic: 'bars',
    same: [t`|${a}${x}-${a * b}|`, t`${a}|${b}-${x}|`, t`\sqrt{${a * a}(${x}-${b})^2}`],
    wrong: [t`${a}${x}-${a * b}`, t`${a}|${x}+${b}|`, t`${a}|${x}|-${a * b}`],
  }),
  (x, [a, b]) => ({
    topic: 'bars where the sign is known',
    same: [t`|${x}-${b}|+${a}`, t`${x}-${b}+${a}`, t`\sqrt{(${b}-${x})^2}+${a}`],
    wrong: [t`${b}-${x}+${a}`, t`|${x}|+${b}+${a}`, t`${x}-${b}-${a}`],
    assume: [t`${x}>${b}`],
  }),
  (_, [a]) => ({
    topic: 'factorials',
    same: [t`(n+1)!+${a}n!`, t`(n+1)n!+${a}n!`, t`(n+${a + 1})n!`],
    wrong: [t`n!+1+${a}n!`, t`(n+1+${a})!`, t`(n+${a})n!`],
  }),
  (_, [a]) => ({
    topic: 'binomials',
    same: [t`${a}\binom{n}{2}`, t`\frac{${a}n(n-1)}{2}`, t`\frac{${a}(n^2-n)}{2}`],
    wrong: [t`${a}n(n-1)`, t`\frac{${a}n(n+1)}{2}`, t`\frac{${a}n^2}{2}`],
  }),
  (x, [a, b]) => ({
    topic: 'complex numbers',
    same: [t`(${a}+${b}i)(${x}-i)`, t`${a}${x}-${a}i+${b}i${x}+${b}`, t`${a}${x}+${b}+(${b}${x}-${a})i`],
    wrong: [t`${a}${x}-${a}i+${b}i${x}-${b}`, t`${a}${x}+${b}`, t`${a}${x}+${b}+(${b}${x}+${a})i`],
    complex: true,
  }),
  (_, [a, b]) => ({
    topic: 'numbers',
    same: [t`${a}-(${b}-3)^2`, t`${a}-${(b - 3) ** 2}`, t`${a - (b - 3) ** 2}`],
    wrong: [t`${a}-${b * b - 9}+100`, t`${a + (b - 3) ** 2 + 1}`, t`${a - (b - 3) ** 2 - 1}`],
  }),
  (x, [a, b]) => ({
    topic: 'derivatives',
    same: [t`\frac{d}{d${x}}(${a}${x}^3-${b}${x})`, t`${3 * a}${x}^2-${b}`, t`${a}\cdot 3${x}^2-${b}`],
    wrong: [t`${3 * a}${x}^2-${b}${x}`, t`${a}${x}^2-${b}`, t`${3 * a}${x}^3-${b}`],
  }),
  (_, [a, b]) => ({
    topic: 'sums',
    same: [t`\sum_{k=1}^{n}(${a}k+${b})`, t`${a}\cdot\frac{n(n+1)}{2}+${b}n`, t`\frac{${a}n^2+${a + 2 * b}n}{2}`],
    wrong: [
      t`${a}\cdot\frac{n(n+1)}{2}+${b}`,
      t`${a}\cdot\frac{n(n-1)}{2}+${b}n`,
      t`\frac{${a}n^2+${a + b + 1 + b * 2}n}{2}`,
    ],
  }),
];

/** Statements: one equation, an inequality, a formula, a system. */
export const statementForms: readonly Make[] = [
  (x, [a, b, c]) => ({
    topic: 'linear equations',
    same: [t`${a}${x}+${b}=${c}`, t`${a}${x}=${c - b}`, t`${x}=\frac{${c - b}}{${a}}`],
    wrong: [t`${a}${x}=${c + b}`, t`${x}=\frac{${c - b + 1}}{${a}}`, t`${a}${x}+${b}=${c + 1}`],
  }),
  (x, [a, b]) => ({
    topic: 'quadratic equations',
    same: [t`${x}^2-${a + b}${x}+${a * b}=0`, t`(${x}-${a})(${x}-${b})=0`, t`${x}=${a}\text{ or }${x}=${b}`],
    wrong: [t`(${x}+${a})(${x}-${b})=0`, t`${x}=${a}`, t`${x}=-${a}\text{ or }${x}=${b}`],
  }),
  (x, [a]) => ({
    topic: 'roots of both signs',
    same: [t`${x}^2=${a}`, t`${x}=\pm\sqrt{${a}}`, t`|${x}|=\sqrt{${a}}`],
    wrong: [t`${x}=\sqrt{${a}}`, t`${x}=\pm ${a}`, t`${x}^2=${a * a}`],
  }),
  (x, [a, b]) => ({
    topic: 'fractions',
    same: [t`\frac{${a}}{${x}}=${b}`, t`\frac{${a}}{${b}}=${x}`, t`${x}=\frac{${a}}{${b}}`],
    wrong: [t`${x}=${a * b}`, t`${x}=\frac{${b}}{${a}}`, t`\frac{${a}}{${x}}=${b + 1}`],
  }),
  (x, [a, b]) => ({
    topic: 'bars',
    same: [t`|${x}-${a}|=${b}`, t`${x}-${a}=${b}\text{ or }${x}-${a}=-${b}`, t`${x}=${a + b}\text{ or }${x}=${a - b}`],
    wrong: [t`${x}-${a}=${b}`, t`|${x}|=${a + b}`, t`${x}=${a + b}\text{ or }${x}=${b - a}`],
  }),
  (x, [a, b]) => ({
    topic: 'exponentials',
    same: [t`${a}^{${x}}=${b}`, t`${x}\ln ${a}=\ln ${b}`, t`${x}=\frac{\ln ${b}}{\ln ${a}}`],
    wrong: [t`${x}=\ln\frac{${b}}{${a}}`, t`${x}=\frac{${b}}{${a}}`, t`${x}\ln ${b}=\ln ${a}`],
  }),
  (x, [a, b]) => ({
    topic: 'logarithms',
    same: [t`\ln(${x}-${a})=${b}`, t`${x}-${a}=e^{${b}}`, t`${x}=${a}+e^{${b}}`],
    wrong: [t`${x}-${a}=${b}e`, t`${x}=e^{${b}}-${a}`, t`\ln ${x}-\ln ${a}=${b}`],
  }),
  (x, [a]) => ({
    topic: 'cubes and roots',
    same: [t`${x}^3=${a ** 3}`, t`${x}=${a}`, t`\sqrt[3]{${x}}=\sqrt[3]{${a}}`],
    wrong: [t`${x}=${a ** 2}`, t`${x}=\pm ${a}`, t`${x}^3=${a}`],
  }),
  (x, [a, b]) => ({
    topic: 'linear inequalities',
    same: [t`-${a}${x}<${a * b}`, t`${x}>-${b}`, t`0<${x}+${b}`],
    wrong: [t`${x}<-${b}`, t`${x}\ge -${b}`, t`${x}>${b}`],
  }),
  (x, [a, b]) => ({
    topic: 'quadratic inequalities',
    same: [t`${x}^2\le ${a * a}`, t`-${a}\le ${x}\le ${a}`, t`|${x}|\le ${a}`],
    wrong: [t`${x}\le ${a}`, t`-${a}<${x}<${a}`, t`|${x}|\le ${a + b}`],
  }),
  (x, [a, b]) => ({
    topic: 'formulas',
    same: [t`P=${a}${x}+${b}y`, t`P-${b}y=${a}${x}`, t`${x}=\frac{P-${b}y}{${a}}`],
    wrong: [t`${x}=\frac{P+${b}y}{${a}}`, t`${x}=P-${b}y-${a}`, t`${x}=\frac{P}{${a}}-${b}y`],
  }),
  (x, [a, b]) => ({
    topic: 'systems',
    same: [
      t`\begin{cases}${x}+y=${a}\\${x}-y=${b}\end{cases}`,
      t`\begin{cases}2${x}=${a + b}\\2y=${a - b}\end{cases}`,
      t`${x}=\frac{${a + b}}{2},\ y=\frac{${a - b}}{2}`,
    ],
    wrong: [
      t`\begin{cases}2${x}=${a + b}\\2y=${b - a}\end{cases}`,
      t`${x}=${a + b},\ y=${a - b + 1}`,
      t`\begin{cases}${x}+y=${a}\\${x}-y=${b + 1}\end{cases}`,
    ],
  }),
  (x, [a]) => ({
    topic: 'trigonometric equations',
    same: [t`${2 * a}\sin ${x}=${a}`, t`\sin ${x}=\frac12`, t`${x}=\frac{\pi}{6}\text{ or }${x}=\frac{5\pi}{6}`],
    wrong: [t`\sin ${x}=\frac{1}{${a + 2}}`, t`${x}=\frac{\pi}{6}`, t`\sin ${x}=-\frac12`],
    assume: [t`0\le ${x}<2\pi`],
  }),
];
