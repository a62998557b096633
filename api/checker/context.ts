import type { Expr, Line } from '../../shared/maths/expression.ts';
import { BudgetSpent, charge, workDone } from './numbers/work.ts';

export { BudgetSpent };

/** A function that the derivation introduced, such as f(x)=x^2. */
export interface OwnFunction {
  readonly params: readonly string[];
  readonly value: Expr;
}

export interface Definitions {
  readonly letters: ReadonlyMap<string, Expr>;
  readonly functions: ReadonlyMap<string, OwnFunction>;
}

/** What the whole derivation says about its calculus. */
export interface CalculusScope {
  /** Letters that it takes derivatives of, as dy/dx, by the letter that they depend on. */
  readonly dependents: ReadonlyMap<string, string>;
  /** Letters under d/dx that may depend on x or not: nothing says which. */
  readonly ambiguous: ReadonlyMap<string, string>;
  /** Letters that it integrates by. */
  readonly variables: ReadonlySet<string>;
  /** Letters that play the constant of integration. */
  readonly constants: ReadonlySet<string>;
  readonly hasIntegral: boolean;
  /** Whether a missing constant is a fault. */
  readonly constantNeeded: boolean;
  /** What was carried out before in the same step. */
  readonly known: WeakMap<Definitions, WeakMap<Expr, Expr | null>>;
}

/** Everything besides the two lines that a ruling on a step depends on. */
export interface CheckContext {
  readonly numbers: 'real' | 'complex';
  readonly assumptions: readonly Line[];
  /** Letters that stand for whole numbers. */
  readonly wholeLetters: ReadonlySet<string>;
  /** Letters that stand for real numbers where the numbers are complex. */
  readonly realLetters?: ReadonlySet<string>;
  readonly definitions: Definitions;
  /** The only source of randomness, so that a ruling can be repeated. */
  readonly seed: number;
  readonly budget: Budget;
  /** Turns a derivative, integral, limit or sum into an ordinary expression, or answers null. */
  readonly calculus?: CalculusScope;
  readonly reduceCalculus?: (expr: Expr, context: CheckContext) => Expr | null;
}

/** Counts operations; a count and never a clock, so that a ruling is the same on every machine. */
export interface Budget {
  readonly spend: (operations: number) => void;
  readonly left: () => number;
}

/** All work that is done from here on counts, also that of budgets made later and that of the arithmetic itself. */
export function createBudget(operations: number): Budget {
  let end = workDone() + operations;
  return {
    spend(count) {
      if (workDone() + count > end) {
        end = -1;
        throw new BudgetSpent();
      }
      charge(count);
    },
    left: () => end - workDone(),
  };
}

export const operationsPerStep = 180_000;

const noDefinitions: Definitions = { letters: new Map(), functions: new Map() };

/** A context for the real numbers without assumptions, changed by what is given. */
export function createContext(changes: Partial<CheckContext> = {}): CheckContext {
  return {
    numbers: 'real',
    assumptions: [],
    wholeLetters: new Set(),
    definitions: noDefinitions,
    seed: 1,
    budget: createBudget(operationsPerStep),
    ...changes,
  };
}
