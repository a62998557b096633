import type { CheckContext } from '../context.ts';
import { compareAt } from './agreement.ts';
import type { Comparison } from './comparison.ts';
import { confirmAt } from './confirm.ts';
import { provesIdentity } from './kernel-identity.ts';
import type { Pair } from './pair.ts';
import { provesEqualConstants } from './separation.ts';
import { witnessAt } from './witness.ts';

const nowhere = new Map<string, never>();
const ladder = [160, 420, 1_300, 3_000] as const;

/** Two numbers. */
export function compareConstants(pair: Pair, context: CheckContext): Comparison {
  const result = compareAt(pair, nowhere, context, ladder);
  const { above, below } = result.values;
  switch (result.agreement) {
    case 'apart': {
      const witness = witnessAt(pair, nowhere, result.bits, context);
      return witness === null ? { kind: 'undecided', reason: 'not-settled' } : { kind: 'different', witness };
    }
    case 'same': {
      const exact = pair.above === pair.below || (above.kind !== 'ball' && above.kind === below.kind);
      if (exact || provesIdentity(pair, context) || provesEqualConstants(pair, context)) return equal('proved');
      return confirmSampled(pair, context);
    }
    case 'above-only':
      return { kind: 'meaningless' };
    case 'below-only':
    case 'neither':
      return { kind: 'undecided', reason: 'no-domain' };
    case 'blurred':
      // Two numbers around zero that no precision tells apart from it.
      return provesIdentity(pair, context) || provesEqualConstants(pair, context)
        ? equal('proved')
        : { kind: 'undecided', reason: 'not-settled' };
    case 'limit':
      // Numbers too long to write out may still be the same by their residues.
      return pair.above !== pair.below && provesIdentity(pair, context)
        ? equal('proved')
        : { kind: 'undecided', reason: 'limit' };
    default:
      return { kind: 'undecided', reason: result.agreement };
  }
}

function equal(reached: 'proved' | 'sampled'): Comparison {
  return { kind: 'equal', reached, excluded: [], cancelled: [] };
}

/** Numbers without a proof have to agree to several hundred digits. */
function confirmSampled(pair: Pair, context: CheckContext): Comparison {
  const fine = confirmAt(pair, nowhere, context);
  if (fine?.agreement === 'same') return equal('sampled');
  const witness = fine?.agreement === 'apart' ? witnessAt(pair, nowhere, fine.bits, context) : null;
  return witness === null ? { kind: 'undecided', reason: 'not-settled' } : { kind: 'different', witness };
}
