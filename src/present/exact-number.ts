import { rational } from '../algebra/index.ts';
import { invariant } from '../base/index.ts';
import { ONE, type Written } from './written.ts';

/** Integers below this are always written in full. */
const LONG_INTEGER = 1_000_000n;

/**
 * The numerator and denominator of a positive exact number n/d as they are written: digits over digits, or one decimal
 * where that is shorter (`1/2`, but `0.1` and `1.2e-6`).
 */
export function writeNumber(n: bigint, d: bigint): { num: Written; den: Written } {
  const num = numberForm(integerText(n));
  if (d === 1n) return { num, den: ONE };
  const den = numberForm(integerText(d));
  const decimal = decimalText(n, d);
  const fraction = `${integerText(n)}/${integerText(d)}`;
  if (decimal === null || decimal.length >= fraction.length) return { num, den };
  return { num: numberForm(decimal), den: ONE };
}

/** Whether an exact number n/d is a terminating decimal. */
export function isDecimalOver(n: bigint, d: bigint): boolean {
  return decimalText(n < 0n ? -n : n, d) !== null;
}

/** A positive exact number n/d that is a terminating decimal, as one. */
export function decimalOver(n: bigint, d: bigint): Written {
  const text = decimalText(n, d);
  invariant(text !== null, `${n}/${d} is no terminating decimal`);
  return numberForm(text);
}

function numberForm(text: string): Written {
  return { kind: 'number', text };
}

function integerText(n: bigint): string {
  const digits = n.toString();
  if (n < LONG_INTEGER) return digits;
  const exponential = exponentialText(digits, 0);
  return exponential.length < digits.length ? exponential : digits;
}

/** The terminating decimal of n/d, fixed or with an exponent, whichever is shorter; null if it does not terminate. */
function decimalText(n: bigint, d: bigint): string | null {
  if (n % d === 0n) return integerText(n / d);
  const places = decimalPlaces(rational(n, d).d);
  if (places === null) return null;
  const digits = ((n * 10n ** BigInt(places)) / d).toString();
  const padded = digits.padStart(places + 1, '0');
  const point = padded.length - places;
  const fixed = `${padded.slice(0, point)}.${padded.slice(point)}`;
  const exponential = exponentialText(digits, -places);
  return exponential.length < fixed.length ? exponential : fixed;
}

/** How many decimals 1/d has: the larger exponent of 2 and 5 in d; null if d has another prime factor. */
function decimalPlaces(d: bigint): number | null {
  let rest = d;
  let twos = 0;
  let fives = 0;
  for (; rest % 2n === 0n; rest /= 2n) twos += 1;
  for (; rest % 5n === 0n; rest /= 5n) fives += 1;
  return rest === 1n ? Math.max(twos, fives) : null;
}

/** digits · 10^power in the form 1.25e-6. */
function exponentialText(digits: string, power: number): string {
  const significant = digits.replace(/0+$/, '');
  const rest = significant.slice(1);
  return `${significant[0]}${rest ? `.${rest}` : ''}e${power + digits.length - 1}`;
}
