import {
  generatorPolynomial,
  laplace,
  mulRatios,
  powPolynomial,
  powRatio,
  quotientOf,
  ratioOf,
  type Ratio,
} from '../algebra/index.ts';
import { derivativeFromStart } from './initial-value.ts';
import { powerOfS } from './s-polynomial.ts';
import type { SignalTerm, SignalValue, StabilityBlock } from './values.ts';

/**
 * The time derivative of a signal, of some order: sⁿ X(s), all signals being zero before t = 0 but for what initial
 * values set in motion.
 */
export function differentiateSignal(signal: SignalValue, order: number): SignalValue {
  return {
    ...signal,
    name: signal.name + "'".repeat(order),
    terms: signal.terms.map((term) => ({ ...term, transform: differentiated(term, order) })),
    blocks: withoutIntegrations(signal.blocks, order),
  };
}

function differentiated({ source, transform }: SignalTerm, order: number): Ratio {
  if (source !== 'initial') return mulRatios(transform, powRatio(ratioOf(laplace), order));
  return Array.from({ length: order }).reduce<Ratio>(derivativeFromStart, transform);
}

/**
 * The blocks with so many roots at s = 0 taken away, those nearest to the signal first: what m such roots leave in a
 * signal is a polynomial in time of a degree below m, of which n derivatives leave one of a degree below m − n.
 */
function withoutIntegrations(
  blocks: readonly StabilityBlock[],
  count: number,
): readonly StabilityBlock[] {
  let left = count;
  return blocks
    .toReversed()
    .map((block) => {
      const taken = Math.min(left, powerOfS(block.polynomial));
      left -= taken;
      return taken === 0 ? block : { ...block, polynomial: dividedByS(block.polynomial, taken) };
    })
    .toReversed();
}

function dividedByS(polynomial: StabilityBlock['polynomial'], times: number) {
  return quotientOf(polynomial, powPolynomial(generatorPolynomial(laplace), times));
}
