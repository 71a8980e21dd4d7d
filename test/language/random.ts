/** A seeded source of random numbers (mulberry32), so that a failing case can be seen again. */
export function randomSource(seed: number): (below: number) => number {
  let state = seed >>> 0;
  return (below) => {
    state = (state + 0x6d2b79f5) >>> 0;
    let bits = Math.imul(state ^ (state >>> 15), state | 1);
    bits ^= bits + Math.imul(bits ^ (bits >>> 7), bits | 61);
    return Math.floor((((bits ^ (bits >>> 14)) >>> 0) / 4294967296) * below);
  };
}
