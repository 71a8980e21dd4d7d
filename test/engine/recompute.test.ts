import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { createSession, type Report } from '../../src/engine/index.ts';

const WORKSHEET = `# Arm

\`\`\`loop
J is 2 kg m^2 ± 10 %
Kp is 40 N m/rad
Kd is 12 N m s/rad
Tw is 3 N m
unrelated is 5 m
J, Kp, Kd are positive

loop arm driven by r, w
  J theta'' = T + w
  T = Kp (r - theta) - Kd theta'
  e = r - theta

case load of arm
  w = step(Tw)

e_ss = final(load.e) in mrad
twice = 2 e_ss
other = 3 unrelated
arm(w -> e)
require stable(arm)  # R-1
require abs(e_ss) <= 100 mrad  # R-2
\`\`\`
`;

const contents = (report: Report) => report.results.map((row) => row.content);

describe('recomputing a worksheet', () => {
  test('two loops of one name keep their own equations', () => {
    const twin = WORKSHEET.replace('case load', 'loop arm driven by r\n  e = 2 r\n\ncase load');
    const [first, second] = createSession().update(twin).loops;
    expect(first.content.equationsLatex).toHaveLength(3);
    expect(second.content.equationsLatex).toEqual(['e = 2\\,r']);
  });

  test('a changed number derives nothing anew', () => {
    const session = createSession();
    const before = session.update(WORKSHEET);
    const after = session.update(WORKSHEET.replace('Tw is 3', 'Tw is 4'));
    const transfer = (report: Report) => contents(report).find((row) => row.kind === 'transfer');
    expect(transfer(after)).toBe(transfer(before));
    expect(after.loops[0].content).toBe(before.loops[0].content);
    expect(after.results[0].content.shown).not.toBe(before.results[0].content.shown);
  });

  test('a result that does not lean on the change is the same object', () => {
    const session = createSession();
    const before = session.update(WORKSHEET);
    const after = session.update(WORKSHEET.replace('Tw is 3', 'Tw is 4'));
    const other = (report: Report) => contents(report).find((row) => row.name === 'other');
    expect(other(after)).toBe(other(before));
    expect(after.requirements[0].content).toBe(before.requirements[0].content);
  });

  test('prose moves rows and changes none', () => {
    const session = createSession();
    const before = session.update(WORKSHEET);
    const after = session.update(`A new first paragraph.\n\n${WORKSHEET}`);
    expect(after.results.map((row) => row.line)).toEqual(before.results.map((row) => row.line + 2));
    contents(after).forEach((content, index) => expect(content).toBe(contents(before)[index]));
  });

  test('after any sequence of edits the report is that of a fresh session', () => {
    const edits = [
      ['J is 2 kg', 'J is 3 kg'],
      ['Kd is 12 N', 'Kd is 0 N'],
      ['Tw is 3 N m', 'Tw is 3 N'],
      ['w = step(Tw)', 'w = ramp(Tw/1 [s])'],
      ['twice = 2 e_ss', 'twice = 2 e_s'],
      ["T = Kp (r - theta) - Kd theta'", "T = Kp (r - theta) - Kd theta' +"],
      ['J, Kp, Kd are positive', ''],
      ['e = r - theta', 'e = r - theta theta'],
      ['unrelated is 5 m', 'unrelated is other'],
    ] as const;
    fc.assert(
      fc.property(
        fc.array(fc.subarray([...edits], { minLength: 0 }), { maxLength: 5 }),
        (steps) => {
          const session = createSession();
          session.update(WORKSHEET);
          let last = WORKSHEET;
          let report = session.update(last);
          for (const step of steps) {
            last = step.reduce((text, [from, to]) => text.replace(from, to), WORKSHEET);
            report = session.update(last);
          }
          expect(report).toEqual(createSession().update(last));
        },
      ),
      { seed: 7, numRuns: 40 },
    );
  });
});
