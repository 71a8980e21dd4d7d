import { execFileSync } from 'node:child_process';
import { readdirSync } from 'node:fs';
import { bench, describe } from 'vitest';

const worksheets = readdirSync('worksheets').filter((name) => name.endsWith('.md'));

/** Runs a whole process; a verdict that is not met is no failure here. */
function run(args: readonly string[]): void {
  try {
    execFileSync(process.execPath, args, { stdio: 'ignore' });
  } catch (error) {
    if ((error as { status?: number }).status !== 1) throw error;
  }
}

describe('the whole command as a process (after npm run build)', () => {
  bench('node that does nothing (the reference)', () => run(['-e', '0']), { iterations: 5 });
  for (const name of worksheets) {
    bench(`check ${name}`, () => run(['build/cli/loopwright.js', 'check', `worksheets/${name}`]), {
      iterations: 5,
    });
  }
});
