import { readFile, rm, writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import type { Browser, BrowserContextOptions } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest';
import { startBrowser } from './browser.ts';
import { openPage, type OpenedPage } from './open-page.ts';
import { DRUM, TANK } from './tank.ts';
import { WorksheetPage } from './worksheet-page.ts';

let browser: Browser;
beforeAll(async () => {
  browser = await startBrowser();
});
afterAll(() => browser?.close());

const PATIENCE = { timeout: 10_000, interval: 50 };

interface OpenedSheet extends OpenedPage {
  readonly sheet: WorksheetPage;
  /** What `tank.md` holds on disk. */
  onDisk(): Promise<string>;
}

async function openTank(options: BrowserContextOptions = {}): Promise<OpenedSheet> {
  return openText({ 'tank.md': TANK }, options);
}

async function openText(
  files: Readonly<Record<string, string>>,
  options: BrowserContextOptions = {},
): Promise<OpenedSheet> {
  const opened = await openPage(browser, files, options);
  const sheet = await new WorksheetPage(opened.page).settled();
  return { ...opened, sheet, onDisk: () => readFile(join(opened.folder, 'tank.md'), 'utf8') };
}

const has = (text: string | RegExp, read: () => Promise<string | null>) =>
  vi.waitFor(async () => expect(await read()).toMatch(text), PATIENCE);
const becomes = (text: string, read: () => Promise<string | null>) =>
  vi.waitFor(async () => expect(await read()).toBe(text), PATIENCE);

describe('the worksheet page', () => {
  it('shows the prose typeset, the results under their statements and a summary', async () => {
    const { page, sheet } = await openTank();
    expect(await page.title()).toBe('Tank level under a slow leak');
    await becomes('1 of 2 met · 1 at nominal only', () => sheet.summary.textContent());
    await becomes('20 mm', () => sheet.value('e_ss').textContent());
    expect(await sheet.requirement('R-2 offset').textContent()).toContain('met at nominal only');
    await has('It settles 20 mm off.', () => sheet.text.textContent());
    const prose = sheet.line('The level of a buffer tank');
    expect((await prose.boundingBox())?.height).toBeGreaterThan(10);
  });

  it('follows an edit of the text', async () => {
    const { sheet } = await openTank();
    await sheet.retype('Kp is 0.02 m^2/s', '0.02', '0.05');
    await becomes('8 mm', () => sheet.value('e_ss').textContent());
    await becomes('2 of 2 met', () => sheet.summary.textContent());
    await becomes('unsaved edits', () => sheet.savedState.textContent());
  });

  it('keeps the other results alive while a line is half typed', async () => {
    const { page, sheet } = await openTank();
    await sheet.line('e_ss = final(leak.e) in mm').click();
    await page.keyboard.press('End');
    await page.keyboard.press('Enter');
    await page.keyboard.insertText('x = (A +');
    await page.getByRole('group', { name: 'Problem', exact: true }).first().waitFor();
    await becomes('20 mm', () => sheet.value('e_ss').textContent());
  });

  it('puts a number from the side column into the text, and nothing else', async () => {
    const { page, sheet, onDisk } = await openTank();
    await sheet.number('Kp').fill('0.05');
    await page.keyboard.press('Enter');
    await becomes('8 mm', () => sheet.value('e_ss').textContent());
    await page.keyboard.press('Control+s');
    await becomes('saved', () => sheet.savedState.textContent());
    expect(await onDisk()).toBe(TANK.replace('0.02 m^2/s', '0.05 m^2/s'));
  });

  it('follows a slider, and takes its whole way back in one step', async () => {
    const { page, sheet } = await openTank();
    const slider = await sheet.slider('Kp').boundingBox();
    if (slider === null) throw new Error('there is no slider');
    const height = slider.y + slider.height / 2;
    const at = (part: number) => slider.x + part * slider.width;
    await page.mouse.move(at(0.16), height);
    await page.mouse.down();
    await page.mouse.move(at(0.6), height, { steps: 12 });
    await page.mouse.up();
    await becomes('2 of 2 met', () => sheet.summary.textContent());
    expect(await sheet.line('Kp is 0.02 m^2/s').count()).toBe(0);
    await sheet.text.focus();
    await page.keyboard.press('Control+z');
    await sheet.line('Kp is 0.02 m^2/s').waitFor();
    await becomes('saved', () => sheet.savedState.textContent());
  });

  it('says what each value was while a baseline is pinned', async () => {
    const { page, sheet } = await openTank();
    await sheet.button('Baseline').click();
    await sheet.number('Kp').fill('0.05');
    await page.keyboard.press('Enter');
    const row = page.getByRole('group', { name: 'Result e_ss', exact: true });
    await has(/was 20 mm/, () => row.textContent());
    await sheet.button('Baseline').click();
    await vi.waitFor(async () => expect(await row.textContent()).not.toContain('was'), PATIENCE);
  });

  it('moves a gain with the point of a gain plane, and takes the drag back in one step', async () => {
    const { page, sheet } = await openText({ 'drum.md': DRUM });
    const point = page.getByRole('button', { name: /^Present gains/ });
    await point.scrollIntoViewIfNeeded();
    const box = await point.boundingBox();
    if (box === null) throw new Error('there is no point');
    const [x, y] = [box.x + box.width / 2, box.y + box.height / 2];
    await page.mouse.move(x, y);
    await page.mouse.down();
    await page.mouse.move(x + 40, y - 150, { steps: 20 });
    await page.mouse.up();
    await becomes('0 of 1 met · 1 not met', () => sheet.summary.textContent());
    expect(Number(await sheet.number('Kp').inputValue())).toBeGreaterThan(6);
    expect(Number(await sheet.number('Ki').inputValue())).toBeGreaterThan(3);
    await sheet.text.focus();
    await page.keyboard.press('Control+z');
    await becomes('1 of 1 met', () => sheet.summary.textContent());
    expect(await sheet.number('Kp').inputValue()).toBe('6');
    expect(await sheet.number('Ki').inputValue()).toBe('1');
  });

  it('makes a new worksheet and opens it', async () => {
    const { page, sheet, folder } = await openTank();
    await sheet.button('New worksheet').click();
    await page.keyboard.insertText('Pump house');
    await page.keyboard.press('Enter');
    await becomes('Pump house', () => page.title());
    expect(await readFile(join(folder, 'pump-house.md'), 'utf8')).toContain('# Pump house\n');
    await sheet.button('tank').click();
    await becomes('20 mm', () => sheet.value('e_ss').textContent());
  });
});

describe('the file on disk', () => {
  it('keeps its line endings and its byte order mark through an edit', async () => {
    const text = `\uFEFF${TANK.replaceAll('\n', '\r\n')}`;
    const { page, sheet, onDisk } = await openText({ 'tank.md': text });
    await sheet.number('Kp').fill('0.05');
    await page.keyboard.press('Enter');
    await becomes('8 mm', () => sheet.value('e_ss').textContent());
    await page.keyboard.press('Control+s');
    await becomes('saved', () => sheet.savedState.textContent());
    expect(await onDisk()).toBe(text.replace('0.02 m^2/s', '0.05 m^2/s'));
  });

  it('is read again when it changes and there are no unsaved edits', async () => {
    const { sheet, folder } = await openTank();
    await writeFile(join(folder, 'tank.md'), TANK.replace('0.02 m^2/s', '0.05 m^2/s'));
    await becomes('8 mm', () => sheet.value('e_ss').textContent());
    await becomes('saved', () => sheet.savedState.textContent());
  });

  it('is never overwritten when it changed meanwhile: both are shown, and the choice is mine', async () => {
    const { page, sheet, folder, onDisk } = await openTank();
    const theirs = TANK.replace('1.5 m^2', '1.8 m^2');
    await sheet.retype('Kp is 0.02 m^2/s', '0.02', '0.05');
    await becomes('unsaved edits', () => sheet.savedState.textContent());
    await writeFile(join(folder, 'tank.md'), theirs);
    const conflict = page.getByRole('region', { name: /changed on disk/ });
    await conflict.waitFor();
    await page.keyboard.press('Control+s');
    expect(await onDisk()).toBe(theirs);
    await sheet.button('Save the text at the right').click();
    await becomes('saved', () => sheet.savedState.textContent());
    expect(await onDisk()).toBe(TANK.replace('0.02 m^2/s', '0.05 m^2/s'));
  });

  it('can be taken in the place of my edits, which the undo history keeps', async () => {
    const { page, sheet, folder, onDisk } = await openTank();
    const theirs = TANK.replace('1.5 m^2', '1.8 m^2');
    await sheet.retype('Kp is 0.02 m^2/s', '0.02', '0.05');
    await becomes('unsaved edits', () => sheet.savedState.textContent());
    await writeFile(join(folder, 'tank.md'), theirs);
    await sheet.button('Take the file on disk').click();
    await sheet.line('A  is 1.8 m^2').waitFor();
    await becomes('saved', () => sheet.savedState.textContent());
    await sheet.text.focus();
    await page.keyboard.press('Control+z');
    await sheet.line('Kp is 0.05 m^2/s').waitFor();
    expect(await onDisk()).toBe(theirs);
  });

  it('that was removed can be saved anew', async () => {
    const { page, sheet, folder, onDisk } = await openTank();
    await rm(join(folder, 'tank.md'));
    await page.getByText('tank.md is no longer on disk.').waitFor();
    await page.keyboard.press('Control+s');
    await becomes('saved', () => sheet.savedState.textContent());
    expect(await onDisk()).toBe(TANK);
  });

  it('gets back the edits that were not saved when the page went away', async () => {
    const { page, sheet } = await openTank();
    await sheet.retype('Kp is 0.02 m^2/s', '0.02', '0.05');
    await becomes('8 mm', () => sheet.value('e_ss').textContent());
    page.on('dialog', (dialog) => void dialog.accept());
    await page.reload();
    await becomes('20 mm', () => sheet.value('e_ss').textContent());
    await sheet.button('Restore them').click();
    await becomes('8 mm', () => sheet.value('e_ss').textContent());
  });
});
