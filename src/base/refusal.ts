/**
 * What a function below the language returns instead of an answer: a reason in words, without a place in a text.
 * The engine turns it into a problem at the statement that asked, or into a result without a number.
 */
export interface Refusal {
  readonly kind: 'refusal';
  readonly code: string;
  readonly reason: string;
}

/** Makes a refusal; `code` is stable and kebab-case, `reason` one sentence with the actual names and numbers. */
export function refuse(code: string, reason: string): Refusal {
  return { kind: 'refusal', code, reason };
}

/** Whether an answer is a refusal. */
export function isRefusal(answer: unknown): answer is Refusal {
  return (
    typeof answer === 'object' &&
    answer !== null &&
    (answer as { kind?: unknown }).kind === 'refusal'
  );
}
