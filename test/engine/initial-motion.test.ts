import { describe, expect, it } from 'vitest';
import { evaluateCell } from './worksheet.ts';

const PENDULUM = `
J, d, k, p, v are positive
loop swing driven by T
  J phi'' + d phi' + k phi = T
  power = phi'
case let_go of swing
  phi starts at p
  phi' starts at v`;

/** J phi'' = −d phi' − k phi holds at t = 0+ too, with phi = p and phi' = v. */
describe('derivatives of a signal that starts at a value of its own', () => {
  it.each([
    ['initial(let_go.phi)', 'p'],
    ["initial(let_go.phi')", 'v'],
    ["initial(let_go.phi'')", '-(d v + k p)/J'],
  ])('%s is %s', (formula, expected) => {
    const { result } = evaluateCell(`${PENDULUM}\nx0 = ${formula}\nagrees = same(x0, ${expected})`);
    expect(result('agrees').value).toBe(true);
  });

  it("leave no impulse in the response: phi' is the signal that the loop equates with it", () => {
    const { result } = evaluateCell(
      `${PENDULUM}\na = response(let_go.phi')\nb = response(let_go.power)`,
    );
    expect(result('a').formula).not.toBeNull();
    expect(result('a').formula).toBe(result('b').formula);
  });
});

/** A pure integration behind a stable loop: x itself grows, and its rate is what the loop settles to. */
describe('the derivative of a signal that integrates', () => {
  const FEED = `
K, a, v, d are positive
loop feed driven by r
  y' = K (r - y)
  x' = a y
  z' = x
  q'' + d q' = y
case run of feed
  r = step(v)`;

  it.each([
    ["final(run.x')", 'a v'],
    ["final(run.z'')", 'a v'],
    ["final(run.q')", 'v/d'],
  ])('%s is %s', (formula, expected) => {
    const { result } = evaluateCell(`${FEED}\nx0 = ${formula}\nagrees = same(x0, ${expected})`);
    expect(result('agrees').value).toBe(true);
  });

  it('has no final value of its own, nor has a derivative of too low an order', () => {
    const { result } = evaluateCell(`${FEED}\nx0 = final(run.x)\nz1 = final(run.z')`);
    expect(result('x0').notes.join()).toContain('grows without bound, as t');
    expect(result('z1').notes.join()).toContain('grows without bound, as t');
  });
});
