import type { CheckSettings } from '../../../shared/schemas/verdict.ts';

/** A step of the large set, with the programs that its label comes from. */
export interface Step {
  readonly id: string;
  readonly topic: string;
  readonly kind: 'expression' | 'statement' | 'system' | 'formula' | 'calculus';
  readonly lines: readonly [string, string];
  readonly right: boolean;
  readonly by: readonly string[];
  readonly assume?: readonly string[];
  readonly settings?: CheckSettings;
}

export function readSteps(text: string): Step[] {
  return text
    .split('\n')
    .filter((line) => line.startsWith('{'))
    .map((line) => JSON.parse(line) as Step);
}
