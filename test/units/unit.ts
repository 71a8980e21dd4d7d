import { isRefusal } from '../../src/base/index.ts';
import { parseUnit } from '../../src/units/index.ts';
import type { Unit } from '../../src/units/index.ts';

/** A unit that the test knows to be one. */
export function unit(text: string): Unit {
  const parsed = parseUnit(text);
  if (isRefusal(parsed)) throw new Error(parsed.reason);
  return parsed;
}
