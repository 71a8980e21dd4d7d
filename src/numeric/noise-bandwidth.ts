/**
 * ∫₀^∞ |H(j2πf)|² df of a strictly proper transfer function; NaN unless all its poles decay, or where it is not strictly
 * proper.
 *
 * `numerator`, `denominator`: coefficients of s, highest power first. Cost: the square of the degree.
 * Source: K. J. Åström, Introduction to Stochastic Control Theory, Academic Press, 1970, chapter 5, section 3 (from
 * memory).
 */
export function noiseBandwidthOf(
  numerator: ArrayLike<number>,
  denominator: ArrayLike<number>,
): number {
  const a = withoutLeadingZeros(denominator);
  const top = withoutLeadingZeros(numerator);
  const degree = a.length - 1;
  if (top.length === 0) return 0;
  if (top.length > degree) return NaN;
  const b = [...new Array<number>(degree - top.length).fill(0), ...top];
  let sum = 0;
  for (let k = 0; k < degree; k++) {
    if (!(a[k] * a[k + 1] > 0)) return NaN;
    const [alpha, beta] = [a[k] / a[k + 1], b[k] / a[k + 1]];
    sum += (b[k] * beta) / a[k];
    for (let i = k + 1; i <= degree; i += 2) {
      b[i - 1] -= beta * a[i];
      a[i - 1] -= alpha * a[i];
    }
  }
  return sum / 4;
}

function withoutLeadingZeros(coefficients: ArrayLike<number>): number[] {
  const all = Array.from(coefficients);
  const first = all.findIndex((c) => c !== 0);
  return first < 0 ? [] : all.slice(first);
}
