import { describe, expect, it } from 'vitest';
import { refuse } from '../../src/base/index.ts';
import { worksheetSegments } from '../../src/server/worksheet-name.ts';

describe("a worksheet's name", () => {
  it.each(['mast.md', 'Mast on a boat.md', 'Füllstand-θ.md', 'a..b.md', 'plant/north/mast.md'])(
    'may be %j',
    (name) => {
      expect(worksheetSegments(name)).toEqual(name.split('/'));
    },
  );

  it.each([
    ['', 'it leaves the worksheet folder'],
    ['../mast.md', 'it leaves the worksheet folder'],
    ['plant/../../mast.md', 'it leaves the worksheet folder'],
    ['/etc/mast.md', 'it leaves the worksheet folder'],
    ['plant//mast.md', 'it leaves the worksheet folder'],
    ['./mast.md', 'it leaves the worksheet folder'],
    ['.mast.md', 'hidden files are not worksheets'],
    ['.git/mast.md', 'hidden files are not worksheets'],
    [' mast.md', 'it begins or ends with a space'],
    ['..\\mast.md', 'hidden files are not worksheets'],
    ['plant\\mast.md', 'it holds a character that file names cannot have'],
    ['C:mast.md', 'it holds a character that file names cannot have'],
    ['mast\0.md', 'it holds a character that file names cannot have'],
    ['mast\n.md', 'it holds a character that file names cannot have'],
    ['a/b/c/mast.md', 'it lies more than 2 folders deep'],
    [`${'m'.repeat(240)}.md`, 'it is longer than 240 characters'],
    ['mast', "a worksheet's name ends in .md"],
    ['mast.md.exe', "a worksheet's name ends in .md"],
  ])('may not be %j', (name, fault) => {
    const reason = `${JSON.stringify(name)} cannot be a worksheet's name: ${fault}.`;
    expect(worksheetSegments(name)).toEqual(refuse('bad-name', reason));
  });
});
