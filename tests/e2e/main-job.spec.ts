import path from 'node:path';
import { readFileSync } from 'node:fs';
import { expect, test, type APIRequestContext } from '@playwright/test';
import { secondsByHand, vegaToAbV, type ImagingByHand } from './by-hand.js';
import { hydrogenInVMag } from './hydrogen-by-hand.js';
import {
  choose,
  expectAccessible,
  settled,
  signInAsDemoPerson,
  typeIntoCell,
  visitor,
  type Visitor,
} from './support.js';

const sources = path.resolve(import.meta.dirname, '../reference/sources/quasars-z2.csv');
const title = 'An imaging census of bright quasars beyond redshift two';
const goal = { signalToNoise: 100, exposureSeconds: 10 };
const conditions = { seeingArcsec: 0.85, airmass: 1.2 };
const reviewers = ['Haruka Shiomi', 'Benoît Carraz', 'Farida Nazari-Holt'];
const scores = [
  [8, 7.5, 9],
  [6.5, 7, 7],
  [9, 8.5, 8],
];

/**
 * The main job on real input, from a list of published quasars to hours awarded, each person in a browser of their own.
 * One test, because each step needs what the step before it left behind.
 */
test('a list of published quasars travels the whole chain', async ({ browser }) => {
  const visitors: Visitor[] = [];
  const enter = async (name: string) => {
    const one = await visitor(browser);
    visitors.push(one);
    await signInAsDemoPerson(one.page, name);
    return one.page;
  };
  let proposalUrl = '';
  let label = '';
  let requestedHours = 0;

  await test.step('anybody reads the open call', async () => {
    const one = await visitor(browser);
    visitors.push(one);
    await one.page.goto('/');
    await expect(one.page.getByRole('heading', { level: 1 })).toBeVisible();
    await expect(one.page.getByText(/Deadline .* UTC/)).toBeVisible();
    await expectAccessible(one.page);
    await one.page.goto('/sign-in');
    await expect(one.page.getByText('Marisol Quintrel')).toBeVisible();
    await expectAccessible(one.page);
  });

  const investigator = await enter('Marisol Quintrel');

  await test.step('the investigator begins a proposal', async () => {
    await investigator.goto('/proposals');
    await expectAccessible(investigator);
    await investigator.getByRole('link', { name: 'Begin a proposal' }).first().click();
    await investigator.getByLabel('Title').fill(title);
    await expectAccessible(investigator);
    await investigator.getByRole('button', { name: 'Begin the proposal' }).click();
    await expect(investigator).toHaveURL(/\/proposals\/[0-9a-f-]+\/targets$/);
    proposalUrl = new URL(investigator.url()).pathname.replace(/\/targets$/, '');
    label = (await investigator.getByText(/^Proposal \d+-\d+/).textContent())?.match(/\d{4}[A-Z]?-\d+/)?.[0] ?? '';
    expect(label).not.toBe('');
  });

  await test.step('a table with mistakes is refused cell by cell and stays where it was', async () => {
    await investigator
      .getByRole('button', { name: /^Import/ })
      .first()
      .click();
    const dialog = investigator.getByRole('dialog', { name: 'Import targets' });
    const faulty =
      'name,ra,dec,z\nA,10.5,-30,abc\nB,11.5,-31,-1\nC,12.5,-32,1e9\nD,400,-33,2\nE,13.5,-95,2\nF,14.5,-34,2.5';
    await dialog.getByRole('textbox', { name: 'Table' }).fill(faulty);
    await expect(dialog.getByText('▲ 5 faulty')).toBeVisible();
    await expect(dialog.getByText('✓ 1 ready')).toBeVisible();
    await expect(
      dialog.getByRole('region', { name: 'What is wrong' }).or(dialog.getByLabel('What is wrong')).first(),
    ).toContainText('Line 2');
    await expectAccessible(investigator);
    await expect(dialog.getByRole('textbox', { name: 'Table' })).toHaveValue(faulty);
    await dialog.getByRole('textbox', { name: 'Table' }).fill('');
  });

  await test.step('the published quasars are imported', async () => {
    const dialog = investigator.getByRole('dialog', { name: 'Import targets' });
    await dialog.getByLabel('Table file').setInputFiles(sources);
    await expect(dialog.getByText('618 rows', { exact: true })).toBeVisible();
    await choose(dialog, 'and in system', 'Vega');
    await expect(dialog.getByRole('button', { name: /^Import 6\d\d targets$/ })).toBeEnabled();
    await dialog.getByRole('checkbox', { name: /Skip what is in the list/ }).uncheck();
    await dialog.getByRole('button', { name: 'Import 618 targets' }).click();
    await expect(dialog).toHaveCount(0);
    await expect(investigator.getByText(/of 618/).first()).toBeVisible();
    // Two thousand cells take axe minutes; a few rows are the same screen.
    await investigator.goto(`${proposalUrl}/targets?search=J0355`);
    await expect(investigator.getByRole('row').filter({ hasText: 'BR J0355-3811' })).toBeVisible();
    await expectAccessible(investigator);
  });

  await test.step('the sheet of one tells its light from the luminosity to the top of the atmosphere', async () => {
    await investigator
      .getByRole('row')
      .filter({ hasText: 'BR J0355-3811' })
      .getByRole('button', { name: 'BR J0355-3811' })
      .click();
    await expect(investigator.getByRole('heading', { name: 'BR J0355-3811', level: 1 })).toBeVisible();
    await expect(investigator.getByRole('figure', { name: 'Light budget in V' })).toBeVisible();
    await expect(investigator.getByText('17.97 AB').first()).toBeVisible();
    // z = 4.545: the Lyman limit is at 0.506 µm, so that nothing is left in U and u.
    await expect(investigator.getByText(/No flux in this band: the Lyman break is at/).first()).toBeVisible();
    await expectAccessible(investigator);
  });

  await test.step('exposures are planned for all of them at once', async () => {
    await investigator.goto(`${proposalUrl}/exposures`);
    await expect(investigator.getByRole('heading', { name: 'Apply a setup' })).toBeVisible();
    await choose(investigator, 'Telescope', 'Lumbre');
    await choose(investigator, 'Instrument', 'Lantern');
    await choose(investigator, 'Mode', 'Imaging i');
    await investigator.getByRole('textbox', { name: /^S\/N/ }).fill(String(goal.signalToNoise));
    await investigator.getByRole('textbox', { name: /^One exposure/ }).fill(String(goal.exposureSeconds));
    await investigator.getByRole('textbox', { name: /^Seeing/ }).fill(String(conditions.seeingArcsec));
    await investigator.getByRole('textbox', { name: /^Airmass/ }).fill(String(conditions.airmass));
    await choose(investigator, 'Moon class', 'dark');
    await investigator.getByRole('button', { name: 'Apply to 618 targets' }).click();
    await expect(investigator.getByText(/618 observations/).first()).toBeVisible();
    await investigator.goto(`${proposalUrl}/exposures?search=J0355`);
    await investigator.getByRole('row').filter({ hasText: 'BR J0355-3811' }).click();
    await expect(investigator.getByText('Read-out').first()).toBeVisible();
    await expectAccessible(investigator);
  });

  await test.step('the hours are those that the published formulas give by hand', async () => {
    await investigator.goto(`${proposalUrl}/time`);
    const shown = investigator.getByTestId('request-total-hours');
    await expect(shown).toBeVisible();
    await expectAccessible(investigator);
    const setup = await setupFromInstrumentPage(investigator.request);
    const quasars = readFileSync(sources, 'utf8')
      .trim()
      .split('\n')
      .slice(1)
      .map((line) => line.split(','))
      .map((cells) => ({ redshift: Number(cells[3]), v: Number(cells[4]) }));
    expect(quasars).toHaveLength(618);
    // The forest reaches into V from z = 2.9 on and not into i: what it takes from V is given back in i.
    const seconds = quasars.map(
      ({ redshift, v }) => secondsByHand(v + vegaToAbV - hydrogenInVMag(redshift), setup).totalSeconds,
    );
    requestedHours = seconds.reduce((sum, each) => sum + each, 0) / 3600;
    expect(Number((await shown.textContent())?.replace(/[^\d.]/g, ''))).toBeCloseTo(requestedHours, 1);
  });

  await test.step('a co-investigator is added and corrects a redshift in a second browser', async () => {
    await investigator.goto(`${proposalUrl}/team`);
    await investigator.getByRole('combobox', { name: 'Name' }).fill('Rennemo');
    await investigator.getByRole('option', { name: /Tobias Rennemo/ }).click();
    await investigator.getByRole('button', { name: 'Add to the team' }).click();
    await expect(investigator.getByRole('listitem').filter({ hasText: 'Tobias Rennemo' })).toBeVisible();
    await expectAccessible(investigator);

    const colleague = await enter('Tobias Rennemo');
    await colleague.goto('/proposals');
    await colleague.getByRole('link', { name: title }).click();
    await colleague.getByLabel('Search names and notes').fill('BR J0355-3811');
    const row = colleague.getByRole('row').filter({ hasText: 'BR J0355-3811' });
    await expect(row).toHaveCount(1);
    const redshift = row.locator('[data-field="redshift"]');
    const distance = row.locator('[data-field="luminosityDistanceMpc"]');
    const before = await distance.textContent();

    await typeIntoCell(redshift, 'abc');
    await expect(colleague.getByLabel('Cells that are not stored')).toContainText('abc');
    await expect(redshift).toContainText('abc');
    await typeIntoCell(redshift, '4.51');
    await expect(redshift).toContainText('4.51');
    await expect(colleague.getByLabel('Cells that are not stored')).not.toContainText('abc');
    await expect(distance).not.toHaveText(before ?? '');
    await settled(colleague);

    // The other browser sees it, and the history says who it was.
    await investigator.goto(`${proposalUrl}/targets?search=${encodeURIComponent('BR J0355-3811')}`);
    await expect(
      investigator.getByRole('row').filter({ hasText: 'BR J0355-3811' }).locator('[data-field="redshift"]'),
    ).toContainText('4.51');
    await investigator.goto(`${proposalUrl}/history`);
    await expect(investigator.getByRole('listitem').filter({ hasText: 'Tobias Rennemo' }).first()).toContainText(
      'redshift',
    );
    await expectAccessible(investigator);

    await colleague.goto(`${proposalUrl}/team`);
    await colleague.getByRole('button', { name: 'Sign the proposal' }).click();
    await expect(colleague.getByText(/^signed /).first()).toBeVisible();
  });

  await test.step('the case is written, checked and submitted', async () => {
    await investigator.goto(`${proposalUrl}/submit`);
    await expect(investigator.getByRole('button', { name: 'Submit the proposal' })).toBeDisabled();
    await investigator.goto(`${proposalUrl}/case`);
    await investigator
      .getByRole('textbox', { name: 'Summary' })
      .fill('Uniform images of the brightest known quasars, to find companions and lensed pairs.');
    await choose(investigator, 'Panel', 'Distant galaxies');
    await investigator.getByRole('button', { name: 'Save', exact: true }).click();
    await expect(investigator.getByText('Saved.')).toBeVisible();
    for (const section of ['Scientific case', 'Technical case']) {
      await investigator
        .getByRole('textbox', { name: section })
        .fill(`${section}: one depth for all, so that counts of companions compare.`);
    }
    await expect(investigator.getByText(/^saved /)).toHaveCount(2);
    await expectAccessible(investigator);
    await investigator.getByRole('link', { name: 'Check and submit' }).click();
    await expectAccessible(investigator);
    await investigator.getByRole('button', { name: 'Submit the proposal' }).click();
    await investigator.getByRole('dialog').getByRole('button', { name: 'Submit', exact: true }).click();
    await expect(investigator.getByText(/Submission 1/)).toBeVisible({ timeout: 30_000 });
    await investigator.goto('/mailbox');
    await expect(investigator.getByText(label).first()).toBeVisible();
  });

  await test.step('the staff close the call', async () => {
    const staff = await enter('Joaquín Pailahual');
    await closeTheCall(staff.request);
    await investigator.goto(`${proposalUrl}/submit`);
    await expect(investigator.getByText(/in review/).first()).toBeVisible();
  });

  const chair = await enter('Leonor Abrantes');
  const panelId = await panelOfOpenSemester(chair.request, label);

  await test.step('the chair assigns three reviewers', async () => {
    await chair.goto(`/panels/${panelId}`);
    const entry = chair.getByRole('listitem').filter({ hasText: label }).first();
    for (const name of reviewers) {
      await choose(chair, `Add a reviewer to ${label}`, new RegExp(name));
      await expect(entry.getByText(new RegExp(`^${name}.*to read`))).toBeVisible();
    }
    await expectAccessible(chair);
  });

  for (const [index, name] of reviewers.entries()) {
    await test.step(`${name} reads and scores`, async () => {
      const page = await enter(name);
      await page.goto('/reviews');
      await expect(page.getByRole('link', { name: title })).toBeVisible();
      if (index === 0) await expectAccessible(page);
      await page.getByRole('link', { name: title }).click();
      await expect(page.getByRole('heading', { level: 1, name: title })).toBeVisible();
      // The semester is anonymised: no name of the team anywhere on the page.
      await expect(page.locator('main')).not.toContainText('Quintrel');
      const fields = page.getByRole('textbox', { name: /: score$/ });
      await expect(fields).toHaveCount(3);
      if (index === 0) {
        await fields.first().fill('7.3');
        await expect(page.getByText('0 to 10 in half steps, such as 7.5')).toBeVisible();
      }
      for (const [criterion, score] of (scores[index] ?? []).entries()) await fields.nth(criterion).fill(String(score));
      await expect(page.getByText('complete', { exact: true })).toBeVisible();
      await expect(page.getByText(/^saved /)).toBeVisible();
      if (index === 0) await expectAccessible(page);
    });
  }

  await test.step('the chair reads the ranking grid and awards hours', async () => {
    await chair.goto(`/panels/${panelId}/ranking`);
    const row = chair.getByRole('row').filter({ hasText: title });
    await expect(row).toBeVisible();
    const weights = await criteriaWeights(chair.request, panelId);
    const overall = scores.map(
      (own) => own.reduce((sum, score, i) => sum + score * (weights[i] ?? 0), 0) / weights.reduce((a, b) => a + b, 0),
    );
    const mean = overall.reduce((sum, score) => sum + score, 0) / overall.length;
    const spread = Math.sqrt(overall.reduce((sum, score) => sum + (score - mean) ** 2, 0) / (overall.length - 1));
    await expect(row.locator('[data-field="meanScore"]')).toContainText(mean.toFixed(2));
    await expect(row.locator('[data-field="spread"]')).toContainText(spread.toFixed(2));
    await expect(row.locator('[data-field="scoreCount"]')).toContainText('3 of 3');
    await expect(row.locator('[data-field="requestedTotalHours"]')).toContainText(`${requestedHours.toFixed(1)} dark`);
    await expectAccessible(chair);

    await row.getByRole('button', { name: /Award for/ }).click();
    const dialog = chair.getByRole('dialog', { name: `Award for ${label}` });
    await dialog.getByLabel('Hours').fill('-4');
    await dialog.getByRole('button', { name: 'Decide' }).click();
    await expect(dialog.getByText('Hours cannot be negative.')).toBeVisible();
    await dialog.getByLabel('Hours').fill('20');
    await choose(dialog, 'Standing', 'flexible');
    await dialog.getByLabel('Reason for the team').fill('The brightest third suffices for the question.');
    await expectAccessible(chair);
    await dialog.getByRole('button', { name: 'Decide' }).click();
    await expect(dialog).toHaveCount(0);
    await expect(row.locator('[data-field="award"]')).toContainText('20.0 h dark, flexible');
  });

  await test.step('nobody sees what is not theirs', async () => {
    const outsider = await enter('Adaeze Okonlind');
    for (const address of [
      proposalUrl,
      proposalUrl.replace('/proposals/', '/reviews/'),
      `/panels/${panelId}/ranking`,
    ]) {
      await outsider.goto(address);
      await expect(outsider.getByText('There is nothing here, or nothing that you may see')).toBeVisible();
    }
  });

  expect(visitors.flatMap((one) => one.faults)).toEqual([]);
});

/** The numbers of the mode as the instrument page gives them to anybody. */
async function setupFromInstrumentPage(request: APIRequestContext): Promise<ImagingByHand> {
  const { rows } = await (await request.get('/api/v1/telescopes')).json();
  const telescope = rows.find((row: { name: string }) => row.name === 'Lumbre');
  const lantern = telescope.instruments.find((row: { name: string }) => row.name === 'Lantern');
  const { configuration } = lantern.modes.find((row: { name: string }) => row.name === 'Imaging i');
  return {
    ...configuration,
    ...configuration.detector,
    ...configuration.overheads,
    ...goal,
    ...conditions,
    diameterM: telescope.diameterM,
    obstructionDiameterM: telescope.obstructionDiameterM,
    outerScaleM: telescope.site.outerScaleM,
    skyAbMagPerArcsec2: configuration.skyAbMagPerArcsec2.dark,
  };
}

/** Sets the deadline of the open call to a moment that then passes. */
async function closeTheCall(request: APIRequestContext): Promise<void> {
  const { calls } = await (await request.get('/api/v1/calls')).json();
  const open = calls.find((call: { stage: string }) => call.stage === 'open');
  const deadlineAt = new Date(Date.now() + 1500).toISOString();
  const answer = await request.patch(`/api/v1/semesters/${open.semesterId}`, {
    data: { deadlineAt },
    headers: { 'If-Match': `"${open.version}"` },
  });
  expect(answer.ok(), await answer.text()).toBe(true);
  await expect
    .poll(async () => {
      const semester = await (await request.get(`/api/v1/semesters/${open.semesterId}`)).json();
      return semester.stage;
    })
    .toBe('reviewing');
}

/** Submissions open to a panel once the deadline and its grace for requests under way have passed. */
async function panelOfOpenSemester(request: APIRequestContext, label: string): Promise<string> {
  const me = await (await request.get('/api/v1/session')).json();
  let found = '';
  await expect
    .poll(
      async () => {
        for (const { panelId, role } of me.panels) {
          if (role !== 'chair') continue;
          const panel = await (await request.get(`/api/v1/panels/${panelId}`)).json();
          if (panel.proposals.some((proposal: { label: string }) => proposal.label === label)) found = panelId;
        }
        return found;
      },
      { timeout: 90_000, intervals: [2000] },
    )
    .not.toBe('');
  return found;
}

async function criteriaWeights(request: APIRequestContext, panelId: string): Promise<number[]> {
  const { semesterId } = await (await request.get(`/api/v1/panels/${panelId}`)).json();
  const semester = await (await request.get(`/api/v1/semesters/${semesterId}`)).json();
  return semester.criteria.map((criterion: { weight: number }) => criterion.weight);
}
