import type { Line } from '../../../shared/maths/expression.ts';
import type { UndecidedReason } from '../../../shared/schemas/verdict.ts';
import type { KnownValue } from '../values/value.ts';

/** A condition that a line needs: as TeX for people, and as a line that can join the assumptions. */
export interface Condition {
  readonly tex: string;
  readonly line: Line;
}

export interface Witness {
  /** Values of the letters, exact. */
  readonly at: ReadonlyMap<string, KnownValue>;
  readonly atTex: Readonly<Record<string, string>>;
  /** What each line is worth there, exact or in decimals, as TeX. */
  readonly above: string;
  readonly below: string;
}

/** How two expressions compare where both have a value (rule 1 of the checker). */
export type Comparison =
  | {
      readonly kind: 'equal';
      readonly reached: 'proved' | 'sampled';
      /** Needed by the line below where the line above has a value: D shrinks to these. */
      readonly excluded: readonly Condition[];
      /** Needed by the line above only: what a cancelled factor took with it. D stays. */
      readonly cancelled: readonly Condition[];
    }
  | { readonly kind: 'different'; readonly witness: Witness }
  | { readonly kind: 'nothing-in-common' }
  /** The line below has no value anywhere. */
  | { readonly kind: 'meaningless' }
  | { readonly kind: 'undecided'; readonly reason: UndecidedReason };
