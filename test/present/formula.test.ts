import fc from 'fast-check';
import katex from 'katex';
import { describe, expect, it } from 'vitest';
import { equalRatios } from '../../src/algebra/index.ts';
import { formulaLatex, formulaText } from '../../src/present/formula.ts';
import { readFormula, writingOf } from './read-formula.ts';

const writing = writingOf('J J1 J2 b Tw T1 T2 Td Kp Kd Ki zeta omega_n a c d', 'Kp Kd Ki');

const written = (text: string) => formulaText(readFormula(text), writing);

describe('a formula is written as an engineer writes it', () => {
  it.each([
    ['-Tw/Kp', '-Tw/Kp'],
    ['1/(s^2 J + s (Kd + b) + Kp)', '1/(J s^2 + (b + Kd) s + Kp)'],
    ['Ki J/Kd', 'J Ki/Kd'],
    ['Kp + Ki/s + Kd s', '(Kd s^2 + Kp s + Ki)/s'],
    ['1/(J s^2 + b s)', '1/(s (J s + b))'],
    ['J s^2 + b s', 'J s^2 + b s'],
    ['(J1 + J2) s^2 + b s + Kp + Kd', '(J1 + J2) s^2 + b s + Kp + Kd'],
    ['Kp/((T1 s + 1) (T2 s + 1))', 'Kp/((T1 s + 1) (T2 s + 1))'],
    ['(s + 1) (s + 2)', 's^2 + 3 s + 2'],
    ['omega_n^2/(s^2 + 2 zeta omega_n s + omega_n^2)', 'ω_n^2/(s^2 + 2 ζ ω_n s + ω_n^2)'],
    ['Kp - J s^2', '-J s^2 + Kp'],
    ['(Kp - J s^2)/b', '-(J s^2 - Kp)/b'],
    ['-J Ki + Kp Kd', 'Kp Kd - J Ki'],
    ['b/2', 'b/2'],
    ['3 b/(4 J)', '3 b/(4 J)'],
    ['0.0000012 Kp', '1.2e-6 Kp'],
    ['0.1', '0.1'],
    ['1/2', '1/2'],
    ['-3/4', '-3/4'],
    ['1/3', '1/3'],
    ['0', '0'],
    ['0.5 + 0.04/s', '(0.5 s + 0.04)/s'],
    ['1/(s^2 + 1.2 s + 0.5)', '1/(s^2 + 1.2 s + 0.5)'],
    ['4.1 s^2 + 0.0123 s - 1e-6', '4.1 s^2 + 0.0123 s - 1e-6'],
    ['(1.7 - 0.3 s)/(0.7 s + 0.1)', '-(3 s - 17)/(7 s + 1)'],
    ['0.3 Kp + 0.05', '0.3 Kp + 0.05'],
    ['Kp exp(-2 Td s)', 'Kp delay(2 Td)'],
    ['2 pi Kp', '2 pi Kp'],
    ['pi/2', 'pi/2'],
    ['Kp exp(-Td s)/(J s + b)', 'Kp delay(Td)/(J s + b)'],
    ['J s + b + Kp exp(-Td s)', 'J s + b + Kp delay(Td)'],
    ['a^2 d + a d^2', 'a d (a + d)'],
    ['sqrt(Kp/J)/2', 'sqrt(Kp/J)/2'],
    ['b/(2 sqrt(J Kp))', 'b/(2 sqrt(J Kp))'],
    ['1/sqrt(2 J Kp)', '1/sqrt(2 J Kp)'],
    ['1/sqrt(Kp/J)', '1/sqrt(Kp/J)'],
    ['b/sqrt(a + d)', 'b/sqrt(a + d)'],
    ['(b + sqrt(J Kp))/(J Kp)', '(b + sqrt(J Kp))/(J Kp)'],
    ['nominal(J) Kp', 'Kp nominal(J)'],
    ['(a + c)^2 s/(a + d)^2', '(a + c)^2 s/(a + d)^2'],
  ])('%s is %s', (given, expected) => {
    expect(written(given)).toBe(expected);
  });
});

describe('the shape of a formula can be asked for', () => {
  it('expanded: above and below the line', () => {
    expect(formulaText(readFormula('Kp/(3 s (T1 s + 1) (T2 s + 1))'), writing, 'expanded')).toBe(
      'Kp/(3 T1 T2 s^3 + 3 T1 s^2 + 3 T2 s^2 + 3 s)',
    );
  });

  it('expanded: every product multiplied out, collected by nothing', () => {
    expect(formulaText(readFormula('(a + c) s (s + 1)'), writing, 'expanded')).toBe(
      'a s^2 + c s^2 + a s + c s',
    );
  });

  it('factored: every factor found', () => {
    expect(formulaText(readFormula('s^2 + 3 s + 2'), writing, 'factored')).toBe('(s + 1) (s + 2)');
  });
});

describe('the same formula as LaTeX', () => {
  it.each([
    ['-Tw/Kp', '-\\frac{T_{\\mathrm{w}}}{K_{\\mathrm{p}}}'],
    ['Kp exp(-Td s)', 'K_{\\mathrm{p}}\\,\\mathrm{e}^{-T_{\\mathrm{d}}\\,s}'],
    ['(J1 + J2) s^2 + 1', '(J_{1}+J_{2})s^{2}+1'],
    ['abs(a) sqrt(b)', '\\left|a\\right|\\,\\sqrt{b}'],
    ['12345 a', '12\\,345\\,a'],
  ])('%s is %s', (given, expected) => {
    expect(formulaLatex(readFormula(given), writing)).toBe(expected);
  });
});

/** Random formulas: sums, products and quotients of small numbers, symbols, s and kernels. */
const formula = fc.letrec<{ node: string; leaf: string }>((tie) => ({
  leaf: fc.oneof(
    fc.constantFrom('s', 'J', 'b', 'Kp', 'Kd', 'a', 'pi', 's', 'sqrt(a)', 'exp(-Td s)'),
    fc.constantFrom('nominal(J)', 'sin(a/2)', '0.25', '1.2e-7', '3', '1000000', '7/3'),
  ),
  node: fc.oneof(
    { depthSize: 'small', withCrossShrink: true },
    tie('leaf'),
    fc.tuple(tie('node'), tie('node')).map(([x, y]) => `(${x}) + (${y})`),
    fc.tuple(tie('node'), tie('node')).map(([x, y]) => `(${x}) - (${y})`),
    fc.tuple(tie('node'), tie('node')).map(([x, y]) => `(${x}) (${y})`),
    fc.tuple(tie('node'), tie('leaf')).map(([x, y]) => `(${x})/(${y})`),
    tie('node').map((x) => `(${x})^2`),
  ),
})).node;

describe('every formula', () => {
  it('is read back by the worksheet language as an equal one, in every shape', () => {
    fc.assert(
      fc.property(formula, fc.constantFrom('readable', 'expanded', 'factored'), (text, shape) => {
        const value = readFormula(text);
        const again = formulaText(value, writing, shape);
        if (!equalRatios(readFormula(again), value)) throw new Error(`${text} became ${again}`);
      }),
      { seed: 20, numRuns: 400 },
    );
  });

  it('is LaTeX that KaTeX sets without an error', () => {
    fc.assert(
      fc.property(formula, (text) => {
        katex.renderToString(formulaLatex(readFormula(text), writing), { strict: 'error' });
      }),
      { seed: 21, numRuns: 100 },
    );
  });
});
