import { readFile, readdir } from 'node:fs/promises';
import { join } from 'node:path';
import type { Browser } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { startBrowser } from './browser.ts';
import { openPage } from './open-page.ts';

const TEXT = '\uFEFF# Mast\r\n\r\nθ leans.\n';

let browser: Browser;
beforeAll(async () => {
  browser = await startBrowser();
});
afterAll(() => browser?.close());

describe('in a browser, the service', () => {
  it('gives the page its worksheets and saves them byte for byte', async () => {
    const { page, folder } = await openPage(browser, { 'mast.md': TEXT });
    const saved = await page.evaluate(async () => {
      const { token } = await (await fetch('/api/session')).json();
      const { text, hash } = await (await fetch('/api/worksheets/mast.md')).json();
      const answer = await fetch('/api/worksheets/mast.md', {
        method: 'PUT',
        headers: { 'content-type': 'application/json', 'x-loopwright-token': token },
        body: JSON.stringify({ text: `${text}β\r\n`, baseHash: hash }),
      });
      return answer.status;
    });
    expect(saved).toBe(200);
    expect(await readFile(join(folder, 'mast.md'), 'utf8')).toBe(`${TEXT}β\r\n`);
    expect(await readdir(folder)).toEqual(['mast.md']);
  });

  it('forbids what the content security policy names: evaluated and inline script', async () => {
    const { page, faults } = await openPage(browser, { 'mast.md': TEXT });
    const outcomes = await page.evaluate(async () => {
      const inline = document.createElement('script');
      inline.textContent = 'window.inlineRan = true';
      document.head.append(inline);
      // What the test itself evaluates is exempt from the policy; what a timer calls is not.
      const evaluated = await new Promise((settle) => {
        setTimeout(() => {
          try {
            settle(new Function('return "ran"')());
          } catch (error) {
            settle((error as Error).name);
          }
        });
      });
      return { evaluated, inline: 'inlineRan' in window };
    });
    expect(outcomes).toEqual({ evaluated: 'EvalError', inline: false });
    expect(faults.splice(0).every((fault) => fault.includes('Content Security Policy'))).toBe(true);
  });

  it("does not answer another site's page", async () => {
    const { page, address } = await openPage(browser, { 'mast.md': TEXT });
    const other = await openPage(browser, {});
    const read = await other.page.evaluate(
      (url) =>
        fetch(url).then(
          () => 'read',
          () => 'refused',
        ),
      new URL('api/session', address).href,
    );
    expect(read).toBe('refused');
    expect(other.faults.splice(0)).not.toEqual([]);
    expect(await page.evaluate(() => fetch('/api/session').then(({ ok }) => ok))).toBe(true);
  });
});
