import { spawnSync } from 'node:child_process';
import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';
import { checkDerivation } from '../../../api/checker/rule-derivation.ts';

const script = fileURLToPath(new URL('../data/make_statement_steps.py', import.meta.url));

interface Row {
  readonly lines: readonly string[];
  readonly assume?: readonly string[];
  readonly settings: { readonly reversible: true };
  readonly label: 'same' | 'different';
}

/** Reference program: SymPy, whose solution sets of both lines are compared (see the script). */
describe('steps between statements, beside SymPy', () => {
  it('never disagree, and are seldom undecided', () => {
    const made = spawnSync('/usr/bin/python3', [script, '20261', '120'], { encoding: 'utf8', timeout: 240_000 });
    const rows = made.stdout
      .trim()
      .split('\n')
      .map((line) => JSON.parse(line) as Row);
    expect(rows).toHaveLength(120);
    const rulings = rows.map(({ lines, assume, settings, label }) => {
      const verdict = checkDerivation({ lines, assume: assume ?? [], settings });
      return { lines, label, ruling: verdict.steps[0]?.ruling };
    });
    expect(rulings.filter(({ ruling, label }) => ruling === (label === 'same' ? 'fails' : 'holds'))).toEqual([]);
    expect(rulings.filter(({ ruling }) => ruling === 'undecided')).toEqual([]);
  }, 300_000);
});
