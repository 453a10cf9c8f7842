// Looks for violations of WCAG 2.2 AA on every screen of the demo, in the three themes, on a desk and a phone:
// node apps/web/.scripts/accessibility.mjs [--build]; SCREENS, THEMES and WIDTHS narrow it down. Ends with 1 if any is found.
import { AxeBuilder } from '@axe-core/playwright';
import { chromium as playwright } from '@playwright/test';
import { chromium, demoPeople, openContext, openDemo, openPage, screenPaths, signIn } from './demo-server.mjs';

const { investigator, largeList, reviewer, chair, staff, administrator } = demoPeople;
const fixed = (path) => async () => path;
const proposal = (section) => (request, base) => screenPaths.proposal(request, base, section);
const screens = {
  front: [null, fixed('/')],
  'sign-in': [null, fixed('/sign-in')],
  'sign-up': [null, fixed('/sign-up')],
  'forgotten-password': [null, fixed('/forgotten-password')],
  'password-reset': [null, fixed('/password-reset/none')],
  distances: [null, fixed('/calculators/distances')],
  source: [null, fixed('/calculators/source')],
  sources: [null, fixed('/sources')],
  exposure: [null, fixed('/calculators/exposure')],
  instruments: [null, fixed('/instruments')],
  mailbox: [null, fixed('/mailbox')],
  'not-found': [null, fixed('/nowhere')],
  proposals: [investigator, fixed('/proposals')],
  'new-proposal': [investigator, fixed('/proposals/new')],
  targets: [investigator, proposal('targets')],
  target: [investigator, (request, base) => screenPaths.target(request, base)],
  cosmologies: [investigator, proposal('cosmologies')],
  'large-list': [largeList, proposal('targets')],
  exposures: [investigator, proposal('exposures')],
  time: [investigator, proposal('time')],
  case: [investigator, proposal('case')],
  team: [investigator, proposal('team')],
  submit: [investigator, proposal('submit')],
  history: [investigator, proposal('history')],
  profile: [investigator, fixed('/profile')],
  reviews: [reviewer, fixed('/reviews')],
  review: [reviewer, (request, base) => screenPaths.review(request, base)],
  panels: [chair, fixed('/panels')],
  panel: [chair, (request, base) => screenPaths.panel(request, base)],
  ranking: [chair, (request, base) => screenPaths.panel(request, base, '/ranking')],
  semesters: [staff, fixed('/semesters')],
  semester: [staff, (request, base) => screenPaths.semester(request, base)],
  'semester-edit': [staff, (request, base) => screenPaths.semester(request, base, '/edit')],
  'new-semester': [staff, fixed('/semesters/new')],
  'new-configuration': [staff, (request, base) => screenPaths.newConfiguration(request, base)],
  people: [administrator, fixed('/administration/people')],
  mail: [administrator, fixed('/administration/mail')],
  changes: [administrator, fixed('/administration/changes')],
};

const listed = (name, all) => process.env[name]?.split(',') ?? all;
const demo = await openDemo();
const browser = await playwright.launch(chromium);
let violationCount = 0;
let lookCount = 0;
try {
  for (const theme of listed('THEMES', ['paper', 'slate', 'dome'])) {
    for (const width of listed('WIDTHS', ['1440', '390']).map(Number)) {
      const contexts = new Map();
      for (const name of listed('SCREENS', Object.keys(screens))) {
        const [person, at] = screens[name];
        if (!contexts.has(person)) {
          const context = await openContext(browser, { theme, width });
          await signIn(context, demo.base, person ?? undefined);
          contexts.set(person, context);
        }
        const context = contexts.get(person);
        const page = await context.newPage();
        await openPage(page, demo.base + (await at(context.request, demo.base)));
        const { violations } = await new AxeBuilder({ page })
          .withTags(['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa'])
          .analyze();
        lookCount += 1;
        for (const violation of violations) {
          violationCount += 1;
          console.log(`${name} ${theme} ${width}: ${violation.id}, ${violation.help}`);
          for (const node of violation.nodes.slice(0, 3)) {
            console.log(`    ${node.target.join(' ')}\n      ${node.html.slice(0, 160)}`);
            console.log(
              `      ${node.any
                .map((check) => check.message)
                .join(' ')
                .slice(0, 200)}`,
            );
          }
        }
        const overflow = await page.evaluate(
          () => globalThis.document.documentElement.scrollWidth - globalThis.innerWidth,
        );
        if (overflow > 0) {
          violationCount += 1;
          console.log(`${name} ${theme} ${width}: wider than the window by ${overflow} px`);
        }
        await page.close();
      }
      for (const context of contexts.values()) await context.close();
    }
  }
} finally {
  await browser.close();
  await demo.stop();
}
console.log(`${lookCount} looks, ${violationCount} violations`);
process.exitCode = violationCount > 0 ? 1 : 0;
