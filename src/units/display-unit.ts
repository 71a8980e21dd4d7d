import { isRefusal } from '../base/index.ts';
import type { Dimension } from './dimension.ts';
import { equalDimensions } from './dimension.ts';
import type { Counted } from './dimension-text.ts';
import { dimensionText } from './dimension-text.ts';
import { multiplyRatios, ratioPower } from './ratio.ts';
import type { PrefixedSymbol } from './unit-symbols.ts';
import { findSymbol, prefixFactor } from './unit-symbols.ts';
import type { Unit, UnitScale } from './unit.ts';
import { multiplyScales, scaleOf, unitFrom, unitScale } from './unit.ts';
import type { UnitTree } from './unit-tree.ts';
import { readUnitTree, unitTreeText } from './unit-tree.ts';
import { valueIn } from './value-text.ts';

/** Prefixes that results use: powers of a thousand near 1. */
const SMALL_PREFIXES = ['m', 'µ', 'n', 'p'];
const LARGE_PREFIXES = ['k', 'M', 'G'];
/** Units that nobody writes with a prefix above 1: no kiloradians, kiloseconds, kilokelvins. */
const NEVER_LARGE = new Set(['rad', 's', 'K', 'mol', 'cd', 'L', 'l', 't', 'deg', 'arcsec']);

/**
 * The unit to show a value in.
 *
 * `hints` are the units typed in the worksheet, most wanted first; those of the same dimension, angle and cycles
 * are used, and the SI prefix is moved so that 1 ≤ |x| < 1000 where it can be. `si` is the value in coherent SI
 * units. Without a hint the unit is the coherent one, with rad and Hz where `counted` says so. Bare percent signs
 * and decibels are used only where a worksheet asks for them with `in`, never by themselves, nor is °C, since a result
 * in kelvins may be a difference.
 */
export function chooseUnit(
  dimension: Dimension,
  hints: readonly Unit[],
  si: number,
  counted: Counted = {},
): Unit {
  const { angle = 0, cycles = 0 } = counted;
  const fitting = hints.filter(
    (unit) =>
      equalDimensions(unit.dimension, dimension) &&
      unit.angle === angle &&
      unit.cycles === cycles &&
      unit.text !== '' &&
      unit.offset === '0' &&
      !unit.isPercent &&
      !unit.logarithmic,
  );
  const typed = fitting.find((unit) => readsWell(si, unit));
  if (typed) return typed;
  const candidates = fitting.length > 0 ? fitting : [coherentUnit(dimension, { angle, cycles })];
  const moved = candidates.map((unit) => movePrefix(unit, si));
  return moved.find((unit) => readsWell(si, unit)) ?? moved[0]!;
}

function readsWell(si: number, unit: Unit): boolean {
  const shown = Math.abs(shownIn(si, unit));
  return !Number.isFinite(si) || si === 0 || (shown >= 1 && shown < 1000);
}

/** The number as it will be shown, rounded, so that 999.96 mm is 1 m. */
function shownIn(si: number, unit: Unit): number {
  return Number(valueIn(si, unit, { difference: true }).toPrecision(4));
}

/** The coherent SI unit of a dimension, with rad and Hz where they are counted: `rad/s`, `N m/rad`, `Hz`. */
export function coherentUnit(dimension: Dimension, counted: Counted = {}): Unit {
  const { angle = 0, cycles = 0 } = counted;
  return unitFrom(dimensionText(dimension, counted), { ...unitScale, dimension, angle, cycles });
}

/** The symbol whose prefix can move, and its power in the unit. */
interface Lead {
  readonly text: string;
  readonly found: PrefixedSymbol;
  readonly exponent: number;
}

/** The unit with the prefix of its first symbol chosen so that the number is nearest to 1 … 1000. */
function movePrefix(unit: Unit, si: number): Unit {
  const tree = readUnitTree(unit.text);
  const lead = isRefusal(tree) ? null : leadOf(tree);
  if (isRefusal(tree) || !lead) return unit;
  const others = prefixesFor(lead.found.unit.symbol).map((prefix) => {
    const text = prefix + lead.text.slice(lead.text.length - lead.found.unit.symbol.length);
    return unitFrom(unitTreeText(replaceLead(tree, text)), scaleWith(unit, lead, prefix));
  });
  return others.reduce((best, next) => (excess(si, next) < excess(si, best) ? next : best), unit);
}

function leadOf(tree: UnitTree): Lead | null {
  if (tree.kind === 'product') return leadOf(tree.factors[0]!);
  if (tree.kind === 'quotient') return leadOf(tree.above);
  const [symbol, exponent] = tree.kind === 'power' ? [tree.base, tree.exponent] : [tree, 1];
  if (symbol.kind !== 'symbol' || exponent < 1) return null;
  const found = findSymbol(symbol.text);
  return found?.unit.prefixed ? { text: symbol.text, found, exponent } : null;
}

function replaceLead(tree: UnitTree, text: string): UnitTree {
  if (tree.kind === 'product') {
    const [first, ...rest] = tree.factors;
    return { ...tree, factors: [replaceLead(first!, text), ...rest] };
  }
  if (tree.kind === 'quotient') return { ...tree, above: replaceLead(tree.above, text) };
  if (tree.kind === 'power') return { ...tree, base: replaceLead(tree.base, text) };
  return { kind: 'symbol', text };
}

function scaleWith(unit: Unit, lead: Lead, prefix: string): UnitScale {
  const change = multiplyRatios(
    prefixFactor(prefix),
    ratioPower(prefixFactor(lead.found.prefix), -1),
  );
  const power = ratioPower(change, lead.exponent);
  return multiplyScales(scaleOf(unit), { ...unitScale, factor: power });
}

function prefixesFor(symbol: string): readonly string[] {
  if (symbol === 'g') return ['k', '', ...SMALL_PREFIXES];
  return ['', ...SMALL_PREFIXES, ...(NEVER_LARGE.has(symbol) ? [] : LARGE_PREFIXES)];
}

/** How many decades the number lies outside 1 … 1000. */
function excess(si: number, unit: Unit): number {
  const decades = Math.log10(Math.abs(shownIn(si, unit)));
  return decades < 0 ? -decades : Math.max(0, decades - Math.log10(999.95));
}
