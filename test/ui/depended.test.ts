import { describe, expect, it } from 'vitest';
import { dependedAt } from '../../src/ui/depended.ts';
import { placed, report, requirement, result } from './rows.ts';

describe('what the statement at the cursor was computed from', () => {
  const given = report({
    results: [placed(result({ dependsOn: ['J', 'Kp'] }), 10, 20)],
    requirements: [placed(requirement({ dependsOn: ['Ki'] }), 30, 40)],
  });

  it('is that of the result or the requirement there, its ends included', () => {
    expect([10, 20, 35].map((place) => dependedAt(given, place))).toEqual([
      ['J', 'Kp'],
      ['J', 'Kp'],
      ['Ki'],
    ]);
  });

  it('is nothing elsewhere, and while the text is only read', () => {
    expect([25, null].map((place) => dependedAt(given, place))).toEqual([[], []]);
  });
});
