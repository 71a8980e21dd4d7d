import { chmod, mkdir, readFile, readdir, rm, stat, symlink, writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { refuse } from '../../src/base/index.ts';
import { contentHash } from '../../src/server/worksheet-bytes.ts';
import { openFolder, type WorksheetFolder } from '../../src/server/worksheet-folder.ts';
import { temporaryFolder } from '../temporary-folder.ts';

const TEXT = '# Mast\r\n\r\nθ leans.\n';
const hashOf = (text: string) => contentHash(Buffer.from(text));

async function folderWith(files: Readonly<Record<string, string | Uint8Array>>) {
  const path = await temporaryFolder();
  for (const [name, content] of Object.entries(files)) {
    await mkdir(join(path, name, '..'), { recursive: true });
    await writeFile(join(path, name), content);
  }
  const folder = (await openFolder(path)) as WorksheetFolder;
  return { path, folder };
}

describe('a worksheet folder', () => {
  it('lists the worksheets that lie in it, by name, and nothing else', async () => {
    const { path, folder } = await folderWith({
      'tank 10.md': 'a',
      'tank 2.md': TEXT,
      'plant/north.md': 'b',
      'plant/deep/est.md': 'c',
      'plant/deep/too/deep.md': 'd',
      'gusts.csv': '1,2',
      '.hidden.md': 'e',
      '.git/x.md': 'f',
      'node_modules/y/README.md': 'g',
    });
    await symlink('/etc/hostname', join(path, 'linked.md'));
    await symlink(join(path, 'nowhere'), join(path, 'dangling.md'));
    const listed = await folder.list();
    expect(listed).toEqual(
      ['plant/deep/est.md', 'plant/north.md', 'tank 2.md', 'tank 10.md'].map((name) =>
        expect.objectContaining({ name, modified: expect.any(Number) }),
      ),
    );
    expect(listed).toContainEqual(
      expect.objectContaining({ name: 'tank 2.md', hash: hashOf(TEXT) }),
    );
  });

  it('opens a worksheet with its text and the hash of its bytes', async () => {
    const { folder } = await folderWith({ 'mast.md': TEXT });
    expect(await folder.open('mast.md')).toEqual({
      name: 'mast.md',
      text: TEXT,
      hash: hashOf(TEXT),
      readOnly: false,
    });
  });

  it('says why a worksheet cannot be opened', async () => {
    const { path, folder } = await folderWith({ 'large.md': new Uint8Array(6 * 1024 * 1024) });
    await mkdir(join(path, 'folder.md'));
    expect(await folder.open('mast.md')).toEqual(
      refuse('missing', 'There is no worksheet mast.md.'),
    );
    expect(await folder.open('none/mast.md')).toEqual(
      refuse('no-folder', 'The folder of none/mast.md does not exist.'),
    );
    expect(await folder.open('folder.md')).toEqual(
      refuse('not-a-file', 'folder.md is not a file.'),
    );
    expect(await folder.open('large.md')).toEqual(
      refuse('too-large', 'The worksheet has 6.0 MB; the limit is 5.0 MB.'),
    );
  });

  it('that does not exist is refused', async () => {
    const path = join(await temporaryFolder(), 'none');
    expect(await openFolder(path)).toEqual(refuse('missing', `${path}: there is no such file.`));
  });
});

describe('a path', () => {
  it('through a link that leaves the folder is refused, to read, to replace and to create', async () => {
    const outside = await temporaryFolder();
    await writeFile(join(outside, 'secret.md'), 'secret');
    const { path, folder } = await folderWith({});
    await symlink(join(outside, 'secret.md'), join(path, 'file.md'));
    await symlink(outside, join(path, 'plant'));
    for (const name of ['file.md', 'plant/secret.md', 'plant/new.md']) {
      const refusal = refuse('outside', `${name} leads outside the worksheet folder.`);
      expect(await folder.open(name)).toEqual(refusal);
      expect(await folder.save(name, 'mine', hashOf('secret'))).toEqual(refusal);
      expect(await folder.save(name, 'mine', null)).toEqual(refusal);
    }
    expect(await readdir(outside)).toEqual(['secret.md']);
    expect(await readFile(join(outside, 'secret.md'), 'utf8')).toBe('secret');
  });

  it('through a link to a place that does not exist outside creates nothing there', async () => {
    const outside = await temporaryFolder();
    const { path, folder } = await folderWith({});
    await symlink(join(outside, 'new.md'), join(path, 'mast.md'));
    expect(await folder.save('mast.md', 'mine', null)).toEqual(
      refuse('missing', 'mast.md: there is no such file.'),
    );
    expect(await readdir(outside)).toEqual([]);
  });

  it('into a neighbour whose name begins like the folder is refused', async () => {
    const { path, folder } = await folderWith({});
    await mkdir(`${path}-other`);
    await writeFile(`${path}-other/mast.md`, 'theirs');
    await symlink(`${path}-other`, join(path, 'plant'));
    expect(await folder.open('plant/mast.md')).toEqual(
      refuse('outside', 'plant/mast.md leads outside the worksheet folder.'),
    );
    await rm(`${path}-other`, { recursive: true });
  });

  it('through a link that stays in the folder is followed, and the link is kept', async () => {
    const { path, folder } = await folderWith({ 'plant/mast.md': 'old' });
    await symlink('plant/mast.md', join(path, 'mast.md'));
    expect(await folder.save('mast.md', 'new', hashOf('old'))).toEqual({
      kind: 'saved',
      hash: hashOf('new'),
    });
    expect(await readFile(join(path, 'plant/mast.md'), 'utf8')).toBe('new');
    expect(
      (await readdir(path, { withFileTypes: true })).map((entry) => entry.isSymbolicLink()),
    ).toContain(true);
  });
});

describe('saving', () => {
  it('writes exactly the text, and leaves nothing else behind', async () => {
    const { path, folder } = await folderWith({ 'mast.md': TEXT });
    const text = `\uFEFF${TEXT}β\r\n`;
    const saved = await folder.save('mast.md', text, hashOf(TEXT));
    expect(saved).toEqual({ kind: 'saved', hash: hashOf(text) });
    expect(await readFile(join(path, 'mast.md'))).toEqual(Buffer.from(text));
    expect(await readdir(path)).toEqual(['mast.md']);
  });

  it('keeps the permissions of the file', async () => {
    const { path, folder } = await folderWith({ 'mast.md': 'old' });
    await chmod(join(path, 'mast.md'), 0o640);
    await folder.save('mast.md', 'new', hashOf('old'));
    expect((await stat(join(path, 'mast.md'))).mode & 0o777).toBe(0o640);
  });

  it('refuses a read-only file and says so on opening', async () => {
    const { path, folder } = await folderWith({ 'mast.md': 'old' });
    await chmod(join(path, 'mast.md'), 0o444);
    expect(await folder.open('mast.md')).toMatchObject({ readOnly: true });
    expect(await folder.save('mast.md', 'new', hashOf('old'))).toEqual(
      refuse('read-only', 'mast.md is read-only.'),
    );
    expect(await readFile(join(path, 'mast.md'), 'utf8')).toBe('old');
  });

  it('over a file that changed on disk gives back what is there and writes nothing', async () => {
    const { path, folder } = await folderWith({ 'mast.md': 'theirs' });
    expect(await folder.save('mast.md', 'mine', hashOf('old'))).toEqual({
      kind: 'conflict',
      text: 'theirs',
      hash: hashOf('theirs'),
    });
    expect(await readFile(join(path, 'mast.md'), 'utf8')).toBe('theirs');
  });

  it('a new worksheet creates it, once', async () => {
    const { path, folder } = await folderWith({});
    expect(await folder.save('mast.md', 'first', null)).toEqual({
      kind: 'saved',
      hash: hashOf('first'),
    });
    expect(await folder.save('mast.md', 'second', null)).toEqual({
      kind: 'conflict',
      text: 'first',
      hash: hashOf('first'),
    });
    expect(await readFile(join(path, 'mast.md'), 'utf8')).toBe('first');
    expect(await readdir(path)).toEqual(['mast.md']);
  });

  it('a worksheet that was removed on disk is a conflict with nothing', async () => {
    const { path, folder } = await folderWith({});
    expect(await folder.save('mast.md', 'mine', hashOf('old'))).toEqual({
      kind: 'conflict',
      text: '',
      hash: null,
    });
    expect(await readdir(path)).toEqual([]);
  });

  it('over a file that is no longer text is refused', async () => {
    const { folder } = await folderWith({ 'mast.md': Buffer.from([0xff, 0xfe]) });
    expect(await folder.save('mast.md', 'mine', hashOf('old'))).toMatchObject({ code: 'not-utf8' });
  });

  it('twice at once lets one through and tells the other', async () => {
    const { folder } = await folderWith({ 'mast.md': 'old' });
    const saves = ['mine', 'yours'].map((text) => folder.save('mast.md', text, hashOf('old')));
    expect(await Promise.all(saves)).toEqual([
      { kind: 'saved', hash: hashOf('mine') },
      { kind: 'conflict', text: 'mine', hash: hashOf('mine') },
    ]);
  });

  it('is never seen half done by a reader', async () => {
    const texts = ['a', 'b'].map((letter) => letter.repeat(1024 * 1024));
    const { path, folder } = await folderWith({ 'mast.md': texts[0] });
    let saving = true;
    const reading = (async () => {
      const seen = new Set<string>();
      while (saving) seen.add(hashOf(await readFile(join(path, 'mast.md'), 'utf8')));
      return seen;
    })();
    for (const turn of [1, 0, 1, 0]) {
      await folder.save('mast.md', texts[turn], hashOf(texts[1 - turn]));
    }
    saving = false;
    for (const hash of await reading) expect(texts.map(hashOf)).toContain(hash);
  });
});
