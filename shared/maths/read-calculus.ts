import type { Expr } from './expression.ts';
import { readExponent, readName, readScripts } from './read-arguments.ts';
import { takeDifferential } from './read-expression.ts';
import { numberOf, type Reader } from './reader.ts';

/** An integral up to and with its dx, which may stand anywhere in the integrand. */
export function readIntegral(reader: Reader): Expr {
  const { start } = reader.next();
  const [from, to] = readScripts(reader, readExponent, readExponent);
  if (!from !== !to) reader.fail(`bad-integral ${from ? '^' : '_'}`);
  const before = reader.variable;
  reader.variable = null as string | null;
  const integrand = reader.inside(readIntegrand, { ...reader.context, dx: 'ends' });
  const variable = reader.variable ?? reader.fail('bad-integral dx');
  reader.variable = before;
  return { kind: 'integral', integrand, variable, from, to, span: reader.span(start) };
}

function readIntegrand(reader: Reader): Expr {
  const { start } = reader.token;
  if (reader.atDifferential()) {
    takeDifferential(reader);
    return reader.startsFactor() ? reader.grammar.product(reader) : numberOf(reader.span(start), 1n);
  }
  const integrand = reader.grammar.sum(reader);
  if (reader.atDifferential()) takeDifferential(reader);
  return integrand;
}

/** `\sum_{k=1}^{n} ..` and `\prod`: what follows up to the next sign belongs to it. */
export function readSeries(reader: Reader): Expr {
  const { start, kind } = reader.next();
  let index = '';
  const readStart = () => {
    reader.expect('{', 'bad-series {k=1}');
    return reader.enclosed('}', () => {
      index = readName(reader);
      reader.expect('=', 'bad-series =');
      return reader.grammar.sum(reader);
    });
  };
  const [from, to] = readScripts(reader, readStart, readExponent);
  if (!from || !to) return reader.fail(`bad-series ${from ? '^' : '_'}`);
  const operation = kind === '∏' ? 'product' : 'sum';
  const body = reader.binding(index, reader.grammar.product);
  return { kind: 'series', operation, index, from, to, body, span: reader.span(start) };
}

/** `\lim_{x\to a^+} ..`: what follows up to the next sign belongs to it. */
export function readLimit(reader: Reader): Expr {
  const { start } = reader.next();
  if (!reader.take('_') || !reader.take('{')) reader.fail('bad-limit _{x\\to 0}');
  let variable = '';
  let side: 'both' | 'left' | 'right' = 'both';
  const readAim = () => {
    variable = readName(reader);
    reader.expect('→', 'bad-limit \\to');
    reader.context = { ...reader.context, side: 'limit' };
    const aim = reader.grammar.sum(reader);
    const found = reader.context.side;
    if (found === 'left' || found === 'right') side = found;
    return aim;
  };
  const to = reader.enclosed('}', readAim);
  const operand = reader.binding(variable, reader.grammar.product);
  return { kind: 'limit', variable, to, side, operand, span: reader.span(start) };
}
