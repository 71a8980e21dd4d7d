import { describe, expect, it } from 'vitest';
import type { RequirementContent, Verdict } from '../../src/engine/index.ts';
import { outlineOf } from '../../src/ui/outline.ts';
import { verdictSummary, verdictWord, worstVerdict } from '../../src/ui/verdicts.ts';
import { placed, requirement } from './rows.ts';

const of = (...verdicts: Verdict[]): RequirementContent[] =>
  verdicts.map((verdict) => requirement({ verdict }));

describe('words of verdicts', () => {
  it('summarises the verdicts, naming only those that occur', () => {
    expect(verdictSummary(of('met', 'met at nominal only', 'not met', 'met'), 0)).toBe(
      '2 of 4 met · 1 at nominal only · 1 not met',
    );
    expect(verdictSummary(of('met', 'met'), 0)).toBe('2 of 2 met');
    expect(verdictSummary(of('undecided'), 0)).toBe('0 of 1 met · 1 undecided');
  });

  it('counts errors, also where nothing is required', () => {
    expect(verdictSummary(of('met'), 2)).toBe('1 of 1 met · 2 errors');
    expect(verdictSummary([], 1)).toBe('1 error');
  });

  it('says nothing where nothing is required', () => {
    expect(verdictSummary([], 0)).toBeNull();
  });

  it('never calls a sampled verdict plainly met', () => {
    expect(verdictWord(requirement({ how: 'sampled', n: 2000 }))).toBe('met (sampled, n = 2000)');
    expect(verdictWord(requirement({ how: 'corners' }))).toBe('met');
  });

  it('takes the worst verdict, an undecided one being worse than a met one', () => {
    expect(worstVerdict(['met', 'not met', 'undecided'])).toBe('not met');
    expect(worstVerdict(['met', 'undecided'])).toBe('undecided');
    expect(worstVerdict([])).toBeNull();
  });
});

describe('the outline', () => {
  const headings = [
    { from: 0, level: 1, text: 'Drive' },
    { from: 100, level: 2, text: 'Plant' },
    { from: 200, level: 2, text: 'Bias' },
    { from: 300, level: 1, text: 'Annex' },
  ];

  it('gives each heading the worst verdict of its section, subsections included', () => {
    const rows = [
      placed(requirement({ verdict: 'met' }), 150),
      placed(requirement({ verdict: 'not met' }), 250),
    ];
    const verdicts = outlineOf(headings, rows, []).map(({ verdict }) => verdict);
    expect(verdicts).toEqual(['not met', 'met', 'not met', null]);
  });

  it('counts the errors of each section', () => {
    expect(outlineOf(headings, [], [120, 130, 310]).map(({ errors }) => errors)).toEqual([
      2, 2, 0, 1,
    ]);
  });
});
