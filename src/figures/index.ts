export * from './data.ts';
export type { BatchMargin, Side } from './grid.ts';
export * from './region-trace.ts';
export * from './figure.ts';
export * from './table.ts';
export {
  positionOf,
  valueAt,
  type Box,
  type FigureLayout,
  type FigureSize,
  type Panel,
  type Scale,
} from './scale.ts';
export { standaloneSvg } from './ink.ts';
