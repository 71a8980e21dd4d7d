import { execFileSync } from 'node:child_process';
import { mkdtempSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { simplify, rationalize } from 'mathjs';
import { build } from 'vite';
import { beforeAll, bench, describe } from 'vitest';
import type { Measured } from './algebra-cold.ts';
import { TASKS } from './algebra-tasks.ts';

/** Old generation of the processes that measure: a task that needs more than the bound dies. */
const HEAP_MEGABYTES = 64;
/** Task i keeps the largest loop that it can close, which may take more. */
const RECORD_MEGABYTES = 1024;

async function coldProgram(): Promise<string> {
  const outDir = mkdtempSync(join(tmpdir(), 'loopwright-bench-'));
  await build({
    configFile: false,
    logLevel: 'error',
    build: { ssr: 'test/bench/algebra-cold.ts', outDir, emptyOutDir: false },
  });
  return join(outDir, 'algebra-cold.js');
}

function measure(program: string, key: string): Measured {
  const heap = key === 'i' ? RECORD_MEGABYTES : HEAP_MEGABYTES;
  const args = [`--max-old-space-size=${heap}`, program, key];
  return JSON.parse(execFileSync(process.execPath, args, { encoding: 'utf8' })) as Measured;
}

/** The same tasks in sympy, by task key in milliseconds, where Debian's python3-sympy is installed and asked for. */
function sympyTimes(): Readonly<Record<string, number>> {
  if (process.env.LOOPWRIGHT_SYMPY !== '1') return {};
  const output = execFileSync('python3', ['test/bench/algebra_reference.py'], { encoding: 'utf8' });
  return JSON.parse(output) as Record<string, number>;
}

const milliseconds = (time: number | undefined): string =>
  time === undefined ? '–' : String(Number(time.toPrecision(3)));

const HEAD = 'aim ms, first run ms, warm ms, sympy ms, terms, bits, heap MB: task\n';

beforeAll(async () => {
  const program = await coldProgram();
  const sympy = sympyTimes();
  const lines = [...Object.keys(TASKS), 'i'].map((key) => {
    const { name, aim, coldMs, warmMs, terms, bits, heapMegabytes } = measure(program, key);
    const times = [aim, coldMs, warmMs, sympy[key]].map(milliseconds);
    const sizes = [terms, bits, Math.round(heapMegabytes)].map(String);
    return `${[...times, ...sizes].map((cell) => cell.padStart(8)).join('')}  ${name}\n`;
  });
  process.stdout.write(HEAD + lines.join(''));
}, 600_000);

describe('the tasks of exact algebra', () => {
  for (const make of Object.values(TASKS)) {
    const { name, run } = make();
    bench(name, () => void run(), { time: 300 });
  }
});

/*
 * The reference from npm is mathjs, which the project has anyway. It does not finish task a within 40 s, nor the
 * larger ones; this is the largest piece of them that it reduces.
 */
describe('the fourth element of a Routh column, all symbols', () => {
  const element = '((a1*a2 - a0*a3)*a3 - a1*(a1*a4 - a0*a5))/(a1*a2 - a0*a3)';
  bench('mathjs, rationalize', () => void rationalize(element), { time: 300 });
  bench('mathjs, simplify', () => void simplify(element), { time: 300 });
  const column = TASKS.d5().run;
  bench('Loopwright, the whole column of degree 5', () => void column(), { time: 300 });
});
