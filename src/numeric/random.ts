/** A source of uniform numbers in [0, 1). */
export type RandomSource = () => number;

/**
 * A seeded source of uniform numbers with 53 random bits, the same on every machine.
 *
 * Source: D. Blackman, S. Vigna, Scrambled linear pseudorandom number generators, ACM Transactions on Mathematical
 * Software 47 (2021), article 36 (xoshiro128**); its state is filled by the mixing of SplitMix32.
 */
export function seededRandom(seed: number): RandomSource {
  const state = Uint32Array.from({ length: 4 }, (_, i) => mixed(seed + 0x9e3779b9 * (i + 1)));
  const next = (): number => {
    const [a, b, c, d] = state as unknown as [number, number, number, number];
    const result = Math.imul(rotated(Math.imul(b, 5), 7), 9) >>> 0;
    const [c1, d1] = [c ^ a, d ^ b];
    state.set([a ^ d1, b ^ c1, c1 ^ (b << 9), rotated(d1, 11)]);
    return result;
  };
  return () => ((next() >>> 5) * 2 ** 26 + (next() >>> 6)) / 2 ** 53;
}

function mixed(word: number): number {
  let z = word | 0;
  z = Math.imul(z ^ (z >>> 16), 0x85ebca6b);
  z = Math.imul(z ^ (z >>> 13), 0xc2b2ae35);
  return (z ^ (z >>> 16)) >>> 0;
}

function rotated(word: number, by: number): number {
  return (word << by) | (word >>> (32 - by));
}

/**
 * A standard normal number, by the transformation of G. E. P. Box, M. E. Muller, A note on the generation of random
 * normal deviates, Annals of Mathematical Statistics 29 (1958), 610–611.
 */
export function randomNormal(random: RandomSource): number {
  const radius = Math.sqrt(-2 * Math.log(1 - random()));
  return radius * Math.cos(2 * Math.PI * random());
}

/** A random integer from `low` to `high`, both included. */
export function randomInteger(random: RandomSource, low: number, high: number): number {
  return low + Math.floor(random() * (high - low + 1));
}

/**
 * `count` points in the unit cube, one array for each dimension: in every dimension each of the `count` equal
 * intervals holds one point.
 *
 * Source: M. D. McKay, R. J. Beckman, W. J. Conover, A comparison of three methods for selecting values of input
 * variables in the analysis of output from a computer code, Technometrics 21 (1979), 239–245.
 */
export function latinHypercube(
  random: RandomSource,
  dimensions: number,
  count: number,
): Float64Array[] {
  return Array.from({ length: dimensions }, () => {
    const order = shuffled(random, count);
    return Float64Array.from(order, (interval) => (interval + random()) / count);
  });
}

/** 0 … count − 1 in random order (Fisher–Yates). */
function shuffled(random: RandomSource, count: number): number[] {
  const order = Array.from({ length: count }, (_, i) => i);
  for (let i = count - 1; i > 0; i--) {
    const k = randomInteger(random, 0, i);
    [order[i], order[k]] = [order[k]!, order[i]!];
  }
  return order;
}
