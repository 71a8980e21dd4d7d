export * from './values.ts';
export * from './conditions.ts';
export { reduceCondition, relationOf, signsUnder } from './reduced-condition.ts';
export type { Relation } from './reduced-condition.ts';
export { readable, solveForGain } from './readable-condition.ts';
export { expandStable, stabilityConditions, stable } from './stability.ts';
export { routhArray } from './routh.ts';
export { countRoots } from './root-count.ts';
export type { RootCounts } from './root-count.ts';
export { blocksOf, closeLoop } from './loops.ts';
export type { ClosedLoop, LoopBlock, LoopRow } from './loops.ts';
export { hiddenModesNote } from './hidden-modes.ts';
export { openedAt, propernessOf, transferFunction } from './transfer.ts';
export type { Transfer } from './transfer.ts';
export { finalValue } from './final-value.ts';
export { initialValue } from './initial-value.ts';
export { dcGain, errorConstants, polesOf, systemType, zerosOf } from './loop-gain.ts';
export type { ErrorConstants } from './loop-gain.ts';
export { describePlace, unstablePlace } from './pole-place.ts';
export type { RootPlace } from './pole-place.ts';
export { partialFractions } from './partial-fractions.ts';
export type { PartialFraction, PartialFractions } from './partial-fractions.ts';
export { compileResponse, responseOf } from './response.ts';
export type { Response, ResponseSampler } from './response.ts';
export type { ResponseImpulse, ResponseTerm, Wave } from './time-function.ts';
export { solutionsFor, solveInequality, solveLinearFor } from './equation.ts';
export { matchCoefficients } from './match.ts';
export type { MatchedGain } from './match.ts';
export { stableIntervals } from './stability-range.ts';
export type { GainInterval, RangeEnd } from './stability-range.ts';
export { cornersOf } from './tolerance.ts';
export type { Bounds, Corners } from './tolerance.ts';
export { compileRatios, numberOf } from './compile.ts';
export type { CompiledRatio, CompiledRatios, Resolve } from './compile.ts';
export { compileConditions, NO, UNDECIDED, YES } from './condition-batch.ts';
export type { CompiledConditions } from './condition-batch.ts';
export {
  degreeInS,
  descendingInS,
  functionsOfS,
  hasFunctionsOfS,
  isFreeOfS,
} from './s-polynomial.ts';
