export type { Dimension } from './dimension.ts';
export {
  dimensionless,
  dimensionOf,
  equalDimensions,
  powDimension,
} from './dimension.ts';
export type { Counted } from './dimension-text.ts';
export { dimensionText } from './dimension-text.ts';
export type { ExactFactor, Unit } from './unit.ts';
export type { CustomUnits } from './unit-parse.ts';
export { isUnitSymbol, parseUnit } from './unit-parse.ts';
export type { Ratio } from './ratio.ts';
export type { QuantityMeaning, SiQuantity } from './quantity.ts';
export { customUnit, quantityToSI } from './quantity.ts';
export type { ValueStyle } from './value-text.ts';
export { formatNumber, formatValue, valueIn } from './value-text.ts';
export { cycleFactor } from './frequency.ts';
export { chooseUnit, coherentUnit } from './display-unit.ts';
export { unitAsTyped, unitText, unitToLatex } from './unit-text.ts';
