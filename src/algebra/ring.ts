/*
 * The data of the ring, together because they are mutually recursive: a generator may be a function of ratios,
 * a ratio is a pair of polynomials, and a polynomial is written in generators.
 */

export type GeneratorKind = 'laplace' | 'imaginary' | 'constant' | 'symbol' | 'function';

/**
 * An indeterminate of the ring. Interned by `key`, so that `===` is equality. A `function` (a kernel such as
 * exp(−s Td)) carries its arguments. `square` is the relation of j and of square roots: generator² = square.
 */
export interface Generator {
  readonly kind: GeneratorKind;
  readonly key: string;
  readonly name: string;
  readonly args?: readonly Ratio[];
  readonly square?: Ratio;
  /** The variable that stands for itself only inside the arguments, as s does in a phase margin of L(s). */
  readonly binds?: Generator;
}

/**
 * A sparse polynomial over ℤ in canonical form. Term i is coefficients[i] · Π generators[k]^exponents[i·width + k]
 * with width = generators.length. Invariants: generators in canonical order, each of them occurring; terms in
 * descending lexicographic order of their exponents, distinct; no zero coefficients; degrees[k] is the degree in
 * generators[k]. The fields are private to this folder.
 *
 *     3 s² Kp − 7 Kp + 1     generators [s, Kp]   exponents [2 1, 0 1, 0 0]   coefficients [3, −7, 1]
 */
export interface Polynomial {
  readonly kind: 'polynomial';
  readonly generators: readonly Generator[];
  readonly exponents: Int32Array;
  readonly coefficients: readonly bigint[];
  readonly degrees: readonly number[];
}

/**
 * A rational function in canonical form: coprime integer polynomials, `den` with a positive leading coefficient,
 * generators with a `square` at most to the first power, and none of them in `den`.
 */
export interface Ratio {
  readonly kind: 'ratio';
  readonly num: Polynomial;
  readonly den: Polynomial;
}
