import { describe, expect, it } from 'vitest';
import { marginBar } from '../../src/ui/results/margin-bar.ts';
import { requirement } from './rows.ts';

describe('the margin bar', () => {
  it('runs from zero past the limit, with the nominal and the worst value as marks', () => {
    const bar = marginBar(requirement({ nominal: 0.1, worst: 0.15, limit: 0.2, operator: '<=' }));
    expect(bar?.limit).toBeCloseTo(1 / 1.04);
    expect(bar?.nominal).toBeCloseTo(0.5 / 1.04);
    expect(bar?.worst).toBeCloseTo(0.75 / 1.04);
    expect(bar?.allowed).toEqual([0, bar?.limit]);
  });

  it('allows what lies beyond a lower limit', () => {
    const bar = marginBar(requirement({ nominal: 60, worst: 50, limit: 45, operator: '>=' }));
    expect(bar?.allowed).toEqual([bar?.limit, 1]);
    expect(bar!.worst!).toBeLessThan(bar!.nominal);
  });

  it('draws a value far beyond its limit at the end, so that the limit is still seen', () => {
    const bar = marginBar(
      requirement({ nominal: 9000, worst: Infinity, limit: 1, operator: '<=' }),
    );
    expect(bar?.nominal).toBe(1);
    expect(bar?.worst).toBe(1);
    expect(bar?.limit).toBeCloseTo(0.5 / 1.04);
  });

  it('shows negative values left of zero', () => {
    const bar = marginBar(requirement({ nominal: -1, worst: -2, limit: 2, operator: '<' }));
    expect(bar?.worst).toBe(0);
    expect(bar?.filled[0]).toBe(bar?.nominal);
  });

  it('is left out for a condition and where a number is missing', () => {
    expect(marginBar(requirement({}))).toBeNull();
    expect(marginBar(requirement({ nominal: null, limit: 1, operator: '<' }))).toBeNull();
  });
});
