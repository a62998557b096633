import type { StepState } from '../../shared/lib/step-words.ts';

/** A drawn stretch of the edge. */
export type Stroke = 'none' | 'plain' | 'holds' | 'carried' | 'fault' | 'bracket';
export type Knot = 'fault' | 'undecided' | 'also-fails';

/** What one row of the edge draws, from its top to its bottom. */
export interface EdgeRow {
  /** Above the line: one stretch, or two with a knot between. */
  readonly step: { readonly above: Stroke; readonly knot: Knot | null; readonly below: Stroke } | null;
  readonly upper: Stroke;
  readonly lower: Stroke;
  readonly tick: Stroke | null;
  readonly isArm: boolean;
}

/** One row as the edge sees it: a line, or words between two lines. */
export interface EdgeStep {
  /** The state of the step that leads here; for words, nothing. */
  readonly state: StepState | null;
  readonly isBracketed: boolean;
  readonly isLine: boolean;
}

interface Span {
  readonly above: Stroke;
  readonly knot: Knot | null;
  readonly below: Stroke;
}

function spanOf(state: StepState, isBracketed: boolean, isAfterFault: boolean): Span {
  const ground: Stroke = isAfterFault ? 'carried' : 'holds';
  switch (state) {
    case 'plain': {
      const stroke = isBracketed ? 'bracket' : 'plain';
      return { above: stroke, knot: null, below: stroke };
    }
    case 'holds':
      return { above: 'holds', knot: null, below: 'holds' };
    case 'fault':
      return { above: 'holds', knot: 'fault', below: 'fault' };
    case 'carried':
      return { above: 'carried', knot: null, below: 'carried' };
    case 'undecided':
      return { above: ground, knot: 'undecided', below: ground };
    case 'also-fails':
      return { above: 'carried', knot: 'also-fails', below: 'carried' };
  }
}

function tickOf(span: Span | undefined, next: Span | undefined): Stroke {
  const stroke = span?.below ?? next?.above ?? 'plain';
  return stroke === 'bracket' || stroke === 'none' ? 'plain' : stroke;
}

/**
 * The state of step k is drawn from the tick of line k-1 to the tick of line k. Words between two lines lie on the upper
 * stretch of the step that leads to the next line. `continues`: the edge runs on below the last row.
 */
export function strokesOf(rows: readonly EdgeStep[], continues = false): readonly EdgeRow[] {
  let isAfterFault = false;
  const spans = rows.map((row) => {
    if (!row.isLine || row.state === null) return undefined;
    const span = spanOf(row.state, row.isBracketed, isAfterFault);
    if (row.state === 'fault') isAfterFault = true;
    return span;
  });
  const nextLine = (index: number) => rows.findIndex((row, at) => at > index && row.isLine);
  return rows.map((row, index) => {
    const at = nextLine(index);
    const next = at < 0 ? undefined : spans[at];
    const own = spans[index];
    if (!row.isLine) {
      const through = next?.above ?? 'none';
      return {
        step: { above: through, knot: null, below: through },
        upper: through,
        lower: through,
        tick: null,
        isArm: false,
      };
    }
    return {
      step: own ?? null,
      upper: own?.below ?? 'none',
      lower: next?.above ?? (continues ? (own?.below ?? 'plain') : 'none'),
      tick: tickOf(own, next),
      isArm: row.isBracketed || (at >= 0 && rows[at]?.isBracketed === true),
    };
  });
}

/** The visible words at a step; none where nothing is to be said. */
export const STEP_WORDS: Record<StepState, string | null> = {
  plain: null,
  holds: null,
  fault: 'first fault',
  carried: 'carried',
  undecided: 'undecided',
  'also-fails': 'also fails',
};

/** What a screen reader says of a step. */
export const SPOKEN_STATES: Record<StepState, string> = {
  plain: '',
  holds: 'holds',
  fault: 'first fault',
  carried: 'carried',
  undecided: 'undecided',
  'also-fails': 'also fails',
};
