/** A frequency at which a loop gain passes the unit circle or the negative real axis. */
export interface Crossing {
  /** rad/s */
  readonly frequency: number;
  /** The factor of the gain (gain margin), the angle in rad (phase margin) or the time in s (delay margin) there. */
  readonly margin: number;
  readonly binding: boolean;
}

/** A number found from others, or why there is none; infinite with the reason too. */
export interface Finding {
  readonly value: number;
  readonly reason: string | null;
  /** What is said of a value that exists. */
  readonly notes: readonly string[];
  readonly crossings: readonly Crossing[];
}

export function found(value: number, notes: readonly string[] = []): Finding {
  return { value, reason: null, notes, crossings: [] };
}

/** No number, or (where `value` says so) an infinite one. */
export function notFound(reason: string, value = NaN): Finding {
  return { value, reason, notes: [], crossings: [] };
}
