import type { FeasibleEstimate } from '@faintward/contracts/estimates';
import type { Observation } from '@faintward/contracts/observations';
import { configure, screen, waitFor, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { beforeEach, describe, expect, it, vi } from 'vitest';
import { calls, id, infeasible, me } from '../testing/examples';
import { anObservation, aProposal, aTarget, telescope } from '../testing/proposalExamples';
import { renderRoute } from '../testing/renderRoute';
import { answerWith, problem } from '../testing/server';

const wait = { timeout: 15_000 };
// A grid of a whole page is slow to draw where several tests share a processor.
configure({ asyncUtilTimeout: 8000 });
const base = `/proposals/${id(50)}`;

const feasible: FeasibleEstimate = {
  outcome: 'feasible',
  engineVersion: '0.1.0',
  referenceDataVersion: '2026-12',
  inputHash: 'abcdef0123456789',
  cosmologyId: 'planck18',
  steps: [],
  notices: [],
  fwhmArcsec: 0.8,
  wavelengthNm: 1250,
  signalToNoise: 5.02,
  signalToNoisePer: 'aperture',
  exposureSeconds: 60,
  exposureCount: 240,
  openShutterSeconds: 14_400,
  overheads: [{ id: 'readout', title: 'Read-out', seconds: 960, count: 240 }],
  totalSeconds: 18_000,
  apparentMagnitudeAb: 26,
  apertureMagnitudeAb: 26.4,
  surfaceBrightnessAbMagPerArcsec2: null,
  aperture: {
    kind: 'circle',
    radiusArcsec: 0.54,
    widthArcsec: null,
    lengthArcsec: null,
    areaArcsec2: 0.92,
    enclosedFraction: 0.72,
    pixelCount: 40,
  },
  rates: {
    sourceElectronsPerSecond: 1,
    continuumElectronsPerSecond: 1,
    skyElectronsPerSecond: 900,
    darkElectronsPerSecond: 0.8,
    skyElectronsPerSecondPerPixel: 22,
    peakElectronsPerSecondPerPixel: 23,
  },
  peakElectronsPerPixel: 1400,
  limitedBy: 'sky',
  noiseShares: { source: 0, sky: 0.97, dark: 0, readNoise: 0.03 },
  exposureBounds: [],
};

function server(observations: Observation[], proposal = aProposal()) {
  return {
    'GET /session': { body: me },
    'GET /calls': { body: calls },
    [`GET ${base}`]: { body: proposal },
    [`GET ${base}/targets`]: { body: { rows: [aTarget()], rowCount: 1, page: 1, pageSize: 100 } },
    [`GET ${base}/observations`]: {
      body: { rows: observations, rowCount: observations.length, page: 1, pageSize: 100 },
    },
    'GET /telescopes': { body: { observatoryName: 'Cerro Lumbre Observatory', rows: [telescope] } },
    'POST /estimates': { body: feasible },
  };
}

beforeEach(() => {
  // jsdom lays nothing out: without a size the grid draws no columns.
  vi.spyOn(HTMLElement.prototype, 'clientWidth', 'get').mockReturnValue(2400);
  vi.spyOn(HTMLElement.prototype, 'clientHeight', 'get').mockReturnValue(900);
  vi.spyOn(HTMLElement.prototype, 'offsetWidth', 'get').mockReturnValue(2400);
  vi.spyOn(HTMLElement.prototype, 'offsetHeight', 'get').mockReturnValue(900);
});

describe('the exposures page', () => {
  it('answers for an example while a plan is typed, and applies it to all targets', async () => {
    const { seen } = answerWith({
      ...server([]),
      [`POST ${base}/observations/apply`]: {
        body: {
          createdCount: 1,
          replacedCount: 0,
          feasibleCount: 1,
          infeasibleCount: 0,
          lackingCount: 0,
          totalSeconds: 18_000,
        },
      },
    });
    renderRoute(`${base}/exposures`);
    expect(await screen.findByText('240 × 60 s', {}, wait)).toBeVisible();
    expect(screen.getByText(/limited by the sky/)).toBeVisible();
    const field = screen.getByRole('textbox', { name: 'S/N' });
    await userEvent.clear(field);
    await userEvent.type(field, '10');
    await waitFor(() =>
      expect(seen.findLast((request) => request.path === '/estimates')?.body).toMatchObject({
        cosmology: 'planck18',
        target: { redshift: 7.12 },
        setup: { modeId: id(80) },
        goal: { kind: 'signalToNoise', value: 10, per: 'aperture' },
        conditions: { seeingArcsec: 0.8, airmass: 1.2, moonClass: 'dark', transparency: 'clear' },
      }),
    );
    await userEvent.click(screen.getByRole('button', { name: 'Apply to 1 target' }));
    expect(await screen.findByText(/1 observation planned; 1 feasible, together 5 h\./)).toBeVisible();
    expect(seen.find((request) => request.path.endsWith('/apply'))?.body).toMatchObject({
      targetIds: 'all',
      modeId: id(80),
      repeatCount: 1,
      replaceSameMode: true,
    });
  }, 60_000);

  it('says what is wrong with a plan under its field, keeps the answer before it and applies nothing', async () => {
    answerWith(server([]));
    renderRoute(`${base}/exposures`);
    await screen.findByText('240 × 60 s', {}, wait);
    const field = screen.getByRole('textbox', { name: 'Airmass' });
    await userEvent.clear(field);
    await userEvent.type(field, '0.5');
    expect(await screen.findByText('Airmass is 1 at the zenith and grows from there.')).toBeVisible();
    expect(screen.getByText(/this is the answer to what stood there before/)).toBeVisible();
    expect(screen.getByRole('button', { name: 'Apply to 1 target' })).toBeDisabled();
  }, 60_000);

  it('says why an observation gives no time', async () => {
    answerWith(server([anObservation({ estimate: infeasible })]));
    renderRoute(`${base}/exposures`);
    expect(
      await screen.findByText(/Not feasible\. No light of this source reaches the band\./, {}, wait),
    ).toBeVisible();
  }, 60_000);

  it('opens an observation with its overheads, and shows both plans when another person was faster', async () => {
    const mine = anObservation({ estimate: feasible, totalSeconds: 18_000 });
    const theirs = anObservation({
      estimate: feasible,
      version: 8,
      conditions: { ...mine.conditions, seeingArcsec: 0.6 },
    });
    const path = `PATCH ${base}/observations/${id(70)}`;
    const { handlers, seen } = answerWith({
      ...server([mine]),
      [path]: problem(412, 'stale-version', { current: theirs }),
    });
    renderRoute(`${base}/exposures?observation=${id(70)}`);
    const panel = await screen.findByRole('dialog', { name: 'The chosen observation' }, wait);
    expect(within(panel).getByRole('row', { name: /Read-out, 240 × 16 min/ })).toBeVisible();
    await userEvent.click(within(panel).getByRole('button', { name: 'Change goal and conditions' }));
    const field = within(panel).getByRole('textbox', { name: 'Seeing' });
    await userEvent.clear(field);
    await userEvent.type(field, '0.9');
    await userEvent.click(within(panel).getByRole('button', { name: 'Save' }));
    const dialog = await screen.findByRole('dialog', { name: /changed by another person/ });
    expect(within(dialog).getByRole('row', { name: /conditions 0\.9″.* 0\.6″/ })).toBeVisible();
    handlers[path] = { body: { ...mine, version: 9 } };
    await userEvent.click(within(dialog).getByRole('button', { name: 'Store mine' }));
    await waitFor(() => expect(seen.filter((request) => request.method === 'PATCH')).toHaveLength(2));
    const last = seen.findLast((request) => request.method === 'PATCH');
    expect(last?.headers.get('If-Match')).toBe('"8"');
    expect(last?.body).toMatchObject({ conditions: { seeingArcsec: 0.9 } });
  }, 60_000);

  it('says that the observations could not be loaded', async () => {
    answerWith({ ...server([]), [`GET ${base}/observations`]: problem(500, 'internal', { errorId: 'e-5' }) });
    renderRoute(`${base}/exposures`);
    expect(await screen.findByText(/The observations could not be loaded/, {}, wait)).toHaveTextContent('e-5');
  }, 60_000);

  it('shows the plan to those who may only read, without a way to change it', async () => {
    answerWith(server([anObservation()], aProposal({ canEditTargets: false })));
    renderRoute(`${base}/exposures?observation=${id(70)}`);
    const panel = await screen.findByRole('dialog', { name: 'The chosen observation' }, wait);
    expect(within(panel).queryByRole('button', { name: /Change goal/ })).not.toBeInTheDocument();
    expect(screen.getByText(/You may read these exposures/)).toBeInTheDocument();
    expect(screen.queryByRole('button', { name: 'Apply a setup', hidden: true })).not.toBeInTheDocument();
  }, 60_000);
});
