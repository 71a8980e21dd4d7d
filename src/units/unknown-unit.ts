import { refuse } from '../base/index.ts';
import type { Refusal } from '../base/index.ts';
import { findSymbol, PREFIXES, SYMBOLS } from './unit-symbols.ts';

/** Words and habits that no rule finds, with the unit they stand for. */
const HABITS: ReadonlyMap<string, string> = new Map([
  ['in', 'inch'],
  ['sec', 's'],
  ['secs', 's'],
  ['second', 's'],
  ['seconds', 's'],
  ['hr', 'h'],
  ['hour', 'h'],
  ['hours', 'h'],
  ['minute', 'min'],
  ['minutes', 'min'],
  ['day', 'd'],
  ['degree', 'deg'],
  ['degrees', 'deg'],
  ['radian', 'rad'],
  ['radians', 'rad'],
  ['metre', 'm'],
  ['meter', 'm'],
  ['metres', 'm'],
  ['meters', 'm'],
  ['gram', 'g'],
  ['newton', 'N'],
  ['volt', 'V'],
  ['volts', 'V'],
  ['amp', 'A'],
  ['amps', 'A'],
  ['watt', 'W'],
  ['watts', 'W'],
  ['percent', '%'],
  ['cc', 'cm^3'],
  ['cycle', 'Hz'],
  ['cycles', 'Hz'],
  ['feet', 'ft'],
  ['inches', 'inch'],
]);

/** The refusal of an unknown symbol, with the unit that was likely meant where there is one. */
export function unknownUnit(text: string, custom?: ReadonlyMap<string, unknown>): Refusal {
  const likely = likelyUnit(text, custom);
  const advice = likely === null ? '' : `; did you mean ${likely}?`;
  return refuse('unit-unknown', `'${text}' is not a unit${advice}`);
}

function likelyUnit(text: string, custom?: ReadonlyMap<string, unknown>): string | null {
  return (
    HABITS.get(text.toLowerCase()) ??
    capitalKilo(text) ??
    gluedPower(text) ??
    gluedProduct(text) ??
    otherCase(text, custom)
  );
}

/** `KHz` for kHz. */
function capitalKilo(text: string): string | null {
  const small = text.replace(/^K/, 'k');
  return small !== text && findSymbol(small) ? small : null;
}

/** `m2` for m^2. */
function gluedPower(text: string): string | null {
  const [, symbol = '', power] = /^(\D+)(\d+)$/.exec(text) ?? [];
  const base = findSymbol(symbol) ? symbol : gluedProduct(symbol);
  return power && base ? `${base}^${power}` : null;
}

/** `Nm` for N m. The longest first symbol wins: `kNm` is kN m. */
function gluedProduct(text: string): string | null {
  for (let cut = text.length - 1; cut > 0; cut--) {
    const [first, second] = [text.slice(0, cut), text.slice(cut)];
    if (findSymbol(first) && findSymbol(second)) return `${first} ${second}`;
  }
  return null;
}

/** `KHz` for kHz, `hz` for Hz: the symbol that differs in case only. */
function otherCase(text: string, custom?: ReadonlyMap<string, unknown>): string | null {
  const lower = text.toLowerCase();
  const known = [...(custom?.keys() ?? []), ...SYMBOLS.keys()];
  const whole = known.find((symbol) => symbol.toLowerCase() === lower);
  if (whole) return whole;
  for (const unit of SYMBOLS.values()) {
    if (!unit.prefixed || !lower.endsWith(unit.symbol.toLowerCase())) continue;
    const lead = text.slice(0, text.length - unit.symbol.length);
    const prefix = PREFIXES.has(lead) ? lead : [lead.toLowerCase()].find((p) => PREFIXES.has(p));
    if (prefix) return prefix + unit.symbol;
  }
  return null;
}
