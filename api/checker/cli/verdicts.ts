import { createInterface } from 'node:readline';
import type { Verdict } from '../../../shared/schemas/verdict.ts';
import { createCheckPool, type CheckPool } from '../pool.ts';
import { parseDerivationLine, type DerivationLine } from './derivation-line.ts';
import { explainVerdict } from './explain.ts';

/**
 * Reads derivations as JSON lines from standard input and writes one JSON line each, in order; `--explain` words them for
 * people instead. Checks run in a worker with limits, so that no input stops the rest.
 */
async function main(): Promise<void> {
  const explain = process.argv.includes('--explain');
  // Beside this file: its own bundle in the build, the source under tsx.
  const worker = import.meta.url.endsWith('.ts') ? '../check.worker.ts' : './check.worker.js';
  const pool = createCheckPool({
    workerUrl: new URL(worker, import.meta.url),
    threads: 1,
    stepMs: 250,
    derivationMs: 2000,
    onEnded: ({ reason, cause }) => {
      if (reason === 'broken')
        process.stderr.write(`An error of the checker itself left a step undecided: ${String(cause)}\n`);
    },
  });
  for await (const text of createInterface({ input: process.stdin, crlfDelay: Infinity })) {
    if (text.trim() === '') continue;
    const parsed = parseDerivationLine(text);
    const output = parsed.ok ? await toOutput(parsed, pool, explain) : toError(parsed, explain);
    if (!process.stdout.write(`${output}\n`)) await new Promise((resolve) => process.stdout.once('drain', resolve));
  }
  await pool.close();
}

async function toOutput(
  parsed: Extract<DerivationLine, { ok: true }>,
  pool: CheckPool,
  explain: boolean,
): Promise<string> {
  const { outcome, firstFault, steps, ms, explainMs } = await pool.check(parsed.input);
  const verdict: Verdict = { outcome, firstFault, steps };
  if (!explain) return JSON.stringify({ id: parsed.id, ...verdict, ms: inThousandths(ms) });
  const took = `Ruled in ${inThousandths(ms)} ms, explained in ${inThousandths(explainMs)} ms.`;
  return `${parsed.id ?? '-'}: ${explainVerdict(parsed.input, verdict)}\n${took}\n`;
}

function inThousandths(ms: number): number {
  return Math.round(ms * 1000) / 1000;
}

function toError({ id, message }: Extract<DerivationLine, { ok: false }>, explain: boolean): string {
  return explain ? `${id ?? '-'}: cannot be read: ${message}\n` : JSON.stringify({ id, error: { message } });
}

// Whoever reads the answers may stop reading.
process.stdout.on('error', () => process.exit());
await main();
