import { positiveRoots } from '../numeric/index.ts';
import { found, notFound, type Finding } from './finding.ts';
import {
  addScaled,
  delayedRational,
  multiply,
  numberOf,
  squaredMagnitude,
  sumAt,
  transferAt,
  type NumericTransfer,
} from './frequency-polynomials.ts';
import { unwrappedPhase } from './phase-curve.ts';

const MANY_DELAYS =
  'the dead times stand in several terms of the transfer function, and this figure is found for one dead time';
const AT_POLE = 'there is a pole at this frequency';

/** |H(jω)| */
export function gainAt(transfer: NumericTransfer, frequency: NumericTransfer): Finding {
  const value = transferAt(transfer, numberOf(frequency));
  return value
    ? found(Math.hypot(value.re, value.im))
    : notFound(`it is infinite: ${AT_POLE}`, Infinity);
}

/** The phase of H(jω) in rad, unwrapped from low frequency. */
export function phaseAt(transfer: NumericTransfer, frequency: NumericTransfer): Finding {
  const w = numberOf(frequency);
  if (!(w > 0)) return notFound('a phase is that at a frequency above 0');
  const rational = delayedRational(transfer);
  if (!rational) return notFound(MANY_DELAYS);
  if (sumAt(transfer.num, w).size === 0) return notFound('the transfer function is 0');
  const value = transferAt(transfer, w);
  if (!value) return notFound(AT_POLE);
  if (value.re === 0 && value.im === 0) return notFound('there is a zero at this frequency');
  return found(unwrappedPhase(rational, w));
}

/**
 * The angular frequency at which the gain first falls to 1/√2 of that at 0.
 *
 * Found as a root of 2 |N(jω)|² |D(0)|² − |N(0)|² |D(jω)|², so that dead time does not matter.
 */
export function bandwidthOf(transfer: NumericTransfer): Finding {
  const rational = delayedRational(transfer);
  if (!rational) return notFound(MANY_DELAYS);
  const [n, d] = [rational.num, rational.den].map(squaredMagnitude);
  const [atRest, below] = [n.at(-1) ?? 0, d.at(-1) ?? 0];
  if (below === 0) return notFound('there is a pole at s = 0, so that the gain at 0 is infinite');
  if (atRest === 0) return notFound('the gain at 0 is 0, so that there is none to fall from');
  const excess = addScaled(
    n.map((c) => 2 * c * below),
    d.map((c) => c * atRest),
    -1,
  );
  const [first] = positiveRoots(excess);
  return first === undefined
    ? notFound('it is infinite: the gain never falls to 1/√2 of that at 0', Infinity)
    : found(Math.sqrt(first));
}

/** The derivative of a polynomial, highest power first. */
function slopeOf(p: readonly number[]): number[] {
  return p.slice(0, -1).map((c, k) => c * (p.length - 1 - k));
}

/**
 * The largest gain over all frequencies: at a root of the derivative of |H(jω)|², at 0 or at infinity.
 */
export function peakGain(transfer: NumericTransfer): Finding {
  const rational = delayedRational(transfer);
  if (!rational) return notFound(MANY_DELAYS);
  if (rational.num.length === 0) return found(0);
  const [n, d] = [rational.num, rational.den].map(squaredMagnitude);
  if (rational.num.length > rational.den.length)
    return notFound('it is infinite: the gain rises without bound with the frequency', Infinity);
  const turns = addScaled(multiply(slopeOf(n), d), multiply(n, slopeOf(d)), -1);
  const frequencies = [
    0,
    ...positiveRoots(turns).map(Math.sqrt),
    ...positiveRoots(d).map(Math.sqrt),
  ];
  const ends = rational.num.length === rational.den.length ? rational.num[0] / rational.den[0] : 0;
  let peak = Math.abs(ends);
  for (const w of frequencies) {
    const value = transferAt(transfer, w);
    if (!value)
      return notFound(
        `it is infinite: there is a pole on the imaginary axis, at ${w} rad/s`,
        Infinity,
      );
    peak = Math.max(peak, Math.hypot(value.re, value.im));
  }
  return found(peak);
}
