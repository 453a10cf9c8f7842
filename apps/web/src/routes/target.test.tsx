import type { Target } from '@faintward/contracts/targets';
import { configure, screen, waitFor, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { describe, expect, it } from 'vitest';
import { calls, id, me } from '../testing/examples';
import { aLightReport } from '../testing/lightExamples';
import { aProposal, aTarget } from '../testing/proposalExamples';
import { renderRoute } from '../testing/renderRoute';
import { answerWith, problem, type SeenRequest } from '../testing/server';

const wait = { timeout: 15_000 };
configure({ asyncUtilTimeout: 8000 });
const base = `/proposals/${id(50)}`;
const own = `${base}/targets/${id(60)}`;

function server(target: Target = aTarget(), proposal = aProposal()) {
  return {
    'GET /session': { body: me },
    'GET /calls': { body: calls },
    [`GET ${base}`]: { body: proposal },
    [`GET ${own}`]: { body: target },
    [`GET ${own}/light`]: { body: aLightReport() },
    [`GET ${base}/observations`]: { body: { rows: [], rowCount: 0, page: 1, pageSize: 100 } },
    [`GET ${base}/history`]: { body: { rows: [], rowCount: 0, page: 1, pageSize: 5 } },
    'POST /distances': problem(503, 'unavailable'),
  };
}

const patches = (seen: SeenRequest[]) => seen.filter((request) => request.method === 'PATCH');
const form = async () => within(await screen.findByRole('form', { name: 'Redshift, light and size' }, wait));

describe('the target sheet', () => {
  it('names the target, where it is, its redshift with its uncertainty and its age', async () => {
    answerWith(
      server(
        aTarget({
          redshiftUncertainty: { kind: 'percentiles', p16: 7.09, p50: 7.12, p84: 7.17 },
          redshiftUncertaintyText: '+0.05 −0.03',
          redshiftKind: 'photometric',
        }),
      ),
    );
    renderRoute(own);
    expect(await screen.findByRole('heading', { level: 1, name: 'CLR J0215−0409' }, wait)).toBeVisible();
    expect(screen.getByText('02 15 30.77 −04 09 13.8')).toBeVisible();
    expect(screen.getByText('+0.05 −0.03')).toBeVisible();
    expect(screen.getByText(/when the Universe was 0\.746/)).toBeVisible();
    expect(screen.getByRole('row', { name: /^Luminosity distance 71.?909/ })).toBeVisible();
  }, 60_000);

  it('ends with its own last changes in words and the way to the whole history', async () => {
    const row = {
      changeId: id(90),
      at: '2027-03-02T20:15:00.000Z',
      personName: 'Marisol Quintrel',
      subject: 'target',
      subjectName: 'CLR J0215−0409',
      action: 'changed',
      changes: [{ field: 'light', before: { magnitude: 25.1 }, after: { magnitude: 25.4 } }],
    };
    const { seen } = answerWith({
      ...server(),
      [`GET ${base}/history`]: { body: { rows: [row], rowCount: 7, page: 1, pageSize: 5 } },
    });
    renderRoute(own);
    const panel = within(await screen.findByRole('region', { name: 'Changes of this target' }, wait));
    expect(await panel.findByText('Marisol Quintrel')).toBeVisible();
    expect(panel.getByText('light, magnitude: 25.1 → 25.4')).toBeVisible();
    expect(panel.getByText(/6 older changes/)).toBeVisible();
    expect(panel.getByRole('link', { name: /whole history/ })).toHaveAttribute('href', `${base}/history`);
    expect(seen.find(({ path }) => path.includes('/history?'))?.path).toContain(`subjectId=${id(60)}`);
  }, 60_000);

  it('saves only what changed when a field is left, against the version seen, and says so', async () => {
    const saved = aTarget({ light: { ...aTarget().light!, magnitude: 25.4 } as Target['light'], version: 4 });
    const { seen } = answerWith({ ...server(), [`PATCH ${own}`]: { body: saved } });
    renderRoute(own);
    const field = (await form()).getByRole('textbox', { name: 'Magnitude' });
    await userEvent.clear(field);
    await userEvent.type(field, '25.4{Tab}');
    expect(await screen.findByText(/^saved/)).toBeVisible();
    expect(patches(seen)).toHaveLength(1);
    expect(patches(seen)[0]?.headers.get('If-Match')).toBe('"3"');
    expect(Object.keys(patches(seen)[0]?.body as object)).toEqual(['light']);
    expect(patches(seen)[0]?.body).toMatchObject({
      light: { kind: 'apparentMagnitude', magnitude: 25.4, bandId: 'J' },
    });
  }, 60_000);

  it('saves by itself a moment after the last key', async () => {
    const { seen } = answerWith({ ...server(), [`PATCH ${own}`]: { body: aTarget({ redshift: 7.3, version: 4 }) } });
    renderRoute(own);
    const field = (await form()).getByRole('textbox', { name: 'Redshift' });
    await userEvent.clear(field);
    await userEvent.type(field, '7.3');
    await waitFor(() => expect(patches(seen)).toHaveLength(1));
    expect(patches(seen)[0]?.body).toEqual({ redshift: 7.3 });
    expect(field).toHaveFocus();
  }, 60_000);

  it('puts a refused light under its field and keeps what was typed', async () => {
    answerWith({
      ...server(),
      [`PATCH ${own}`]: problem(422, 'validation-failed', {
        fieldErrors: [{ path: 'light.magnitude', message: 'Too faint to be true.' }],
      }),
    });
    renderRoute(own);
    const field = (await form()).getByRole('textbox', { name: 'Magnitude' });
    await userEvent.clear(field);
    await userEvent.type(field, '59{Tab}');
    expect(await screen.findByText('Too faint to be true.')).toBeVisible();
    expect(field).toHaveValue('59');
    expect(screen.getByText(/not saved/)).toBeVisible();
  }, 60_000);

  it('does not save while something is lacking, and says so', async () => {
    const { seen } = answerWith(server());
    renderRoute(own);
    const fields = await form();
    await userEvent.click(fields.getByRole('combobox', { name: 'Its uncertainty' }));
    await userEvent.click(await screen.findByRole('option', { name: '± 1 σ' }));
    const sigma = fields.getByRole('textbox', { name: 'σ of z' });
    expect(sigma).not.toBeInvalid();
    await userEvent.click(sigma);
    await userEvent.tab();
    expect(sigma).toBeInvalid();
    expect(screen.getByText('not saved while something is lacking or cannot be read')).toBeVisible();
    await new Promise((resolve) => setTimeout(resolve, 2500));
    expect(patches(seen)).toHaveLength(0);
  }, 60_000);

  it('shows both lights when another person was faster, and stores mine on top of theirs', async () => {
    const theirs = aTarget({ light: { ...aTarget().light!, magnitude: 24 } as Target['light'], version: 9 });
    const { handlers, seen } = answerWith({
      ...server(),
      [`PATCH ${own}`]: problem(412, 'stale-version', { current: theirs }),
    });
    renderRoute(own);
    const field = (await form()).getByRole('textbox', { name: 'Magnitude' });
    await userEvent.clear(field);
    await userEvent.type(field, '25.4{Tab}');
    const dialog = await screen.findByRole('dialog', { name: /changed by another person/ });
    expect(within(dialog).getByRole('row', { name: 'light 25.40 AB (J) 24.00 AB (J)' })).toBeVisible();
    handlers[`PATCH ${own}`] = { body: aTarget({ version: 10 }) };
    await userEvent.click(within(dialog).getByRole('button', { name: 'Store mine' }));
    await waitFor(() => expect(patches(seen)).toHaveLength(2));
    expect(patches(seen)[1]?.headers.get('If-Match')).toBe('"9"');
    expect(field).toHaveValue('25.4');
  }, 60_000);

  it('takes a table of probabilities and shows its peaks', async () => {
    const table = { kind: 'table' as const, redshifts: [2, 2.3, 6.9, 7.2], densities: [0, 1, 0.5, 0] };
    const { seen } = answerWith({
      ...server(),
      'POST /light/redshift-distribution': {
        body: {
          uncertainty: table,
          quantiles: { p16: 2.2, p50: 2.5, p84: 7 },
          peaks: [
            { redshift: 2.3, probability: 0.64 },
            { redshift: 6.9, probability: 0.36 },
          ],
          notices: [],
        },
      },
      [`PATCH ${own}`]: {
        body: aTarget({ redshiftUncertainty: table, redshiftUncertaintyText: 'p(z), 2 peaks', version: 4 }),
      },
    });
    renderRoute(own);
    const fields = await form();
    await userEvent.click(fields.getByRole('combobox', { name: 'Its uncertainty' }));
    await userEvent.click(await screen.findByRole('option', { name: 'a table p(z)' }));
    await userEvent.type(fields.getByRole('textbox', { name: /redshift and probability/ }), '2 0');
    await userEvent.click(fields.getByRole('button', { name: 'Read the table' }));
    expect(await fields.findByText('2 peaks: z 2.30 with 64 %, z 6.90 with 36 %.')).toBeVisible();
    await waitFor(() => expect(patches(seen)[0]?.body).toEqual({ redshiftUncertainty: table }));
  }, 60_000);

  it('lets nobody type who may only read', async () => {
    answerWith(server(aTarget(), aProposal({ canEditTargets: false })));
    renderRoute(own);
    expect((await form()).getByRole('textbox', { name: 'Magnitude' })).toBeDisabled();
    expect(screen.getByText(/You may read these targets/)).toBeVisible();
  }, 60_000);
});
