import { writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import type { Browser, BrowserContextOptions, ConsoleMessage, Page } from 'playwright-core';
import { expect, onTestFinished } from 'vitest';
import { startServer } from '../built-command.ts';
import { temporaryFolder } from '../temporary-folder.ts';

/** A page of the built program on a folder of its own. */
export interface OpenedPage {
  readonly page: Page;
  readonly address: string;
  readonly folder: string;
  /** What went wrong so far; a test that expects a fault empties the list. */
  readonly faults: string[];
}

/**
 * Serves a fresh folder with these files and opens the page on it. A console error or warning, an uncaught error, a
 * failed request and an answer of 400 or above each fail the test in the end.
 */
export async function openPage(
  browser: Browser,
  files: Readonly<Record<string, string>>,
  options: BrowserContextOptions = {},
): Promise<OpenedPage> {
  const folder = await temporaryFolder();
  for (const [name, text] of Object.entries(files)) await writeFile(join(folder, name), text);
  const server = await startServer(folder);
  onTestFinished(async () => void (await server.stop()));
  const context = await browser.newContext({ viewport: { width: 1280, height: 800 }, ...options });
  onTestFinished(() => context.close());
  context.setDefaultTimeout(10_000);
  const page = await context.newPage();
  const faults = collectFaults(page);
  onTestFinished(() => expect(faults).toEqual([]));
  await page.goto(server.address);
  return { page, address: server.address, folder, faults };
}

function collectFaults(page: Page): string[] {
  const faults: string[] = [];
  page.on('console', (message) => {
    if (isFault(message)) faults.push(`console ${message.type()}: ${message.text().slice(0, 300)}`);
  });
  // Uncaught errors and unhandled rejections, in the page and in its workers.
  page.on('pageerror', (error) => faults.push(`uncaught: ${error.message}`));
  page.on('requestfailed', (request) => {
    const reason = request.failure()?.errorText ?? 'unknown';
    // The event stream ends with the page.
    if (!request.url().endsWith('/api/events')) faults.push(`request: ${request.url()} ${reason}`);
  });
  page.on('response', (response) => {
    if (response.status() >= 400) faults.push(`answer: ${response.url()} ${response.status()}`);
  });
  return faults;
}

function isFault(message: ConsoleMessage): boolean {
  return message.type() === 'error' || message.type() === 'warning';
}
