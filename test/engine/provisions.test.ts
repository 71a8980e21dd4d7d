import { expect, it } from 'vitest';
import { createSession } from '../../src/engine/index.ts';

const DRIVE = `
J, b, Kp, Ki, R are positive
loop az driven by w
  J th'' + b th' = T + w
  T = -(Kp + Ki/s) th
case front of az
  w = ramp(R)`;

function notesOf(formula: string): readonly string[] {
  const { results } = createSession().update(`\`\`\`loop${DRIVE}\n${formula}\n\`\`\`\n`);
  return results[0].content.notes;
}

it('says with a final value in symbols under which condition it stands', () => {
  expect(notesOf('final(front.th)')).toContain('Provided that b Kp > J Ki.');
});

it('says no condition where the signs settle it', () => {
  expect(notesOf('final(front.th with Ki is 0)').join()).not.toContain('Provided');
});

it('says of a growing signal as what it grows, and at which rate', () => {
  expect(notesOf('final(front.th with Ki is 0)')).toContain(
    'No value: grows without bound, as t (rate R/Kp)',
  );
});
