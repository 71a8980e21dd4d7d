export type { Complex } from './complex.ts';
export {
  addComplex,
  argument,
  complex,
  complexExponential,
  complexRoot,
  divideComplex,
  magnitude,
  multiplyComplex,
  polynomialAt,
  subtractComplex,
} from './complex.ts';
export type { MultipleRoot } from './roots.ts';
export { polynomialRoots, rootsWithMultiplicity } from './roots.ts';
export { noiseBandwidthOf } from './noise-bandwidth.ts';
export { positiveRoots } from './positive-roots.ts';
export { hurwitzVerdicts, isHurwitz } from './hurwitz.ts';
export type { BatchInput } from './tape.ts';
export { Tape } from './tape.ts';
export type { TapeFunction } from './tape-operations.ts';
export type { Slot } from './tape-builder.ts';
export { TapeBuilder } from './tape-builder.ts';
export type { Matrix } from './matrix.ts';
export { combineMatrices, matrixOf, multiplyMatrices, oneNorm, scalarMatrix } from './matrix.ts';
export { solveLinear } from './linear-solve.ts';
export { matrixExponential } from './matrix-exponential.ts';
export type { TestInput } from './time-response.ts';
export { timeResponse } from './time-response.ts';
export type { OdeTolerance, RightSide } from './differential-equation.ts';
export { solveOde } from './differential-equation.ts';
export type { Integral, IntegralTolerance } from './quadrature.ts';
export { integrate } from './quadrature.ts';
export type { RandomSource } from './random.ts';
export { latinHypercube, randomInteger, randomNormal, seededRandom } from './random.ts';
