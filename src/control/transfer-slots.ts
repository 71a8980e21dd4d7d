import type { Polynomial, Ratio } from '../algebra/index.ts';
import type { Slot } from '../numeric/index.ts';
import { delayTerms, type DelayTerm } from './dead-time.ts';
import type { NumericTerms, NumericTransfer } from './frequency-polynomials.ts';
import { descendingInS } from './s-polynomial.ts';

/** Where the numbers of one function of s stand in a row of values: places of coefficients and of dead times. */
interface TransferPlaces {
  readonly num: readonly DelayTerm<readonly number[], number>[];
  readonly den: readonly DelayTerm<readonly number[], number>[];
}

/** Functions of s laid out as a row of slots, and the way to read them back from a row of their values. */
export interface TransferSlots {
  readonly slots: readonly Slot[];
  read(values: ArrayLike<number>): readonly NumericTransfer[];
}

/**
 * Lays out functions of s: the slots of all coefficients and dead times in a row.
 *
 * `slotOf` gives the slot of an amount free of s. Null where a function of s is no dead time.
 */
export function transferSlots(
  args: readonly Ratio[],
  slotOf: { polynomial(p: Polynomial): Slot; ratio(r: Ratio): Slot },
): TransferSlots | null {
  const slots: Slot[] = [];
  const place = (slot: Slot): number => slots.push(slot) - 1;
  const termPlaces = (p: Polynomial): TransferPlaces['num'] | null =>
    delayTerms(p)?.map(({ coefficients, delay }) => ({
      coefficients: descendingInS(coefficients).map((c) => place(slotOf.polynomial(c))),
      delay: place(slotOf.ratio(delay)),
    })) ?? null;
  const places: TransferPlaces[] = [];
  for (const { num, den } of args) {
    const [above, below] = [termPlaces(num), termPlaces(den)];
    if (!above || !below) return null;
    places.push({ num: above, den: below });
  }
  return {
    slots,
    read: (values) =>
      places.map(({ num, den }) => ({ num: termsAt(num, values), den: termsAt(den, values) })),
  };
}

function termsAt(places: TransferPlaces['num'], values: ArrayLike<number>): NumericTerms {
  return places.map(({ coefficients, delay }) => ({
    coefficients: coefficients.map((k) => values[k]),
    delay: values[delay],
  }));
}
