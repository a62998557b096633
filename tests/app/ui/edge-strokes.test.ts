import { describe, expect, it } from 'vitest';
import type { EdgeStep } from '../../../app/ui/edge-strokes.ts';
import { strokesOf } from '../../../app/ui/edge-strokes.ts';
import type { StepState } from '../../../shared/lib/step-words.ts';

const line = (state: StepState | null, isBracketed = false): EdgeStep => ({ state, isBracketed, isLine: true });
const words: EdgeStep = { state: null, isBracketed: false, isLine: false };

describe('the strokes of the edge', () => {
  it('draws a step from the middle of the line above to the middle of its own line', () => {
    const [given, first] = strokesOf([line(null), line('holds')]);
    expect(given).toMatchObject({ step: null, upper: 'none', lower: 'holds', tick: 'holds' });
    expect(first).toMatchObject({ upper: 'holds', lower: 'none' });
  });

  it('turns at the first fault: solid above, rust below to the tick, broken from there', () => {
    const rows = strokesOf([line(null), line('fault'), line('carried')]);
    expect(rows[0]?.lower).toBe('holds');
    expect(rows[1]).toMatchObject({
      step: { above: 'holds', knot: 'fault', below: 'fault' },
      upper: 'fault',
      lower: 'carried',
      tick: 'fault',
    });
    expect(rows[2]).toMatchObject({ upper: 'carried', tick: 'carried' });
  });

  it('leaves a gap with solid stubs where a step is undecided, and keeps the ground it stands on', () => {
    expect(strokesOf([line(null), line('undecided')])[1]?.step).toEqual({
      above: 'holds',
      knot: 'undecided',
      below: 'holds',
    });
    const afterFault = strokesOf([line(null), line('fault'), line('undecided')])[2];
    expect(afterFault?.step).toEqual({ above: 'carried', knot: 'undecided', below: 'carried' });
  });

  it('gives nothing away on a plain edge, and brackets both ends of the picked step', () => {
    const rows = strokesOf([line(null), line('plain'), line('plain', true), line('plain')]);
    expect(rows.map((row) => row.isArm)).toEqual([false, true, true, false]);
    expect(rows[1]?.lower).toBe('bracket');
    expect(rows[2]?.lower).toBe('plain');
    expect(rows.map((row) => row.tick)).toEqual(['plain', 'plain', 'plain', 'plain']);
  });

  it('runs past words between two lines with the stroke that leads to the fault', () => {
    const rows = strokesOf([line(null), words, line('fault')]);
    expect(rows[1]).toMatchObject({ upper: 'holds', lower: 'holds', tick: null });
  });

  it('ends at the last tick, also when words follow it', () => {
    const rows = strokesOf([line(null), line('plain'), words]);
    expect(rows[1]?.lower).toBe('none');
    expect(rows[2]).toMatchObject({ upper: 'none', lower: 'none' });
  });

  it('runs on below the last line where the derivation continues', () => {
    expect(strokesOf([line(null), line('plain')], true)[1]?.lower).toBe('plain');
  });
});
