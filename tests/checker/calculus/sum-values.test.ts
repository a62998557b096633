import { expect, it } from 'vitest';
import { reduceCalculus } from '../../../api/checker/calculus/reduce.ts';
import { scopeOf } from '../../../api/checker/calculus/scope.ts';
import { createContext } from '../../../api/checker/context.ts';
import { ballToNumber } from '../../../api/checker/numbers/ball.ts';
import { isKnown, toBall } from '../../../api/checker/values/arithmetic.ts';
import { evaluate } from '../../../api/checker/values/evaluate.ts';
import { readLine } from '../../../shared/maths/read.ts';
import sumValues from './sum-values.json';

const bits = 128;

it.each(sumValues.map(({ tex, value }) => [tex, value] as const))('%s is %s, as mpmath sums it', (tex, value) => {
  const reading = readLine(tex, { numbers: 'real', decimal: 'point', functions: [] });
  if (!reading.ok || reading.line.kind !== 'expression') throw new Error('not read');
  const context = createContext({ calculus: scopeOf([reading.line], false), reduceCalculus });
  const closed = reduceCalculus(reading.line.expr, context);
  const worth = closed && evaluate(closed, new Map(), bits, context);
  expect(worth && isKnown(worth) ? ballToNumber(toBall(worth, bits).re, bits) : null).toBeCloseTo(Number(value), 10);
});
