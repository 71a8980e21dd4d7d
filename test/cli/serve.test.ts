import { createServer, request, type IncomingMessage } from 'node:http';
import type { AddressInfo } from 'node:net';
import { join } from 'node:path';
import { describe, expect, it, onTestFinished } from 'vitest';
import { isRefusal, refuse } from '../../src/base/index.ts';
import { serve, type ServedPage } from '../../src/cli/serve.ts';
import { temporaryFolder } from '../temporary-folder.ts';

/** Serves a page that answers everything with its path. */
async function served(port: number | null = 0): Promise<ServedPage> {
  const page = await serve(await temporaryFolder(), port, async () => (asked, answer) => {
    answer.end(asked.url);
  });
  if (isRefusal(page)) throw new Error(page.reason);
  onTestFinished(() => page.close());
  return page;
}

/** Asks with exactly these headers; fetch would not send a Host of its own. */
async function ask(address: string, path: string, headers: Record<string, string> = {}) {
  const answer = await new Promise<IncomingMessage>((settle, fail) => {
    request(new URL(path, address), { headers, agent: false }, settle).on('error', fail).end();
  });
  let text = '';
  for await (const piece of answer) text += String(piece);
  return { status: answer.statusCode, headers: answer.headers, text };
}

describe('serve', () => {
  it('answers on the loopback interface under the address it gives, with security headers', async () => {
    const { address } = await served();
    expect(address).toMatch(/^http:\/\/127\.0\.0\.1:\d+\/$/);
    expect(await ask(address, '/x')).toMatchObject({
      status: 200,
      text: '/x',
      headers: { 'x-content-type-options': 'nosniff', 'x-frame-options': 'DENY' },
    });
  });

  it("refuses another site's Host, Origin and fetches, also for the page's own files", async () => {
    const { address } = await served();
    const foreign = [
      { host: 'evil.example' },
      { host: 'evil.example:80' },
      { origin: 'http://evil.example' },
      { 'sec-fetch-site': 'cross-site' },
    ] as Record<string, string>[];
    for (const headers of foreign) {
      for (const path of ['/', '/mark.svg', '/api/session']) {
        const { status, text } = await ask(address, path, headers);
        expect(status).toBe(403);
        expect(JSON.parse(text)).toMatchObject({ code: 'foreign' });
      }
    }
  });

  it('takes the next port where the usual one is taken', async () => {
    const first = await served(null);
    const second = await served(null);
    expect(second.address).not.toBe(first.address);
  });

  it('refuses a port that was asked for and is taken', async () => {
    const other = createServer();
    await new Promise<void>((settle) => other.listen(0, '127.0.0.1', settle));
    onTestFinished(() => void other.close());
    const { port } = other.address() as AddressInfo;
    const page = await serve(await temporaryFolder(), port, () => Promise.reject(new Error()));
    expect(page).toEqual(
      refuse('port-taken', `Port ${port} is taken or not allowed; choose another with --port.`),
    );
  });

  it('refuses a folder that does not exist', async () => {
    const folder = join(await temporaryFolder(), 'none');
    const page = await serve(folder, 0, () => Promise.reject(new Error()));
    expect(page).toEqual(refuse('missing', `${folder}: there is no such file.`));
  });

  it('frees its port when it is closed, even with a connection open', async () => {
    const page = await serve(await temporaryFolder(), 0, async () => (_asked, answer) => {
      answer.write('still');
    });
    if (isRefusal(page)) throw new Error(page.reason);
    const answer = await fetch(page.address);
    await page.close();
    await expect(answer.text()).rejects.toThrow();
    await expect(fetch(page.address)).rejects.toThrow();
  });
});
