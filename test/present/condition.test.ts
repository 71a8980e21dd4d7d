import { describe, expect, it } from 'vitest';
import type { Comparison, Condition } from '../../src/control/index.ts';
import { conditionLatex, conditionText } from '../../src/present/index.ts';
import { readFormula, writingOf } from './read-formula.ts';

const writing = writingOf('J b Kp Kd Ki m a', 'Kp Kd Ki');

const compare = (left: string, operator: Comparison, right: string): Condition => ({
  kind: 'compare',
  left: readFormula(left),
  operator,
  right: readFormula(right),
});

const both: Condition = { kind: 'all', of: [compare('Kp', '>', '0'), compare('Ki', '>=', '1')] };

describe('a condition is written so that the language reads it back', () => {
  it.each<[Condition, string]>([
    [compare('Kp', '>', 'J Ki/Kd'), 'Kp > J Ki/Kd'],
    [compare('a', '!=', '1'), 'not (a = 1)'],
    [both, 'Kp > 0 and Ki >= 1'],
    [{ kind: 'any', of: [both, compare('a', '<', '0')] }, 'Kp > 0 and Ki >= 1 or a < 0'],
    [
      { kind: 'all', of: [{ kind: 'any', of: [compare('a', '<', '0'), both] }, both] },
      '(a < 0 or Kp > 0 and Ki >= 1) and Kp > 0 and Ki >= 1',
    ],
    [{ kind: 'not', of: both }, 'not (Kp > 0 and Ki >= 1)'],
    [{ kind: 'truth', value: true }, '1 > 0'],
    [{ kind: 'truth', value: false }, '1 < 0'],
    [{ kind: 'all', of: [] }, '1 > 0'],
  ])('case %#', (condition, expected) => {
    expect(conditionText(condition, writing)).toBe(expected);
  });

  it('with a bracket where a bare limit would be read as a quantity', () => {
    expect(conditionText(compare('Kp', '<', '2 m'), writing)).toBe('Kp < (2 m)');
    expect(conditionText(compare('Kp', '<', '2 Kd'), writing)).toBe('Kp < 2 Kd');
  });
});

describe('stability', () => {
  const block = (text: string) => ({ signals: ['θ'], polynomial: readFormula(text).num });

  it('of a rigid body under three-term control reads as a condition on the tuned gain', () => {
    const stable: Condition = { kind: 'stable', blocks: [block('J s^3 + Kd s^2 + Kp s + Ki')] };
    expect(conditionText(stable, writing)).toBe('Kp > J Ki/Kd');
    expect(conditionLatex(stable, writing)).toBe(
      '\\text{stable: }K_{\\mathrm{p}}>\\frac{J\\,K_{\\mathrm{i}}}{K_{\\mathrm{d}}}',
    );
  });

  it('with dead time is left closed', () => {
    const stable: Condition = { kind: 'stable', blocks: [block('J s + Kp exp(-a s)')] };
    expect(conditionText(stable, writing)).toBe('stable(J s + Kp delay(a))');
  });

  it('that always holds says so', () => {
    const stable: Condition = { kind: 'stable', blocks: [block('J s + Kp')] };
    expect(conditionText(stable, writing)).toBe('1 > 0');
    expect(conditionLatex(stable, writing)).toBe('\\text{stable: }\\text{always}');
  });

  it('of no block is always', () => {
    expect(conditionText({ kind: 'stable', blocks: [] }, writing)).toBe('1 > 0');
  });

  it('whose conditions have too many terms to read keeps its polynomial', () => {
    const polynomial = '(J s^2 + b s + Kp) (m s^2 + a s + Kd) (a s^2 + m s + J) (b s + Kd) + Ki';
    const stable: Condition = { kind: 'stable', blocks: [block(polynomial)] };
    expect(conditionText(stable, writing)).toMatch(/^stable\(.*s\^7.*\)$/);
  });

  it('leaves out blocks that are always stable, and is never where one is never', () => {
    const blocks = [block('J s + Kp'), block('J s^2 + Kd s + Kp - Ki')];
    expect(conditionText({ kind: 'stable', blocks }, writing)).toBe('Kp > Ki');
    const fails = [...blocks, block('J s^2 + Kp')];
    expect(conditionText({ kind: 'stable', blocks: fails }, writing)).toBe('1 < 0');
  });
});

it('What cannot be decided is said in words, marks escaped.', () => {
  const undecided: Condition = { kind: 'undecided', reason: 'Kp_max has no value' };
  expect(conditionText(undecided, writing)).toBe('undecided: Kp_max has no value');
  expect(conditionLatex(undecided, writing)).toBe('\\text{undecided: Kp\\_max has no value}');
});
