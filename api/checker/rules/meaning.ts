import type { Expr, Line } from '../../../shared/maths/expression.ts';
import { lettersOf } from '../../../shared/maths/letters.ts';
import { childrenOf } from '../../../shared/maths/walk.ts';
import type { CheckContext } from '../context.ts';
import { charge } from '../numbers/work.ts';
import { exprsOfStatement, toStatement, type Statement } from '../statements/statement.ts';
import { lowerAll } from '../values/lower.ts';

/** What a line leaves for the step that starts from it. */
export type Meaning =
  | {
      readonly kind: 'expression';
      readonly expr: Expr;
      /** What the expression was before it was rounded. */
      readonly exact?: Expr;
      /** Whether it is not known that the author goes on from here. */
      readonly isUnsure?: boolean;
    }
  | {
      readonly kind: 'statement';
      readonly statement: Statement;
      /** What a line that begins with a relation sign goes on from. */
      readonly last: Expr | null;
    };

/** The meaning of a line by itself; null for a definition and for a line that continues another. */
export function meaningOf(line: Line): Meaning | null {
  if (line.kind === 'expression') return { kind: 'expression', expr: line.expr };
  const statement = toStatement(line);
  return statement && { kind: 'statement', statement, last: lastMember(line) };
}

function lastMember(line: Line): Expr | null {
  if (line.kind === 'relation') return line.right;
  return line.kind === 'chain' ? (line.members[line.members.length - 1] ?? null) : null;
}

/** What is known is asked for its letters at every step of a derivation. */
const plainKnown = new WeakMap<Statement, readonly string[] | null>();

/** The letters of a statement in which each stands for itself; null for another. */
function plainLetters(statement: Statement): readonly string[] | null {
  const known = plainKnown.get(statement);
  if (known !== undefined) return known;
  const exprs = exprsOfStatement(statement);
  const found = exprs.every(isPlain) ? [...new Set(exprs.flatMap((expr) => lettersOf(expr)))] : null;
  plainKnown.set(statement, found);
  return found;
}

/** The letters that a statement depends on once definitions are put in, in order of appearance. */
export function freeLetters(statement: Statement, context: CheckContext): readonly string[] {
  const plain = context.definitions.letters.size === 0 ? plainLetters(statement) : null;
  if (plain) return plain;
  const { builder } = lowerAll(exprsOfStatement(statement), context);
  return [...new Set(builder.nodes.flatMap((node) => (node.op === 'letter' ? [node.name] : [])))];
}

const plainKinds: ReadonlySet<Expr['kind']> = new Set([
  'number',
  'letter',
  'constant',
  'sum',
  'product',
  'quotient',
  'power',
  'root',
  'call',
  'log',
  'matrix',
]);

/** Without anything that has letters of its own or stands for something else. */
function isPlain(expr: Expr): boolean {
  // What was put into each other many times is small as a graph and endless as a tree.
  charge(0.4);
  return plainKinds.has(expr.kind) && childrenOf(expr).every(isPlain);
}
