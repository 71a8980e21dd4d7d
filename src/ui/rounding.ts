/**
 * Rounds a dragged number sensibly: to three significant digits, and no finer than a thousandth of the decade of its
 * range, so that dragging near zero yields 0.02 and not 0.0178.
 *
 * @param value in any unit
 * @param extent the length of the range that is dragged over, in the same unit
 */
export function roundDragged(value: number, extent: number): number {
  const finest = extent > 0 ? 10 ** (Math.floor(Math.log10(extent)) - 3) : 0;
  const ownStep = value === 0 ? 0 : 10 ** (Math.floor(Math.log10(Math.abs(value))) - 2);
  const step = Math.max(finest, ownStep);
  if (step === 0) return value;
  // The quotient rounds a number that is a whole count of steps; toPrecision drops what the binary step added.
  return Number((Math.round(value / step) * step).toPrecision(12));
}

/** The text of a number as the worksheet language reads it: `9.05`, `-0.2`, `1.2e-7`. */
export function numberText(value: number): string {
  return Object.is(value, -0) ? '0' : String(value).replace('e+', 'e');
}

/** Reads what was typed into a number field as the language would: a decimal number, or null. */
export function readNumber(text: string): string | null {
  const plain = text.trim().replace(/^[−–]/u, '-').replace(/^\+/u, '');
  return /^-?(?:\d+(?:\.\d*)?|\.\d+)(?:[eE][-+]?\d+)?$/u.test(plain) ? plain : null;
}
