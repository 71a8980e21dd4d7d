import { expect, it } from 'vitest';
import { evaluateCell } from './worksheet.ts';

const FILLING = `
a is 1 1/h
loop tank driven by q
  h' + a h = q
case filling of tank
  q = step(1 1/h)`;

it.each([
  ['2 h', 'h', 2],
  ['90 min', 'min', 90],
  ['100 s', 's', 100],
  ['2/a', 's', 7200],
])('a response over %s has its axis in %s', (over, unit, to) => {
  const { result, problems } = evaluateCell(`${FILLING}\ndraw response of filling.h over ${over}`);
  expect(problems).toEqual([]);
  const { figure } = result('draw');
  expect(figure).toMatchObject({ x: { label: `time t, ${unit}`, unit, from: 0 } });
  if (figure?.kind !== 'response') throw new Error('not a response');
  expect(figure.x.to).toBeCloseTo(to, 9);
  const [time, level] = figure.curves[0].points.at(-1)!;
  const hours = { h: time, min: time / 60, s: time / 3600 }[unit]!;
  expect(level).toBeCloseTo(1 - Math.exp(-hours), 4);
});
