import { refuse } from '../base/index.ts';
import type { Refusal } from '../base/index.ts';

/** Positive nodes of the 15-point Kronrod rule, the odd ones being those of the 7-point Gauss rule: QUADPACK, routine QK15. */
const NODES = [
  0.991455371120812639206854697526329, 0.949107912342758524526189684047851,
  0.864864423359769072789712788640926, 0.741531185599394439863864773280788,
  0.58608723546769113029414469119386, 0.405845151377397166906606412076961,
  0.207784955007898467600689403773245, 0,
];
const KRONROD = [
  0.02293532201052922496373200805897, 0.063092092629978553290700663189204,
  0.104790010322250183839876322541518, 0.140653259715525918745189590510238,
  0.16900472663926790282829543641, 0.190350578064785409913256402421014,
  0.204432940075298892414161999234649, 0.209482141084727828012999174891714,
];
const GAUSS = [
  0, 0.129484966168869693270611432679082, 0, 0.27970539148927666790146777142378, 0,
  0.381830050505118944950369775488975, 0, 0.417959183673469387755102040816327,
];

/** An integral with an estimate of its absolute error. */
export interface Integral {
  readonly value: number;
  readonly error: number;
}

/** How exact an integral should be; the looser of the two holds. */
export interface IntegralTolerance {
  readonly relative?: number;
  readonly absolute?: number;
  /** Intervals after which it gives up. */
  readonly intervals?: number;
}

interface Piece extends Integral {
  readonly from: number;
  readonly to: number;
}

/**
 * The integral of a function over an interval, which may be infinite on either side, by adaptive bisection of the
 * interval with the largest error.
 *
 * Refuses where the tolerance is not reached, as for a divergent integral, or a value is not finite.
 *
 * Source: R. Piessens, E. de Doncker-Kapenga, C. W. Überhuber, D. K. Kahaner, QUADPACK, 1983, sections 2.2.1 and 3.1
 * (routines QAG and QK15; infinite intervals by the substitution of QAGI).
 */
export function integrate(
  integrand: (x: number) => number,
  from: number,
  to: number,
  tolerance: IntegralTolerance = {},
): Integral | Refusal {
  const { relative = 1e-10, absolute = 0, intervals = 2000 } = tolerance;
  const isReached = ({ value, error }: Integral): boolean =>
    Number.isFinite(value) && error <= Math.max(absolute, relative * Math.abs(value));
  const [mapped, low, high] = finiteForm(integrand, from, to);
  let pieces = [kronrodPiece(mapped, low, high)];
  let total = totalOf(pieces);
  while (!isReached(total)) {
    const worst = pieces.reduce((most, piece) => (piece.error > most.error ? piece : most));
    const middle = (worst.from + worst.to) / 2;
    if (pieces.length >= intervals || middle <= worst.from || middle >= worst.to) break;
    const halves = [
      kronrodPiece(mapped, worst.from, middle),
      kronrodPiece(mapped, middle, worst.to),
    ];
    pieces = [...pieces.filter((piece) => piece !== worst), ...halves];
    total = totalOf(pieces);
  }
  return isReached(total)
    ? total
    : refuse(
        'integral-unsettled',
        `the integral from ${from} to ${to} does not settle: ${total.value} ± ${total.error}`,
      );
}

/** Infinite intervals as (0, 1]: x = a + (1 − t)/t; two infinite ends are folded together at 0. */
function finiteForm(
  integrand: (x: number) => number,
  from: number,
  to: number,
): [(x: number) => number, number, number] {
  if (Number.isFinite(from) && Number.isFinite(to)) return [integrand, from, to];
  const folded = (x: number): number => {
    if (Number.isFinite(from)) return integrand(from + x);
    return Number.isFinite(to) ? integrand(to - x) : integrand(x) + integrand(-x);
  };
  return [(t) => folded((1 - t) / t) / (t * t), 0, 1];
}

function kronrodPiece(integrand: (x: number) => number, from: number, to: number): Piece {
  const centre = (from + to) / 2;
  const half = (to - from) / 2;
  let kronrod = 0;
  let gauss = 0;
  let size = 0;
  NODES.forEach((node, i) => {
    const pair =
      node === 0 ? [integrand(centre)] : [-1, 1].map((k) => integrand(centre + k * half * node));
    for (const value of pair) {
      kronrod += KRONROD[i]! * value;
      gauss += GAUSS[i]! * value;
      size += KRONROD[i]! * Math.abs(value);
    }
  });
  const rounding = 8 * Number.EPSILON * size * Math.abs(half);
  // The rule's error is far below its difference to Gauss's: QUADPACK's estimate, section 2.2.4.1.
  const difference = Math.abs((kronrod - gauss) * half);
  const scale = size * Math.abs(half);
  const estimate = scale > 0 ? scale * Math.min(1, ((200 * difference) / scale) ** 1.5) : 0;
  const error = Math.max(Math.min(difference, estimate), rounding);
  return { from, to, value: kronrod * half, error: Number.isNaN(error) ? Infinity : error };
}

function totalOf(pieces: readonly Piece[]): Integral {
  const value = pieces.reduce((sum, piece) => sum + piece.value, 0);
  return { value, error: pieces.reduce((sum, piece) => sum + piece.error, 0) };
}
