import { laplace, mulRatios, powRatio, ratioOf, oneRatio, type Ratio } from '../algebra/index.ts';
import { lineTransform, type SourceKind } from '../control/index.ts';

/** What stands in the brackets of a source. A density is one-sided, per Hz; an amplitude density is squared first. */
export interface SourceArgument {
  readonly name: string;
  readonly takes: 'size' | 'frequency' | 'density' | 'transfer' | 'file';
}

/** A source as a formula: its transform; of a random one the transfer function that its white noise passes. */
export interface SourceFormula {
  readonly transform: Ratio;
  /** Of white noise. */
  readonly density?: Ratio;
  /** Of a line, in rad/s. */
  readonly frequency?: Ratio;
}

/** A source of a load case, for evaluation, completion and help. */
export interface Source {
  readonly name: string;
  /** What the source does in time and what its arguments are. */
  readonly summary: string;
  /** `later`: known to the language, but refused until it is built. */
  readonly availability: 'now' | 'later';
  readonly parameters: readonly SourceArgument[];
  /** A size is the source's own unit times s^(power − 1). */
  readonly power: number;
  kindAfterIntegrations(order: number): SourceKind;
  /** `args` as the parameters say: sizes, angular frequencies, densities, transfer functions. */
  formula(args: readonly Ratio[]): SourceFormula;
}

/** A/s is constant, A/s² and beyond drift, A alone is an impulse. */
function polynomialKind(power: number): SourceKind {
  if (power === 0) return 'impulsive';
  return power === 1 ? 'constant' : 'drifting';
}

function polynomialSource(name: string, size: string, power: number, summary: string): Source {
  return {
    name,
    summary,
    availability: 'now',
    parameters: [{ name: size, takes: 'size' }],
    power,
    kindAfterIntegrations: (order) => polynomialKind(power + order),
    formula: ([amount]) => ({ transform: mulRatios(amount, powRatio(ratioOf(laplace), -power)) }),
  };
}

const sine: Source = {
  name: 'sine',
  summary: 'a line of amplitude A at the frequency f, with phase zero at t = 0',
  availability: 'now',
  parameters: [
    { name: 'A', takes: 'size' },
    { name: 'f', takes: 'frequency' },
  ],
  power: 1,
  kindAfterIntegrations: () => 'periodic',
  formula: ([amplitude, frequency]) => ({
    transform: mulRatios(amplitude, lineTransform(frequency)),
    frequency,
  }),
};

const noise: Source = {
  name: 'noise',
  summary: 'white noise of one-sided density S per Hz',
  availability: 'now',
  parameters: [{ name: 'S', takes: 'density' }],
  power: 1,
  kindAfterIntegrations: () => 'random',
  formula: ([density]) => ({ transform: oneRatio, density }),
};

const shaped: Source = {
  name: 'shaped',
  summary: 'white noise of one-sided density S per Hz through G(s)',
  availability: 'now',
  parameters: [
    { name: 'G', takes: 'transfer' },
    { name: 'S', takes: 'density' },
  ],
  power: 1,
  kindAfterIntegrations: () => 'random',
  formula: ([transform, density]) => ({ transform, density }),
};

const measured: Source = {
  name: 'measured',
  summary: 'noise with a measured one-sided density, from a file',
  availability: 'later',
  parameters: [{ name: 'file', takes: 'file' }],
  power: 1,
  kindAfterIntegrations: () => 'random',
  formula: () => ({ transform: oneRatio }),
};

/** All sources, by name. */
export const SOURCES: readonly Source[] = Object.freeze([
  polynomialSource('impulse', 'I', 0, 'an impulse of area I at t = 0'),
  polynomialSource('step', 'A', 1, 'a constant load of size A from t = 0'),
  polynomialSource('ramp', 'R', 2, 'a load that grows at the rate R, as R t'),
  polynomialSource('parabola', 'P', 3, 'a load that grows as P t²/2'),
  sine,
  noise,
  shaped,
  measured,
]);

/** The source of this name. */
export function sourceNamed(name: string): Source | undefined {
  return SOURCES.find((source) => source.name === name);
}
