import { AxeBuilder } from '@axe-core/playwright';
import { writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import type { Browser, BrowserContextOptions, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest';
import { startBrowser } from './browser.ts';
import { openPage } from './open-page.ts';
import { DRUM, TANK } from './tank.ts';
import { WorksheetPage } from './worksheet-page.ts';

let browser: Browser;
beforeAll(async () => {
  browser = await startBrowser();
});
afterAll(() => browser?.close());

async function open(text: string, options: BrowserContextOptions = {}) {
  const opened = await openPage(browser, { 'sheet.md': text }, options);
  const sheet = await new WorksheetPage(opened.page).settled();
  return { ...opened, sheet };
}

/** What an accessibility scan of the page finds, in short. */
async function violations(page: Page): Promise<string[]> {
  const { violations: found } = await new AxeBuilder({ page }).analyze();
  return found.flatMap(({ id, nodes }) =>
    nodes.map(({ html, failureSummary }) => `${id}: ${html}\n${failureSummary}`),
  );
}

describe('an accessibility scan finds nothing', () => {
  const sizes = { wide: { width: 1920, height: 1080 }, narrow: { width: 900, height: 700 } };

  for (const colorScheme of ['light', 'dark'] as const) {
    for (const [size, viewport] of Object.entries(sizes)) {
      it(`in a ${size} ${colorScheme} page with results, problems and a figure`, async () => {
        const text = DRUM.replace('J  is 0.8', 'x = y\nJ  is 0.8');
        const { page } = await open(text, { colorScheme, viewport });
        await page.getByRole('group', { name: /^Gain plane/ }).waitFor();
        expect(await violations(page)).toEqual([]);
      });
    }
  }

  it('in the drawers of a narrow page', async () => {
    const { page, sheet } = await open(TANK, { viewport: sizes.narrow });
    for (const drawer of ['Contents', 'Values']) {
      await sheet.button(drawer).click();
      expect(await violations(page)).toEqual([]);
      await page.keyboard.press('Escape');
    }
  });

  it('in a conflict', async () => {
    const { page, sheet, folder } = await open(TANK);
    await sheet.retype('Kp is 0.02 m^2/s', '0.02', '0.05');
    await page.getByText('unsaved edits').waitFor();
    await writeFile(join(folder, 'sheet.md'), TANK.replace('1.5 m^2', '1.8 m^2'));
    await page.getByRole('region', { name: /changed on disk/ }).waitFor();
    expect(await violations(page)).toEqual([]);
  });

  it('in the list of keys', async () => {
    const { page, sheet } = await open(TANK);
    await sheet.button('Keys').click();
    await page.getByRole('dialog').waitFor();
    expect(await violations(page)).toEqual([]);
  });

  it('in an empty folder', async () => {
    const { page } = await openPage(browser, {});
    await page.getByText('No worksheet is open.').waitFor();
    expect(await violations(page)).toEqual([]);
  });
});

describe('the colours', () => {
  const paper = (page: Page) =>
    page.evaluate(() => {
      const [red, green, blue] = getComputedStyle(document.body)
        .backgroundColor.match(/[\d.]+/g)!
        .map(Number);
      return (red + green + blue) / 3;
    });

  it('follow the system, and a choice of one’s own', async () => {
    const { page, sheet } = await open(TANK, { colorScheme: 'dark' });
    expect(await paper(page)).toBeLessThan(80);
    await page.getByRole('button', { name: /^Colours/ }).click();
    await vi.waitFor(async () => expect(await paper(page)).toBeGreaterThan(200));
    await page.reload();
    await sheet.settled();
    expect(await paper(page)).toBeGreaterThan(200);
  });
});

describe('by keyboard alone', () => {
  it('one can reach every control, and see where one is', async () => {
    const { page } = await open(TANK);
    const reached = new Set<string>();
    for (let step = 0; step < 60; step++) {
      await page.keyboard.press('Tab');
      const place = await page.evaluate(() => {
        const focused = document.activeElement;
        if (!(focused instanceof HTMLElement) || focused === document.body) return null;
        const { outlineStyle, boxShadow } = getComputedStyle(focused);
        const name = focused.getAttribute('aria-label') ?? focused.textContent ?? '';
        // In the text the caret shows the place.
        const seen = focused.isContentEditable || outlineStyle !== 'none' || boxShadow !== 'none';
        return { name: name.trim(), seen };
      });
      if (place === null) continue;
      expect(place).toMatchObject({ seen: true });
      reached.add(place.name);
    }
    const expected = [
      'Contents',
      'Baseline',
      'Keys',
      'Values',
      'sheet',
      'New worksheet',
      'Worksheet',
      'Go to Kp',
      'Kp, gain to be tuned',
    ];
    expect([...reached]).toEqual(expect.arrayContaining(expected));
  });

  it('one can read, edit, slide and save', async () => {
    const { page, sheet } = await open(TANK);
    await sheet.slider('Kp').focus();
    for (let step = 0; step < 5; step++) await page.keyboard.press('ArrowRight');
    await page.getByText('unsaved edits').waitFor();
    await page.keyboard.press('Control+s');
    await page.getByText('saved', { exact: true }).waitFor();
    await page.keyboard.press('?');
    await page.getByRole('dialog').waitFor();
    await page.keyboard.press('Escape');
    await page.getByRole('dialog').waitFor({ state: 'hidden' });
    await page.getByRole('region', { name: 'Worksheet', exact: true }).focus();
    await page.keyboard.press('Enter');
    expect(await sheet.text.evaluate((text) => text === document.activeElement)).toBe(true);
    await page.keyboard.press('Escape');
    expect(await sheet.text.evaluate((text) => text === document.activeElement)).toBe(false);
  });

  it('one can move the point of a gain plane with the arrow keys', async () => {
    const { page, sheet } = await open(DRUM);
    await page.getByRole('button', { name: /^Present gains/ }).focus();
    for (let step = 0; step < 3; step++) await page.keyboard.press('Shift+ArrowRight');
    await vi.waitFor(
      async () => expect(Number(await sheet.number('Kp').inputValue())).toBeGreaterThan(6),
      5000,
    );
  });
});
