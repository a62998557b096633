import type { Expr } from './expression.ts';
import { readExponent, readName, readScripts } from './read-arguments.ts';
import { readProduct } from './read-expression.ts';
import {
  atDifferential,
  binding,
  context,
  enclosed,
  expect,
  fail,
  integrating,
  numberOf,
  OUTSIDE,
  span,
  start,
  startsFactor,
  sum,
  takeDifferential,
} from './reader.ts';
import type { Token } from './tokens.ts';

/** An integral up to and with its dx, which may stand anywhere in the integrand. */
export function readIntegral({ start: from }: Token): Expr {
  const [lower, upper] = readScripts(readExponent, readExponent);
  if (!lower !== !upper) fail(`bad-integral ${lower ? '^' : '_'}`);
  const [integrand, variable] = integrating(readIntegrand);
  return { kind: 'integral', integrand, variable, from: lower, to: upper, span: span(from) };
}

function readIntegrand(): Expr {
  const from = start;
  if (atDifferential()) {
    takeDifferential();
    return startsFactor() ? readProduct() : numberOf(span(from), 1n);
  }
  const integrand = sum();
  if (atDifferential()) takeDifferential();
  return integrand;
}

/** `\sum_{k=1}^{n} ..` and `\prod`: what follows up to the next sign belongs to it. */
export function readSeries({ start: from, kind }: Token): Expr {
  let index = '';
  const readStart = () => {
    expect('{', 'bad-series {k=1}');
    return enclosed('}', () => {
      index = readName();
      expect('=', 'bad-series =');
      return sum();
    });
  };
  const [lower, upper] = readScripts(readStart, readExponent);
  if (!lower || !upper) return fail(`bad-series ${lower ? '^' : '_'}`);
  const operation = kind === '∏' ? 'product' : 'sum';
  const body = binding(index, readProduct);
  return { kind: 'series', operation, index, from: lower, to: upper, body, span: span(from) };
}

/** `\lim_{x\to a^+} ..`: what follows up to the next sign belongs to it. */
export function readLimit({ start: from }: Token): Expr {
  expect('_', 'bad-limit _{x\\to 0}');
  expect('{', 'bad-limit _{x\\to 0}');
  let variable = '';
  let side: 'both' | 'left' | 'right' = 'both';
  const readAim = () => {
    variable = readName();
    expect('→', 'bad-limit \\to');
    const aim = sum();
    const found = context.side;
    if (found === 'left' || found === 'right') side = found;
    return aim;
  };
  const to = enclosed('}', readAim, { ...OUTSIDE, side: 'limit' });
  const operand = binding(variable, readProduct);
  return { kind: 'limit', variable, to, side, operand, span: span(from) };
}
