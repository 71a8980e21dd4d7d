import { describe, expect, test } from 'vitest';
import { evaluateCell } from './worksheet.ts';

/** A loop whose gain is the final value of another one, which exists only where K is positive. */
const pair = (K: string, statements: string, q = '0.5 1/s') => `
K is ${K}
q is ${q}
A is 3 m
w0 is 1 1/s
loop a driven by r
  y' = (K - q) (r - y)
case c of a
  r = step(A)
g = final(c.y)
loop b driven by r
  y' = -w0 (g/A) (y - r)
case d of b
  r = step(1)
case e of a
  r = step(g)
${statements}`;

describe("a loop's coefficients may be results of another loop", () => {
  const statements = `stable(b)
b(r -> y)
final(d.y)
final(e.y)
require stable(b) # R-1
require final(d.y) <= 2 # R-2`;

  test('and are used where these exist', () => {
    const cell = evaluateCell(pair('2 1/s', statements));
    expect(cell.problems).toEqual([]);
    expect(cell.result('final(d.y)').value).toBe(1);
    expect(cell.result('final(e.y)')).toMatchObject({ value: 3, unit: 'm' });
    expect(cell.requirement('R-1').verdict).toBe('met');
    expect(cell.requirement('R-2').verdict).toBe('met');
  });

  test('and give nothing where these do not exist', () => {
    const cell = evaluateCell(pair('-2 1/s', statements));
    const why =
      'No value at the nominal: the block of y has a root outside the open left half plane, s = 2.5.';
    for (const statement of ['stable(b)', 'final(d.y)', 'final(e.y)']) {
      expect(cell.result(statement).value).toBeNull();
      expect(cell.result(statement).notes).toContain(why);
    }
    expect(cell.requirement('R-1').verdict).toBe('not met');
    expect(cell.requirement('R-2').verdict).toBe('not met');
  });

  test('and are judged over the tolerances too', () => {
    const cell = evaluateCell(pair('1 1/s', statements, '0.5 1/s from 0.4 to 2 1/s'));
    expect(cell.requirement('R-1').verdict).toBe('met at nominal only');
    expect(cell.result('final(d.y)').span).toBeNull();
  });

  test('but never its own', () => {
    const cell = evaluateCell(`
loop a driven by r
  y' = g (r - y)
case c of a
  r = step(1)
g = final(c.y)
stable(a)`);
    expect(cell.problems).toEqual(
      ['a', 'c', 'g'].map(
        (name) =>
          `error at ‹${name}›: a, g, c are defined in a circle, in lines 3, 5 and 7; break it at one of them.`,
      ),
    );
    expect(cell.result('stable(a)')).toMatchObject({ state: 'error', value: null });
  });

  test('and a coefficient that can have no value is a problem that says why', () => {
    const { problems } = evaluateCell(`
K is 2 1/s
loop a driven by r
  y' = K r
case c of a
  r = step(1)
g = final(c.y)
loop b driven by r
  y' = -g y + r`);
    expect(problems).toEqual([
      'error at ‹g›: g has no value, so it cannot be a coefficient of a loop: grows without bound, as t (rate K)',
    ]);
  });
});
