import { ticks } from 'd3';

export interface Tick {
  readonly value: number;
  readonly text: string;
}

/** Round values within a domain with the fewest digits that tell them apart; minus signs are typographic. */
export function ticksOver(domain: readonly [number, number], count: number): readonly Tick[] {
  const values = ticks(domain[0], domain[1], count);
  const step =
    values.length > 1 ? Math.abs(values[1] - values[0]) : Math.abs(domain[1] - domain[0]);
  const largest = Math.max(...values.map(Math.abs), step);
  const decade = Math.floor(Math.log10(largest));
  const scaled = decade >= 5 || decade < -3;
  return values.map((value) => ({
    value,
    text: scaled ? powerText(value, step, decade) : fixedText(value, step),
  }));
}

/** A value beside a step, with no more decimals than the step needs. */
function fixedText(value: number, step: number): string {
  const decimals = Math.max(0, Math.min(20, -Math.floor(Math.log10(step) + 1e-9)));
  const text = Math.abs(value).toFixed(decimals);
  return value < 0 && Number(text) !== 0 ? `−${text}` : text;
}

function powerText(value: number, step: number, decade: number): string {
  if (value === 0) return '0';
  const mantissa = fixedText(value / 10 ** decade, step / 10 ** decade);
  return `${mantissa}·10${superscript(decade)}`;
}

const SUPERSCRIPTS: Readonly<Record<string, string>> = Object.fromEntries(
  [...'-0123456789'].map((digit, i) => [digit, [...'⁻⁰¹²³⁴⁵⁶⁷⁸⁹'][i]]),
);

function superscript(n: number): string {
  return [...String(n)].map((digit) => SUPERSCRIPTS[digit]).join('');
}
