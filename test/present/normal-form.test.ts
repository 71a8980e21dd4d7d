import fc from 'fast-check';
import katex from 'katex';
import { describe, expect, it } from 'vitest';
import { equalRatios } from '../../src/algebra/index.ts';
import { formulaLatex, formulaText } from '../../src/present/formula.ts';
import { readFormula, writingOf } from './read-formula.ts';

const writing = writingOf('K J b T1 T2 Td zeta omega_n a c', 'K');

const FORMS = ['time constants', 'poles and zeros'] as const;

describe('time-constant form and pole-zero form', () => {
  it.each([
    ['K/(s (J s + b))', 'K/(b s (1 + J s/b))', 'K/(J s (s + b/J))'],
    ['K (T1 s + 1)/(T2 s + 1)', 'K (1 + T1 s)/(1 + T2 s)', 'K T1 (s + 1/T1)/(T2 (s + 1/T2))'],
    ['10/(s^2 + 7 s + 10)', '1/((1 + s/2) (1 + s/5))', '10/((s + 2) (s + 5))'],
    ['(s - 4)/(s + 4)', '-(1 - s/4)/(1 + s/4)', '(s - 4)/(s + 4)'],
    [
      'omega_n^2/(s^2 + 2 zeta omega_n s + omega_n^2)',
      '1/(1 + 2 ζ s/ω_n + s^2/ω_n^2)',
      'ω_n^2/(s^2 + 2 ζ ω_n s + ω_n^2)',
    ],
    ['K s^2/(s + a)^2', 'K s^2/(a^2 (1 + s/a)^2)', 'K s^2/(s + a)^2'],
    ['K exp(-Td s)/(J s + b)', 'K delay(Td)/(b (1 + J s/b))', 'K delay(Td)/(J (s + b/J))'],
    ['(a + c) s + 1', '1 + (a + c) s', '(a + c) (s + 1/(a + c))'],
    ['K/b', 'K/b', 'K/b'],
    ['0', '0', '0'],
  ])('of %s', (given, timeConstants, polesAndZeros) => {
    const texts = FORMS.map((form) => formulaText(readFormula(given), writing, form));
    expect(texts).toEqual([timeConstants, polesAndZeros]);
  });

  it('read back as the same formula, and are set by KaTeX', () => {
    const factor = fc.constantFrom(
      's',
      'J s + b',
      'T1 s - 1',
      '3 s + 2',
      's^2 + a s + K',
      '2 K',
      'a + c',
    );
    const side = fc.array(factor, { minLength: 1, maxLength: 4 });
    fc.assert(
      fc.property(side, side, (top, bottom) => {
        const join = (factors: readonly string[]) => factors.map((f) => `(${f})`).join(' ');
        const r = readFormula(`(${join(top)})/(${join(bottom)})`);
        for (const form of FORMS) {
          const text = formulaText(r, writing, form);
          expect(equalRatios(readFormula(text), r), text).toBe(true);
          katex.renderToString(formulaLatex(r, writing, form), {
            throwOnError: true,
            strict: 'error',
          });
        }
      }),
      { numRuns: 150, seed: 4 },
    );
  });
});
