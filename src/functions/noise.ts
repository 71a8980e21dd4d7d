import {
  dependsOn,
  divRatios,
  laplace,
  mulRatios,
  pi,
  ratioFromRational,
  ratioOf,
  rational,
  type Ratio,
} from '../algebra/index.ts';
import { isRefusal, refuse, type Budget, type Refusal } from '../base/index.ts';
import {
  densityOf,
  letsWhiteNoiseThrough,
  noiseBandwidth as bandwidthOf,
  noiseBandwidthBetween,
  rmsOf,
  stable,
  varianceOf,
  type Band,
  type SignalValue,
  type Value,
} from '../control/index.ts';
import { absentAnswer, formulaAnswer, onFormula, ratioOfArgument, signalOf } from './answer.ts';
import {
  frequencySlot,
  one,
  optionalFrequency,
  type Argument,
  type WorksheetFunction,
} from './spec.ts';

const INTEGRALS =
  'H. M. James, N. B. Nichols, R. S. Phillips, Theory of Servomechanisms, McGraw-Hill, 1947, section 7.9 and appendix; G. C. Newton, L. A. Gould, J. F. Kaiser, Analytical Design of Linear Feedback Controls, Wiley, 1957, appendix E.';

const EXAMPLE =
  "K is 2 1/s\nS is 0.1 1/(s^2 Hz)\nK, S are positive\nloop a driven by w\n  y' = w - K y\ncase wind of a\n  w = noise(S)\n";

const BAND = [optionalFrequency('f1'), optionalFrequency('f2')];

const TURN = mulRatios(ratioFromRational(rational(2n)), ratioOf(pi));

/** The band between two frequencies, given in rad/s; undefined without any. */
function bandOf(ends: readonly Argument[]): Band | Refusal | undefined {
  if (ends.length === 1) return refuse('half-band', 'a band has two ends, f1 and f2');
  const [from, to] = ends.map((end) => divRatios(ratioOfArgument(end), TURN));
  return from && to ? { from, to } : undefined;
}

/** A signal of a load case; a formula in s has no noise in it. */
function signalWithSources(x: Argument, name: string): SignalValue | Refusal {
  const signal = signalOf(x);
  const isFormula = signal.terms.some((term) => term.input === '');
  return isFormula
    ? refuse(
        'no-sources',
        `${name} takes a signal of a load case, since a formula in s has no noise; of a transfer function take \`noise_bandwidth(…)\``,
      )
    : signal;
}

/** What noise does to a signal of a load case. */
function ofNoise(
  spec: Pick<WorksheetFunction, 'name' | 'summary' | 'example' | 'unit' | 'parameters' | 'source'>,
  compute: (
    signal: SignalValue,
    ...rest: Parameters<WorksheetFunction['evaluate']>
  ) => Value | Refusal,
): WorksheetFunction {
  return {
    ...spec,
    availability: 'now',
    evaluate: (args, context) => {
      const signal = signalWithSources(args[0], spec.name);
      return isRefusal(signal) ? signal : compute(signal, args, context);
    },
  };
}

const variance = ofNoise(
  {
    name: 'variance',
    summary: 'The variance of the random part of a signal, in closed form as far as symbols allow.',
    source: INTEGRALS,
    example: `${EXAMPLE}variance(wind.y)`,
    parameters: [one('x', 'signal')],
    unit: 'square',
  },
  (signal, _, context) => varianceOf(signal, context),
);

const rms = ofNoise(
  {
    name: 'rms',
    summary:
      'The root mean square of the random and periodic parts of a signal; constant parts do not count.',
    source: INTEGRALS,
    example: `${EXAMPLE}rms(wind.y)`,
    parameters: [one('x', 'signal'), ...BAND],
    unit: 'first',
  },
  (signal, [, ...ends], context) => {
    const band = bandOf(ends);
    return isRefusal(band) ? band : rmsOf(signal, context, band);
  },
);

const density = ofNoise(
  {
    name: 'density',
    summary: 'The one-sided power spectral density per Hz of the random part of a signal.',
    source:
      'J. H. Laning, R. H. Battin, Random Processes in Automatic Control, McGraw-Hill, 1956, chapter 5.',
    example: `${EXAMPLE}density(wind.y, 1 Hz)`,
    parameters: [one('x', 'signal'), frequencySlot('f', 'frequency')],
    unit: 'density',
  },
  (signal, [, frequency], context) => densityOf(signal, ratioOfArgument(frequency), context),
);

const noiseBandwidth: WorksheetFunction = {
  name: 'noise_bandwidth',
  summary:
    'The cyclic noise bandwidth of a transfer function, ∫ |H|² df over all frequencies in Hz, or from f1 to f2: variance = S · noise_bandwidth.',
  source: INTEGRALS,
  example: 'T is 2 s\nT is positive\nnoise_bandwidth(1/(T s + 1))',
  parameters: [one('H', 'formula'), ...BAND],
  unit: 'bandwidth',
  availability: 'now',
  evaluate: ([transfer, ...ends], { budget }) => {
    const band = bandOf(ends);
    if (isRefusal(band)) return band;
    return onFormula(transfer, (h) =>
      band ? noiseBandwidthBetween(h, band.from, band.to) : wholeBandwidth(h, budget),
    );
  },
};

function wholeBandwidth(h: Ratio, budget: Budget): Value {
  if (!dependsOn(h, laplace) || letsWhiteNoiseThrough(h))
    return absentAnswer('it is infinite: the gain does not roll off at high frequencies');
  const when = stable([{ signals: [], polynomial: h.den }]);
  return formulaAnswer(bandwidthOf(h, budget), { when });
}

/** What noise does to signals. */
export const NOISE: readonly WorksheetFunction[] = [variance, rms, density, noiseBandwidth];
