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
export { LARGEST_DEGREE, polynomialRoots, rootsWithMultiplicity } from './roots.ts';
export { hurwitzVerdicts, isHurwitz } from './hurwitz.ts';
export type { BatchInput } from './tape.ts';
export { Tape } from './tape.ts';
export type { TapeFunction } from './tape-operations.ts';
export type { Slot } from './tape-builder.ts';
export { TapeBuilder } from './tape-builder.ts';
