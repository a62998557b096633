/** In whole parts of an operation, so that sums of work are exact and never depend on what was done before. */
const parts = 16;
/** No single piece of work is allowed as much; what is counted stays exact. */
const mostParts = 2 ** 36;

let done = 0;
let end = Infinity;

/** Thrown when no work is left; caught where a step begins, which is then undecided. */
export class BudgetSpent extends Error {
  constructor() {
    super('the operations allowed for this step are spent');
    this.name = 'BudgetSpent';
  }
}

/** Counts work, wherever it is done. One operation is about one multiplication of two numbers of 192 bits. */
export function charge(operations: number): void {
  const next = done + Math.min(mostParts, Math.ceil(operations * parts));
  if (next <= end) {
    done = next;
    return;
  }
  // What is refused is not done; all that was left goes with it, so that nothing else is begun.
  done = end;
  throw new BudgetSpent();
}

/** All work that was counted since the process began: differences tell what something took. */
export function workDone(): number {
  return done / parts;
}

/** Does something that may take so many operations and no more, whatever budgets are made on the way. */
export function within<T>(operations: number, work: () => T): T {
  const outer = end;
  end = Math.min(outer, done + operations * parts);
  try {
    return work();
  } finally {
    end = outer;
  }
}

/** Counts a product of so many bits, or an operation on numbers of that length; short ones are free. */
export function chargeProduct(bits: number): void {
  charge(costOfProduct(bits));
}

/**
 * A product of two numbers of half as many bits: below the square of the length, for long ones are cut into parts. Its
 * power 1.5 is a square root, which is quick and the same everywhere.
 */
export function costOfProduct(bits: number): number {
  const words = bits / 64;
  return bits > 0 ? (words * Math.sqrt(words)) / 240 : 0;
}
