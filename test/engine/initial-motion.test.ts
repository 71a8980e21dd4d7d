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

/** J φ'' = −d φ' − k φ holds at t = 0+ too, with φ = p and φ' = v. */
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
