import type { Fix, Span } from '../base/index.ts';
import { bracketing } from './fixes.ts';

/** The two readings of `a/b c`, `a/b*c` or `a/b/c`, by the places of their parts. */
export interface SolidusReadings {
  /** `a`. */
  readonly numerator: Span;
  /** `b`, the first factor after the solidus. */
  readonly divisor: Span;
  /** `b c`, all that may belong under the solidus. */
  readonly rest: Span;
}

/**
 * The fixes for an expression that goes on after a solidus: brackets around the quotient, or around all that follows.
 *
 * Source: ISO 80000-2:2019, "Quantities and units, Part 2: Mathematics", rule on the solidus.
 */
export function solidusFixes(readings: SolidusReadings, source: string): readonly Fix[] {
  const { numerator, divisor, rest } = readings;
  const quotient = { from: numerator.from, to: divisor.to };
  const text = (from: number, to: number): string => source.slice(from, to);
  const over = text(numerator.from, rest.from);
  return [
    bracketing(
      quotient,
      `write \`(${text(quotient.from, quotient.to)})${text(divisor.to, rest.to)}\``,
    ),
    bracketing(rest, `write \`${over}(${text(rest.from, rest.to)})\``),
  ];
}

/** The sentence that goes with {@link solidusFixes}. */
export function solidusMessage(readings: SolidusReadings, source: string): string {
  const shown = source.slice(readings.numerator.from, readings.rest.to);
  return `\`${shown}\` can be read in two ways: what follows a solidus needs brackets (ISO 80000-2).`;
}
