import type { Browser } from 'playwright-core';
import { afterAll, beforeAll, bench, describe } from 'vitest';
import { startBrowser } from '../browser/browser.ts';
import { openPage } from '../browser/open-page.ts';
import { TANK } from '../browser/tank.ts';
import { WorksheetPage } from '../browser/worksheet-page.ts';

let browser: Browser;
let reload: () => Promise<void>;
let blank: () => Promise<void>;

beforeAll(async () => {
  browser = await startBrowser();
  const { page } = await openPage(browser, { 'tank.md': TANK });
  await new WorksheetPage(page).settled();
  reload = async () => {
    await page.reload();
    await page.getByText('The level of a buffer tank').waitFor();
  };
  const other = await browser.newPage();
  blank = async () => {
    await other.goto('about:blank');
  };
});
afterAll(() => browser?.close());

describe('the first load of the page, to a readable worksheet (after npm run build)', () => {
  bench('an empty page (the reference)', () => blank(), { iterations: 5 });
  bench('the tank worksheet', () => reload(), { iterations: 5 });
});
