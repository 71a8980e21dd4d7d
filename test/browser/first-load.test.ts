import { gzipSync } from 'node:zlib';
import type { Browser, Request } from 'playwright-core';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { startBrowser } from './browser.ts';
import { openPage } from './open-page.ts';
import { TANK } from './tank.ts';
import { WorksheetPage } from './worksheet-page.ts';

let browser: Browser;
beforeAll(async () => {
  browser = await startBrowser();
});
afterAll(() => browser?.close());

it('the first load takes less than 600 kB of compressed script and asks only this machine', async () => {
  const { page, address } = await openPage(browser, { 'tank.md': TANK });
  await new WorksheetPage(page).settled();
  const asked: Request[] = [];
  page.on('request', (request) => asked.push(request));
  await page.reload();
  await new WorksheetPage(page).settled();
  const urls = asked.map((request) => request.url());
  expect(urls.filter((url) => !url.startsWith(address) && !url.startsWith('data:'))).toEqual([]);
  let total = 0;
  for (const url of new Set(urls.filter((candidate) => candidate.endsWith('.js')))) {
    total += gzipSync(await (await page.request.get(url)).body()).length;
  }
  expect(total).toBeGreaterThan(50_000);
  expect(total).toBeLessThan(600_000);
});
