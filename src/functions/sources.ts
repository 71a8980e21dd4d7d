import type { SourceKind } from '../control/index.ts';

/** A source of a load case, for evaluation, completion and help. */
export interface Source {
  readonly name: string;
  /** What the source does in time and what its argument is. */
  readonly summary: string;
  /** `later`: known to the language, but refused until it is built. */
  readonly availability: 'now' | 'later';
  /** Its transform is A / s^power. */
  readonly power: number;
  kindAfterIntegrations(order: number): SourceKind;
}

/** A/s is constant, A/s² and beyond drift, A alone is an impulse. */
function polynomialKind(power: number): SourceKind {
  if (power === 0) return 'impulsive';
  return power === 1 ? 'constant' : 'drifting';
}

function polynomialSource(name: string, power: number, summary: string): Source {
  return {
    name,
    summary,
    availability: 'now',
    power,
    kindAfterIntegrations: (order) => polynomialKind(power + order),
  };
}

function laterSource(name: string, kind: SourceKind, summary: string): Source {
  return { name, summary, availability: 'later', power: 0, kindAfterIntegrations: () => kind };
}

/** All sources, by name. */
export const SOURCES: readonly Source[] = Object.freeze([
  polynomialSource('impulse', 0, 'an impulse of area I at t = 0'),
  polynomialSource('step', 1, 'a constant load of size A from t = 0'),
  polynomialSource('ramp', 2, 'a load that grows at the rate R, as R t'),
  polynomialSource('parabola', 3, 'a load that grows as P t²/2'),
  laterSource(
    'sine',
    'periodic',
    'a line of amplitude A at the frequency f, with phase zero at t = 0',
  ),
  laterSource('noise', 'random', 'white noise of one-sided density S per Hz'),
  laterSource('shaped', 'random', 'white noise of one-sided density S per Hz through G(s)'),
  laterSource('measured', 'random', 'noise with a measured one-sided density, from a file'),
]);

/** The source of this name. */
export function sourceNamed(name: string): Source | undefined {
  return SOURCES.find((source) => source.name === name);
}
