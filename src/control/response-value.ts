import {
  addRatios,
  applyFunction,
  mulRatios,
  numberToRational,
  powRatio,
  ratioFromRational,
  signOfRatio,
  subRatios,
  zeroRatio,
  type Ratio,
  type SignOf,
} from '../algebra/index.ts';
import { isRefusal, refuse, type Refusal } from '../base/index.ts';
import type { ResponseTerm } from './time-function.ts';
import type { Response } from './values.ts';

/** How a response's amounts and ratios are written in a refusal. */
type Write = (ratio: Ratio) => string;

/**
 * The value of a response at a time, from the right where a part begins just then: exact where the response is.
 *
 * @param time seconds; its sign, and its order to the times at which parts begin, must be known.
 * Refuses a time of unknown sign, a time at which an impulse acts, and what functions refuse.
 */
export function responseAt(
  response: Response,
  time: Ratio,
  signOf: SignOf,
  write: Write,
): Ratio | Refusal {
  for (const { after } of response.impulses) {
    const sign = signOfRatio(subRatios(time, after), signOf);
    if (sign !== 'positive' && sign !== 'negative') {
      return refuse('at-impulse', `an impulse may act at t = ${write(time)}`);
    }
  }
  let sum = zeroRatio;
  for (const term of response.terms as readonly ResponseTerm<Ratio | number>[]) {
    const share = termAt(term, time, signOf, write);
    if (isRefusal(share)) return share;
    sum = addRatios(sum, share);
  }
  return sum;
}

function termAt(
  term: ResponseTerm<Ratio | number>,
  time: Ratio,
  signOf: SignOf,
  write: Write,
): Ratio | Refusal {
  const since = subRatios(time, term.after);
  const sign = signOfRatio(since, signOf);
  if (sign === 'negative') return zeroRatio;
  if (sign === 'unknown' || sign === 'nonpositive') {
    return refuse(
      'time-unknown',
      `it is not known whether ${write(since)} is negative; a sign statement settles it`,
    );
  }
  const growth = applyFunction('exp', [mulRatios(exact(term.rate), since)]);
  if (isRefusal(growth)) return growth;
  const wave = waveAt(term, since);
  if (isRefusal(wave)) return wave;
  const size = mulRatios(exact(term.coefficient), powRatio(since, term.power));
  return mulRatios(mulRatios(size, growth), wave);
}

function waveAt(term: ResponseTerm<Ratio | number>, since: Ratio): Ratio | Refusal {
  if (term.wave === 'none') return powRatio(since, 0);
  return applyFunction(term.wave, [mulRatios(exact(term.frequency), since)]);
}

function exact(amount: Ratio | number): Ratio {
  return typeof amount === 'number' ? ratioFromRational(numberToRational(amount)) : amount;
}
