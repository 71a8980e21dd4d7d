import { isZeroRatio, laplace, mulRatios, powRatio, ratioOf, sumRatios } from '../algebra/index.ts';
import { isRefusal } from '../base/index.ts';
import { ALWAYS, partialFractions as fractionsOf } from '../control/index.ts';
import { formulaAnswer, ratioOfArgument } from './answer.ts';
import { one, type WorksheetFunction } from './spec.ts';

export const partialFractions: WorksheetFunction = {
  name: 'partial_fractions',
  summary: 'A transfer function as a sum of partial fractions.',
  source: 'K. Ogata, Modern Control Engineering, 5th ed., Prentice Hall, 2010, appendix B.',
  example: 'partial_fractions((s + 3)/((s + 1) (s + 2)))',
  parameters: [one('H', 'formula')],
  unit: 'first',
  availability: 'now',
  evaluate: ([transfer], { budget }) => {
    const fractions = fractionsOf(ratioOfArgument(transfer), budget);
    if (isRefusal(fractions)) return fractions;
    const polynomial = sumRatios(
      fractions.polynomial.map((c, k) => mulRatios(c, powRatio(ratioOf(laplace), k))),
    );
    const ratios = [
      ...(isZeroRatio(polynomial) ? [] : [polynomial]),
      ...fractions.terms.map((term) => term.ratio),
    ];
    const parts = ratios.map((ratio, index) => ({
      name: String(index + 1),
      value: formulaAnswer(ratio),
    }));
    return { kind: 'parts', parts, joined: 'sum', when: ALWAYS, notes: [] };
  },
};
