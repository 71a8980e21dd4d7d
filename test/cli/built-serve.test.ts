import { symlink, writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import { expect, it, onTestFinished } from 'vitest';
import { startServer } from '../built-command.ts';
import { temporaryFolder } from '../temporary-folder.ts';

async function served() {
  const folder = await temporaryFolder();
  await writeFile(join(folder, 'mast.md'), '# Mast\n');
  const server = await startServer(folder);
  onTestFinished(async () => void (await server.stop()));
  return { folder, server, ask: (path: string) => fetch(new URL(path, server.address)) };
}

it('the built server gives out the worksheets of its folder and nothing beside them', async () => {
  const { folder, ask } = await served();
  await symlink('/etc', join(folder, 'plant'));
  expect(await (await ask('api/worksheets/mast.md')).json()).toMatchObject({ text: '# Mast\n' });
  const escapes = {
    'api/worksheets/..%2F..%2Fetc%2Fhostname': 400,
    'api/worksheets/%2Fetc%2Fhostname.md': 400,
    'api/worksheets/plant/x.md': 403,
    'api/worksheets/mast.md%00': 400,
    'api/worksheets/..%5Cmast.md': 400,
    'api/worksheets/.mast.md': 400,
  };
  for (const [path, status] of Object.entries(escapes)) {
    expect((await ask(path)).status, path).toBe(status);
  }
});

it('the built server writes only what carries its token', async () => {
  const { ask, server } = await served();
  const { token } = (await (await ask('api/session')).json()) as { token: string };
  const save = (headers: Record<string, string>) =>
    fetch(new URL('api/worksheets/new.md', server.address), {
      method: 'PUT',
      headers: { 'content-type': 'application/json', ...headers },
      body: JSON.stringify({ text: 'θ', baseHash: null }),
    });
  expect((await save({})).status).toBe(403);
  expect((await save({ 'x-loopwright-token': `${token}x` })).status).toBe(403);
  expect((await save({ 'x-loopwright-token': token, origin: 'http://evil.example' })).status).toBe(
    403,
  );
  expect((await ask('api/worksheets/new.md')).status).toBe(404);
  expect((await save({ 'x-loopwright-token': token })).status).toBe(200);
  expect((await ask('api/worksheets/new.md')).status).toBe(200);
});

it('the built server ends cleanly on Ctrl-C, with a page still listening', async () => {
  const { ask, server } = await served();
  const events = await ask('api/events');
  expect(events.headers.get('content-type')).toBe('text/event-stream');
  expect(await server.stop()).toBe(0);
  await expect(events.text()).rejects.toThrow();
});
