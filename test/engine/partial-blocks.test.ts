import { describe, expect, it } from 'vitest';
import { createSession } from '../../src/engine/index.ts';

const PLANT = `
J is 2 kg m^2
c is 3 N m s/rad
Kp is 5 N m/rad
J, c, Kp are positive`;

function reportOf(cell: string) {
  return createSession().update(`\`\`\`loop${PLANT}\n${cell}\n\`\`\`\n`);
}

describe('a block of which a line cannot be read', () => {
  it('gives no value where a load is missing from a case', () => {
    const { results, problems } = reportOf(`
loop az driven by w
  J th'' + c th' + Kp th = w
case storm of az
  w = step(
th_ss = final(storm.th)`);
    expect(problems.map(({ code }) => code)).toEqual(['incomplete']);
    expect(results[0].content).toMatchObject({ state: 'error', value: null, formula: null });
    expect(results[0].content.waitsFor?.name).toBe('storm');
  });

  it('derives nothing from a loop with a missing equation, and reports only the line at fault', () => {
    const { results, requirements, problems } = reportOf(`
loop az driven by w
  J th'' + c th' + Kp th = w +
az(w -> th)
routh(az)
opened(az, th)
require stable(az)`);
    expect(problems.map(({ code }) => code)).toEqual(['incomplete']);
    for (const { content } of results) {
      expect(content).toMatchObject({ state: 'error', value: null });
      expect(content.waitsFor?.name).toBe('az');
    }
    expect(requirements[0].content.verdict).toBe('undecided');
  });
});

describe('an assumption whose unit stands with its tolerance', () => {
  it.each(['Tg is 60 ± 20 N m', 'Tg is 60 from 40 to 80 N m'])('reads `%s`', (line) => {
    const { assumptions, results, problems } = reportOf(`${line}\nhalf = Tg/2`);
    expect(problems).toEqual([]);
    expect(assumptions.at(-1)!.content.unit).toBe('N m');
    expect(results[0].content).toMatchObject({ value: 30, unit: 'N m', shown: '30 N m' });
    expect(results[0].content.span).toMatchObject({ low: 20, high: 40, how: 'corners' });
  });
});
