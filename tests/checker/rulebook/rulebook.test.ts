import { describe, expect, it } from 'vitest';
import { checkDerivation } from '../../../api/checker/rule-derivation.ts';
import { collegeRows, joinedRows } from './college-rows.ts';
import { closeRows, equationRows, roundingRows } from './equation-rows.ts';
import { expressionRows } from './expression-rows.ts';
import { formulaRows } from './formula-rows.ts';
import { inequalityRows } from './inequality-rows.ts';
import { complexRows, definitionRows, otherRows } from './other-rows.ts';
import { linesOf, type Row, type Ruling } from './row.ts';
import { furtherSystemRows, systemRows } from './system-rows.ts';

/** Each row is a derivation with the ruling that the rule beside it demands, written by hand from the rules' text. */
const tables: Record<string, readonly Row[]> = {
  expressions: expressionRows,
  equations: equationRows,
  approximations: roundingRows,
  'close numbers': closeRows,
  inequalities: inequalityRows,
  formulas: formulaRows,
  systems: systemRows,
  'further systems': furtherSystemRows,
  'complex equations': complexRows,
  definitions: definitionRows,
  'goals, settings, calculus, matrices': otherRows,
  'whole derivations': collegeRows,
  'joined statements': joinedRows,
};

describe.each(Object.entries(tables))('the rules on %s', (_, rows) => {
  it.each(rows.map((row) => [row[0], row[1], row] as const))('rule %s: %s', (_rule, _lines, row) => {
    const [, , ruling, options = {}] = row;
    const { assume = [], settings = {}, uses, note } = options;
    const verdict = checkDerivation({ lines: linesOf(row), assume, settings, ...(uses ? { uses } : {}) });
    const found: Ruling = verdict.outcome === 'undecided' ? 'undecided' : verdict.firstFault;
    expect(found).toBe(ruling);
    const noted = verdict.steps[(verdict.firstFault ?? verdict.steps.length) - 1];
    if (note) expect(noted?.notes).toContain(note);
  });
});
