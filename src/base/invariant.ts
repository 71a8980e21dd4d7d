/** Thrown when the program contradicts itself: our bug, never the user's mistake. */
export class InvariantError extends Error {
  constructor(message: string) {
    super(`internal error: ${message}`);
    this.name = 'InvariantError';
  }
}

/** Throws an {@link InvariantError} unless the condition holds. */
export function invariant(condition: unknown, message: string): asserts condition {
  if (!condition) throw new InvariantError(message);
}
