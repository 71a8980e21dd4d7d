import type { CheckRecord } from './check-record.ts';

/** Exit codes of the command; where several apply, the largest wins. */
export const EXIT = { allMet: 0, notMet: 1, error: 2 } as const;

/** What one file alone makes `check` exit with; warnings do not count. */
export function exitCode({ requirements, problems }: CheckRecord): number {
  if (problems.some(({ severity }) => severity === 'error')) return EXIT.error;
  return requirements.every(({ verdict }) => verdict === 'met') ? EXIT.allMet : EXIT.notMet;
}
