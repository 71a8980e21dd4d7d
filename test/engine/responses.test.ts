import { describe, expect, test } from 'vitest';
import { evaluateCell } from './worksheet.ts';

const textOf = (lines: string, x: string) => {
  const { problems, result } = evaluateCell(`${lines}\nresponse(${x})`);
  expect(problems).toEqual([]);
  return result('response').formula;
};

const RATES = 'K is 2 1/s\na is 3 1/s\nK, a are positive';

describe('a response in closed form', () => {
  test.each([
    ['K/(s (s + K))', '1 - exp(-K t)'],
    ['1/(s + K)^3', 't^2 exp(-K t)/2'],
    ['1/(s^2 + K^2)', 'sin(K t)/K'],
    ['s/(s^2 + K^2)', 'cos(K t)'],
    ['1/(s^2 - K^2)', 'exp(K t)/(2 K) - exp(-K t)/(2 K)'],
    ['1/((s + K) (s + a))', '-exp(-K t)/(K - a) + exp(-a t)/(K - a)'],
    ['1/s^3', 't^2/2'],
    ['s/(s + K)', 'delta(t) - K exp(-K t)'],
    ['s^2', "delta''(t)"],
    ['5', '5 delta(t)'],
    ['0', '0'],
  ])('of %s is %s', (transform, text) => {
    expect(textOf(RATES, transform)).toBe(text);
  });

  test('of a second-order lag names damping and natural frequency', () => {
    const lines = 'z is 0.5\nwn is 4 rad/s\nz, wn are positive';
    expect(textOf(lines, 'wn^2/(s (s^2 + 2 z wn s + wn^2))')).toBe(
      '1 - exp(-z wn t) cos(wn t sqrt(1 - z^2)) - z exp(-z wn t) sin(wn t sqrt(1 - z^2))/sqrt(1 - z^2)',
    );
  });

  test('of a signal has a term for each time at which something begins', () => {
    const loop = `${RATES}
loop l driven by r
  y' = K (r - y)
case c of l
  r = step(3) after 2 s + step(1)`;
    expect(textOf(loop, 'c.y')).toBe('1 - exp(-K t) + [3 - 3 exp(2 K - K t) from t = 2 on]');
  });

  test('is in decimals, and says so, where roots had to be found numerically', () => {
    const { result } = evaluateCell('response(1/(s^3 + s + 1))');
    expect(result('response').formula).toContain('≈');
    expect(result('response').notes).toContain('Amounts marked ≈ are rounded.');
  });

  test('is refused, with what to do, where symbols leave a cubic', () => {
    const { problems } = evaluateCell('K is real\nresponse(1/(s^3 + K s + 1))');
    expect(problems).toEqual([
      'error at ‹response(1/(s^3 + K s + 1))›: a factor of degree 3 of the denominator does not split with symbols; give numbers for them.',
    ]);
  });

  test('is evaluated at a time, on both sides of critical damping and at it', () => {
    const at = (z: number) => {
      const { problems, result } = evaluateCell(`
z is ${z}
wn is 4 rad/s
z, wn are positive
x = response(wn^2/(s (s^2 + 2 z wn s + wn^2)))
y = x with t = 0.5 [s]`);
      expect(problems).toEqual([]);
      return result('y').value;
    };
    const [w, t] = [4, 0.5];
    const d = w * Math.sqrt(0.75);
    const damped = Math.exp(-0.5 * w * t);
    expect(at(0.5)).toBeCloseTo(
      1 - damped * (Math.cos(d * t) + (0.5 / Math.sqrt(0.75)) * Math.sin(d * t)),
      12,
    );
    expect(at(1)).toBeCloseTo(1 - (1 + w * t) * Math.exp(-w * t), 12);
    const [p, q] = [w * (2 - Math.sqrt(3)), w * (2 + Math.sqrt(3))];
    expect(at(2)).toBeCloseTo(1 - (q * Math.exp(-p * t) - p * Math.exp(-q * t)) / (q - p), 12);
  });
});

describe('partial fractions', () => {
  test('stand as a sum, a polynomial first', () => {
    const { result } = evaluateCell('partial_fractions((s^3 + 1)/(s^2 + 3 s + 2))');
    expect(result('partial').formula).toBe('s - 3 + 7/(s + 2)');
  });

  test.each([
    'K/(s (s + K))',
    '(s + 3 K)/((s + K) (s^2 + K^2))',
    '1/(s^2 + 1)',
    '(s^4 + K^4)/(s^2 (s + a)^2)',
  ])('of %s add up to it again', (ratio) => {
    const { formula } = evaluateCell(`${RATES}\npartial_fractions(${ratio})`).result('partial');
    const again = evaluateCell(`${RATES}\nx = same(${formula}, ${ratio})`);
    expect(again.problems).toEqual([]);
    expect(again.result('x').value).toBe(true);
  });
});
