import type { PrimeField } from './prime-field.ts';

/** Π (z − nodes[i]), ascending. */
function masterPolynomial(nodes: readonly number[], field: PrimeField): number[] {
  const master = [1];
  for (const node of nodes) {
    master.push(0);
    for (let k = master.length - 1; k >= 0; k -= 1) {
      const lower = k > 0 ? master[k - 1] : 0;
      master[k] = field.sub(lower, field.mul(node, master[k]));
    }
  }
  return master;
}

/**
 * Solves Σ_i x[i] · nodes[i]^k = sums[k], k = 1 … n, modulo a prime, for distinct nodes other than zero, in n²
 * steps.
 *
 * Source: R. Zippel, "Interpolating polynomials from their values", Journal of Symbolic Computation 9 (1990),
 * section 3 (transposed Vandermonde systems).
 */
export function solveVandermonde(
  nodes: readonly number[],
  sums: readonly number[],
  field: PrimeField,
): number[] {
  const master = masterPolynomial(nodes, field);
  return nodes.map((node) => {
    // Synthetic division by (z − node) gives the polynomial that vanishes at the other nodes only.
    let coefficient = 0;
    let value = 0;
    let sum = 0;
    for (let k = nodes.length; k >= 1; k -= 1) {
      coefficient = field.add(master[k], field.mul(coefficient, node));
      value = field.add(field.mul(value, node), coefficient);
      sum = field.add(sum, field.mul(coefficient, sums[k - 1]));
    }
    return field.mul(sum, field.inverse(field.mul(value, node)));
  });
}

/** The coefficients, ascending, of the polynomial through (points[i], values[i]) modulo a prime (Newton's form). */
export function interpolate(
  points: readonly number[],
  values: readonly number[],
  field: PrimeField,
): number[] {
  let result: number[] = [];
  let master = [1];
  points.forEach((point, i) => {
    const at = (f: readonly number[]): number =>
      f.reduceRight((sum, c) => field.add(field.mul(sum, point), c), 0);
    const gap = field.sub(values[i], at(result));
    const step = field.mul(gap, field.inverse(at(master)));
    result = master.map((c, k) => field.add(result[k] ?? 0, field.mul(step, c)));
    master = [0, ...master].map((c, k) => field.sub(c, field.mul(point, master[k] ?? 0)));
  });
  return result;
}
