import { describe, expect, it } from 'vitest';
import { askNerdamer } from '../../../api/checker/suggest/ask-nerdamer.ts';

const asked = Array.from({ length: 8 }, (_, k) => k + 1).flatMap((k) => [
  `expand((x+${k})^2-(x-${k})*(${k}*x+1))`,
  `factor(x^2+${2 * k + 1}*x+${k * (k + 1)})`,
  `expand((${k}*y-1)^3/(y+${k}))`,
  `factor(${k}*x^3-${k}*x)`,
  `integrate(x^${(k % 3) + 1}*sin(${k}*x), x)`,
  `integrate(x*e^(${k}*x+1), x)`,
]);
/** What leaves something behind in the library: functions, values, errors. */
const disturbing = ['f(x):=x^2', 'x:=5', '((', 'expand(1/0)', 'solve(x^2=1,x)', 'factor(x^9-y)'];

describe('the library that suggests forms', { timeout: 120_000 }, () => {
  it('answers the same in any order, whatever it was asked and failed at in between', () => {
    const first = asked.map(askNerdamer);
    const again = asked.toReversed().map((command, k) => {
      askNerdamer(disturbing[k % disturbing.length] as string);
      return askNerdamer(command);
    });
    expect(again.reverse()).toEqual(first);
    expect(first.filter((answer) => answer !== null).length).toBeGreaterThan(40);
  });
});
