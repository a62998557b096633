import { spawn, type ChildProcessWithoutNullStreams } from 'node:child_process';
import { performance } from 'node:perf_hooks';
import type { BenchPairs } from './bench-pairs.ts';

export type BenchAnswer = 'equal' | 'different' | 'undecided' | 'timeout';

export interface Timed {
  readonly answer: BenchAnswer;
  readonly ms: number;
}

/** A program that is asked one question a line and answers each with one line that begins with `@@`. */
export interface Engine {
  readonly name: string;
  readonly command: readonly [string, ...string[]];
  /** Sent once, before the first question. */
  readonly setup: string;
  readonly ask: (above: string, below: string) => string;
}

const limitMs = 2000;

/**
 * Asks an engine about every pair, one process for all; a new one after a time-out. Only the pairs to measure are among the
 * answers. Null where it is not installed.
 */
export async function runEngine(engine: Engine, { before, measured }: BenchPairs): Promise<Timed[] | null> {
  const results: Timed[] = [];
  let session = await startSession(engine);
  if (!session) return null;
  for (const { plain } of [...before, ...measured]) {
    if (!session) session = await startSession(engine);
    if (!session) return null;
    const began = performance.now();
    const answer = await session.ask(engine.ask(plain[0], plain[1]), limitMs);
    const ms = performance.now() - began;
    results.push({ answer: answer === null ? 'timeout' : toAnswer(answer), ms });
    if (answer !== null) continue;
    session.stop();
    session = null;
  }
  session?.stop();
  return results.slice(before.length);
}

function toAnswer(text: string): BenchAnswer {
  if (/\bequal\b/.test(text)) return 'equal';
  return /\bdifferent\b/.test(text) ? 'different' : 'undecided';
}

interface Session {
  readonly ask: (line: string, ms: number) => Promise<string | null>;
  readonly stop: () => void;
}

/** Ready when it has answered a first question, which is not measured. */
async function startSession(engine: Engine): Promise<Session | null> {
  const [program, ...args] = engine.command;
  const child = spawn(program, args, {
    stdio: ['pipe', 'pipe', 'ignore'],
  }) as unknown as ChildProcessWithoutNullStreams;
  let isGone = false;
  child.on('error', () => (isGone = true));
  child.on('exit', () => (isGone = true));
  child.stdin.on('error', () => (isGone = true));
  let rest = '';
  let settle: ((line: string | null) => void) | null = null;
  child.stdout.on('data', (piece: Buffer) => {
    rest += piece.toString();
    for (let end = rest.indexOf('\n'); end >= 0; end = rest.indexOf('\n')) {
      const line = rest.slice(0, end).trim();
      rest = rest.slice(end + 1);
      if (line.startsWith('@@')) settle?.(line);
    }
  });
  const ask = (line: string, ms: number): Promise<string | null> =>
    new Promise((resolve) => {
      if (isGone) return resolve(null);
      const timer = setTimeout(() => finish(null), ms);
      const finish = (answer: string | null): void => {
        clearTimeout(timer);
        settle = null;
        resolve(answer);
      };
      settle = finish;
      child.stdin.write(`${line}\n`);
    });
  child.stdin.write(engine.setup);
  const stop = (): void => void child.kill('SIGKILL');
  const isReady = await ask(engine.ask('(x+1)**2', 'x**2+2*x+1'), 30_000);
  if (isReady !== null) return { ask, stop };
  stop();
  return null;
}

const spaced = (text: string): string => text.replace(/\s+/g, '');

const sympyLoop = `
import sys
import sympy as sp
local = {n: sp.Symbol(n) for n in 'abcdtuvxyz'}
local.update({'n': sp.Symbol('n', integer=True, positive=True), 'cbrt': lambda a: sp.real_root(a, 3), 'logb': lambda b, a: sp.log(a) / sp.log(b)})
for line in sys.stdin:
    above, below = line.rstrip('\\n').split('\\t')
    try:
        difference = sp.simplify(sp.sympify(above, locals=local) - sp.sympify(below, locals=local))
        print('@@ equal' if difference == 0 else '@@ different', flush=True)
    except Exception:
        print('@@ failed', flush=True)
`;

const nerdamerLoop = `
const { createRequire } = require('node:module');
const load = createRequire(process.cwd() + '/package.json');
const nerdamer = load('nerdamer');
load('nerdamer/Algebra.js');
load('nerdamer/Calculus.js');
require('node:readline').createInterface({ input: process.stdin }).on('line', (line) => {
  const [above, below] = line.split('\\t');
  let text = '@@ failed';
  try {
    text = nerdamer('simplify((' + above + ')-(' + below + '))').text() === '0' ? '@@ equal' : '@@ different';
  } catch {}
  console.log(text);
});
`;

/** Nerdamer's own notation: `^` for powers, small letters for the functions that differ. */
function forNerdamer(text: string): string {
  return spaced(text)
    .replaceAll('**', '^')
    .replaceAll('Abs(', 'abs(')
    .replaceAll(/\bI\b/g, 'i')
    .replaceAll(/cbrt\(([a-z0-9*]+)\)/g, '($1)^(1/3)')
    .replaceAll(/logb\(([^,]+),([^)]*)\)/g, '(log($2)/log($1))');
}

function forMaxima(text: string): string {
  return spaced(text)
    .replaceAll('**', '^')
    .replaceAll('Abs(', 'abs(')
    .replaceAll(/\bpi\b/g, '%pi')
    .replaceAll(/\bI\b/g, '%i');
}

function forPari(text: string): string {
  return spaced(text)
    .replaceAll('**', '^')
    .replaceAll('Abs(', 'abs(')
    .replaceAll(/\bpi\b/g, 'Pi')
    .replaceAll('factorial(', 'fac(');
}

export const engines: readonly Engine[] = [
  {
    name: 'nerdamer 1.1.13, simplify(a-b)',
    command: [process.execPath, '-e', nerdamerLoop],
    setup: '',
    ask: (above, below) => `${forNerdamer(above)}\t${forNerdamer(below)}`,
  },
  {
    name: 'SymPy, simplify(a-b)',
    command: ['/usr/bin/python3', '-c', sympyLoop],
    setup: '',
    ask: (above, below) => `${spaced(above)}\t${spaced(below)}`,
  },
  {
    name: 'Maxima, radcan and trigonometry',
    command: ['maxima', '--very-quiet'],
    setup:
      'display2d:false$ errormsg:false$ logexpand:false$ cbrt(u):=signum(u)*abs(u)^(1/3)$ logb(b,u):=log(u)/log(b)$\n' +
      'zero(d):=is(ratsimp(d)=0) or is(radcan(d)=0) or is(ratsimp(trigsimp(trigexpand(d)))=0) or is(radcan(minfactorial(makefact(d)))=0)$\n',
    ask: (above, below) =>
      `print("@@",errcatch(if zero((${forMaxima(above)})-(${forMaxima(below)})) then "equal" else "different"))$`,
  },
  {
    // It has no simplification of functions: an exact zero for rational expressions, anything else it leaves open.
    name: 'PARI/GP, a-b as a rational function',
    command: ['gp', '-q', '-f'],
    setup: 'default(breakloop,0);\nfac(n)=n!;\n',
    ask: (above, below) =>
      `print("@@ ",iferr(my(d=(${forPari(above)})-(${forPari(below)}));if(d==0,"equal",type(d)=="t_POL"||type(d)=="t_RFRAC"||type(d)=="t_FRAC"||type(d)=="t_INT","different","open"),e,"failed"))`,
  },
];
