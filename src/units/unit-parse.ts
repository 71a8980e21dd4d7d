import { isRefusal, refuse } from '../base/index.ts';
import type { Refusal } from '../base/index.ts';
import { ratio, multiplyRatios, ratioText } from './ratio.ts';
import { findSymbol, prefixFactor } from './unit-symbols.ts';
import type { Unit, UnitScale } from './unit.ts';
import {
  multiplyScales,
  scaleOf,
  scalePower,
  scaleRoot,
  unitFrom,
  unitOne,
  unitScale,
} from './unit.ts';
import type { UnitTree } from './unit-tree.ts';
import { readUnitTree } from './unit-tree.ts';
import { unknownUnit } from './unknown-unit.ts';

/** Units that a worksheet defines, by symbol. */
export type CustomUnits = ReadonlyMap<string, Unit>;

/** Zero of the Celsius scale in kelvins: SI Brochure, 9th ed., 2019, section 2.3.1. */
const CELSIUS_ZERO = ratioText(ratio(27315n, 100n));

/** Units that stand alone: a zero point or a logarithm does not survive multiplication. */
const ALONE: ReadonlyMap<string, Unit> = new Map([
  ['dB', unitFrom('dB', unitScale, { logarithmic: 'dB' })],
  ...['°C', 'degC'].map((text) => [text, celsius(text)] as const),
]);

function celsius(text: string): Unit {
  return unitFrom(text, scaleOfSymbol('K')!, { offset: CELSIUS_ZERO });
}

/**
 * The unit that a text means: `kN m/rad`, `µrad/√Hz`, `25 1/s` without its number; empty means one.
 *
 * `custom` are the worksheet's own units. Refuses unknown symbols (with the likely one), text that is no unit
 * expression, a solidus with more than one factor after it, °C and dB in compound units, and roots of units that
 * differ from the coherent one by an irrational factor.
 */
export function parseUnit(text: string, custom?: CustomUnits): Unit | Refusal {
  const trimmed = text.trim();
  const alone = ALONE.get(trimmed);
  if (alone) return alone;
  const tree = readUnitTree(trimmed);
  if (isRefusal(tree)) return tree;
  if (tree.kind === 'one') return unitOne;
  const scale = treeScale(tree, custom);
  if (isRefusal(scale)) return scale;
  return unitFrom(trimmed, scale, { isPercent: trimmed === '%' });
}

/** Whether a text is one unit symbol, with or without a prefix, or one of the worksheet's own units. */
export function isUnitSymbol(text: string, custom?: CustomUnits): boolean {
  return ALONE.has(text) || findSymbol(text) !== null || (custom?.has(text) ?? false);
}

function treeScale(tree: UnitTree, custom?: CustomUnits): UnitScale | Refusal {
  switch (tree.kind) {
    case 'one':
      return unitScale;
    case 'symbol':
      return symbolScale(tree.text, custom);
    case 'product':
      return productScale(tree.factors, custom);
    case 'quotient':
      return productScale([tree.above, { kind: 'power', base: tree.below, exponent: -1 }], custom);
    case 'power': {
      const base = treeScale(tree.base, custom);
      return isRefusal(base) ? base : scalePower(base, tree.exponent);
    }
    case 'root':
      return rootScale(tree.of, custom);
  }
}

function productScale(factors: readonly UnitTree[], custom?: CustomUnits): UnitScale | Refusal {
  let product = unitScale;
  for (const factor of factors) {
    const scale = treeScale(factor, custom);
    if (isRefusal(scale)) return scale;
    product = multiplyScales(product, scale);
  }
  return product;
}

function rootScale(of: UnitTree, custom?: CustomUnits): UnitScale | Refusal {
  const square = treeScale(of, custom);
  if (isRefusal(square)) return square;
  return (
    scaleRoot(square) ??
    refuse(
      'unit-root',
      `the root of a unit that is ${ratioText(square.factor)} SI units is not exact; use a unit whose factor is a square`,
    )
  );
}

function symbolScale(text: string, custom?: CustomUnits): UnitScale | Refusal {
  const own = custom?.get(text);
  if (own) return scaleOf(own);
  if (text === 'dB') return refuse('unit-alone', 'dB is a logarithm and stands alone in a unit');
  if (ALONE.has(text))
    return refuse('unit-alone', `${text} stands alone; in a compound unit write K`);
  return scaleOfSymbol(text) ?? unknownUnit(text, custom);
}

function scaleOfSymbol(text: string): UnitScale | null {
  const found = findSymbol(text);
  if (!found) return null;
  const { dimension, pi, angle, cycles, factor } = found.unit;
  return {
    dimension,
    pi,
    angle,
    cycles,
    factor: multiplyRatios(factor, prefixFactor(found.prefix)),
  };
}
