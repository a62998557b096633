/** One step between two statements, and whether it follows. */
export interface HiddenRow {
  readonly lines: readonly [string, string];
  readonly right: boolean;
  readonly assume?: readonly string[];
}

const t = String.raw;
const none = t`\text{no solution}`;
const all = t`\text{all real }x`;

type Below = readonly [line: string, right: boolean];

function rows(above: string, below: readonly Below[], assume?: readonly string[]): HiddenRow[] {
  return below.map(([line, right]) => ({ lines: [above, line], right, ...(assume ? { assume } : {}) }));
}

/** Equations made from a solution that lies far out. */
function farRoots(): HiddenRow[] {
  const found: HiddenRow[] = [];
  for (const n of [60, 300, 1200, 20_000]) {
    found.push(
      ...rows(t`e^x+\ln 2^x=e^{-${n}}+x\ln 2`, [
        [none, false],
        [`x=-${n}`, true],
        ['x=0', false],
      ]),
      ...rows(t`2^x+3x=2^{-${n}}+3x`, [
        [none, false],
        [`x=-${n}`, true],
      ]),
      ...rows(t`\ln x=${n}`, [
        [none, false],
        [`x=e^{${n}}`, true],
        [`x=${n}e`, false],
      ]),
      ...rows(t`(x-2)(\ln x-${n})=0`, [
        ['x=2', false],
        [t`x=2\text{ or }x=e^{${n}}`, true],
        [`x=e^{${n}}`, false],
      ]),
      ...rows(t`(x-2)(e^x-e^{-${n}})=0`, [
        ['x=2', false],
        [t`x=2\text{ or }x=-${n}`, true],
      ]),
      ...rows(t`xe^x-2e^x-xe^{-${n}}+2e^{-${n}}=0`, [
        ['x=2', false],
        [t`x=2\text{ or }x=-${n}`, true],
      ]),
      ...rows(t`e^x\le e^{-${n}}`, [
        [none, false],
        [`x\\le -${n}`, true],
      ]),
      ...rows(t`e^x>e^{-${n}}`, [
        [all, false],
        [`x>-${n}`, true],
      ]),
    );
  }
  for (const n of [200, 3000, 40_000, 1_000_000]) {
    found.push(
      ...rows(t`\sqrt{x}=${n}`, [
        [none, false],
        [`x=${n ** 2}`, true],
      ]),
      ...rows(t`x\sqrt{x}-${n}x-2\sqrt{x}+${2 * n}=0`, [
        ['x=2', false],
        [t`x=2\text{ or }x=${n ** 2}`, true],
      ]),
      ...rows(t`|x-${n}|=0`, [
        [none, false],
        [`x=${n}`, true],
      ]),
      ...rows(t`|x-${n}|>0`, [
        [all, false],
        [t`x\ne ${n}`, true],
      ]),
      ...rows(t`\sqrt{x^2+1}-x=\frac{1}{${n}}`, [[none, false]]),
      ...rows(t`x-${n}\ln x=0`, [[none, false]]),
      ...rows(t`\frac{1}{\sqrt{x}}=\frac{1}{${n}}`, [
        [none, false],
        [`x=${n ** 2}`, true],
      ]),
      ...rows(t`(x-3)(\sqrt[3]{x}-${n})>0`, [
        ['x<3', false],
        [t`x<3\text{ or }x>${n ** 3}`, true],
      ]),
    );
  }
  return found;
}

/** Pairs of solutions that lie close together, and pairs that just miss each other. */
function closeRoots(): HiddenRow[] {
  const found: HiddenRow[] = [];
  for (const k of [5, 9, 14, 30]) {
    const small = `10^{-${k}}`;
    const near = `1.${'0'.repeat(k - 1)}1`;
    found.push(
      ...rows(t`(e^x-1)(e^x-${near})=0`, [
        ['x=0', false],
        [t`x=0\text{ or }x=\ln ${near}`, true],
        [none, false],
      ]),
      ...rows(t`(\sqrt{x}-1)(\sqrt{x}-${near})=0`, [
        ['x=1', false],
        [t`x=1\text{ or }x=${near}^2`, true],
      ]),
      ...rows(t`|x-1|=${small}`, [
        ['x=1', false],
        [t`x=1+${small}\text{ or }x=1-${small}`, true],
        [none, false],
      ]),
      ...rows(t`x-4\sqrt{x}+4=${small}`, [
        ['x=4', false],
        [none, false],
      ]),
      ...rows(t`x-4\sqrt{x}+4+${small}=0`, [
        ['x=4', false],
        [none, true],
      ]),
      ...rows(t`e^x=x+1+${small}`, [
        ['x=0', false],
        [none, false],
      ]),
      ...rows(t`e^x+${small}=x+1`, [
        ['x=0', false],
        [none, true],
      ]),
      ...rows(t`\ln x=x-1-${small}`, [
        ['x=1', false],
        [none, false],
      ]),
      ...rows(t`\ln x=x-1+${small}`, [
        ['x=1', false],
        [none, true],
      ]),
      ...rows(t`e^{2x}-2e^x+1=${small}`, [
        ['x=0', false],
        [none, false],
      ]),
      ...rows(t`\sqrt{x-1}+\sqrt{1+${small}-x}=0`, [
        [none, true],
        ['x=1', false],
      ]),
      ...rows(t`\sqrt{x-1}\sqrt{1+${small}-x}=0`, [
        ['x=1', false],
        [t`x=1\text{ or }x=1+${small}`, true],
      ]),
      ...rows(t`|x-3|+|x-3-${small}|=${small}`, [
        [t`3\le x\le 3+${small}`, true],
        ['x=3', false],
      ]),
      ...rows(t`x^2<${small}`, [
        [none, false],
        ['x=0', false],
      ]),
      ...rows(t`e^x>x+1-${small}`, [
        [all, true],
        [t`x\ne 0`, false],
      ]),
      ...rows(t`e^x>x+1+${small}`, [
        [all, false],
        [t`x\ne 0`, false],
      ]),
    );
  }
  return found;
}

function doubleRoots(): HiddenRow[] {
  return [
    ...rows(t`x-4\sqrt{x}+4=0`, [
      ['x=4', true],
      [none, false],
    ]),
    ...rows(t`e^{2x}-2e^x+1=0`, [
      ['x=0', true],
      [none, false],
    ]),
    ...rows(t`\ln x=x-1`, [
      ['x=1', true],
      [none, false],
      [t`x=1\text{ or }x=e`, false],
    ]),
    ...rows(t`e^x=x+1`, [
      ['x=0', true],
      [none, false],
    ]),
    ...rows(t`e^x\ge x+1`, [
      [all, true],
      [t`x\ge 0`, false],
    ]),
    ...rows(t`e^x>x+1`, [
      [all, false],
      [t`x\ne 0`, true],
      ['x>0', false],
    ]),
    ...rows(t`\ln x\le x-1`, [
      ['x>0', true],
      [t`x\ge 1`, false],
    ]),
    ...rows(t`(\ln x)^2-2\ln x+1=0`, [
      ['x=e', true],
      [none, false],
    ]),
    ...rows(t`4^x-6\cdot 2^x+9=0`, [
      [t`x=\log_2 3`, true],
      [none, false],
    ]),
    ...rows(t`x\cdot 2^x=2^x`, [
      ['x=1', true],
      [none, false],
    ]),
    ...rows(t`\sqrt{x^2-6x+9}=0`, [
      ['x=3', true],
      [none, false],
    ]),
    ...rows(t`e^x+e^{-x}=2`, [
      ['x=0', true],
      [none, false],
      [t`x=\pm 1`, false],
    ]),
    ...rows(t`e^x+e^{-x}>2`, [
      [all, false],
      [t`x\ne 0`, true],
    ]),
    ...rows(t`e^{x-1}=x`, [
      ['x=1', true],
      [none, false],
    ]),
    ...rows(t`x\ln x=x-1`, [
      ['x=1', true],
      [none, false],
    ]),
  ];
}

/** Solutions on the edge of where a line has a value, and where its form changes. */
function edgeRoots(): HiddenRow[] {
  return [
    ...rows(t`\sqrt{x-2}(x-5)=0`, [
      ['x=5', false],
      [t`x=2\text{ or }x=5`, true],
      [none, false],
    ]),
    ...rows(t`\sqrt{x-2}(x-1)=0`, [
      ['x=2', true],
      [t`x=1\text{ or }x=2`, false],
    ]),
    ...rows(t`|x-2|+x-2=0`, [
      [t`x\le 2`, true],
      ['x=2', false],
      [none, false],
    ]),
    ...rows(t`\sqrt{x-1}\ln x=0`, [
      ['x=1', true],
      [none, false],
    ]),
    ...rows(t`\sqrt{x-1}\sqrt{1-x}=0`, [
      ['x=1', true],
      [none, false],
      [all, false],
    ]),
    ...rows(t`\sqrt{x}+\sqrt{-x}=0`, [
      ['x=0', true],
      [none, false],
    ]),
    ...rows(t`\sqrt{x^2-4}+\sqrt{4-x^2}=0`, [
      [t`x=\pm 2`, true],
      ['x=2', false],
      [none, false],
    ]),
    ...rows(t`x\ln x=0`, [
      ['x=1', true],
      [t`x=0\text{ or }x=1`, false],
    ]),
    ...rows(t`\sqrt{x}\ln x=0`, [
      ['x=1', true],
      [none, false],
    ]),
    ...rows(t`\sqrt{x}\ge 0`, [
      [t`x\ge 0`, true],
      [all, false],
      ['x>0', false],
    ]),
    ...rows(t`\sqrt{x}>0`, [
      ['x>0', true],
      [t`x\ge 0`, false],
    ]),
    ...rows(t`(x-3)\sqrt{x}\ge 0`, [
      [t`x\ge 3`, false],
      [t`x\ge 3\text{ or }x=0`, true],
    ]),
    ...rows(t`(x-3)^2e^x\le 0`, [
      ['x=3', true],
      [none, false],
    ]),
    ...rows(t`|x|=-x`, [
      [t`x\le 0`, true],
      ['x=0', false],
      [none, false],
    ]),
    ...rows(t`\frac{|x|}{x}=1`, [
      ['x>0', true],
      [t`x\ge 0`, false],
    ]),
    ...rows(t`\ln|x|=-50`, [
      [none, false],
      [t`x=\pm e^{-50}`, true],
      [t`x=e^{-50}`, false],
    ]),
    ...rows(t`e^{\frac{1}{x}}=e^{1000}`, [
      ['x=0.001', true],
      [none, false],
    ]),
    ...rows(t`\frac{e^x-1}{x}=0`, [
      [none, true],
      ['x=0', false],
    ]),
    ...rows(t`\frac{\ln x}{x-1}=0`, [
      [none, true],
      ['x=1', false],
    ]),
    ...rows(t`x^x=1`, [
      ['x=1', true],
      [none, false],
    ]),
    ...rows(t`\lfloor x\rfloor=3`, [
      ['x=3', false],
      [t`3\le x<4`, true],
      [none, false],
    ]),
    ...rows(t`e^{-x}<10^{-9}`, [
      [none, false],
      [t`x>9\ln 10`, true],
    ]),
    ...rows(t`\frac{1}{x-1}+e^x=e^x+10^{9}`, [
      [none, false],
      [t`x=1+10^{-9}`, true],
    ]),
    ...rows(t`\frac{1}{|x|}>10^{12}`, [
      [none, false],
      ['x=0', false],
    ]),
    ...rows(t`\arcsin x=\frac{\pi}{2}`, [
      ['x=1', true],
      [none, false],
    ]),
    ...rows(t`\arctan x=\frac{\pi}{2}`, [
      [none, true],
      ['x=1', false],
    ]),
    ...rows(t`\arctan x<1.5707963`, [[all, false]]),
    ...rows(t`\arctan x<\frac{\pi}{2}`, [[all, true]]),
  ];
}

/** Lines that are true for every number, and lines that are nearly so. */
function nearlyAll(): HiddenRow[] {
  return [
    ...rows('e^x>0', [
      [all, true],
      ['x>0', false],
      [none, false],
    ]),
    ...rows('e^x>10^{-200}', [[all, false]]),
    ...rows('2^x>x', [[all, true]]),
    ...rows('2^x>x^2', [[all, false]]),
    ...rows('1.01^x>x', [[all, false]]),
    ...rows('1.01^x=x', [[none, false]]),
    ...rows(t`1.0001^x>x-20`, [[all, false]]),
    ...rows('e^x>ex', [
      [all, false],
      [t`x\ne 1`, true],
    ]),
    ...rows(t`\sqrt{x^2+1}>x`, [
      [all, true],
      ['x<0', false],
    ]),
    ...rows(t`\sqrt{x^2+10^{-20}}>x`, [[all, true]]),
    ...rows(t`\sqrt{x^2}>x`, [
      [all, false],
      ['x<0', true],
    ]),
    ...rows('|x|+1>x', [[all, true]]),
    ...rows('|x|>x-10^{-9}', [[all, true]]),
    ...rows(t`\sqrt{x+1}>\sqrt{x}`, [
      [t`x\ge 0`, true],
      [all, false],
    ]),
    ...rows(t`\sqrt{x+1}-\sqrt{x}>10^{-5}`, [[t`x\ge 0`, false]]),
    ...rows(t`\sqrt[3]{x+1}=\sqrt[3]{x}`, [
      [none, true],
      ['x=0', false],
    ]),
    ...rows(t`\sqrt{x+1}=\sqrt{x}`, [[none, true]]),
    ...rows(t`\ln(x+1)=\ln x`, [[none, true]]),
    ...rows(t`\ln(x+1)-\ln x=10^{-7}`, [[none, false]]),
    ...rows(t`x>1000\ln x`, [['0<x<1', false]]),
    ...rows(t`e^x+e^{2x}=0`, [
      [none, true],
      ['x=0', false],
    ]),
    ...rows(t`e^x=x`, [
      [none, true],
      ['x=1', false],
    ]),
    ...rows(t`e^{0.3x}=x`, [[none, false]]),
    ...rows(t`3^x+4^x=5^x`, [
      ['x=2', true],
      [none, false],
      [t`x=2\text{ or }x=0`, false],
    ]),
    ...rows(t`2^x=x^2`, [[t`x=2\text{ or }x=4`, false]]),
    ...rows(t`2^x+2^{-x}=1`, [[none, true]]),
    ...rows(t`x^2e^{-x}=10^{-9}`, [[none, false]]),
    ...rows(t`xe^{-x}=1`, [[none, true]]),
    ...rows(t`xe^{-x}=\frac{1}{e}`, [
      ['x=1', true],
      [none, false],
    ]),
    ...rows(t`e^x-x^{10}=0`, [[none, false]]),
    ...rows(t`\ln x=\sqrt[10]{x}`, [[none, false]]),
    ...rows(t`\cosh x=1`, [
      ['x=0', true],
      [none, false],
    ]),
    ...rows(t`\sinh x=x`, [
      ['x=0', true],
      [none, false],
    ]),
    ...rows(t`\tanh x=1`, [[none, true]]),
  ];
}

/** Sines and their kin: many solutions, far windows, slow waves. */
function waves(): HiddenRow[] {
  return [
    ...rows(t`\sin x=\frac{x}{50}`, [['x=0', false]]),
    ...rows(t`x=20\sin x`, [
      ['x=0', false],
      [none, false],
    ]),
    ...rows(t`x=100\sin x`, [['x=0', false]]),
    ...rows(t`x=\sin x`, [
      ['x=0', true],
      [none, false],
    ]),
    ...rows(t`\sin x>x-10^{-9}`, [[t`x\le 0`, false]]),
    ...rows(t`\cos x=1+x^2`, [
      ['x=0', true],
      [none, false],
    ]),
    ...rows(t`\cos x=1`, [
      [t`x=2k\pi`, true],
      ['x=0', false],
      [t`x=k\pi`, false],
    ]),
    ...rows(t`\cos x=1-10^{-10}`, [
      [t`x=2k\pi`, false],
      [none, false],
    ]),
    ...rows(t`\cos x=1+10^{-10}`, [
      [t`x=2k\pi`, false],
      [none, true],
    ]),
    ...rows(t`\sin\frac{x}{1000}=0`, [['x=0', false]]),
    ...rows(t`\sin\frac{x}{100}=1`, [[none, false]]),
    ...rows(t`\cos x<1`, [[all, false]]),
    ...rows(t`\cos x<1.0000001`, [[all, true]]),
    ...rows(t`\sin x+\cos x\le\sqrt{2}`, [[all, true]]),
    ...rows(t`\sin x+\cos x<\sqrt{2}`, [[all, false]]),
    ...rows(t`\sin x+\cos x<1.41421356`, [[all, false]]),
    ...rows(t`\sin(50x)=0`, [
      [t`x=\frac{k\pi}{50}`, true],
      [t`x=\frac{k\pi}{25}`, false],
      ['x=0', false],
    ]),
    ...rows(t`\sin x=10^{-6}`, [
      [t`x=k\pi`, false],
      [none, false],
    ]),
    ...rows(t`e^{-x}\sin x=0`, [
      [t`x=k\pi`, true],
      ['x=0', false],
    ]),
    ...rows(t`(x-200)\sin x=0`, [[t`x=k\pi`, false]]),
    ...rows(t`(e^x-e^{100})\cos x=0`, [[t`x=\frac{\pi}{2}+k\pi`, false]]),
    ...rows(t`x+\cos x=200`, [[none, false]]),
    ...rows(t`\sin x=2`, [
      [none, true],
      [t`x=\arcsin 2`, true],
    ]),
    ...rows(t`\sin x=1.0000001`, [[none, true]]),
    ...rows(t`\sin x\cos x=0.5`, [
      [t`x=\frac{\pi}{4}+k\pi`, true],
      [none, false],
    ]),
    ...rows(t`\tan x=10^6`, [[none, false]]),
    ...rows(t`\tan x=10^6`, [[none, false]], [t`0\le x<2\pi`]),
    ...rows(t`\sin^2 x+\cos^2 x=1`, [[all, true]]),
    ...rows(t`\sin x+\sin\frac{x}{7}=0`, [
      [t`x=2k\pi`, false],
      ['x=0', false],
    ]),
    ...rows(
      t`\sin 40x=0`,
      [
        [t`x=0`, false],
        [t`x=0\text{ or }x=\frac{\pi}{40}`, true],
      ],
      [t`0\le x\le 0.1`],
    ),
  ];
}

/** Steps with a truth known from how the equation was made: solutions that sampling may miss. */
export function hiddenRows(): HiddenRow[] {
  return [...farRoots(), ...closeRoots(), ...doubleRoots(), ...edgeRoots(), ...nearlyAll(), ...waves()];
}
