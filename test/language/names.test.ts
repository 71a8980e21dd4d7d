import { describe, expect, test } from 'vitest';
import {
  canonicalName,
  isReserved,
  KEYWORDS,
  nameToLatex,
  nameToText,
  nearestName,
  RESERVED,
  sameTypesetting,
  spellingDistance,
} from '../../src/language/index.ts';

describe('a name', () => {
  test.each([
    ['theta', 'θ'],
    ['θ', 'θ'],
    ['omega_n', 'ω_n'],
    ['phi2', 'φ2'],
    ['Omega', 'Ω'],
    ['\u2126', 'Ω'], // ohm sign
    ['\u00b5', 'μ'], // micro sign
    ['mu_max', 'μ_max'],
    ['ϑ_1', 'θ_1'],
    ['thetadot', 'thetadot'],
    ['K_theta', 'K_theta'],
    ['beta', 'β'],
    ['betas', 'betas'],
    ['e\u0301', 'é'],
    ['π', 'pi'],
    ['pi', 'pi'],
    ['pi_1', 'π_1'],
    ['Pi', 'Π'],
    ['eta', 'η'],
    ['zeta', 'ζ'],
    ['J', 'J'],
  ])('spelled %s is known as %s', (typed, canonical) => {
    expect(canonicalName(typed)).toBe(canonical);
    expect(canonicalName(canonical)).toBe(canonical);
    expect(nameToText(typed)).toBe(canonical);
  });

  test.each([
    ['Kp', 'K_{\\mathrm{p}}'],
    ['K_p', 'K_{\\mathrm{p}}'],
    ['Kmax', 'K_{\\mathrm{max}}'],
    ['Kmaxi', '\\mathrm{Kmaxi}'],
    ['A1', 'A_{1}'],
    ['e1', 'e_{1}'],
    ['e12', 'e_{12}'],
    ['phi2', '\\phi_{2}'],
    ['omega_n', '\\omega_{\\mathrm{n}}'],
    ['K_theta', 'K_{\\theta}'],
    ['Kp_max', 'K_{\\mathrm{p},\\mathrm{max}}'],
    ['e_ss', 'e_{\\mathrm{ss}}'],
    ['storm', '\\mathrm{storm}'],
    ['az', '\\mathrm{az}'],
    ['x', 'x'],
    ['theta', '\\theta'],
    ['Delta', '\\Delta'],
    ['Alpha', '\\mathrm{A}'],
    ['s', 's'],
    ['j', '\\mathrm{j}'],
    ['pi', '\\pi'],
    ['RMS', '\\mathrm{RMS}'],
    ['é', '\\text{é}'],
  ])('%s is set as %s', (name, latex) => {
    expect(nameToLatex(name)).toBe(latex);
  });

  test.each([
    ['Kp', 'K_p', true],
    ['e1', 'e_1', true],
    ['K_theta', 'K_θ', true],
    ['theta', 'θ', false],
    ['Kp', 'Kd', false],
    ['wc', 'w_c', false],
  ])('%s and %s look alike when set: %s', (a, b, isSame) => {
    expect(sameTypesetting(a, b)).toBe(isSame);
  });

  test('is reserved if it is a word of the language or a constant, in any spelling', () => {
    expect(KEYWORDS).toHaveLength(31);
    expect(RESERVED.size).toBe(35);
    for (const name of ['s', 't', 'j', 'pi', 'π', 'is', 'unit'])
      expect(isReserved(name)).toBe(true);
    for (const name of ['e', 'S', 'pi_1', 'region', 'theta']) expect(isReserved(name)).toBe(false);
  });
});

describe('the nearest spelling', () => {
  test.each([
    ['thta', ['θ', 'theta', 'phi'], 'theta'],
    ['storn', ['storm', 'stern'], 'storm'],
    ['kp', ['Kd', 'Kp'], 'Kp'],
    ['Kb', ['Kp', 'J'], 'Kp'],
    ['finale', ['initial', 'final'], 'final'],
    ['rsm', ['rms', 'routh'], 'rms'],
    ['x', ['y', 'z'], null],
    ['X', ['x', 'z'], 'x'],
    ['torque', ['T', 'theta'], null],
    ['Tw', ['Tw'], null],
    ['respons', ['response'], 'response'],
  ])('of %s among %j is %s', (name, candidates, nearest) => {
    expect(nearestName(name, candidates)).toBe(nearest);
  });

  test('is told by insertions, deletions, replacements and swaps of neighbours', () => {
    expect(spellingDistance('', 'abc')).toBe(3);
    expect(spellingDistance('abcd', 'acbd')).toBe(1);
    expect(spellingDistance('ca', 'abc')).toBe(3);
    expect(spellingDistance('kitten', 'sitting')).toBe(3);
  });
});
