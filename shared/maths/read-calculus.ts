import type { Expr, LimitExpr } from './expression.ts';
import { readExponent, readName, readScripts } from './read-arguments.ts';
import { readProduct } from './read-expression.ts';
import {
  atDifferential,
  behindDifferential,
  binding,
  context,
  enclosed,
  expect,
  fail,
  integrating,
  OUTSIDE,
  span,
  sum,
  takeDifferential,
} from './reader.ts';
import type { Token } from './tokens.ts';

/** An integral up to and with its dx, which may stand anywhere in the integrand. */
export const readIntegral = ({ start: from }: Token): Expr => {
  const [lower, upper] = readScripts(readExponent, readExponent);
  if (!lower !== !upper) fail(`integral ${lower ? '^' : '_'}`);
  const [integrand, variable] = integrating(readIntegrand);
  return { kind: 'integral', integrand, variable, from: lower, to: upper, span: span(from) };
};

const readIntegrand = (): Expr => {
  if (atDifferential()) return behindDifferential(readProduct);
  const integrand = sum();
  if (atDifferential()) takeDifferential();
  return integrand;
};

/** `\sum_{k=1}^{n} ..` and `\prod`: what follows up to the next sign belongs to it. */
export const readSeries = ({ start: from, text }: Token): Expr => {
  let index = '';
  const readStart = () => {
    expect('{', 'series {k=1}');
    return enclosed('}', () => {
      index = readName();
      expect('=', 'series =');
      return sum();
    });
  };
  const [lower, upper] = readScripts(readStart, readExponent);
  if (!lower || !upper) return fail(`series ${lower ? '^' : '_'}`);
  const operation = text === 'product' ? text : 'sum';
  return {
    kind: 'series',
    operation,
    index,
    from: lower,
    to: upper,
    body: binding(index, readProduct),
    span: span(from),
  };
};

/** `\lim_{x\to a^+} ..`: what follows up to the next sign belongs to it. */
export const readLimit = ({ start: from }: Token): Expr => {
  expect('_', 'limit');
  expect('{', 'limit');
  let variable = '';
  let side: LimitExpr['side'] = 'both';
  const readAim = () => {
    variable = readName();
    expect('→', 'to');
    const aim = sum();
    const found = context.side;
    if (found === 'left' || found === 'right') side = found;
    return aim;
  };
  const to = enclosed('}', readAim, { ...OUTSIDE, side: 'limit' });
  return { kind: 'limit', variable, to, side, operand: binding(variable, readProduct), span: span(from) };
};
