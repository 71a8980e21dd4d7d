import type { Sign } from '../language/index.ts';
import type { Numbers } from './numbers.ts';
import { sampleBox } from './tolerance.ts';

/** The least and the largest value of a name, nominal and over the tolerances. */
export interface ValueRange {
  readonly low: number;
  readonly high: number;
}

const HOLDS: Readonly<Record<Sign, (range: ValueRange) => boolean>> = {
  positive: ({ low }) => low > 0,
  negative: ({ high }) => high < 0,
  nonnegative: ({ low }) => low >= 0,
  real: () => true,
};

/** The values of a name that contradict the sign that is stated of it, or null. */
export function signConflict(name: string, sign: Sign, numbers: Numbers): ValueRange | null {
  const range = numbers.meaning(name) ? derivedRange(name, numbers) : assumedRange(name, numbers);
  return range === null || HOLDS[sign](range) ? null : range;
}

function assumedRange(name: string, numbers: Numbers): ValueRange | null {
  const nominal = numbers.nominal(name);
  if (nominal === null) return null;
  const [low, high] = numbers.bounds(name) ?? [nominal, nominal];
  return { low, high };
}

/** A derived parameter is looked at where its spans are. */
function derivedRange(name: string, numbers: Numbers): ValueRange | null {
  const moving = numbers.inputsOf(name).filter((input) => numbers.bounds(input) !== null);
  const values = numbers.valuesOf(name, sampleBox(moving, false, numbers));
  const present = values.filter(Number.isFinite);
  return present.length === 0 ? null : { low: Math.min(...present), high: Math.max(...present) };
}
