import { describe, expect, it } from 'vitest';
import { refuse } from '../../src/base/index.ts';
import { readOrder } from '../../src/cli/command-line.ts';

const order = (line: string) => readOrder(line.split(' ').filter((word) => word !== ''));

describe('the command line', () => {
  it.each(['', 'help', '--help', '-h'])('"%s" asks for help', (line) => {
    expect(order(line)).toEqual({ verb: 'help' });
  });

  it.each([
    ['serve', { verb: 'serve', folder: 'worksheets', port: null }],
    ['serve memos', { verb: 'serve', folder: 'memos', port: null }],
    ['serve --port 0', { verb: 'serve', folder: 'worksheets', port: 0 }],
    ['serve memos --port=4711', { verb: 'serve', folder: 'memos', port: 4711 }],
    ['check a.md', { verb: 'check', files: ['a.md'], json: false }],
    ['check a.md b.md --json', { verb: 'check', files: ['a.md', 'b.md'], json: true }],
    ['check --json -- -a.md', { verb: 'check', files: ['-a.md'], json: true }],
  ])('"%s" is understood', (line, expected) => {
    expect(order(line)).toEqual(expected);
  });

  it.each([
    ['solve', 'There is no command "solve".'],
    ['serve a b', 'serve takes one folder.'],
    ['serve --port x', '--port takes a whole number from 0 to 65535.'],
    ['serve --port 70000', '--port takes a whole number from 0 to 65535.'],
    ['serve --port=', '--port takes a whole number from 0 to 65535.'],
    ['check', 'check needs at least one file.'],
    ['check --json', 'check needs at least one file.'],
  ])('"%s" is refused', (line, reason) => {
    expect(order(line)).toEqual(refuse('usage', reason));
  });

  it('names an option that does not exist', () => {
    expect(order('check --fast a.md')).toMatchObject({
      code: 'usage',
      reason: expect.stringContaining("'--fast'"),
    });
  });

  it.each(['memo', 'compare'])('%s is not available yet, and says so', (verb) => {
    expect(order(`${verb} a.md`)).toEqual(refuse('not-available', `${verb} is not available yet.`));
  });
});
