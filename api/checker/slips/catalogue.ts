import { algebraSlips } from './algebra-catalogue.ts';
import { derivativeSlips } from './derivative-slips.ts';
import { equationSlips } from './equation-slips.ts';
import { functionSlips } from './functions-catalogue.ts';
import { inequalitySlips } from './inequality-slips.ts';
import { integralSlips } from './integral-slips.ts';
import { limitSlips } from './limit-slips.ts';
import { powerSlips } from './powers-catalogue.ts';
import type { Slip } from './slip.ts';
import { solutionSlips } from './solution-slips.ts';
import { wholeSlips } from './whole-slips.ts';

/** Every slip, the most specific first; of equals the one that is listed first. */
export const allSlips: readonly Slip[] = [
  ...derivativeSlips,
  ...integralSlips,
  ...limitSlips,
  ...algebraSlips,
  ...powerSlips,
  ...functionSlips,
  ...equationSlips,
  ...solutionSlips,
  ...inequalitySlips,
  ...wholeSlips,
].sort((a, b) => b.rank - a.rank);
