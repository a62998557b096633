import { checkDerivation } from '../../checker/rule-derivation.ts';
import type { Platform } from '../../services.ts';
import type { Checked } from '../../checker/pool.ts';

/**
 * The checker without its limits in time, so that a busy machine cannot change what the demo tells. Many of a class
 * write the same lines: what was ruled on once is not ruled on again.
 */
export function createSeedChecks(): Platform['checks'] {
  const known = new Map<string, Checked>();
  return {
    async check(input) {
      const key = JSON.stringify(input);
      const begun = performance.now();
      const verdict = known.get(key) ?? { ...checkDerivation(input), ms: performance.now() - begun, explainMs: 0 };
      known.set(key, verdict);
      return verdict;
    },
    healthy: async () => true,
  };
}
