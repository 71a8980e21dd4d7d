import { readdirSync } from 'node:fs';
import { readFile, writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import type { CheckRecord } from '../../src/cli/check-record.ts';
import { runCommand } from '../built-command.ts';
import { temporaryFolder } from '../temporary-folder.ts';

const worksheet = (requirement: string) =>
  `# Valve\n\n\`\`\`loop\nK is 2\nx = K + 1\n${requirement}\n\`\`\`\n`;
const FILES: Readonly<Record<string, string | Uint8Array>> = {
  'met.md': worksheet('require x <= 4   # R-1 size'),
  'not-met.md': worksheet('require x <= 2   # R-1 size'),
  'error.md': worksheet('require y <= 2'),
  'mark.md': `\uFEFF${worksheet('require x <= 4   # R-1 size')}`,
  'windows.md': worksheet('require x <= 4   # R-1 size').replaceAll('\n', '\r\n'),
  'prose.md': '# Nothing to compute\n',
  'empty.md': '',
  'latin.md': Buffer.from('# F\xfcllstand\n', 'latin1'),
  'large.md': new Uint8Array(6 * 1024 * 1024).fill(32),
};

/** Runs `check` in a folder of these files. */
async function check(names: readonly string[], ...options: readonly string[]) {
  const folder = await temporaryFolder();
  for (const [name, content] of Object.entries(FILES)) await writeFile(join(folder, name), content);
  const run = await runCommand('check', ...options, ...names.map((name) => join(folder, name)));
  return { ...run, output: run.output.replaceAll(`${folder}/`, '') };
}

async function records(...names: readonly string[]): Promise<CheckRecord[]> {
  const { output } = await check(names, '--json');
  const lines = output.split('\n');
  expect(lines.pop()).toBe('');
  return lines.map((line) => JSON.parse(line) as CheckRecord);
}

describe('check', () => {
  it.each([
    [0, ['met.md']],
    [0, ['met.md', 'mark.md', 'windows.md', 'prose.md', 'empty.md']],
    [1, ['met.md', 'not-met.md']],
    [2, ['error.md']],
    [2, ['error.md', 'not-met.md', 'met.md']],
    [2, ['none.md', 'met.md']],
    [2, ['latin.md']],
    [2, ['large.md']],
  ])('exits with %i for %j', async (code, names) => {
    expect(await check(names)).toMatchObject({ code, complaints: '' });
    expect(await check(names, '--json')).toMatchObject({ code, complaints: '' });
  });

  it('prints the verdict with its value and limit', async () => {
    const { output } = await check(['met.md']);
    expect(output).toBe('met.md\n  ● met  R-1 size  3, worst 3, limit 4\n  1 of 1 met\n');
  });

  it('prints a problem with its place, and checks the other files all the same', async () => {
    const { output } = await check(['none.md', 'error.md', 'met.md']);
    expect(output).toContain('none.md:1:1: error: Cannot read the file: there is no such file.\n');
    expect(output).toMatch(/^ {2}error\.md:6:9: error: /m);
    expect(output).toContain('1 of 1 met\n');
  });

  it('says what is wrong with a file that is no text or too large', async () => {
    const found = await records('latin.md', 'large.md');
    expect(found.map(({ problems }) => problems.map(({ message }) => message))).toEqual([
      [
        'The file is not UTF-8 text: line 1 holds bytes that are not. Convert it, for example with iconv -t UTF-8.',
      ],
      ['The worksheet has 6.0 MB; the limit is 5.0 MB.'],
    ]);
  });

  it('prints one JSON object a file, one a line, in the order given', async () => {
    const found = await records('met.md', 'none.md', 'not-met.md');
    expect(found.map(({ file }) => file)).toEqual(['met.md', 'none.md', 'not-met.md']);
    expect(found.map((record) => Object.keys(record))).toEqual(
      found.map(() => ['file', 'results', 'requirements', 'problems']),
    );
  });

  it.each(['met.md', 'mark.md', 'windows.md'])('reports lines of the file in %s', async (name) => {
    const [{ results, requirements, problems }] = await records(name);
    expect(results).toMatchObject([
      { line: 5, name: 'x', kind: 'value', formula: 'K + 1', value: 3 },
    ]);
    expect(requirements).toMatchObject([
      { line: 6, label: 'R-1 size', text: 'x <= 4', verdict: 'met', nominal: 3, limit: 4 },
    ]);
    expect(problems).toEqual([]);
  });

  it('gives a row without a value to a definition in error, and the problem at its cause', async () => {
    const [{ results, problems }] = await records('error.md');
    expect(results).toHaveLength(1);
    expect(problems).toMatchObject([{ line: 6, column: 9, endColumn: 10, severity: 'error' }]);
  });
});

describe('the command', () => {
  it('without arguments prints its help', async () => {
    expect(await runCommand()).toMatchObject({
      code: 0,
      output: expect.stringContaining('loopwright check'),
    });
  });

  it('that is not understood exits with 2 and says what it takes', async () => {
    const run = await runCommand('check');
    expect(run).toMatchObject({ code: 2, output: '' });
    expect(run.complaints).toContain('check needs at least one file.');
    expect(run.complaints).toContain('loopwright check --json FILE…');
  });

  it.each(['memo', 'compare'])('%s exits with 2 and one sentence', async (verb) => {
    expect(await runCommand(verb, 'a.md')).toEqual({
      code: 2,
      output: '',
      complaints: `${verb} is not available yet.\n`,
    });
  });
});

it('the first worksheet of the readme comes to what the readme says', async () => {
  const readme = await readFile('README.md', 'utf8');
  const lines = readme.split('\n').filter((line) => line === '' || line.startsWith('    '));
  const text = lines.map((line) => line.slice(4)).join('\n');
  const file = join(await temporaryFolder(), 'readme.md');
  await writeFile(file, text.slice(text.indexOf('# Tank level')));
  const { code, output } = await runCommand('check', file);
  expect(output).toMatch(/● met +R-1 stable/);
  expect(output).toMatch(/◐ met at nominal only +R-2 offset +20, worst 50, limit 25 mm/);
  expect(code).toBe(1);
});

it('every worksheet of ours has no error', async () => {
  const names = readdirSync('worksheets').filter((name) => name.endsWith('.md'));
  for (const name of names) {
    const { code, output } = await runCommand('check', join('worksheets', name));
    expect(code, output).toBeLessThan(2);
  }
});
