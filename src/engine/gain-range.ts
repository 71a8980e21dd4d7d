/** Leading digits of the round numbers that an axis may end at. */
const ROUND = [1, 2, 5, 10];

/**
 * The range over which a gain is drawn that no `tune` gives one: from 0 to the first round number (1, 2 or 5 times a power
 * of ten) from twice its value on, so that small changes of the value leave the axis alone. Null for 0.
 */
export function rangeAround(value: number): readonly [number, number] | null {
  if (value === 0 || !Number.isFinite(value)) return null;
  const twice = 2 * Math.abs(value);
  const decade = 10 ** Math.floor(Math.log10(twice));
  const digit = ROUND.find((candidate) => candidate * decade >= twice * (1 - 1e-9)) ?? 10;
  const end = Number((digit * decade).toPrecision(12));
  return value > 0 ? [0, end] : [-end, 0];
}
