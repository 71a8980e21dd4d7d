import { isRefusal } from '../base/index.ts';
import { integrate, noiseBandwidthOf, polynomialRoots } from '../numeric/index.ts';
import { found, notFound, type Finding } from './finding.ts';
import {
  delayedRational,
  numberOf,
  transferAt,
  type NumericTransfer,
} from './frequency-polynomials.ts';

/**
 * ∫ |H(j2πf)|² df over all frequencies in Hz, or from one to another.
 *
 * The whole of a rational function is found from its coefficients; a band, and what holds dead time in several terms, by
 * quadrature between the frequencies of its poles. No number where the poles of a rational function do not all decay.
 */
export function noiseBandwidthIn(
  transfer: NumericTransfer,
  from?: NumericTransfer,
  to?: NumericTransfer,
): Finding {
  const rational = delayedRational(transfer);
  if (!from || !to) {
    return rational ? whole(rational.num, rational.den) : between(transfer, [0, Infinity]);
  }
  const [low, high] = [numberOf(from), numberOf(to)];
  if (!(low >= 0 && high >= low))
    return notFound('a band runs from a frequency, 0 or above, to a higher one');
  const poles = rational && rational.den.length > 1 ? polynomialRoots(rational.den) : [];
  const places = poles
    .flatMap(({ re, im }) => [Math.abs(im), Math.hypot(re, im)])
    .map((w) => w / (2 * Math.PI))
    .filter((f) => f > low && f < high);
  return between(transfer, [low, ...[...new Set(places)].sort((a, b) => a - b), high]);
}

function whole(num: readonly number[], den: readonly number[]): Finding {
  const value = noiseBandwidthOf(num, den);
  if (!Number.isNaN(value)) return found(value);
  return notFound(
    num.length >= den.length
      ? 'it is infinite: the gain does not roll off at high frequencies'
      : 'not all poles decay',
  );
}

function between(transfer: NumericTransfer, places: readonly number[]): Finding {
  const density = (f: number): number => {
    const value = transferAt(transfer, 2 * Math.PI * f);
    return value ? value.re * value.re + value.im * value.im : Infinity;
  };
  let sum = 0;
  for (let k = 1; k < places.length; k++) {
    const part = integrate(density, places[k - 1], places[k], { relative: 1e-9 });
    if (isRefusal(part)) return notFound('the integral over the spectrum is not finite');
    sum += part.value;
  }
  return found(sum);
}
