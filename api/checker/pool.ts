import { createRequire } from 'node:module';
import { pathToFileURL } from 'node:url';
import { Piscina } from 'piscina';
import type { DerivationInput, StepRuling, Verdict } from '../../shared/schemas/verdict.ts';
import type { CheckAnswer, CheckTask } from './check.worker.ts';

export interface CheckPoolOptions {
  /** The worker's file: the source under tsx, or its own bundle. */
  readonly workerUrl?: URL;
  readonly threads?: number;
  /**
   * Time at work for one step and for a whole derivation; counts of operations end a step long before. A machine that is
   * busy with other things is not charged for, up to eight times as long.
   */
  readonly stepMs?: number;
  readonly derivationMs?: number;
  readonly memoryMb?: number;
  /** Told of each run that was ended, or that broke on an error of ours (`cause`), so that it can be logged. */
  readonly onEnded?: (event: {
    readonly step: number;
    readonly reason: 'time' | 'memory' | 'broken';
    readonly input: DerivationInput;
    readonly cause?: unknown;
  }) => void;
}

/** A verdict with the time that it took: reading and ruling, and finding what explains the faults. */
export type Checked = Verdict & { readonly ms: number; readonly explainMs: number };

export interface CheckPool {
  readonly check: (input: DerivationInput) => Promise<Checked>;
  /** Whether a small derivation gets its answer; false once closed. */
  readonly healthy: () => Promise<boolean>;
  readonly close: () => Promise<void>;
}

const watchMs = 20;
const mostStretch = 8;
/** What explains the faults of a derivation is tried once only, so that a slow machine gets longer for it than for a step. */
const explainStretch = 2;

/** A clock that goes with the wall's, but no faster than this process gets to work. */
function createWorkClock(): () => number {
  let ms = 0;
  let lastWall = performance.now();
  let lastCpu = process.cpuUsage();
  return () => {
    const wall = performance.now();
    const cpu = process.cpuUsage();
    const worked = (cpu.user + cpu.system - lastCpu.user - lastCpu.system) / 1000;
    ms += Math.max(0, Math.min(wall - lastWall, worked));
    [lastWall, lastCpu] = [wall, cpu];
    return ms;
  };
}

/** Checks run in workers that are ended and replaced at their limit; what they had left is then ruled by another. */
export function createCheckPool(options: CheckPoolOptions = {}): CheckPool {
  const { stepMs = 250, derivationMs = 2000, memoryMb = 192, threads = 2 } = options;
  const workerUrl = options.workerUrl ?? new URL('./check.worker.ts', import.meta.url);
  const piscina = new Piscina({
    filename: workerUrl.href,
    minThreads: 1,
    maxThreads: threads,
    idleTimeout: 60_000,
    resourceLimits: { maxOldGenerationSizeMb: memoryMb },
    // A worker of TypeScript source needs the loader that its parent may not have.
    ...(workerUrl.pathname.endsWith('.ts') ? { execArgv: ['--import', loaderUrl()] } : {}),
  });
  // A worker that runs out of memory is also reported to the run that it was on.
  piscina.on('error', () => {});
  const workMs = createWorkClock();
  let isClosed = false;

  async function check(input: DerivationInput): Promise<Checked> {
    const timedOut: number[] = [];
    const slow = new Set<number>();
    const deadline = workMs() + derivationMs;
    for (;;) {
      const run = await runOnce(piscina, { input, timedOut: [...timedOut] }, { stepMs, deadline, workMs });
      if (run.kind === 'done') return { ...run.answer.verdict, ms: run.answer.ms, explainMs: run.answer.explainMs };
      options.onEnded?.({ step: run.step, reason: run.kind, input, cause: run.cause });
      const explaining = input.lines.length;
      if (timedOut.includes(explaining) && workMs() > deadline) return givenUp(input, derivationMs);
      if (run.step === explaining) timedOut.push(explaining);
      else if (workMs() > deadline) {
        // No time is left for the rest: every step from here on stays open.
        for (let step = run.step; step <= explaining; step += 1) timedOut.push(step);
      } else if (run.kind === 'time' && !slow.has(run.step)) slow.add(run.step);
      else timedOut.push(run.step);
      if (run.step === 0) return givenUp(input, derivationMs);
    }
  }

  return {
    check,
    healthy: async () => {
      if (isClosed) return false;
      try {
        return (await check({ lines: ['x+x', '2x'], assume: [], settings: {} })).outcome === 'sound';
      } catch {
        return false;
      }
    },
    close: async () => {
      isClosed = true;
      await piscina.destroy();
    },
  };
}

function loaderUrl(): string {
  return pathToFileURL(createRequire(import.meta.url).resolve('tsx')).href;
}

type Run =
  | { readonly kind: 'done'; readonly answer: CheckAnswer }
  /** The run ended at this step, 0 while it was still reading. */
  | { readonly kind: 'time' | 'memory' | 'broken'; readonly step: number; readonly cause?: unknown };

interface Limits {
  readonly stepMs: number;
  readonly deadline: number;
  readonly workMs: () => number;
}

async function runOnce(piscina: Piscina, task: Omit<CheckTask, 'progress'>, limits: Limits): Promise<Run> {
  const progress = new SharedArrayBuffer(4);
  const at = new Int32Array(progress);
  Atomics.store(at, 0, -1);
  const ending = new AbortController();
  let seen = -1;
  let since = limits.workMs();
  let wallSince = performance.now();
  const watch = setInterval(() => {
    const step = Atomics.load(at, 0);
    const now = limits.workMs();
    if (step !== seen) [seen, since, wallSince] = [step, now, performance.now()];
    const stepMs = step === task.input.lines.length ? explainStretch * limits.stepMs : limits.stepMs;
    // Before its first step a task may only be waiting for a worker.
    const isOver = now - since > stepMs || (now > limits.deadline && now - since > stepMs / 2);
    const isStalled = performance.now() - wallSince > mostStretch * stepMs;
    if (step >= 0 && (isOver || isStalled)) ending.abort();
  }, watchMs);
  try {
    const answer = (await piscina.run({ ...task, progress } satisfies CheckTask, {
      signal: ending.signal,
    })) as CheckAnswer;
    return { kind: 'done', answer };
  } catch (cause) {
    if (ending.signal.aborted) return { kind: 'time', step: Math.max(0, Atomics.load(at, 0)) };
    if (isOutOfMemory(cause)) return { kind: 'memory', step: Math.max(0, Atomics.load(at, 0)) };
    return { kind: 'broken', step: Math.max(0, Atomics.load(at, 0)), cause };
  } finally {
    clearInterval(watch);
  }
}

function isOutOfMemory(cause: unknown): boolean {
  return cause instanceof Error && 'code' in cause && cause.code === 'ERR_WORKER_OUT_OF_MEMORY';
}

/** Nothing could be read within the limits. */
function givenUp(input: DerivationInput, derivationMs: number): Checked {
  const steps = input.lines.slice(1).map((_, k): StepRuling => {
    return { step: k + 1, ruling: 'undecided', reached: null, notes: [], evidence: { reason: 'time' } };
  });
  return {
    outcome: steps.length === 0 ? 'sound' : 'undecided',
    firstFault: null,
    steps,
    ms: derivationMs,
    explainMs: 0,
  };
}
