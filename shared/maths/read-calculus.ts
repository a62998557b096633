import type { Expr, SeriesExpr } from './expression.ts';
import { readExponent, readName, unwrittenOne } from './read-arguments.ts';
import { takeDifferential } from './read-expression.ts';
import type { Reader } from './reader.ts';

/** An integral up to and with its dx, which may stand anywhere in the integrand. */
export function readIntegral(reader: Reader): Expr {
  const { start } = reader.next();
  let from: Expr | null = null;
  let to: Expr | null = null;
  while (reader.is('_') || reader.is('^')) {
    const below = reader.next().kind === '_';
    if (below ? from : to) reader.fail('extra-bracket', []);
    const bound = readExponent(reader);
    if (below) from = bound;
    else to = bound;
  }
  if ((from === null) !== (to === null)) reader.fail('bad-integral', [from ? '^' : '_']);
  const before = reader.differential;
  const context = reader.context;
  reader.differential = { variable: null };
  reader.context = { ...context, endsAtDifferential: true, holdsDifferential: false };
  reader.enter();
  const integrand = readIntegrand(reader);
  reader.leave();
  reader.context = context;
  const { variable } = reader.differential;
  reader.differential = before;
  if (variable === null) return reader.fail('bad-integral', ['dx']);
  return { kind: 'integral', integrand, variable, from, to, span: reader.span(start) };
}

function readIntegrand(reader: Reader): Expr {
  if (reader.is('letter') && reader.atDifferential()) {
    const { start } = reader.token;
    takeDifferential(reader);
    return reader.startsFactor() ? reader.grammar.product(reader) : unwrittenOne(reader, start);
  }
  const integrand = reader.grammar.sum(reader);
  if (reader.differential.variable === null) {
    if (!reader.is('letter') || !reader.atDifferential()) reader.fail('bad-integral', ['dx']);
    takeDifferential(reader);
  }
  return integrand;
}

/** `\sum_{k=1}^{n} ..` and `\prod`: what follows up to the next sign belongs to it. */
export function readSeries(reader: Reader): Expr {
  const token = reader.next();
  let index = '';
  let from: Expr | null = null;
  let to: Expr | null = null;
  while (reader.is('_') || reader.is('^')) {
    if (reader.next().kind === '^') {
      if (to) reader.fail('extra-bracket', []);
      to = readExponent(reader);
      continue;
    }
    if (from) reader.fail('extra-bracket', []);
    if (!reader.is('{')) reader.fail('bad-series', ['{k=1}']);
    from = reader.inside(() => {
      reader.next();
      index = readName(reader);
      reader.expect('=', 'bad-series', '=');
      return reader.grammar.sum(reader);
    });
    reader.expect('}', 'missing-bracket', '}');
  }
  if (!from || !to) return reader.fail('bad-series', [from ? '^' : '_']);
  const operation: SeriesExpr['operation'] = token.kind === 'prod' ? 'product' : 'sum';
  reader.enter();
  const body = reader.binding(index, () => reader.grammar.product(reader));
  reader.leave();
  return { kind: 'series', operation, index, from, to, body, span: reader.span(token.start) };
}

/** `\lim_{x\to a^+} ..`: what follows up to the next sign belongs to it. */
export function readLimit(reader: Reader): Expr {
  const { start } = reader.next();
  if (!reader.take('_') || !reader.is('{')) return reader.fail('bad-limit', ['_{x\\to 0}']);
  let variable = '';
  let side: 'both' | 'left' | 'right' = 'both';
  const to = reader.inside(() => {
    reader.next();
    variable = readName(reader);
    reader.expect('to', 'bad-limit', '\\to');
    reader.context = { ...reader.context, side: 'limit' };
    const value = reader.grammar.sum(reader);
    if (reader.context.side === 'left' || reader.context.side === 'right') side = reader.context.side;
    return value;
  });
  reader.expect('}', 'missing-bracket', '}');
  reader.enter();
  const operand = reader.binding(variable, () => reader.grammar.product(reader));
  reader.leave();
  return { kind: 'limit', variable, to, side, operand, span: reader.span(start) };
}
