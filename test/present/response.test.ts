import katex from 'katex';
import { describe, expect, it } from 'vitest';
import { isRefusal } from '../../src/base/index.ts';
import { ALWAYS, responseOf, type Response, type SignalTerm } from '../../src/control/index.ts';
import { responseLatex, responseText } from '../../src/present/index.ts';
import { readFormula, writingOf } from './read-formula.ts';

const writing = writingOf('R J b Kp T omega', 'Kp');

function responseTo(...terms: readonly (readonly [transform: string, after: string])[]): Response {
  const signal = terms.map(([transform, after]): SignalTerm => ({
    input: 'w',
    source: 'constant',
    transform: readFormula(transform),
    after: readFormula(after),
  }));
  const response = responseOf(
    {
      kind: 'signal',
      name: 'x',
      terms: signal,
      blocks: [],
      inputs: [],
      when: ALWAYS,
      notes: [],
    },
    writing.signOf,
  );
  if (isRefusal(response)) throw new Error(response.reason);
  return response;
}

describe('a response is written as a function of time', () => {
  it.each<[string, Response, string]>([
    ['a lag', responseTo(['R/(s (T s + 1))', '0']), 'R - R exp(-t/T)'],
    ['a ramp', responseTo(['R/s^2', '0']), 'R t'],
    ['a parabola', responseTo(['R/s^3', '0']), 'R t^2/2'],
    ['an oscillation', responseTo(['R/(s^2 + omega^2)', '0']), 'R sin(ω t)/ω'],
    ['a damped oscillation', responseTo(['(s + 1)/((s + 1)^2 + 4)', '0']), 'exp(-t) cos(2 t)'],
    ['a later step', responseTo(['R/s', '0'], ['1/s', 'T']), 'R + [1 from t = T on]'],
    ['a later ramp', responseTo(['1/s^2', '5']), '[t - 5 from t = 5 on]'],
    ['an impulse', responseTo(['R', '0']), 'R delta(t)'],
    ['nothing', responseTo(['0', '0']), '0'],
  ])('%s', (_, response, expected) => {
    expect(responseText(response, writing)).toBe(expected);
    katex.renderToString(responseLatex(response, writing), { strict: 'error' });
  });

  it('in decimals where the roots have no short exact form, and says so', () => {
    const response = responseTo(['1/(s (s^3 + 2 s^2 + 3 s + 1))', '0']);
    expect(response.exact).toBe(false);
    expect(responseText(response, writing)).toMatch(/^≈ 1 /);
    katex.renderToString(responseLatex(response, writing), { strict: 'error' });
  });
});
