import { describe, expect, test } from 'vitest';
import { evaluateCell } from './worksheet.ts';

/** An integrator with dead time in its loop; on the boundary of stability at K Td = π/2. */
const loop = (K: string, more: string) => `
Td is 0.2 s
K is ${K}
K, Td are positive
loop a driven by r
  y' = K delay(Td) (r - y)
  e = r - y
case c of a
  r = step(3)
${more}`;

describe('dead time in a loop', () => {
  test('stability is decided for the dead time itself', () => {
    const require = 'require stable(a) # R-1';
    expect(evaluateCell(loop('7.8 1/s', require)).requirement('R-1').verdict).toBe('met');
    expect(evaluateCell(loop('7.9 1/s', require)).requirement('R-1')).toMatchObject({
      verdict: 'not met',
      notes: [
        'At the nominal or at the worst point the block of y is not stable with its dead time.',
      ],
    });
  });

  test('over a tolerance it is sampled, for nothing is proved monotone', () => {
    const cell = evaluateCell(loop('7 1/s ± 10 %', 'require stable(a) # R-1'));
    expect(cell.requirement('R-1')).toMatchObject({ verdict: 'met', how: 'sampled' });
    const wider = evaluateCell(loop('7 1/s ± 20 %', 'require stable(a) # R-1'));
    expect(wider.requirement('R-1').verdict).toBe('met at nominal only');
  });

  test('a final value exists where the loop is stable', () => {
    const statements = 'final(c.e)\nfinal(c.y)';
    const cell = evaluateCell(loop('7 1/s', statements));
    expect(cell.problems).toEqual([]);
    expect(cell.result('final(c.y)')).toMatchObject({ formula: '3', value: 3 });
    expect(cell.result('final(c.e)').value).toBe(0);
    const unstable = evaluateCell(loop('8 1/s', statements));
    expect(unstable.result('final(c.y)').value).toBeNull();
    expect(unstable.result('final(c.y)').notes.at(-1)).toBe(
      'No value at the nominal: the block of y is not stable with its dead time.',
    );
  });

  test('a Routh array is refused with the way out', () => {
    const { problems, result } = evaluateCell(loop('2 1/s', 'routh(a)'));
    expect(problems).toEqual([
      'error at ‹routh(a)›: a Routh array needs a polynomial in s; replace delay(Td) by rational_delay(Td, n).',
    ]);
    expect(result('routh(a)')).toMatchObject({ state: 'error', value: null });
  });

  test('its rational approximant has an array, and reads back', () => {
    const cell = evaluateCell(`
Td is 0.2 s
K is 2 1/s
K, Td are positive
loop a driven by r
  y' = K rational_delay(Td, 1) (r - y)
routh(a)
solve(stable(a), K)`);
    expect(cell.result('routh(a)').parts).toMatchObject({
      rows: [['Td', '2 K'], ['2 - Td K'], ['2 K']],
      conditions: ['Td K < 2'],
    });
    expect(cell.result('solve').formula).toBe('K < 2/Td');
  });

  test('behind the loop leaves final values as they are', () => {
    const cell = evaluateCell(`
Td is 0.2 s
K is 2 1/s
K is positive
loop a driven by r
  y' = K (r - y)
  z = delay(Td) y
case c of a
  r = step(3)
final(c.z)
stable(a)
initial(c.z)`);
    expect(cell.result('final(c.z)').value).toBe(3);
    expect(cell.result('stable(a)').value).toBe(true);
    expect(cell.result('initial(c.z)').value).toBe(0);
  });

  test('is written as the language reads it', () => {
    const cell = evaluateCell(loop('2 1/s', 'a(r -> y)\ncharacteristic(a)'));
    expect(cell.result('a(r -> y)').formula).toBe('K delay(Td)/(s + K delay(Td))');
    expect(cell.result('characteristic').formula).toBe('s + K delay(Td)');
  });

  test('conditions in symbols are said to be undecided, never false', () => {
    const cell = evaluateCell(loop('2 1/s', 'solve(stable(a), K)'));
    expect(cell.result('solve').value).toBeNull();
    expect(cell.result('solve').notes).toEqual([
      'Undecided: with dead time stability is decided at numbers only.',
    ]);
  });
});
