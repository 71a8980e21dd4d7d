import type { Generator, Polynomial } from './ring.ts';
import { polynomialOfTerms } from './terms.ts';

/** The terms of p, as lists of their indices, that agree in their exponents of some generators. */
export function rowsOver(
  p: Polynomial,
  generators: ReadonlySet<Generator>,
): readonly (readonly number[])[] {
  const width = p.generators.length;
  const columns = [...p.generators.keys()].filter((k) => generators.has(p.generators[k]));
  const size = columns.reduce((product, k) => product * (p.degrees[k] + 1), 1);
  const groups = new Map<number | string, number[]>();
  for (let i = 0; i < p.coefficients.length; i += 1) {
    const row = i * width;
    // One number in mixed radix where it stays exact, else a text.
    const key =
      size < Number.MAX_SAFE_INTEGER
        ? columns.reduce((sum, k) => sum * (p.degrees[k] + 1) + p.exponents[row + k], 0)
        : columns.map((k) => p.exponents[row + k]).join();
    const group = groups.get(key);
    if (group) group.push(i);
    else groups.set(key, [i]);
  }
  return [...groups.values()];
}

/** The sum of some terms of p, all with the same exponents of some generators, divided by those. */
export function coefficientOf(
  p: Polynomial,
  rows: readonly number[],
  generators: ReadonlySet<Generator>,
): Polynomial {
  const width = p.generators.length;
  const kept = [...p.generators.keys()].filter((k) => !generators.has(p.generators[k]));
  const exponents = new Int32Array(rows.length * kept.length);
  rows.forEach((i, to) => {
    kept.forEach((k, place) => {
      exponents[to * kept.length + place] = p.exponents[i * width + k];
    });
  });
  return polynomialOfTerms(
    kept.map((k) => p.generators[k]),
    exponents,
    rows.map((i) => p.coefficients[i]),
  );
}
