import { bitLength } from '../../src/algebra/integer.ts';
import type { Polynomial, Ratio } from '../../src/algebra/index.ts';
import { chain, TASKS } from './algebra-tasks.ts';

/*
 * One task in a process of its own: its first run, the median of runs for half a second after that, the size of its
 * result, the heap. With the key `i`: the largest chain that closes in a second, each tried once.
 */

/** What one process measured. */
export interface Measured {
  readonly name: string;
  readonly aim: number;
  readonly coldMs: number;
  readonly warmMs: number;
  readonly terms: number;
  readonly bits: number;
  readonly heapMegabytes: number;
}

const WARM_MS = 500;

function timed<T>(run: () => T): { readonly ms: number; readonly result: T } {
  const start = performance.now();
  const result = run();
  return { ms: performance.now() - start, result };
}

function sizeOf(results: readonly (Ratio | Polynomial)[]): { terms: number; bits: number } {
  const parts = results.flatMap((r) => (r.kind === 'ratio' ? [r.num, r.den] : [r]));
  const coefficients = parts.flatMap((p) => p.coefficients);
  const bits = coefficients.reduce((most, c) => Math.max(most, bitLength(c)), 0);
  return { terms: coefficients.length, bits };
}

function medianOfRuns(run: () => unknown): number {
  const times: number[] = [];
  for (const start = performance.now(); performance.now() - start < WARM_MS;) {
    times.push(timed(run).ms);
  }
  return times.sort((a, b) => a - b)[times.length >> 1];
}

const heapMegabytes = (): number => process.memoryUsage().heapUsed / 2 ** 20;

function measured(key: string): Measured {
  const { name, aim, run } = TASKS[key]();
  const { ms: coldMs, result } = timed(run);
  const warmMs = medianOfRuns(run);
  return { name, aim, coldMs, warmMs, ...sizeOf(result), heapMegabytes: heapMegabytes() };
}

function largestChain(): Measured {
  let stages = 2;
  let last = timed(chain(stages));
  for (let next = last; next.ms < 1000; next = timed(chain(stages + 1)), stages += 1) last = next;
  const within = stages - 1;
  const name = `i. a chain of ${2 * within} signals and ${3 * within} symbols, the largest within 1 s`;
  const size = sizeOf(last.result);
  return {
    name,
    aim: 1000,
    coldMs: last.ms,
    warmMs: last.ms,
    ...size,
    heapMegabytes: heapMegabytes(),
  };
}

const [key] = process.argv.slice(2);
process.stdout.write(JSON.stringify(key === 'i' ? largestChain() : measured(key)));
