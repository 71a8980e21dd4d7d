import { writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { listReply, openReply, saveReply, TOKEN_HEADER } from '../../src/server/replies.ts';
import { openService, type FileService } from '../../src/server/service.ts';
import { contentHash } from '../../src/server/worksheet-bytes.ts';
import { temporaryFolder } from '../temporary-folder.ts';

const hashOf = (text: string) => contentHash(Buffer.from(text));

async function service(text = 'old') {
  const folder = await temporaryFolder();
  await writeFile(join(folder, 'mast.md'), text);
  return (await openService({ LOOPWRIGHT_FOLDER: folder })) as FileService;
}

function put(body: unknown, token: string | null): Request {
  const headers = new Headers(token === null ? {} : { [TOKEN_HEADER]: token });
  const text = typeof body === 'string' ? body : JSON.stringify(body);
  return new Request('http://127.0.0.1:4600/', { method: 'PUT', headers, body: text });
}

describe('the answer', () => {
  it('to a list holds the folder and its worksheets', async () => {
    const files = await service();
    expect(await listReply(files)).toEqual({
      status: 200,
      body: {
        folder: files.folder.path,
        worksheets: [{ name: 'mast.md', modified: expect.any(Number), hash: hashOf('old') }],
      },
    });
  });

  it('to an opened worksheet holds its text, through JSON byte for byte', async () => {
    const text = '\uFEFF# θ\r\n\tx\u2028\0\n';
    const { status, body } = await openReply(await service(text), 'mast.md');
    expect(status).toBe(200);
    expect(JSON.parse(JSON.stringify(body))).toMatchObject({ text, hash: hashOf(text) });
  });

  it.each([
    ['../mast.md', 400],
    ['none.md', 404],
    ['none/mast.md', 404],
  ])('to %s is a message with status %i', async (name, status) => {
    expect(await openReply(await service(), name)).toEqual({
      status,
      body: { message: expect.any(String), code: expect.any(String) },
    });
  });

  it('to a save without the token is 403, and nothing is written', async () => {
    const files = await service();
    const order = { text: 'new', baseHash: hashOf('old') };
    for (const token of [null, 'guess']) {
      expect(await saveReply(files, 'mast.md', put(order, token))).toEqual({
        status: 403,
        body: { message: 'The page is out of date: reload it, then save again.', code: 'no-token' },
      });
    }
    expect(await files.folder.open('mast.md')).toMatchObject({ text: 'old' });
  });

  it('to a save is the new hash, and to one from an old version 409 with what is on disk', async () => {
    const files = await service();
    const save = (text: string) =>
      saveReply(files, 'mast.md', put({ text, baseHash: hashOf('old') }, files.token));
    expect(await save('first')).toEqual({ status: 200, body: { hash: hashOf('first') } });
    expect(await save('second')).toEqual({
      status: 409,
      body: { text: 'first', hash: hashOf('first') },
    });
  });

  it.each(['', 'no JSON', '[]', 'null', '{"text":1,"baseHash":null}', '{"text":"x"}'])(
    'to the save %j is 400',
    async (body) => {
      const files = await service();
      expect(await saveReply(files, 'mast.md', put(body, files.token))).toEqual({
        status: 400,
        body: {
          message: 'A save is JSON: {"text": string, "baseHash": string or null}.',
          code: 'bad-request',
        },
      });
    },
  );

  it('to a save of 6 MB is 413', async () => {
    const files = await service();
    const order = { text: 'x'.repeat(6 * 1024 * 1024), baseHash: hashOf('old') };
    const { status } = await saveReply(files, 'mast.md', put(order, files.token));
    expect(status).toBe(413);
  });
});
