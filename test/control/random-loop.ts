import { fractionOfRatio, type Generator } from '../../src/algebra/index.ts';
import type { LoopRow } from '../../src/control/index.ts';
import { randomInteger, type RandomSource } from '../../src/numeric/index.ts';
import { determinantOf, dual, Pole } from './modular.ts';
import {
  difference,
  number,
  pick,
  product,
  quotient,
  randomNumber,
  S,
  sum,
  variable,
  type Formula,
  type Place,
} from './problem.ts';

/** A random loop with one input `u`: its equations for us, and as recipes for values. */
export interface RandomLoop {
  readonly unknowns: readonly string[];
  readonly rows: readonly LoopRow[];
  readonly recipes: readonly ReadonlyMap<string, Formula>[];
}

/** Coefficients that loops have: gains, first-order parts, lags, poles and zeros in the right half plane. */
function coefficient(random: RandomSource, symbols: readonly Generator[]): Formula {
  const gain = variable(pick(random, symbols));
  const small = number(BigInt(randomInteger(random, 1, 4)));
  const kind = random();
  if (kind < 0.35) return randomNumber(random);
  if (kind < 0.6) return gain;
  if (kind < 0.72) return sum(product(gain, S), randomNumber(random));
  if (kind < 0.84) return quotient(gain, sum(S, small));
  if (kind < 0.92) return quotient(difference(S, small), sum(S, number(2n)));
  return quotient(small, difference(S, number(1n)));
}

/** A loop of `size` signals; now and then with a row of zeros, or one that repeats another. */
export function randomLoop(
  random: RandomSource,
  size: number,
  symbols: readonly Generator[],
): RandomLoop {
  const unknowns = Array.from({ length: size }, (_, k) => `x${k}`);
  const density = size < 4 ? 0.5 : 1.1 / size;
  const recipes = unknowns.map((_, i) => {
    const row = new Map<string, Formula>();
    unknowns.forEach((name, k) => {
      if (i === k) row.set(name, random() < 0.6 ? number(1n) : coefficient(random, symbols));
      else if (random() < density) row.set(name, coefficient(random, symbols));
    });
    if (i === 0 || random() < 0.2) row.set('u', coefficient(random, symbols));
    return row;
  });
  const oddity = random();
  if (oddity < 0.02) recipes[size - 1] = new Map();
  else if (oddity < 0.05) recipes[size - 1] = recipes[0];
  return { unknowns, recipes, rows: recipes.map(rowOf) };
}

function rowOf(recipe: ReadonlyMap<string, Formula>): LoopRow {
  const coefficients = [...recipe].map(
    ([name, { exact }]) => [name, fractionOfRatio(exact)] as const,
  );
  return { coefficients: new Map(coefficients) };
}

/** The determinant of the equations in their unknowns; with `replaced`, that column is the input's, with its sign turned. */
export function determinantAt(
  { unknowns, recipes }: Pick<RandomLoop, 'unknowns' | 'recipes'>,
  place: Place,
  replaced?: string,
): bigint {
  return determinantOf(
    recipes.map((row) =>
      unknowns.map((name) => {
        const value = row.get(name === replaced ? 'u' : name)?.at(place).value ?? 0n;
        return name === replaced ? dual(-value).value : value;
      }),
    ),
  );
}

/** The first of a few random places at which something has a value. */
export function somewhere<T>(places: () => Place, compute: (place: Place) => T): T | null {
  for (let attempt = 0; attempt < 4; attempt += 1) {
    try {
      return compute(places());
    } catch (error) {
      if (!(error instanceof Pole)) throw error;
    }
  }
  return null;
}
