import { describe, expect, it } from 'vitest';
import { evaluateCell } from './worksheet.ts';

function solved(polynomial: string, more = '') {
  const { result, problems } = evaluateCell(`K is 3\nx = solve(stable(${polynomial}), K${more})`);
  return { ...result('x'), problems };
}

describe('the intervals of stable gains', () => {
  /** s³ + 3 s² + 2 s + K closes K/(s (s + 1) (s + 2)): stable for 0 < K < 6 (Routh). */
  it('have exact ends where these are rational', () => {
    expect(solved('s^3 + 3 s^2 + 2 s + K')).toMatchObject({
      formula: '0 < K < 6',
      latex: '0<K<6',
      value: true,
      notes: [],
    });
  });

  /** s³ + (6 − K) s² + (5 + K) s + K is stable where (6 − K)(5 + K) > K, K² < 30 (Routh). */
  it('have exact ends where these are square roots', () => {
    expect(solved('s^3 + (6 - K) s^2 + (5 + K) s + K').formula).toBe(
      '0 < K < sqrt(2) sqrt(3) sqrt(5)',
    );
  });

  /** s³ + K s² + K² s + 2 is stable for K³ > 2 (Routh): 2^(1/3) = 1.259921049894873164767 (OEIS A002580). */
  it('are rounded inwards where the ends are roots of higher degree, and that is said', () => {
    expect(solved('s^3 + K s^2 + K^2 s + 2')).toMatchObject({
      formula: 'K > 1.2599210499',
      notes: ['The end near 1.259 is a root of K^3 - 2; it is rounded inwards to 12 digits.'],
    });
    expect(solved('s^3 + K s^2 + K^2 s + 2', ', 22').formula).toBe('K > 1.259921049894873164768');
  });

  /** s⁴ + 2 s³ + (5 − K) s² + (3 − K) s + 1: K < 3 and 2 (5 − K)(3 − K) > (3 − K)² + 4, K² − 10 K + 17 > 0. */
  it('end where the first of several conditions does', () => {
    expect(solved('s^4 + 2 s^3 + (5 - K) s^2 + (3 - K) s + 1').formula).toBe('K < 5 - 2 sqrt(2)');
  });

  /** (s + K)(s + 2 − K) is stable for 0 < K < 2, s + K² − 1 for K² > 1. */
  it('may be several, and are those that all blocks have in common', () => {
    expect(solved('s + K^2 - 1').formula).toBe('K < -1 or K > 1');
    expect(solved('(s^2 + 2 s + K (2 - K)) (s + K^2 - 1)').formula).toBe('1 < K < 2');
  });

  it('are conditions where other symbols stand, with what would make them intervals', () => {
    const { result } = evaluateCell(
      'K is 3\na is 2\na, K are positive\nx = solve(stable(s^3 + a s^2 + K s + 2), K)\n' +
        'y = solve(stable(s^3 + a s^2 + (K^2 + K) s + 2), K)',
    );
    expect(result('x')).toMatchObject({ formula: 'K > 2/a' });
    expect(result('y').formula).toBe('K^2 a + K a > 2');
    expect(result('y').notes).toContain(
      'A condition is not linear in K; with numbers for all other symbols, stable(… with (…)), the intervals of K are exact.',
    );
  });

  it('refuse digits beyond measure', () => {
    expect(solved('s + K', ', 1001').problems).toEqual([expect.stringContaining('1000')]);
  });
});
