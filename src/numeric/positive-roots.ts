/** The value of a polynomial, highest power first, and the sum of the sizes of its terms. */
function valueAndSize(coefficients: readonly number[], x: number): readonly [number, number] {
  let [value, size] = [0, 0];
  for (const c of coefficients) {
    value = value * x + c;
    size = size * x + Math.abs(c);
  }
  return [value, size];
}

/** Values this small against their terms count as 0: there the curve touches the axis. */
const TOUCHING = 1e-13;
const MOST_HALVINGS = 200;

/** The root between two places of opposite sign, by halving: in the logarithm while the ends are far apart. */
function rootBetween(coefficients: readonly number[], from: number, to: number): number {
  let [low, high] = [from, to];
  const rises = valueAndSize(coefficients, high)[0] > 0;
  for (let k = 0; k < MOST_HALVINGS; k++) {
    const apart = low > 0 ? high > 4 * low : high > 1e-300;
    const middle = apart ? Math.sqrt(Math.max(low, high * 1e-12) * high) : low + (high - low) / 2;
    if (middle <= low || middle >= high) break;
    if (valueAndSize(coefficients, middle)[0] > 0 === rises) high = middle;
    else low = middle;
  }
  return high;
}

/** A bound of all roots (M. Fujiwara, Tôhoku Mathematical Journal 10 (1916), 167–171). */
function boundOf([lead, ...others]: readonly number[]): number {
  return 2 * Math.max(...others.map((c, k) => Math.abs(c / lead!) ** (1 / (k + 1))));
}

/**
 * The positive roots of a polynomial with real coefficients, highest power first, ascending, each once.
 *
 * Between the roots of the derivative a polynomial is monotone, so that every root is bracketed; where it only touches
 * the axis within rounding, that place counts as a root. Cost: about degree² halvings of an interval.
 *
 * @example positiveRoots([1, -3, 2]) // [1, 2]
 */
export function positiveRoots(coefficients: readonly number[]): number[] {
  const first = coefficients.findIndex((c) => c !== 0);
  const last = coefficients.findLastIndex((c) => c !== 0);
  if (first === last || !coefficients.every(Number.isFinite)) return [];
  const p = coefficients.slice(first, last + 1);
  const degree = p.length - 1;
  if (degree === 1) return p[0]! * p[1]! < 0 ? [-p[1]! / p[0]!] : [];
  const turns = positiveRoots(p.slice(0, -1).map((c, k) => c * (degree - k)));
  const ends = [0, ...turns, Math.max(2 * (turns.at(-1) ?? 0), 2 * boundOf(p))];
  const values = ends.map((x) => signAt(p, x));
  const roots: number[] = [];
  ends.forEach((x, k) => {
    if (values[k] === 0) roots.push(x);
    else if (values[k + 1] === -values[k]!) roots.push(rootBetween(p, x, ends[k + 1]!));
  });
  return roots;
}

function signAt(p: readonly number[], x: number): number {
  const [value, size] = valueAndSize(p, x);
  return Math.abs(value) <= TOUCHING * size ? 0 : Math.sign(value);
}
