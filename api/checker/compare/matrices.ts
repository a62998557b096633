import type { Expr, ProductExpr, Span, Term } from '../../../shared/maths/expression.ts';
import { childrenOf, mapChildren } from '../../../shared/maths/walk.ts';

/** A matrix of expressions; a vector has one row or one column. */
export type Entries = readonly (readonly Expr[])[];

/** An expression with every operation on matrices carried out: an ordinary expression, or a matrix of them. */
export type Resolved =
  { readonly kind: 'scalar'; readonly expr: Expr } | { readonly kind: 'matrix'; readonly rows: Entries };

const nowhere: Span = { start: 0, end: 0 };
const largestInverse = 4;
const largestPower = 12;

export function holdsMatrix(expr: Expr): boolean {
  return expr.kind === 'matrix' || childrenOf(expr).some(holdsMatrix);
}

/** Null where the sizes do not fit or an operation is not known for matrices. */
export function resolveMatrices(expr: Expr): Resolved | null {
  if (!holdsMatrix(expr)) return { kind: 'scalar', expr };
  switch (expr.kind) {
    case 'matrix':
      return resolveRows(expr.rows);
    case 'sum':
      return resolveSum(expr.terms);
    case 'product':
      return resolveProduct(expr);
    case 'quotient': {
      const top = resolveMatrices(expr.numerator);
      const bottom = resolveMatrices(expr.denominator);
      if (top === null || bottom?.kind !== 'scalar') return null;
      return mapEntries(top, (entry) => ({ ...expr, numerator: entry, denominator: bottom.expr }));
    }
    case 'power':
      return resolvePower(expr.base, expr.exponent);
    case 'call':
      return resolveCall(expr);
    default:
      return resolveInside(expr);
  }
}

function resolveRows(rows: Entries): Resolved | null {
  const resolved: Expr[][] = [];
  for (const row of rows) {
    const entries = row.map(resolveMatrices);
    if (entries.some((entry) => entry?.kind !== 'scalar')) return null;
    resolved.push(entries.flatMap((entry) => (entry?.kind === 'scalar' ? [entry.expr] : [])));
  }
  return { kind: 'matrix', rows: resolved };
}

function mapEntries(value: Resolved, change: (entry: Expr) => Expr): Resolved {
  if (value.kind === 'scalar') return { kind: 'scalar', expr: change(value.expr) };
  return { kind: 'matrix', rows: value.rows.map((row) => row.map(change)) };
}

function signed(sign: Term['sign'], expr: Expr): Term {
  return { sign, expr, span: nowhere };
}

function sumOf(terms: readonly Term[]): Expr {
  return { kind: 'sum', terms, span: nowhere };
}

function productOf(factors: readonly Expr[]): Expr {
  return { kind: 'product', factors, joins: factors.slice(1).map(() => 'implicit' as const), span: nowhere };
}

function resolveSum(terms: readonly Term[]): Resolved | null {
  const parts: { sign: Term['sign']; value: Resolved }[] = [];
  for (const term of terms) {
    const value = resolveMatrices(term.expr);
    if (value === null) return null;
    parts.push({ sign: term.sign, value });
  }
  const matrices = parts.flatMap(({ sign, value }) => (value.kind === 'matrix' ? [{ sign, rows: value.rows }] : []));
  const [first] = matrices;
  if (first === undefined) {
    return {
      kind: 'scalar',
      expr: sumOf(parts.flatMap(({ sign, value }) => (value.kind === 'scalar' ? [signed(sign, value.expr)] : []))),
    };
  }
  if (matrices.length !== parts.length || !matrices.every(({ rows }) => sameSize(rows, first.rows))) return null;
  const rows = first.rows.map((row, i) =>
    row.map((entry, j) => sumOf(matrices.map((m) => signed(m.sign, m.rows[i]?.[j] ?? entry)))),
  );
  return { kind: 'matrix', rows };
}

export function sameSize(a: Entries, b: Entries): boolean {
  return a.length === b.length && a[0]?.length === b[0]?.length;
}

function resolveProduct(expr: ProductExpr): Resolved | null {
  let total: Resolved | null = null;
  for (const [k, factor] of expr.factors.entries()) {
    const value = resolveMatrices(factor);
    if (value === null) return null;
    total = total === null ? value : multiply(total, value, expr.joins[k - 1] ?? 'implicit');
    if (total === null) return null;
  }
  return total;
}

function multiply(a: Resolved, b: Resolved, join: ProductExpr['joins'][number]): Resolved | null {
  if (a.kind === 'scalar') return mapEntries(b, (entry) => productOf([a.expr, entry]));
  if (b.kind === 'scalar') return mapEntries(a, (entry) => productOf([entry, b.expr]));
  const [u, v] = [vectorOf(a.rows), vectorOf(b.rows)];
  if (u !== null && v !== null && sameSize(a.rows, b.rows)) {
    if (join === 'dot') return { kind: 'scalar', expr: dot(u, v) };
    return join === 'times' ? cross(u, v, a.rows.length === 1) : null;
  }
  return multiplyRows(a.rows, b.rows);
}

function vectorOf(rows: Entries): readonly Expr[] | null {
  if (rows.length === 1) return rows[0] ?? null;
  return rows.every((row) => row.length === 1) ? rows.flat() : null;
}

function dot(u: readonly Expr[], v: readonly Expr[]): Expr {
  return sumOf(u.flatMap((entry, k) => (v[k] === undefined ? [] : [signed('plus', productOf([entry, v[k]]))])));
}

function cross(u: readonly Expr[], v: readonly Expr[], asRow: boolean): Resolved | null {
  const [a, b, c] = u;
  const [d, e, f] = v;
  if (u.length !== 3 || !a || !b || !c || !d || !e || !f) return null;
  const minor = (p: Expr, q: Expr, r: Expr, s: Expr): Expr =>
    sumOf([signed('plus', productOf([p, s])), signed('minus', productOf([q, r]))]);
  const entries = [minor(b, c, e, f), minor(c, a, f, d), minor(a, b, d, e)];
  return { kind: 'matrix', rows: asRow ? [entries] : entries.map((entry) => [entry]) };
}

function multiplyRows(a: Entries, b: Entries): Resolved | null {
  if (a[0]?.length !== b.length) return null;
  const columns = transposed(b);
  return { kind: 'matrix', rows: a.map((row) => columns.map((column) => dot(row, column))) };
}

export function transposed(rows: Entries): Entries {
  return (rows[0] ?? []).map((_, j) => rows.flatMap((row) => (row[j] === undefined ? [] : [row[j]])));
}

function resolvePower(base: Expr, exponent: Expr): Resolved | null {
  const value = resolveMatrices(base);
  if (value === null) return null;
  if (value.kind === 'scalar')
    return { kind: 'scalar', expr: { kind: 'power', base: value.expr, exponent, span: nowhere } };
  if (exponent.kind === 'letter' && exponent.name === 'T') return { kind: 'matrix', rows: transposed(value.rows) };
  const n = wholeExponent(exponent);
  if (n === null || value.rows.length !== value.rows[0]?.length || Math.abs(n) > largestPower) return null;
  let result: Resolved | null = n < 0 ? inverse(value.rows) : n === 0 ? identity(value.rows.length) : value;
  const step = result;
  for (let k = 1; k < Math.abs(n) && result !== null && step !== null; k += 1)
    result = multiply(result, step, 'implicit');
  return result;
}

function wholeExponent(exponent: Expr): number | null {
  if (exponent.kind === 'number' && exponent.denominator === 1n && exponent.numerator < 1000n)
    return Number(exponent.numerator);
  if (exponent.kind !== 'sum' || exponent.terms.length !== 1) return null;
  const [term] = exponent.terms;
  const size = term === undefined ? null : wholeExponent(term.expr);
  return size === null ? null : term?.sign === 'minus' ? -size : size;
}

function whole(value: number): Expr {
  return { kind: 'number', numerator: BigInt(value), denominator: 1n, written: 'integer', decimals: 0, span: nowhere };
}

function identity(size: number): Resolved {
  return {
    kind: 'matrix',
    rows: Array.from({ length: size }, (_, i) => Array.from({ length: size }, (__, j) => whole(i === j ? 1 : 0))),
  };
}

/** The adjugate over the determinant. */
function inverse(rows: Entries): Resolved | null {
  if (rows.length > largestInverse) return null;
  const determinant = determinantOf(rows);
  const adjugate = rows.map((row, i) =>
    row.map((_, j): Expr => {
      const cofactor = rows.length === 1 ? whole(1) : determinantOf(without(rows, j, i));
      const numerator = (i + j) % 2 === 0 ? cofactor : sumOf([signed('minus', cofactor)]);
      return { kind: 'quotient', numerator, denominator: determinant, written: 'fraction', span: nowhere };
    }),
  );
  return { kind: 'matrix', rows: adjugate };
}

function without(rows: Entries, i: number, j: number): Entries {
  return rows.filter((_, row) => row !== i).map((row) => row.filter((_, column) => column !== j));
}

/** By the first row. */
function determinantOf(rows: Entries): Expr {
  const [first = []] = rows;
  if (rows.length === 1) return first[0] ?? whole(0);
  return sumOf(
    first.map((entry, j) =>
      signed(j % 2 === 0 ? 'plus' : 'minus', productOf([entry, determinantOf(without(rows, 0, j))])),
    ),
  );
}

function resolveCall(expr: Extract<Expr, { kind: 'call' }>): Resolved | null {
  const [arg] = expr.args;
  const value = arg === undefined ? null : resolveMatrices(arg);
  if (value?.kind !== 'matrix' || expr.args.length !== 1) return resolveInside(expr);
  if (expr.name === 'transpose') return { kind: 'matrix', rows: transposed(value.rows) };
  const isSquare = value.rows.length === value.rows[0]?.length;
  if (expr.name === 'det')
    return isSquare && value.rows.length <= 5 ? { kind: 'scalar', expr: determinantOf(value.rows) } : null;
  const vector = vectorOf(value.rows);
  if (expr.name !== 'abs' || vector === null) return null;
  // The length of a vector.
  return { kind: 'scalar', expr: { kind: 'root', degree: null, radicand: dot(vector, vector), span: nowhere } };
}

/** An ordinary expression with parts such as determinants in it. */
function resolveInside(expr: Expr): Resolved | null {
  let fits = true;
  const changed = mapChildren(expr, (part) => {
    const value = resolveMatrices(part);
    if (value?.kind === 'scalar') return value.expr;
    fits = false;
    return part;
  });
  return fits ? { kind: 'scalar', expr: changed } : null;
}
