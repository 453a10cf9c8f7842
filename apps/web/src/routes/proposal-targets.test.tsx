import { Light } from '@faintward/contracts/light';
import type { CosmicTime, ImportPreview, Target } from '@faintward/contracts/targets';
import { configure, fireEvent, screen, waitFor, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { beforeEach, describe, expect, it, vi } from 'vitest';
import { calls, id, me } from '../testing/examples';
import { aProposal, aTarget } from '../testing/proposalExamples';
import { renderRoute } from '../testing/renderRoute';
import { answerWith, problem, type SeenRequest } from '../testing/server';

const wait = { timeout: 15_000 };
// A grid of a whole page is slow to draw where several tests share a processor.
configure({ asyncUtilTimeout: 8000 });
const base = `/proposals/${id(50)}`;
const strip: CosmicTime = { points: [], ticks: [{ redshift: 0, ageGyr: 13.8 }], ageTicks: [], ageTodayGyr: 13.8 };

function server(targets: Target[] = [aTarget()], proposal = aProposal()) {
  return {
    'GET /session': { body: me },
    'GET /calls': { body: calls },
    [`GET ${base}`]: { body: proposal },
    [`GET ${base}/targets`]: () => ({ body: { rows: targets, rowCount: targets.length, page: 1, pageSize: 100 } }),
    [`GET ${base}/targets/cosmic-time`]: { body: strip },
  };
}

async function cell(row: string, field: string): Promise<HTMLElement> {
  const grid = await screen.findByRole('grid', { name: 'Targets' }, wait);
  const found = await waitFor(() => {
    const cells = within(grid)
      .getAllByRole('row')
      .filter((one) => one.textContent.includes(row))
      .flatMap((one) => [...one.querySelectorAll<HTMLElement>(`[data-field="${field}"]`)]);
    expect(cells).toHaveLength(1);
    return cells[0]!;
  }, wait);
  return found;
}

async function retype(row: string, field: string, text: string) {
  const target = await cell(row, field);
  await userEvent.dblClick(target);
  const input = await within(target).findByRole('textbox');
  await userEvent.clear(input);
  await userEvent.type(input, `${text}{Enter}`);
}

const patches = (seen: SeenRequest[]) => seen.filter((request) => request.method === 'PATCH');

beforeEach(() => {
  // jsdom lays nothing out: without a size the grid draws no columns.
  vi.spyOn(HTMLElement.prototype, 'clientWidth', 'get').mockReturnValue(2400);
  vi.spyOn(HTMLElement.prototype, 'clientHeight', 'get').mockReturnValue(900);
  vi.spyOn(HTMLElement.prototype, 'offsetWidth', 'get').mockReturnValue(2400);
  vi.spyOn(HTMLElement.prototype, 'offsetHeight', 'get').mockReturnValue(900);
});

describe('a cell of the targets', () => {
  it('sends what was typed against the version seen and shows the row as the server computed it', async () => {
    const saved = aTarget({ redshift: 7.5, version: 4 });
    saved.computed.luminosityDistanceMpc = 76_543;
    const { seen, handlers } = answerWith({
      ...server(),
      [`PATCH ${base}/targets/${id(60)}`]: () => {
        handlers[`GET ${base}/targets`] = { body: { rows: [saved], rowCount: 1, page: 1, pageSize: 100 } };
        return { body: saved };
      },
    });
    renderRoute(`${base}/targets`);
    await retype('CLR J0215', 'redshift', '7.5');
    expect(await screen.findByText(/76\s543/)).toBeInTheDocument();
    expect(patches(seen)[0]?.body).toEqual({ cells: { redshift: '7.5' } });
    expect(patches(seen)[0]?.headers.get('If-Match')).toBe('"3"');
    expect(screen.queryByText(/not stored/)).not.toBeInTheDocument();
  }, 60_000);

  it('keeps a text that is refused, says why at the cell and under the table, and puts it back on wish', async () => {
    answerWith({
      ...server(),
      [`PATCH ${base}/targets/${id(60)}`]: problem(422, 'validation-failed', {
        fieldErrors: [{ path: 'cells.redshift', message: '"abc" is not a number.' }],
      }),
    });
    renderRoute(`${base}/targets`);
    await retype('CLR J0215', 'redshift', 'abc');
    const faults = await screen.findByRole('status', { name: 'Cells that are not stored' });
    expect(await within(faults).findByText(/redshift “abc”: "abc" is not a number\./)).toBeVisible();
    expect(await cell('CLR J0215', 'redshift')).toHaveTextContent('abc, not stored: "abc" is not a number.');
    // Opened again it still holds what was typed, not what is stored.
    await userEvent.dblClick(await cell('CLR J0215', 'redshift'));
    expect(await screen.findByRole('textbox', { name: '' })).toHaveValue('abc');
    await userEvent.keyboard('{Escape}');
    await userEvent.click(within(faults).getByRole('button', { name: 'Put back “7.12”' }));
    expect(await cell('CLR J0215', 'redshift')).toHaveTextContent('7.120');
    expect(within(faults).queryByText(/abc/)).not.toBeInTheDocument();
  }, 60_000);

  it('keeps a text that could not be sent, and sends it when the connection returns', async () => {
    const { handlers, seen } = answerWith(server());
    renderRoute(`${base}/targets`);
    await retype('CLR J0215', 'notes', 'slit at 34°');
    const faults = await screen.findByRole('status', { name: 'Cells that are not stored' });
    expect(await within(faults).findByText(/Offline\. It is sent when the connection returns\./)).toBeVisible();
    expect(await cell('CLR J0215', 'notes')).toHaveTextContent('slit at 34°');
    handlers[`PATCH ${base}/targets/${id(60)}`] = { body: aTarget({ notes: 'slit at 34°', version: 4 }) };
    fireEvent(window, new Event('online'));
    await waitFor(() => expect(within(faults).queryByText(/Offline/)).not.toBeInTheDocument());
    expect(patches(seen).at(-1)?.body).toEqual({ cells: { notes: 'slit at 34°' } });
  }, 60_000);

  it('shows both values when another person was faster, and stores mine on top of theirs', async () => {
    const theirs = aTarget({ redshift: 7.13, version: 9 });
    const { handlers, seen } = answerWith({
      ...server(),
      [`PATCH ${base}/targets/${id(60)}`]: problem(412, 'stale-version', { current: theirs }),
    });
    renderRoute(`${base}/targets`);
    await retype('CLR J0215', 'redshift', '7.5');
    const dialog = await screen.findByRole('dialog', { name: /changed by another person/ });
    expect(within(dialog).getByRole('row', { name: /redshift 7\.5 7\.13/ })).toBeVisible();
    handlers[`PATCH ${base}/targets/${id(60)}`] = { body: aTarget({ redshift: 7.5, version: 10 }) };
    await userEvent.click(within(dialog).getByRole('button', { name: 'Store mine' }));
    await waitFor(() => expect(patches(seen)).toHaveLength(2));
    expect(patches(seen)[1]?.headers.get('If-Match')).toBe('"9"');
    expect(patches(seen)[1]?.body).toEqual({ cells: { redshift: '7.5' } });
    await waitFor(() => expect(screen.queryByRole('dialog', { name: /another person/ })).not.toBeInTheDocument());
  }, 60_000);

  it('shows both values when another person was faster, and takes theirs', async () => {
    const theirs = aTarget({ redshift: 7.13, version: 9 });
    const { handlers, seen } = answerWith({
      ...server(),
      [`PATCH ${base}/targets/${id(60)}`]: problem(412, 'stale-version', { current: theirs }),
    });
    handlers[`GET ${base}/targets`] = { body: { rows: [aTarget()], rowCount: 1, page: 1, pageSize: 100 } };
    renderRoute(`${base}/targets`);
    await retype('CLR J0215', 'redshift', '7.5');
    const dialog = await screen.findByRole('dialog', { name: /changed by another person/ });
    await userEvent.click(within(dialog).getByRole('button', { name: 'Take theirs' }));
    await waitFor(async () => expect(await cell('CLR J0215', 'redshift')).toHaveTextContent('7.130'));
    expect(patches(seen)).toHaveLength(1);
  }, 60_000);

  it('saves two cells of one row one after the other, each against the version before it', async () => {
    let version = 3;
    const { seen } = answerWith({
      ...server(),
      [`PATCH ${base}/targets/${id(60)}`]: (request) => {
        const expected = `"${version}"`;
        if (request.headers.get('If-Match') !== expected) return problem(412, 'stale-version', { current: aTarget() });
        version += 1;
        return { body: aTarget({ version }) };
      },
    });
    renderRoute(`${base}/targets`);
    await retype('CLR J0215', 'redshift', '7.5');
    await retype('CLR J0215', 'notes', 'bright');
    await waitFor(() => expect(patches(seen)).toHaveLength(2));
    await waitFor(() => expect(screen.queryByText(/not stored/)).not.toBeInTheDocument());
    expect(screen.queryByRole('dialog')).not.toBeInTheDocument();
  }, 60_000);
});

describe('the targets page', () => {
  it('says that the targets could not be loaded, and loads them on Retry', async () => {
    const answers = server();
    const { handlers } = answerWith({
      ...answers,
      [`GET ${base}/targets`]: problem(503, 'unavailable', { errorId: 'e-21' }),
    });
    renderRoute(`${base}/targets`);
    const alert = await screen.findByText(/The targets could not be loaded/, {}, wait);
    expect(alert).toHaveTextContent('e-21');
    handlers[`GET ${base}/targets`] = answers[`GET ${base}/targets`]!;
    await userEvent.click(screen.getByRole('button', { name: 'Retry' }));
    expect(await cell('CLR J0215', 'name')).toBeInTheDocument();
  }, 60_000);

  it('offers the first steps when there are no targets', async () => {
    answerWith(server([]));
    renderRoute(`${base}/targets`);
    expect(await screen.findByText('No targets yet', {}, wait)).toBeVisible();
    expect(screen.getAllByRole('button', { name: 'Add a target' }).length).toBeGreaterThan(0);
  }, 60_000);

  it('lets nobody type who may only read, and says why', async () => {
    answerWith(server([aTarget()], aProposal({ canEditTargets: false })));
    renderRoute(`${base}/targets`);
    expect(await screen.findByText(/You may read these targets/, {}, wait)).toBeVisible();
    await userEvent.dblClick(await cell('CLR J0215', 'redshift'));
    expect(within(await cell('CLR J0215', 'redshift')).queryByRole('textbox')).not.toBeInTheDocument();
    expect(screen.queryByRole('button', { name: 'Add a target' })).not.toBeInTheDocument();
    expect(screen.queryByRole('button', { name: 'Import' })).not.toBeInTheDocument();
    expect(screen.queryByRole('checkbox', { name: /Select/ })).not.toBeInTheDocument();
  }, 60_000);

  it('asks before it removes, and says what selected rows are', async () => {
    const { seen } = answerWith({
      ...server(),
      [`POST ${base}/targets/removal`]: { body: { removedCount: 1 } },
    });
    renderRoute(`${base}/targets`);
    await userEvent.click(await screen.findByRole('button', { name: 'Actions for CLR J0215−0409' }, wait));
    await userEvent.click(await screen.findByRole('menuitem', { name: 'Remove' }));
    await userEvent.click(await screen.findByRole('button', { name: 'Remove the target' }));
    expect(await screen.findByText('1 target removed.')).toBeVisible();
    expect(seen.find((request) => request.path.endsWith('/removal'))?.body).toEqual({ targetIds: [id(60)] });
  }, 60_000);

  it('leads to the sheet of the target that an address names', async () => {
    answerWith({
      ...server(),
      [`GET ${base}/targets/${id(60)}`]: problem(503, 'unavailable'),
      [`GET ${base}/observations`]: problem(503, 'unavailable'),
    });
    const { router } = renderRoute(`${base}/targets?target=${id(60)}`);
    await waitFor(() => expect(router.state.location.pathname).toBe(`${base}/targets/${id(60)}`), wait);
    expect(await screen.findByText(/The target could not be loaded/, {}, wait)).toBeVisible();
  }, 60_000);

  it('opens a sheet from a name, and remembers the search to come back to', async () => {
    answerWith(server());
    const { router } = renderRoute(`${base}/targets?search=CLR`);
    await userEvent.click(within(await cell('CLR J0215', 'name')).getByRole('button', { name: 'CLR J0215−0409' }));
    await waitFor(() => expect(router.state.location.pathname).toBe(`${base}/targets/${id(60)}`));
    expect(router.state.location.state).toEqual({ search: '?search=CLR' });
  }, 60_000);
});

describe('the columns of light', () => {
  const showAll = () =>
    localStorage.setItem('faintward.targets.columns', JSON.stringify({ 'band-r': true, 'band-J': true }));

  it('show a magnitude with its uncertainty, and words where a band has no light', async () => {
    showAll();
    const target = aTarget({ light: { ...aTarget().light!, sigmaMag: 0.1 } });
    answerWith(server([target]));
    renderRoute(`${base}/targets`);
    expect(await cell('CLR J0215', 'apparentMagnitudeAb')).toHaveTextContent('26.00 ± 0.10');
    expect(await cell('CLR J0215', 'band-J')).toHaveTextContent('26.00');
    expect(await cell('CLR J0215', 'band-r')).toHaveTextContent(/^no light\. None of its light arrives in r/);
  }, 60_000);

  it('show a line by its flux and where it is observed, and no magnitude of it in a band', async () => {
    showAll();
    const target = aTarget({
      light: Light.parse({ kind: 'lineFlux', fluxErgSCm2: 1.84e-17, restWavelengthNm: 121.567 }),
    });
    Object.assign(target.computed, {
      apparentMagnitudeAb: null,
      bandMagnitudesAb: {},
      lineFluxErgSCm2: 1.84e-17,
      lineObservedWavelengthNm: 987.124,
    });
    answerWith(server([target]));
    renderRoute(`${base}/targets`);
    expect(await cell('CLR J0215', 'lineFluxErgSCm2')).toHaveTextContent('1.84 × 10⁻¹⁷');
    expect(await cell('CLR J0215', 'lineObservedWavelengthNm')).toHaveTextContent('987.12');
    expect(await cell('CLR J0215', 'band-J')).toHaveTextContent('A line has no magnitude in a band.');
  }, 60_000);

  it('name the most severe notice and open to all of them', async () => {
    const target = aTarget();
    target.computed.notices = [
      { code: 'smallerThanSeeing', message: 'Smaller than the seeing.', severity: 'note' },
      { code: 'neverUp', message: 'It is never up in this semester.', severity: 'error' },
    ];
    answerWith(server([target]));
    renderRoute(`${base}/targets`);
    const notices = await cell('CLR J0215', 'notices');
    await userEvent.click(within(notices).getByRole('button', { name: 'never up +1' }));
    const all = await screen.findByRole('dialog', { name: 'CLR J0215−0409' });
    expect(within(all).getByText('It is never up in this semester.')).toBeVisible();
    expect(within(all).getByText('Smaller than the seeing.')).toBeVisible();
  }, 60_000);

  it('take an uncertainty of the redshift with two sides, as typed', async () => {
    const { seen } = answerWith({
      ...server(),
      [`PATCH ${base}/targets/${id(60)}`]: {
        body: aTarget({
          redshiftUncertainty: { kind: 'percentiles', p16: 7.09, p50: 7.12, p84: 7.17 },
          redshiftUncertaintyText: '+0.05 −0.03',
          version: 4,
        }),
      },
    });
    renderRoute(`${base}/targets`);
    await retype('CLR J0215', 'redshiftUncertainty', '+0.05 -0.03');
    await waitFor(() => expect(patches(seen)).toHaveLength(1));
    expect(patches(seen)[0]?.body).toEqual({ cells: { redshiftUncertainty: '+0.05 -0.03' } });
    await waitFor(() => expect(screen.queryByText(/not stored/)).not.toBeInTheDocument());
  }, 60_000);
});

const preview: ImportPreview = {
  columns: [
    { header: 'id', role: 'name' },
    { header: 'z', role: 'redshift' },
  ],
  delimiter: '\t',
  hasHeader: true,
  rowCount: 2,
  readyCount: 1,
  faultyCount: 1,
  duplicateCount: 0,
  rows: [
    { lineNumber: 2, cells: [{ text: 'A' }, { text: '7' }], isReady: true, rowErrors: [], isDuplicate: false },
    {
      lineNumber: 3,
      cells: [{ text: 'B' }, { text: 'abc', error: '"abc" is not a number.' }],
      isReady: false,
      rowErrors: [],
      isDuplicate: false,
    },
  ],
  tableErrors: [],
};

function paste(text: string) {
  const event = new Event('paste', { bubbles: true, cancelable: true });
  Object.assign(event, { clipboardData: { getData: () => text } });
  fireEvent(document.body, event);
}

describe('importing a table', () => {
  it('opens with what was pasted into the page and shows each fault at its cell and in the list', async () => {
    const { seen } = answerWith({ ...server(), [`POST ${base}/targets/import-preview`]: { body: preview } });
    renderRoute(`${base}/targets`);
    await cell('CLR J0215', 'name');
    paste('id\tz\nA\t7\nB\tabc');
    const dialog = await screen.findByRole('dialog', { name: 'Import targets' });
    expect(within(dialog).getByRole('textbox', { name: 'Table' })).toHaveValue('id\tz\nA\t7\nB\tabc');
    const faulty = await within(dialog).findByRole('row', { name: /3 B abc/ });
    expect(within(faulty).getByText('"abc" is not a number.')).toBeVisible();
    expect(within(dialog).getByText('Line 3, z: "abc" is not a number.')).toBeVisible();
    expect(within(dialog).getByRole('button', { name: 'Import 1 target' })).toBeEnabled();
    // No band and no system: the header may name them, and nobody chose others.
    expect(seen.find((request) => request.path.endsWith('/import-preview'))?.body).toEqual({
      text: 'id\tz\nA\t7\nB\tabc',
      options: { skipDuplicates: true },
    });
  }, 60_000);

  it('asks again when a column is said to be another one, and gives its old role back', async () => {
    const { seen } = answerWith({ ...server(), [`POST ${base}/targets/import-preview`]: { body: preview } });
    renderRoute(`${base}/targets`);
    await cell('CLR J0215', 'name');
    paste('id\tz\nA\t7');
    await userEvent.selectOptions(await screen.findByRole('combobox', { name: 'id is' }, wait), 'redshift');
    await waitFor(() =>
      expect(seen.findLast((request) => request.path.endsWith('/import-preview'))?.body).toMatchObject({
        options: { roles: ['redshift', 'ignore'], hasHeader: true },
      }),
    );
  }, 60_000);

  it('keeps the table when importing fails, and repeats the same key', async () => {
    const { handlers, seen } = answerWith({
      ...server(),
      [`POST ${base}/targets/import-preview`]: { body: preview },
      [`POST ${base}/targets/import`]: problem(503, 'unavailable'),
    });
    renderRoute(`${base}/targets`);
    await cell('CLR J0215', 'name');
    paste('id\tz\nA\t7\nB\tabc');
    const button = await screen.findByRole('button', { name: 'Import 1 target' }, wait);
    await waitFor(() => expect(button).toBeEnabled());
    await userEvent.click(button);
    expect(await screen.findByText(/Nothing was imported; the table is still here/)).toBeVisible();
    expect(screen.getByRole('textbox', { name: 'Table' })).toHaveValue('id\tz\nA\t7\nB\tabc');
    handlers[`POST ${base}/targets/import`] = {
      body: { importedCount: 1, skippedFaultyCount: 1, skippedDuplicateCount: 0, targetCount: 2 },
    };
    await userEvent.click(screen.getByRole('button', { name: 'Retry' }));
    expect(await screen.findByText('1 target imported, 1 faulty row left out.')).toBeVisible();
    const keys = seen
      .filter((request) => request.path.endsWith('/import'))
      .map((request) => request.headers.get('Idempotency-Key'));
    expect(keys).toHaveLength(2);
    expect(keys[0]).toMatch(/^[0-9a-f-]{36}$/);
    expect(keys[1]).toBe(keys[0]);
  }, 60_000);
});
