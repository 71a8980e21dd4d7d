/**
 * The one of several constraints that contradicts the others: without it they agree. Where more than one would do, the
 * last, since a reader holds the earlier ones for true; null where no single one is at fault.
 *
 * @param errorsWithout counts the contradictions among the constraints but one.
 */
export function culpritOf<Constraint>(
  constraints: readonly Constraint[],
  errorsWithout: (left: Constraint) => number,
): Constraint | null {
  return constraints.filter((constraint) => errorsWithout(constraint) === 0).at(-1) ?? null;
}
