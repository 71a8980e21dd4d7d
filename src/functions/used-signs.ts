import type { Sign, SignOf } from '../algebra/index.ts';
import { nameToText } from '../language/index.ts';

/** Signs of symbols, and which of them a computation asked for and knew. */
export interface UsedSigns {
  readonly signOf: SignOf;
  /** `It uses that J and Kd are positive.` One sentence for each sign. */
  notes(): readonly string[];
}

/** Keeps which signs of symbols are used, so that a result can say so. */
export function recordSigns(signOf: SignOf): UsedSigns {
  const used = new Map<Sign, Set<string>>();
  return {
    signOf: (g) => {
      const sign = signOf(g);
      if (g.kind === 'symbol' && sign !== 'unknown')
        used.set(sign, (used.get(sign) ?? new Set()).add(nameToText(g.name)));
      return sign;
    },
    notes: () =>
      [...used].map(([sign, names]) => `It uses that ${listed([...names].sort())} ${sign}.`),
  };
}

function listed(names: readonly string[]): string {
  if (names.length === 1) return `${names[0]} is`;
  return `${names.slice(0, -1).join(', ')} and ${names[names.length - 1]} are`;
}
