/**
 * A formula in the form in which it is written: what is a fraction, which factors stand in which order, where a sign
 * is pulled out. Text and LaTeX are two renderings of the same tree, so that they cannot differ in more than marks.
 *
 * Invariants: numbers carry no sign (a sign is a `negative` or belongs to a term of a sum); a product has two factors
 * or more, none of them a product or a fraction; an exponent is an integer of 2 or more.
 */
export type Written =
  | { readonly kind: 'number'; readonly text: string }
  | { readonly kind: 'name'; readonly name: string }
  | { readonly kind: 'call'; readonly name: string; readonly args: readonly Written[] }
  | { readonly kind: 'power'; readonly base: Written; readonly exponent: number }
  | { readonly kind: 'product'; readonly factors: readonly Written[] }
  | { readonly kind: 'fraction'; readonly num: Written; readonly den: Written }
  | { readonly kind: 'sum'; readonly terms: readonly SignedTerm[] }
  | { readonly kind: 'negative'; readonly of: Written };

export interface SignedTerm {
  readonly negative: boolean;
  readonly of: Written;
}

export const ONE: Written = Object.freeze({ kind: 'number', text: '1' });
export const ZERO: Written = Object.freeze({ kind: 'number', text: '0' });

/** A base to a positive power; the first power is the base itself. */
export function raised(base: Written, exponent: number): Written {
  return exponent === 1 ? base : { kind: 'power', base, exponent };
}

/** Factors side by side, leaving out ones; no factor at all is 1. */
export function productOf(factors: readonly Written[]): Written {
  const proper = factors.filter((factor) => !isOne(factor));
  if (proper.length === 0) return ONE;
  return proper.length === 1 ? proper[0] : { kind: 'product', factors: proper };
}

/** A numerator over a denominator; over 1 it is the numerator alone. */
export function fractionOf(num: Written, den: Written): Written {
  return isOne(den) ? num : { kind: 'fraction', num, den };
}

/** Terms in a row; a single term keeps its sign in front of it, no term is 0. */
export function sumOf(terms: readonly SignedTerm[]): Written {
  if (terms.length === 0) return ZERO;
  return terms.length === 1 ? signed(terms[0].negative, terms[0].of) : { kind: 'sum', terms };
}

/** A form with a sign in front of it, where it has one. */
export function signed(negative: boolean, of: Written): Written {
  return negative ? { kind: 'negative', of } : of;
}

/** Whether a form is the number 1. */
export function isOne(form: Written): boolean {
  return form.kind === 'number' && form.text === '1';
}

/** A form with further factors behind it, in the numerator where it is a fraction. */
export function timesForms(form: Written, factors: readonly Written[]): Written {
  switch (form.kind) {
    case 'negative':
      return signed(true, timesForms(form.of, factors));
    case 'fraction':
      return fractionOf(timesForms(form.num, factors), form.den);
    case 'product':
      return productOf([...form.factors, ...factors]);
    default:
      return productOf([form, ...factors]);
  }
}
