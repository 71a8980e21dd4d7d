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

/** The budget of one symbolic result unless something else is said: about two seconds of work. */
export const DEFAULT_BUDGET = 20_000_000;
