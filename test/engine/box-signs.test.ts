import { expect, it } from 'vitest';
import { evaluateCell } from './worksheet.ts';

/** d/dx of x² − x y + y³ is 2 x − y: positive for x ≥ 1.8, y ≤ 2.2, though no sign of x and y says so. */
it('a span is found at the corners where Bernstein coefficients prove a formula monotone', () => {
  const { result } = evaluateCell('x is 2 ± 10 %\ny is 2 ± 10 %\nq = x^2 - x y + y^3');
  const [lowX, highX, lowY, highY] = [1.8, 2.2, 1.8, 2.2];
  expect(result('q').span).toMatchObject({
    how: 'corners',
    low: lowX ** 2 - lowX * lowY + lowY ** 3,
    high: highX ** 2 - highX * highY + highY ** 3,
  });
});

it('a span is sampled where a formula turns inside the tolerances', () => {
  const { result } = evaluateCell('x is 2 ± 10 %\nq = x^2 - 4 x');
  expect(result('q').span).toMatchObject({ how: 'sampled' });
});
