/** Thrown when a computation has spent its work budget; the engine's one boundary turns it into a problem. */
export class BudgetExceeded extends Error {
  constructor(
    readonly step: string,
    readonly size: string,
  ) {
    super(`${step} was stopped at ${size}`);
    this.name = 'BudgetExceeded';
  }
}

/**
 * A bound on work, counted in elementary steps (about one coefficient operation each), never in time, so that
 * a result does not depend on the machine. Symbolic loops spend from it.
 */
export class Budget {
  private left: number;

  constructor(readonly limit: number) {
    this.left = limit;
  }

  /** Spends `amount`; past the limit it throws, naming the step and the size reached. */
  spend(
    amount: number,
    step: string,
    size: string | (() => string) = `${this.limit} operations`,
  ): void {
    this.left -= amount;
    if (this.left < 0) throw new BudgetExceeded(step, typeof size === 'string' ? size : size());
  }

  /** Work spent so far. */
  get spent(): number {
    return this.limit - this.left;
  }
}

/** The budget of the result that is being computed; computations are synchronous, so there is one at a time. */
let current: Budget | undefined;

/** Runs a computation whose every step spends from the budget, however deep it is. */
export function withinBudget<T>(budget: Budget, compute: () => T): T {
  const outer = current;
  current = budget;
  try {
    return compute();
  } finally {
    current = outer;
  }
}

/** The budget of the result being computed, if there is one. */
export function currentBudget(): Budget | undefined {
  return current;
}

/** Spends from the budget given, or from that of the result being computed. */
export function spend(
  budget: Budget | undefined,
  amount: number,
  step: string,
  size?: string | (() => string),
): void {
  (budget ?? current)?.spend(amount, step, size);
}

/** The budget of one symbolic result unless something else is said: a second or two of work. */
export const DEFAULT_BUDGET = 5_000_000;
