import katex from 'katex';
import { describe, expect, it } from 'vitest';
import { expressionLatex } from '../../src/present/expression.ts';
import { readExpression } from './read-formula.ts';

describe('a formula as typed is typeset without being worked out', () => {
  it.each([
    ['Kp + Ki/s + Kd s', 'K_{\\mathrm{p}}+\\frac{K_{\\mathrm{i}}}{s}+K_{\\mathrm{d}}\\,s'],
    ['-(a + b) c', '-(a+b)c'],
    ['1/2 a b', '\\frac{1}{2}\\,a\\,b'],
    ['a^2 <= b', 'a^{2}\\le b'],
    ['2 pi f1', '2\\,\\pi\\,f_{1}'],
    ['abs(x) > 1', '\\left|x\\right|>1'],
    ['3 [rad/s]', '3\\,\\mathrm{rad}/\\mathrm{s}'],
  ])('%s', (text, expected) => {
    const latex = expressionLatex(readExpression(text));
    katex.renderToString(latex, { strict: 'error' });
    expect(latex).toBe(expected);
  });
});
