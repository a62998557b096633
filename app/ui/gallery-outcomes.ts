import type { SureOutcome } from './how-sure.tsx';

/** An example of a chart's numbers; the product's own formula lives with its noun. */
export function exampleOutcomes(place: number): readonly SureOutcome[] {
  const s = place / 10;
  const gain = 110 * (2 * s - s * s);
  return [
    { label: 'This step is it', points: gain },
    { label: 'Another step is it', points: gain - 200 * s * (1 - s) - 200 * s * s },
    { label: 'There is no fault', points: gain * 0.5 - 200 * s * (1 - s) - 200 * s * s },
  ];
}
