import { spawnSync } from 'node:child_process';
import { fileURLToPath } from 'node:url';
import { expect, it } from 'vitest';
import { checkDerivation } from '../../../api/checker/rule-derivation.ts';

const SCRIPT = fileURLToPath(new URL('../data/make_rational_pairs.py', import.meta.url));
const SEED = '20261201';
const COUNT = 600;

interface Pair {
  readonly lines: readonly [string, string];
  readonly equal: boolean;
}

function makePairs(): Pair[] {
  const made = spawnSync('/usr/bin/python3', [SCRIPT, SEED, String(COUNT)], { encoding: 'utf8', timeout: 120_000 });
  if (made.status !== 0) throw new Error(`Debian's python3-sympy is needed: ${made.stderr}`);
  return made.stdout
    .trim()
    .split('\n')
    .map((line) => JSON.parse(line) as Pair);
}

/** Reference program: SymPy from Debian, which says whether the difference of the two cancels to nothing. */
it(
  `agrees with SymPy on ${COUNT} random pairs of rational expressions, and decides every one`,
  { timeout: 180_000 },
  () => {
    const pairs = makePairs();
    expect(pairs).toHaveLength(COUNT);
    const differing = pairs.filter(({ lines, equal }) => {
      const [step] = checkDerivation({ lines, assume: [], settings: {} }).steps;
      return step?.ruling !== (equal ? 'holds' : 'fails');
    });
    expect(differing).toEqual([]);
  },
);
