import {
  addRatios,
  isZeroRatio,
  mulRatios,
  ratioKey,
  signOfRatio,
  sumRatios,
  zeroRatio,
} from '../algebra/index.ts';
import type { Ratio } from '../algebra/index.ts';
import { isRefusal, type Refusal } from '../base/index.ts';
import { allOf, compare } from './conditions.ts';
import { noValue, plainValue, settledUnder } from './final-value.ts';
import { squaredGain } from './frequency-point.ts';
import { letsWhiteNoiseThrough, noiseBandwidth, noiseBandwidthBetween } from './noise-bandwidth.ts';
import { powerOfS } from './s-polynomial.ts';
import { stable } from './stability.ts';
import type { Condition, FormulaValue, NoValue, SignalTerm, SignalValue } from './values.ts';
import type { Knowledge } from './vibration.ts';

/** One white noise with all its paths to a signal. */
interface NoisePath {
  readonly input: string;
  /** One-sided, per Hz. */
  readonly density: Ratio;
  readonly transfer: Ratio;
}

/** The white noises behind a signal; paths of the same noise are added before they are squared. */
function noisePaths(x: SignalValue): readonly NoisePath[] {
  const paths = new Map<string, NoisePath>();
  for (const { noise, input, transform } of x.terms) {
    if (!noise) continue;
    const key = `${noise.id} ${ratioKey(noise.density)}`;
    const known = paths.get(key);
    const transfer = known ? addRatios(known.transfer, transform) : transform;
    paths.set(key, { input, density: noise.density, transfer });
  }
  return [...paths.values()].filter(({ transfer }) => !isZeroRatio(transfer));
}

function randomTerms(x: SignalValue): readonly SignalTerm[] {
  return x.terms.filter((term) => term.noise);
}

/** What must hold for the noise in a signal to be stationary, or why it never is. */
function stationaryUnder(
  x: SignalValue,
  paths: readonly NoisePath[],
  { signOf, budget }: Knowledge,
): Condition | { readonly reason: string } {
  const wandering = paths.find(({ transfer }) => powerOfS(transfer.den) > 0);
  if (wandering) {
    return {
      reason: `the noise in ${wandering.input} is integrated on its way to ${x.name} (a pole at s = 0): its variance grows without bound`,
    };
  }
  const settled = settledUnder({ ...x, terms: randomTerms(x) }, signOf, budget);
  if ('reason' in settled) return settled;
  const densities = paths
    .filter(
      ({ density }) => !['positive', 'nonnegative', 'zero'].includes(signOfRatio(density, signOf)),
    )
    .map(({ density }) => compare(density, '>=', zeroRatio));
  return allOf([stable(settled.open), ...densities]);
}

/** Densities are one-sided everywhere, which is said wherever one goes in or comes out. */
const ONE_SIDED = 'Power spectral densities are one-sided, per Hz.';

/** A band of frequencies in Hz. */
export interface Band {
  readonly from: Ratio;
  readonly to: Ratio;
}

/**
 * The variance of the random part of a signal, Σ S · ∫₀^∞ |H(j2πf)|² df over the independent noises, each of one-sided
 * density S per Hz.
 *
 * No value where it is infinite, with the path named: white noise that does not roll off, an integration, a mode that does
 * not decay. Exact, with symbols as far as `noiseBandwidth` goes; it stands where the blocks are stable. Within a `band`
 * it is found in numbers.
 * Source: see {@link noiseBandwidth}.
 */
export function varianceOf(x: SignalValue, known: Knowledge, band?: Band): FormulaValue | NoValue {
  const paths = noisePaths(x);
  if (paths.length === 0) return plainValue(withNote(x, `No noise acts on ${x.name}.`), zeroRatio);
  const through = band ? null : paths.find(({ transfer }) => letsWhiteNoiseThrough(transfer));
  if (through) {
    const reason = `the variance is infinite: white noise at ${through.input} reaches ${x.name} without rolling off at high frequencies`;
    return noValue(x, reason);
  }
  const stationary = stationaryUnder(x, paths, known);
  if ('reason' in stationary) return noValue(x, stationary.reason);
  const variances = paths.map(({ density, transfer }) =>
    mulRatios(density, bandwidthIn(transfer, known, band), known.budget),
  );
  const when = allOf([x.when, stationary]);
  return plainValue({ ...withNote(x, ONE_SIDED), when }, sumRatios(variances, known.budget));
}

function bandwidthIn(transfer: Ratio, { budget }: Knowledge, band?: Band): Ratio {
  return band
    ? noiseBandwidthBetween(transfer, band.from, band.to)
    : noiseBandwidth(transfer, budget);
}

function withNote({ when, notes }: SignalValue, note: string): Pick<SignalValue, 'when' | 'notes'> {
  return { when, notes: [...notes, note] };
}

/**
 * The one-sided power spectral density per Hz of the random part of a signal at a frequency.
 *
 * `frequency`: ω in rad/s. No value where the noise is not stationary. Refused for functions of s other than dead time.
 * Source: J. H. Laning, R. H. Battin, Random Processes in Automatic Control, McGraw-Hill, 1956, chapter 5 (from memory).
 */
export function densityOf(
  x: SignalValue,
  frequency: Ratio,
  known: Knowledge,
): FormulaValue | NoValue | Refusal {
  const paths = noisePaths(x);
  if (paths.length === 0) return plainValue(withNote(x, `No noise acts on ${x.name}.`), zeroRatio);
  const stationary = stationaryUnder(x, paths, known);
  if ('reason' in stationary) return noValue(x, stationary.reason);
  let sum = zeroRatio;
  for (const { density, transfer } of paths) {
    const gain = squaredGain(transfer, frequency);
    if (isRefusal(gain)) return gain;
    sum = addRatios(sum, mulRatios(density, gain, known.budget), known.budget);
  }
  return plainValue({ ...withNote(x, ONE_SIDED), when: allOf([x.when, stationary]) }, sum);
}
