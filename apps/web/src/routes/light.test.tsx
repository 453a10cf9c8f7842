import { ReferenceDataList, type ProposalCosmologies } from '@faintward/contracts/light-report';
import { screen, waitFor, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { describe, expect, it } from 'vitest';
import { calls, id, me } from '../testing/examples';
import { lightReport, reportWithoutLight } from '../testing/lightReportExample';
import { aProposal } from '../testing/proposalExamples';
import { renderRoute } from '../testing/renderRoute';
import { answerWith, problem, type SeenRequest } from '../testing/server';

const wait = { timeout: 15_000 };
const nobody = {
  'GET /session': problem(401, 'not-signed-in'),
  'POST /session/refresh': problem(401, 'not-signed-in'),
  'GET /calls': { body: calls },
  'GET /light/suggestions': { body: { rows: [] } },
};
const reportOf = (request: SeenRequest) => ({
  body: (request.body as { bandId: string | null }).bandId === 'z' ? reportWithoutLight : lightReport,
});
const asked = (seen: SeenRequest[]) => seen.findLast((request) => request.path === '/light')?.body;

describe('the light of a source', () => {
  it('answers at once for the source that its address holds', async () => {
    const { seen } = answerWith({ ...nobody, 'POST /light': reportOf });
    renderRoute('/calculators/source?redshift=7&absolute=-21&uncertainty=gaussian&sigmaZ=0.3');
    expect(await screen.findByText('25.98 AB', {}, wait)).toBeVisible();
    expect(asked(seen)).toMatchObject({
      redshift: 7,
      redshiftUncertainty: { kind: 'gaussian', sigma: 0.3 },
      light: { kind: 'absoluteMagnitude', magnitude: -21 },
      bandId: null,
    });
  });

  it('puts another band into the light budget and into the address, and says that there is no light in it', async () => {
    const { seen } = answerWith({ ...nobody, 'POST /light': reportOf });
    const { router } = renderRoute('/calculators/source');
    const bands = await screen.findByRole('group', { name: 'Bands' }, wait);
    await userEvent.click(within(bands).getByRole('button', { name: /^z no/ }));
    expect(await screen.findByText(/The ledger stops here/, {}, wait)).toBeVisible();
    expect(asked(seen)).toMatchObject({ bandId: 'z' });
    await waitFor(() => expect(router.state.location.search).toContain('ledgerBand=z'));
  });

  it('asks nothing while the form is not complete, and says so', async () => {
    const { seen } = answerWith({ ...nobody, 'POST /light': reportOf });
    renderRoute('/calculators/source?redshift=seven');
    expect(await screen.findByText(/Something in the form is not complete yet/, {}, wait)).toBeVisible();
    expect(
      seen.some((request) => request.path === '/light' && (request.body as { light: unknown }).light !== null),
    ).toBe(false);
  });

  it('shows under its field what the server refuses', async () => {
    answerWith({
      ...nobody,
      'POST /light': problem(400, 'validation-failed', {
        fieldErrors: [{ path: 'seeingArcsec', message: 'Too good to be true.' }],
      }),
    });
    renderRoute('/calculators/source');
    const field = await screen.findByRole('textbox', { name: /^Seeing/ }, wait);
    await waitFor(() => expect(field).toHaveAccessibleDescription('Too good to be true.'));
  });
});

describe('sources of the reference data', () => {
  const list: ReferenceDataList = {
    version: 'd2e5d02e293d',
    rows: [
      {
        file: 'lines.json',
        title: 'Emission lines',
        source: 'An invented list',
        licence: 'no licence applies',
        units: 'nm, vacuum',
        provenance: 'publishedFromMemory',
        contentHash: '1dc52a412c10',
      },
    ],
  };
  it('are listed with how each is known, and linked from the foot of every page', async () => {
    answerWith({ ...nobody, 'GET /reference-data': { body: list } });
    renderRoute('/sources');
    expect(await screen.findByRole('heading', { name: 'Emission lines' }, wait)).toBeVisible();
    expect(screen.getByText(/quoted from memory and are still to be compared/)).toBeVisible();
    expect(screen.getByText('1dc52a412c10')).toBeVisible();
    expect(screen.getByRole('link', { name: 'Sources of the reference data' })).toHaveAttribute('href', '/sources');
  });
  it('can fail, and be tried again', async () => {
    const { handlers } = answerWith({ ...nobody, 'GET /reference-data': problem(503, 'unavailable') });
    renderRoute('/sources');
    expect(await screen.findByText(/The reference data could not be loaded/, {}, wait)).toBeVisible();
    handlers['GET /reference-data'] = { body: list };
    await userEvent.click(screen.getByRole('button', { name: 'Retry' }));
    expect(await screen.findByRole('heading', { name: 'Emission lines' }, wait)).toBeVisible();
  });
});

describe('what the choice of cosmology changes in a proposal', () => {
  const row = {
    medianDeltaDistanceModulusMag: 0,
    largestDeltaDistanceModulusMag: 0,
    medianScaleRatio: 1,
    requestedSeconds: 36_000,
    infeasibleCount: 0,
    changedObservationCount: 0,
  };
  const comparison: ProposalCosmologies = {
    targetCount: 3,
    observationCount: 4,
    apparentCount: 1,
    intrinsicCount: 2,
    rows: [
      { ...row, cosmologyId: 'planck18', title: 'Planck 2018', isChosen: true },
      {
        ...row,
        cosmologyId: 'conv70',
        title: 'Convention 70 / 0.3 / 0.7',
        isChosen: false,
        medianDeltaDistanceModulusMag: -0.046,
        requestedSeconds: 33_120,
        changedObservationCount: 2,
      },
    ],
  };
  const base = `/proposals/${id(50)}`;
  const server = {
    'GET /session': { body: me },
    'GET /calls': { body: calls },
    [`GET ${base}`]: { body: aProposal() },
  };
  it('stands in a table against the chosen one, with what does not depend on it', async () => {
    answerWith({ ...server, [`GET ${base}/cosmologies`]: { body: comparison } });
    renderRoute(`${base}/cosmologies`);
    const table = await screen.findByRole('region', { name: 'Table of cosmologies' }, wait);
    expect(
      within(table).getByRole('row', {
        name: /Convention 70 .* −0\.046 .* 9\.2 −48 min \(−8\.0 %\), in 2 observations no change/,
      }),
    ).toBeVisible();
    expect(screen.getByText(/a cosmology changes no exposure time/)).toBeVisible();
  });
  it('says why it takes some seconds, and then what failed', async () => {
    let refuse = () => {};
    const refused = new Promise<void>((resolve) => (refuse = resolve));
    answerWith({
      ...server,
      [`GET ${base}/cosmologies`]: async () => {
        await refused;
        return problem(500, 'internal', { errorId: 'e-9' });
      },
    });
    renderRoute(`${base}/cosmologies`);
    expect(await screen.findByText(/which takes some seconds/, {}, wait)).toBeVisible();
    refuse();
    expect(await screen.findByText(/The comparison of cosmologies could not be loaded/, {}, wait)).toHaveTextContent(
      'e-9',
    );
  });
  it('leads to the targets while there are none', async () => {
    answerWith({
      ...server,
      [`GET ${base}/cosmologies`]: {
        body: { targetCount: 0, observationCount: 0, apparentCount: 0, intrinsicCount: 0, rows: [] },
      },
    });
    renderRoute(`${base}/cosmologies`);
    expect(await screen.findByText('There is nothing to compare yet', {}, wait)).toBeVisible();
    expect(screen.getByRole('link', { name: 'To the targets' })).toHaveAttribute('href', `${base}/targets`);
  });
});
