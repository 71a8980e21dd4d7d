import { rename, rm, writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import { expect, it, onTestFinished, vi } from 'vitest';
import { eventStream } from '../../src/server/event-stream.ts';
import { watchFolder, type FolderChange } from '../../src/server/watch.ts';
import { contentHash } from '../../src/server/worksheet-bytes.ts';
import { openFolder, type WorksheetFolder } from '../../src/server/worksheet-folder.ts';
import { temporaryFolder } from '../temporary-folder.ts';

const hashOf = (text: string) => contentHash(Buffer.from(text));

async function watched(files: Readonly<Record<string, string>>) {
  const path = await temporaryFolder();
  for (const [name, text] of Object.entries(files)) await writeFile(join(path, name), text);
  const folder = (await openFolder(path)) as WorksheetFolder;
  return { path, folder, watch: watchFolder(folder) };
}

async function changesOf({ watch }: Awaited<ReturnType<typeof watched>>) {
  const changes: FolderChange[] = [];
  onTestFinished(await watch.listen((change) => changes.push(change)));
  return changes;
}

it('tells what is added, changed and removed on disk, and keeps quiet about other files', async () => {
  const place = await watched({ 'mast.md': 'old' });
  const changes = await changesOf(place);
  await writeFile(join(place.path, 'gusts.csv'), '1');
  await writeFile(join(place.path, '.mast.md.swp'), '1');
  await writeFile(join(place.path, 'mast.md'), 'new');
  await writeFile(join(place.path, 'tank.md'), 'tank');
  await vi.waitFor(() => expect(changes).toHaveLength(2), 5000);
  await rm(join(place.path, 'mast.md'));
  await vi.waitFor(() => expect(changes).toHaveLength(3), 5000);
  expect(changes).toEqual(
    expect.arrayContaining([
      { kind: 'changed', name: 'mast.md', hash: hashOf('new') },
      { kind: 'added', name: 'tank.md', hash: hashOf('tank') },
    ]),
  );
  expect(changes[2]).toEqual({ kind: 'removed', name: 'mast.md' });
});

it('tells a save of our own, and a save by renaming, as a change and not as a removal', async () => {
  const place = await watched({ 'mast.md': 'old' });
  const changes = await changesOf(place);
  await place.folder.save('mast.md', 'ours', hashOf('old'));
  await vi.waitFor(() => expect(changes).toHaveLength(1), 5000);
  await writeFile(join(place.path, 'other'), 'theirs');
  await rename(join(place.path, 'other'), join(place.path, 'mast.md'));
  await vi.waitFor(() => expect(changes).toHaveLength(2), 5000);
  expect(changes).toEqual([
    { kind: 'changed', name: 'mast.md', hash: hashOf('ours') },
    { kind: 'changed', name: 'mast.md', hash: hashOf('theirs') },
  ]);
});

it('streams the changes as server-sent events', async () => {
  const place = await watched({});
  const reader = eventStream(place.watch).getReader();
  const nextText = async () => new TextDecoder().decode((await reader.read()).value);
  expect(await nextText()).toBe('retry: 1000\nevent: ready\ndata: {}\n\n');
  await writeFile(join(place.path, 'tank.md'), 'tank');
  const data = JSON.stringify({ name: 'tank.md', hash: hashOf('tank') });
  expect(await nextText()).toBe(`event: added\ndata: ${data}\n\n`);
  await reader.cancel();
});
