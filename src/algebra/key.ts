import type { Polynomial, Ratio } from './ring.ts';

const polynomialKeys = new WeakMap<Polynomial, string>();

function writeKey(p: Polynomial): string {
  const width = p.generators.length;
  const terms = p.coefficients.map((coefficient, i) =>
    [coefficient, ...p.exponents.subarray(i * width, (i + 1) * width)].join(' '),
  );
  return `[${p.generators.map((g) => g.key).join(',')}|${terms.join(';')}]`;
}

/** A text that two polynomials share exactly when they are equal; cached. */
export function polynomialKey(p: Polynomial): string {
  const known = polynomialKeys.get(p);
  if (known !== undefined) return known;
  const key = writeKey(p);
  polynomialKeys.set(p, key);
  return key;
}

/** A text that two ratios share exactly when they have the same canonical form. */
export function ratioKey(r: Ratio): string {
  return `${polynomialKey(r.num)}/${polynomialKey(r.den)}`;
}
