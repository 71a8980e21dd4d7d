import { access, constants } from 'node:fs/promises';
import { delimiter, join } from 'node:path';
import { chromium, type Browser } from 'playwright-core';

const NAMES = ['chromium', 'chromium-browser', 'google-chrome', 'google-chrome-stable'];
const FLAGS = [
  ...['--disable-gpu', '--disable-quic', '--no-first-run', '--disable-sync'],
  ...['--disable-background-networking', '--disable-component-update'],
];

/**
 * Starts the machine's own Chromium or Chrome, headless, with a fresh profile. A machine without one fails the tests:
 * to skip them would be to call an untested page good.
 */
export async function startBrowser(): Promise<Browser> {
  return chromium.launch({
    executablePath: await findBrowser(),
    headless: true,
    chromiumSandbox: false,
    args: FLAGS,
  });
}

/** The program that the variable CHROME names, else the first that is installed. */
async function findBrowser(): Promise<string> {
  const folders = (process.env.PATH ?? '').split(delimiter);
  const installed = NAMES.flatMap((name) => folders.map((folder) => join(folder, name)));
  const candidates = process.env.CHROME ? [process.env.CHROME] : installed;
  for (const candidate of candidates) {
    if (await isProgram(candidate)) return candidate;
  }
  throw new Error(
    'The browser tests need Chromium or Chrome. Install one (on Debian: apt-get install chromium), ' +
      'or set CHROME to the path of one.',
  );
}

function isProgram(path: string): Promise<boolean> {
  return access(path, constants.X_OK).then(
    () => true,
    () => false,
  );
}
