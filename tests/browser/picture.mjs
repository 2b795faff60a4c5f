// A picture of a report: node picture.mjs REPORT.html OUT.png [width] [height]
// Without a height the whole page is taken.
import { resolve } from 'node:path';
import { pathToFileURL } from 'node:url';

import { start_browser } from './browser.mjs';

const [report, out, width = '1100', height] = process.argv.slice(2);
if (!report || !out) {
  console.error('usage: node picture.mjs REPORT.html OUT.png [width] [height]');
  process.exit(2);
}
const browser = await start_browser();
const page = await browser.newPage({ viewport: { width: Number(width), height: Number(height ?? 800) } });
await page.goto(pathToFileURL(resolve(report)).href);
await page.screenshot({ path: out, fullPage: height === undefined });
await browser.close();
