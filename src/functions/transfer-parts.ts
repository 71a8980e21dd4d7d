import { ratioFromPolynomial } from '../algebra/index.ts';
import { dcGain, polesOf, zerosOf } from '../control/index.ts';
import { onFormula } from './answer.ts';
import { one, type UnitRule, type WorksheetFunction } from './spec.ts';

const EXAMPLE = 'K is 2\na is 3 1/s\nH = K a/(s + a)\n';

/** What a transfer function is made of. */
function partOfTransfer(
  name: string,
  summary: string,
  unit: UnitRule,
  compute: Parameters<typeof onFormula>[1],
): WorksheetFunction {
  return {
    name,
    summary,
    source: null,
    example: `${EXAMPLE}${name}(H)`,
    parameters: [one('H', 'formula')],
    unit,
    availability: 'now',
    evaluate: ([transfer]) => onFormula(transfer, compute),
  };
}

/** Poles, zeros, gain at rest, numerator and denominator of a transfer function in lowest terms. */
export const TRANSFER_PARTS: readonly WorksheetFunction[] = [
  partOfTransfer(
    'poles',
    'The poles of a transfer function in lowest terms.',
    'angular frequency',
    polesOf,
  ),
  partOfTransfer(
    'zeros',
    'The zeros of a transfer function in lowest terms.',
    'angular frequency',
    zerosOf,
  ),
  partOfTransfer(
    'dc_gain',
    'The gain of a transfer function at rest, its value at s = 0.',
    'first',
    dcGain,
  ),
  partOfTransfer(
    'numerator',
    'The numerator of a transfer function in lowest terms.',
    'unchecked',
    (h) => ratioFromPolynomial(h.num),
  ),
  partOfTransfer(
    'denominator',
    'The denominator of a transfer function in lowest terms.',
    'unchecked',
    (h) => ratioFromPolynomial(h.den),
  ),
];
