/** A parameter with hard bounds, in SI. */
export interface Bounds {
  readonly name: string;
  readonly low: number;
  readonly high: number;
}

/** Corners of a box of tolerances, one array for each parameter. */
export interface Corners {
  readonly columns: readonly Float64Array[];
  readonly count: number;
  /** Whether these are all corners; past the limit they are a spread selection. */
  readonly complete: boolean;
}

/** An odd number near 2³²/golden ratio: its multiples modulo a power of two are spread evenly. */
const SPREAD = 2654435769n;

/**
 * The corners of a box: every parameter at one of its bounds.
 *
 * All 2ⁿ corners if these are at most `limit`; else `limit` of them, spread evenly and the same every time. Corner 0 has
 * every parameter at its lower bound. Parameters without width are counted once.
 */
export function cornersOf(box: readonly Bounds[], limit: number): Corners {
  const wide = box.map((b) => b.low !== b.high);
  const width = wide.filter(Boolean).length;
  const total = 1n << BigInt(width);
  const complete = total <= BigInt(limit);
  const count = complete ? Number(total) : limit;
  const columns = box.map(() => new Float64Array(count));
  for (let i = 0; i < count; i++) {
    let bits = complete ? BigInt(i) : (BigInt(i) * SPREAD) % total;
    box.forEach((b, k) => {
      columns[k][i] = wide[k] && (bits & 1n) === 1n ? b.high : b.low;
      if (wide[k]) bits >>= 1n;
    });
  }
  return { columns, count, complete };
}
