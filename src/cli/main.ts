#!/usr/bin/env node
import { isRefusal } from '../base/index.ts';
import { readOrder, USAGE, type Order } from './command-line.ts';

/** The page's server, built beside this file. */
const PAGE = new URL('../page/handler.js', import.meta.url);

const say = (text: string) => void process.stdout.write(text);
const complain = (text: string) => void process.stderr.write(text);

async function run(words: readonly string[]): Promise<number> {
  const order = readOrder(words);
  if (!isRefusal(order)) return obey(order);
  complain(`${order.reason}\n`);
  if (order.code === 'usage') complain(`\n${USAGE}`);
  return 2;
}

async function obey(order: Order): Promise<number> {
  switch (order.verb) {
    case 'help':
      say(USAGE);
      return 0;
    case 'check': {
      const { check } = await import('./check.ts');
      return check(order.files, say, order);
    }
    case 'serve':
      return servePage(order.folder, order.port);
  }
}

/** Serves until the process is told to stop. */
async function servePage(folder: string, port: number | null): Promise<number> {
  const { serve } = await import('./serve.ts');
  const page = await serve(folder, port, async () => (await import(PAGE.href)).handler);
  if (isRefusal(page)) {
    complain(`${page.reason}\n`);
    return 2;
  }
  say(`Worksheets in ${page.folder}\n${page.address}\nCtrl-C stops.\n`);
  await new Promise<void>((settle) => {
    process.once('SIGINT', () => settle());
    process.once('SIGTERM', () => settle());
  });
  await page.close();
  return 0;
}

process.exitCode = await run(process.argv.slice(2));
