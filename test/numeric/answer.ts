import { isRefusal } from '../../src/base/index.ts';
import type { Refusal } from '../../src/base/index.ts';

/** The answer of a function that does not refuse in this test. */
export function answer<T>(given: T | Refusal): T {
  if (isRefusal(given)) throw new Error(given.reason);
  return given;
}
