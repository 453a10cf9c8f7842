// Draws the pictures of the README from the demo: npm run screenshots [-- --build]
import { chromium as playwright } from '@playwright/test';
import { mkdir, writeFile } from 'node:fs/promises';
import path from 'node:path';
import {
  chromium,
  demoPeople,
  openContext,
  openDemo,
  openPage,
  repositoryRoot,
  screenPaths,
  signIn,
} from '../apps/web/.scripts/demo-server.mjs';
import { toPalettePng } from '../apps/web/.scripts/palette-png.mjs';

const folder = path.join(repositoryRoot, 'apps/web/pictures');
const largestBytes = 250_000;

const pictures = [
  {
    name: 'targets',
    theme: 'paper',
    person: demoPeople.investigator,
    at: (r, b) => screenPaths.proposal(r, b, 'targets'),
  },
  {
    name: 'exposures',
    theme: 'slate',
    person: demoPeople.investigator,
    at: (r, b) => screenPaths.proposal(r, b, 'exposures'),
  },
  { name: 'light', theme: 'paper', person: demoPeople.investigator, at: (r, b) => screenPaths.target(r, b) },
  { name: 'ranking', theme: 'paper', person: demoPeople.chair, at: (r, b) => screenPaths.panel(r, b, '/ranking') },
  { name: 'distances', theme: 'paper', at: async () => '/calculators/distances?z=7.12,4.27,10.31' },
  { name: 'ranking', theme: 'dome', person: demoPeople.chair, at: (r, b) => screenPaths.panel(r, b, '/ranking') },
];

const demo = await openDemo();
const browser = await playwright.launch(chromium);
try {
  await mkdir(folder, { recursive: true });
  for (const { name, theme, person, at } of pictures) {
    const context = await openContext(browser, { theme, width: 1440, height: 900 });
    await signIn(context, demo.base, person);
    const page = await context.newPage();
    const faults = [];
    page.on('pageerror', (error) => faults.push(String(error)));
    page.on('console', (message) => message.type() === 'error' && faults.push(message.text()));
    await openPage(page, demo.base + (await at(context.request, demo.base)));
    const png = toPalettePng(await page.screenshot());
    if (faults.length > 0) throw new Error(`${name} in ${theme}: ${faults.join('; ')}`);
    if (png.length > largestBytes)
      throw new Error(`${name} in ${theme}: ${png.length} bytes, more than ${largestBytes}.`);
    await writeFile(path.join(folder, `${name}-${theme}.png`), png);
    console.log(`${name}-${theme}.png  ${(png.length / 1000).toFixed(0)} kB`);
    await context.close();
  }
} finally {
  await browser.close();
  await demo.stop();
}
