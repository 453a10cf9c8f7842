import { screen, waitFor, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { describe, expect, it } from 'vitest';
import { calls, id, me, semester } from '../testing/examples';
import { telescope } from '../testing/proposalExamples';
import { renderRoute } from '../testing/renderRoute';
import { answerWith, problem, type SeenRequest } from '../testing/server';
import { panelsBySemester } from './panels.route';

const wait = { timeout: 15_000 };
const semesterPath = `/semesters/${semester.semesterId}`;
const base = {
  'GET /session': { body: me },
  'GET /calls': { body: calls },
  'GET /telescopes': { body: { observatoryName: 'Cerro Lumbre', rows: [telescope] } },
  'GET /semesters': { body: { rows: [semester] } },
  [`GET ${semesterPath}`]: { body: semester },
};
const sent = (seen: SeenRequest[], method: string) => seen.filter((request) => request.method === method);

async function retype(label: string, text: string) {
  const field = screen.getByLabelText(label);
  await userEvent.clear(field);
  if (text !== '') await userEvent.paste(text);
  return field;
}

describe('changing a semester', () => {
  it('sends only what was changed, with the version it was read in', async () => {
    const { seen } = answerWith({
      ...base,
      [`PATCH ${semesterPath}`]: { body: { ...semester, deadlineAt: '2099-04-01T18:00:00Z', version: 2 } },
    });
    const { router } = renderRoute(`${semesterPath}/edit`);
    await screen.findByLabelText('Deadline', {}, wait);
    expect(screen.getByText('2099-03-31 15:00 at the site')).toBeVisible();
    await retype('Deadline', '2099-04-01 18:00');
    expect(screen.getByText('2099-04-01 15:00 at the site')).toBeVisible();
    await userEvent.click(screen.getByRole('button', { name: 'Save' }));
    await waitFor(() => expect(router.state.location.pathname).toBe(semesterPath));
    const [patch] = sent(seen, 'PATCH');
    expect(patch?.body).toEqual({ deadlineAt: '2099-04-01T18:00:00.000Z' });
    expect(patch?.headers.get('If-Match')).toBe('"1"');
  }, 60_000);

  it('keeps bad input in its field, says what is wrong, and sends nothing', async () => {
    const { seen } = answerWith(base);
    renderRoute(`${semesterPath}/edit`);
    await screen.findByLabelText('Deadline', {}, wait);
    const deadline = await retype('Deadline', 'end of March');
    const dark = await retype('dark', '-3');
    const weight = await retype('Weight', '');
    await userEvent.click(screen.getByRole('button', { name: 'Save' }));
    expect(await screen.findByText('A date and time in UTC, as 2027-03-31 18:00.')).toBeVisible();
    expect(screen.getByText('At least 0.')).toBeVisible();
    expect(screen.getByText('Please fill this in.')).toBeVisible();
    expect(deadline).toHaveValue('end of March');
    expect(dark).toHaveValue('-3');
    expect(weight).toHaveValue('');
    expect(sent(seen, 'PATCH')).toHaveLength(0);
  }, 60_000);

  it('puts the server’s refusals under their fields, those of the lists at the lists', async () => {
    answerWith({
      ...base,
      [`PATCH ${semesterPath}`]: problem(400, 'validation-failed', {
        fieldErrors: [
          { path: 'startsOn', message: 'The semester cannot start before its deadline.' },
          { path: 'criteria', message: 'Fixed since reviews have begun.' },
        ],
      }),
    });
    renderRoute(`${semesterPath}/edit`);
    await screen.findByLabelText('Name', {}, wait);
    await retype('Name', 'Winter');
    await userEvent.click(screen.getByRole('button', { name: 'Save' }));
    expect(await screen.findByText('The semester cannot start before its deadline.')).toBeVisible();
    expect(screen.getByText('Fixed since reviews have begun.')).toBeVisible();
    expect(screen.getByLabelText('First night')).toHaveAccessibleDescription(
      'The semester cannot start before its deadline.',
    );
    expect(screen.getByLabelText('Name')).toHaveValue('Winter');
  }, 60_000);

  it('shows both versions of a field that two people changed, and stores the chosen one on the newer version', async () => {
    const theirs = { ...semester, name: 'Southern summer', callText: 'Their text.', version: 4 };
    const { seen } = answerWith({
      ...base,
      [`PATCH ${semesterPath}`]: (request) =>
        request.headers.get('If-Match') === '"4"'
          ? { body: { ...theirs, name: 'Winter', version: 5 } }
          : problem(412, 'stale-version', { current: theirs }),
    });
    const { router } = renderRoute(`${semesterPath}/edit`);
    await screen.findByLabelText('Name', {}, wait);
    await retype('Name', 'Winter');
    await userEvent.click(screen.getByRole('button', { name: 'Save' }));
    const dialog = await screen.findByRole('dialog', { name: /changed by another person meanwhile/ });
    expect(within(dialog).getByRole('row', { name: 'Name Winter Southern summer' })).toBeVisible();
    await userEvent.click(within(dialog).getByRole('button', { name: 'Store mine' }));
    await waitFor(() => expect(router.state.location.pathname).toBe(semesterPath));
    expect(sent(seen, 'PATCH').at(-1)?.body).toEqual({ name: 'Winter' });
  }, 60_000);

  it('lets both changes stand when they do not touch one field', async () => {
    const theirs = { ...semester, callText: 'Their text.', version: 4 };
    const { seen } = answerWith({
      ...base,
      [`PATCH ${semesterPath}`]: (request) =>
        request.headers.get('If-Match') === '"4"'
          ? { body: { ...theirs, name: 'Winter', version: 5 } }
          : problem(412, 'stale-version', { current: theirs }),
    });
    const { router } = renderRoute(`${semesterPath}/edit`);
    await screen.findByLabelText('Name', {}, wait);
    await retype('Name', 'Winter');
    await userEvent.click(screen.getByRole('button', { name: 'Save' }));
    await waitFor(() => expect(router.state.location.pathname).toBe(semesterPath));
    expect(sent(seen, 'PATCH').map((request) => request.headers.get('If-Match'))).toEqual(['"1"', '"4"']);
    expect(await screen.findByText(/beside what a colleague changed meanwhile/)).toBeInTheDocument();
  }, 60_000);

  it('asks before typed changes are left', async () => {
    answerWith(base);
    renderRoute(`${semesterPath}/edit`);
    await screen.findByLabelText('Name', {}, wait);
    await retype('Name', 'Winter');
    await userEvent.click(screen.getByRole('button', { name: 'Cancel' }));
    expect(await screen.findByRole('dialog', { name: 'Leave without saving?' })).toBeVisible();
  }, 60_000);
});

describe('a new semester', () => {
  it('takes criteria and hours from the newest, its name from its months, and names new criteria by their titles', async () => {
    const { seen } = answerWith({ ...base, 'POST /semesters': { status: 201, body: { ...semester, version: 1 } } });
    renderRoute('/semesters/new');
    await screen.findByLabelText('First night', {}, wait);
    await retype('First night', '2028-04-01');
    await retype('Last night', '2028-09-30');
    expect(screen.getByLabelText('Name')).toHaveValue('Apr 2028 to Sep 2028');
    await retype('Call opens', '2027-08-01 12:00');
    await retype('Deadline', '2027-09-30 18:00');
    await userEvent.click(screen.getByRole('button', { name: 'Add a criterion' }));
    const titles = screen.getAllByLabelText('Title');
    await userEvent.click(titles[1]!);
    await userEvent.paste('Use of the Telescope');
    await userEvent.click(screen.getByRole('button', { name: 'Set up the semester' }));
    await waitFor(() => expect(sent(seen, 'POST')).toHaveLength(1));
    expect(sent(seen, 'POST')[0]?.body).toMatchObject({
      name: 'Apr 2028 to Sep 2028',
      startsOn: '2028-04-01',
      deadlineAt: '2027-09-30T18:00:00.000Z',
      reviewsDueAt: null,
      criteria: [{ criterionId: 'merit' }, { criterionId: 'useOfTheTelescope', title: 'Use of the Telescope' }],
      telescopes: [{ telescopeId: id(2), availableHours: { dark: 620, grey: 340, bright: 410 } }],
    });
  }, 60_000);
});

describe('a new configuration', () => {
  const mode = telescope.instruments[0]!.modes[0]!;
  const address = `/instruments/modes/${mode.modeId}/new-configuration`;
  const post = `POST /modes/${mode.modeId}/configurations`;

  it('keeps bad input and says what is wrong before anything is asked or sent', async () => {
    const { seen } = answerWith(base);
    renderRoute(address);
    await screen.findByLabelText('Throughput', {}, wait);
    const throughput = await retype('Throughput', '1.4');
    await retype('Longest wavelength', '1000');
    await userEvent.click(screen.getByRole('button', { name: 'Review the differences' }));
    expect(await screen.findByText('At most 1.')).toBeVisible();
    expect(screen.getByText(/Say what changed and why/)).toBeVisible();
    expect(throughput).toHaveValue('1.4');
    expect(screen.queryByRole('dialog')).not.toBeInTheDocument();
    expect(sent(seen, 'POST')).toHaveLength(0);
  }, 60_000);

  it('shows what differs, then stores it without the options that stay empty', async () => {
    const { seen } = answerWith({
      ...base,
      [post]: (request) => ({
        status: 201,
        body: {
          version: 2,
          createdAt: '2027-03-01T00:00:00Z',
          createdByName: 'Maddalena Orlandi',
          note: 'Measured.',
          configuration: (request.body as { configuration: unknown }).configuration,
        },
      }),
    });
    const { router } = renderRoute(address);
    await screen.findByLabelText('Read noise', {}, wait);
    await retype('Read noise', '5.2');
    await retype('Note', 'Measured.');
    await userEvent.click(screen.getByRole('button', { name: 'Review the differences' }));
    const dialog = await screen.findByRole('dialog', { name: 'Put a new configuration of J imaging in force?' });
    expect(within(dialog).getByRole('row', { name: 'Read noise 6 e⁻ 5.2 e⁻' })).toBeVisible();
    expect(within(dialog).getAllByRole('row')).toHaveLength(2);
    expect(sent(seen, 'POST')).toHaveLength(0);
    await userEvent.click(within(dialog).getByRole('button', { name: 'Put in force' }));
    await waitFor(() => expect(router.state.location.pathname).toBe('/instruments'));
    expect(sent(seen, 'POST')[0]?.body).toEqual({
      configuration: {
        ...mode.configuration,
        detector: { ...mode.configuration.detector, readNoiseElectrons: 5.2 },
      },
      note: 'Measured.',
    });
  }, 60_000);

  it('compares with what is in force when it is asked, and says that it changed', async () => {
    const { handlers } = answerWith(base);
    renderRoute(address);
    await screen.findByLabelText('Read noise', {}, wait);
    const newer = structuredClone(telescope);
    newer.instruments[0]!.modes[0]!.configurationVersion = 2;
    newer.instruments[0]!.modes[0]!.configuration.throughput = 0.35;
    handlers['GET /telescopes'] = { body: { observatoryName: 'Cerro Lumbre', rows: [newer] } };
    await retype('Read noise', '5.2');
    await retype('Note', 'Measured.');
    await userEvent.click(screen.getByRole('button', { name: 'Review the differences' }));
    const dialog = await screen.findByRole('dialog');
    expect(dialog).toHaveTextContent('Configuration 2 was put in force while you were writing.');
    expect(within(dialog).getByRole('row', { name: 'Throughput 0.35 0.4' })).toBeVisible();
  }, 60_000);

  it('puts the server’s refusal under its field', async () => {
    answerWith({
      ...base,
      [post]: problem(400, 'validation-failed', {
        fieldErrors: [{ path: 'configuration.detector.readNoiseElectrons', message: 'Too quiet to be true.' }],
      }),
    });
    renderRoute(address);
    await screen.findByLabelText('Read noise', {}, wait);
    const field = await retype('Read noise', '0.01');
    await retype('Note', 'Measured.');
    await userEvent.click(screen.getByRole('button', { name: 'Review the differences' }));
    await userEvent.click(await screen.findByRole('button', { name: 'Put in force' }));
    expect(await screen.findByText('Too quiet to be true.')).toBeInTheDocument();
    expect(field).toHaveValue('0.01');
  }, 60_000);
});

describe('the panels of a person', () => {
  it('stand by semester: those in review first, then the newest', () => {
    const panel = (number: number, semesterId: string, panelName: string) => ({
      panelId: id(number),
      panelName,
      semesterId,
      semesterName: semesterId,
      role: 'chair' as const,
    });
    const [old, reviewed, next] = [id(11), id(12), id(13)];
    const groups = panelsBySemester(
      [panel(21, old, 'B'), panel(22, next, 'B'), panel(23, reviewed, 'B'), panel(24, reviewed, 'A')],
      [
        { ...semester, semesterId: next, startsOn: '2028-04-01', stage: 'open' },
        { ...semester, semesterId: reviewed, startsOn: '2027-10-01', stage: 'reviewing' },
        { ...semester, semesterId: old, startsOn: '2027-04-01', stage: 'observing' },
      ],
    );
    expect(groups.map((group) => group.semesterId)).toEqual([reviewed, next, old]);
    expect(groups[0]?.panels.map((one) => one.panelName)).toEqual(['A', 'B']);
  });

  it('open from Ranking when a chair has several', async () => {
    const second = { ...me.panels[0]!, panelId: id(5), panelName: 'Nearby galaxies' };
    answerWith({ ...base, 'GET /session': { body: { ...me, panels: [...me.panels, second] } } });
    renderRoute('/panels');
    expect(await screen.findByRole('link', { name: /^Ranking of Nearby galaxies/ }, wait)).toHaveAttribute(
      'href',
      `/panels/${id(5)}/ranking`,
    );
    expect(screen.getByRole('link', { name: 'Ranking' })).toHaveAttribute('href', '/panels');
    expect(screen.getByText('open for proposals')).toBeVisible();
  }, 60_000);
});
