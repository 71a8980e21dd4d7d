import { readdirSync, readFileSync } from 'node:fs';
import { bench, describe } from 'vitest';
import { createSession, type Report } from '../../src/engine/index.ts';

/** The demo worksheet with the most results and requirements. */
function largestWorksheet(): { name: string; text: string; report: Report } {
  const all = readdirSync('worksheets')
    .filter((name) => name.endsWith('.md'))
    .map((name) => {
      const text = readFileSync(`worksheets/${name}`, 'utf8');
      return { name, text, report: createSession().update(text) };
    });
  const size = ({ report }: { report: Report }) =>
    report.results.length + report.requirements.length;
  return all.reduce((largest, other) => (size(other) > size(largest) ? other : largest));
}

const { name, text, report } = largestWorksheet();
const title = `${name}: ${report.results.length} results, ${report.requirements.length} requirements`;

/** Edits that alternate, so that no run finds the last one's text again. */
function alternating(edits: readonly [string, string]): () => void {
  const session = createSession();
  session.update(text);
  let turn = 0;
  return () => void session.update(edits[turn++ % 2]);
}

function replacedAt({ from, to }: { from: number; to: number }, by: string): string {
  return text.slice(0, from) + by + text.slice(to);
}

/** The text with an assumption's number scaled a little, up and down. */
function nudged(of: (row: Report['assumptions'][number]) => boolean): readonly [string, string] {
  const row = report.assumptions.find((candidate) => candidate.content.number && of(candidate))!;
  const { number, numberSpan } = row.content;
  const at = (factor: number) =>
    replacedAt(numberSpan!, String(Number((number! * factor).toPrecision(4))));
  return [at(1.001), at(0.999)];
}

/** The text with the first derived formula of a loop doubled in one of its terms. */
function rewritten(): readonly [string, string] {
  const row = report.results.find(
    (candidate) => candidate.content.kind === 'transfer' && candidate.content.name,
  )!;
  const line = text.slice(row.from, row.to);
  const at = (factor: string) => replacedAt(row, line.replace('=', `= ${factor}`));
  return [at('2'), at('3')];
}

describe(`a revision of ${title}`, () => {
  bench('from scratch (the reference)', () => void createSession().update(text));
  bench('a changed digit', alternating(nudged((row) => row.content.slider?.why !== 'tune')));
  bench('a dragged gain', alternating(nudged((row) => row.content.slider?.why === 'tune')));
  bench('a changed formula', alternating(rewritten()));
});
