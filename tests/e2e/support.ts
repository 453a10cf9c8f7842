import { AxeBuilder } from '@axe-core/playwright';
import { expect, type Browser, type Locator, type Page } from '@playwright/test';

/** A browser of its own for one person: nothing is shared with the others. Console errors and outside requests are kept. */
export interface Visitor {
  page: Page;
  faults: string[];
}

export async function visitor(browser: Browser): Promise<Visitor> {
  const context = await browser.newContext({ viewport: { width: 1440, height: 900 } });
  const page = await context.newPage();
  const faults: string[] = [];
  page.on('pageerror', (error) => faults.push(`error on the page: ${error.message}`));
  page.on('console', (message) => {
    // The browser itself reports each refused request; refusals that a journey provokes are checked where they are shown.
    if (message.type() === 'error' && !message.text().startsWith('Failed to load resource')) {
      faults.push(`console: ${message.text()}`);
    }
  });
  page.on('request', (request) => {
    const { hostname, protocol } = new URL(request.url());
    if (protocol.startsWith('http') && hostname !== '127.0.0.1')
      faults.push(`request to the outside: ${request.url()}`);
  });
  return { page, faults };
}

/** Signs in as a person of the demo scenario, with the one click that a new user would use. */
export async function signInAsDemoPerson(page: Page, name: string): Promise<void> {
  await page.goto('/sign-in');
  await page.getByRole('button', { name: new RegExp(name) }).click();
  await expect(page.getByRole('button', { name: /Sign in/ })).toHaveCount(0);
}

/** No violations of WCAG 2.2 A and AA that axe can see on the page as it is now. */
export async function expectAccessible(page: Page): Promise<void> {
  await settled(page);
  const results = await new AxeBuilder({ page })
    .withTags(['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa'])
    .analyze();
  const violations = results.violations.map(
    ({ id, help, nodes }) => `${id}: ${help}\n  ${nodes.map((node) => node.target.join(' ')).join('\n  ')}`,
  );
  // Soft: the journey goes on, so that one run tells of every screen; it fails at the end all the same.
  expect.soft(violations, `accessibility of ${page.url()}`).toEqual([]);
}

/** Nothing is loading any more and transitions have ended. */
export async function settled(page: Page): Promise<void> {
  await expect(page.locator('[aria-busy="true"]')).toHaveCount(0);
  await page.evaluate(() =>
    Promise.all(document.getAnimations().map((animation) => animation.finished.catch(() => undefined))),
  );
}

/** Chooses in a select field, as a person does. */
export async function choose(scope: Page | Locator, label: string | RegExp, option: string | RegExp): Promise<void> {
  const page = 'goto' in scope ? scope : scope.page();
  await scope.getByRole('combobox', { name: label }).click();
  await page.getByRole('option', { name: option, exact: typeof option === 'string' }).click();
  await expect(page.getByRole('listbox')).toHaveCount(0);
}

/** Replaces what a cell of a data grid holds and leaves it with Enter. */
export async function typeIntoCell(cell: Locator, text: string): Promise<void> {
  await cell.dblclick();
  const input = cell.locator('input');
  await input.fill(text);
  await input.press('Enter');
}
