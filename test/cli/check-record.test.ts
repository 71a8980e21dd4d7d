import { describe, expect, it } from 'vitest';
import { errorAt, warningAt, type Problem } from '../../src/base/index.ts';
import { checkRecord, unreadableRecord } from '../../src/cli/check-record.ts';
import { checkText } from '../../src/cli/check-text.ts';
import { exitCode } from '../../src/cli/exit-code.ts';
import type {
  Report,
  RequirementContent,
  ResultContent,
  Verdict,
} from '../../src/engine/report.ts';

const result: ResultContent = {
  name: 'e_ss',
  nameLatex: 'e_{ss}',
  kind: 'value',
  formula: '-Tw/Kp',
  latex: '-\\frac{T_w}{K_p}',
  value: -0.0289,
  unit: 'rad',
  shown: '-28.9 mrad',
  span: { low: -0.044, high: 0, how: 'corners', n: null, shown: '-44 to 0 mrad' },
  notes: ['a note'],
  parts: null,
  figure: null,
  state: 'ready',
  waitsFor: null,
  dependsOn: ['Tw', 'Kp'],
};
const requirement: RequirementContent = {
  label: 'R-2 bias',
  text: 'abs(e_ss) <= 0.2 mrad',
  latex: '',
  verdict: 'met',
  nominal: 0.12,
  worst: 0.19,
  limit: 0.2,
  operator: '<=',
  unit: 'mrad',
  how: 'corners',
  n: null,
  at: { J: 441.6 },
  notes: [],
  shown: '0.12 of 0.2 mrad',
  waitsFor: null,
  dependsOn: [],
};
const TEXT = '# Mast\r\n\r\n```loop\r\nJ is 4 kh\r\ne = Tw/\r\n  Kp\r\n```\r\n';

function report(rows: {
  results?: readonly ResultContent[];
  requirements?: readonly RequirementContent[];
  problems?: readonly Problem[];
}): Report {
  const placed = <Content>(contents: readonly Content[] = []) =>
    contents.map((content, index) => ({ from: 0, to: 1, line: 12 + index, content }));
  return {
    results: placed(rows.results),
    requirements: placed(rows.requirements),
    assumptions: [],
    problems: rows.problems ?? [],
    references: [],
    loops: [],
  };
}

const record = (rows: Parameters<typeof report>[0]) => checkRecord('mast.md', TEXT, report(rows));
const withVerdicts = (...verdicts: readonly Verdict[]) =>
  record({ requirements: verdicts.map((verdict) => ({ ...requirement, verdict })) });
const spanOf = (word: string) => {
  const from = TEXT.indexOf(word);
  return { from, to: from + word.length };
};

describe("check's record", () => {
  it('has exactly the fields of section 9 for a result', () => {
    expect(record({ results: [result] }).results).toEqual([
      {
        line: 12,
        name: 'e_ss',
        kind: 'value',
        formula: '-Tw/Kp',
        latex: '-\\frac{T_w}{K_p}',
        value: -0.0289,
        unit: 'rad',
        shown: '-28.9 mrad',
        span: { low: -0.044, high: 0, how: 'corners', n: null },
        notes: ['a note'],
        parts: null,
      },
    ]);
  });

  it('has exactly the fields of section 9 for a requirement', () => {
    expect(record({ requirements: [requirement] }).requirements).toEqual([
      {
        line: 12,
        label: 'R-2 bias',
        text: 'abs(e_ss) <= 0.2 mrad',
        verdict: 'met',
        nominal: 0.12,
        worst: 0.19,
        limit: 0.2,
        unit: 'mrad',
        how: 'corners',
        n: null,
        at: { J: 441.6 },
      },
    ]);
  });

  it('places a problem and its fixes by line and column in a file with Windows line ends', () => {
    const edit = { span: spanOf('kh'), insert: 'kg' };
    const problem = errorAt(spanOf('kh'), 'unit', 'There is no unit kh.', [
      { title: 'kg', edits: [edit] },
    ]);
    expect(record({ problems: [problem] }).problems).toEqual([
      {
        line: 4,
        column: 8,
        endColumn: 10,
        severity: 'error',
        message: 'There is no unit kh.',
        fixes: [
          {
            title: 'kg',
            edits: [{ line: 4, column: 8, endLine: 4, endColumn: 10, insert: 'kg' }],
          },
        ],
      },
    ]);
  });

  it('ends a problem of several lines with its first', () => {
    const problem = errorAt(spanOf('Tw/\r\n  Kp'), 'solidus', 'Which?');
    expect(record({ problems: [problem] }).problems).toMatchObject([
      { line: 5, column: 5, endColumn: 8 },
    ]);
  });

  it('is one line of JSON that reads back the same', () => {
    const made = record({ results: [result], requirements: [requirement] });
    const line = JSON.stringify(made);
    expect(line).not.toContain('\n');
    expect(JSON.parse(line)).toEqual(made);
  });
});

describe('the exit code', () => {
  it.each([
    [0, []],
    [0, ['met', 'met']],
    [1, ['met', 'not met']],
    [1, ['met at nominal only']],
    [1, ['undecided']],
  ] as const)('is %i for the verdicts %j', (code, verdicts) => {
    expect(exitCode(withVerdicts(...verdicts))).toBe(code);
  });

  it('is 0 for a verdict met by samples', () => {
    expect(exitCode(record({ requirements: [{ ...requirement, how: 'sampled', n: 9 }] }))).toBe(0);
  });

  it('is 2 for an error, whatever the verdicts, and not for a warning', () => {
    const requirements = [{ ...requirement, verdict: 'not met' as const }];
    const error = errorAt(spanOf('kh'), 'unit', 'No.');
    const warning = warningAt(spanOf('kh'), 'unit', 'Hm.');
    expect(exitCode(record({ problems: [error] }))).toBe(2);
    expect(exitCode(record({ requirements, problems: [error] }))).toBe(2);
    expect(exitCode(record({ problems: [warning] }))).toBe(0);
    expect(exitCode(unreadableRecord('none.md', 'There is no such file.'))).toBe(2);
  });
});

describe("check's text", () => {
  it('lines up verdicts, labels, values and margins, then the problems and a summary', () => {
    const requirements: RequirementContent[] = [
      requirement,
      { ...requirement, label: 'R-3', verdict: 'met at nominal only', worst: 0.31 },
      { ...requirement, label: 'R-4', how: 'sampled', n: 2000, nominal: 1 / 3, worst: null },
      {
        ...requirement,
        label: null,
        text: 'stable(az)',
        verdict: 'not met',
        ...{ nominal: null, worst: null, limit: null, unit: null },
      },
    ];
    const problems = [
      errorAt(spanOf('kh'), 'unit', 'There is no unit kh.', [
        { title: 'kg', edits: [{ span: spanOf('kh'), insert: 'kg' }] },
      ]),
    ];
    const notes = [['hidden'], ['At J = 518.4.'], [], ['The block theta, T is unstable.']];
    expect(checkText(record({ requirements, problems }), notes).split('\n')).toEqual([
      'mast.md',
      '  ● met                      R-2 bias    0.12, worst 0.19, limit 0.2 mrad',
      '  ◐ met at nominal only      R-3         0.12, worst 0.31, limit 0.2 mrad',
      '      At J = 518.4.',
      '  ● met (sampled, n = 2000)  R-4         0.3333, limit 0.2 mrad',
      '  ✕ not met                  stable(az)',
      '      The block theta, T is unstable.',
      '  mast.md:4:8: error: There is no unit kh.',
      '      fix: kg',
      '  2 of 4 met · 1 at nominal only · 1 not met · 1 error',
      '',
    ]);
  });

  it('of a worksheet without requirements says so', () => {
    expect(checkText(record({}), [])).toBe('mast.md\n  no requirements\n');
  });
});
