import { screen, waitFor, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { describe, expect, it } from 'vitest';
import { calls, id, infeasible, me, semester } from '../testing/examples';
import { renderRoute } from '../testing/renderRoute';
import { answerWith, problem, type SeenRequest } from '../testing/server';

const wait = { timeout: 15_000 };
const nobody = {
  'GET /session': problem(401, 'not-signed-in'),
  'POST /session/refresh': problem(401, 'not-signed-in'),
  'GET /calls': { body: calls },
};
const somebody = { 'GET /session': { body: me }, 'GET /calls': { body: calls } };
const failure = problem(503, 'unavailable', { errorId: 'e-17' });

function distancesOf(request: SeenRequest) {
  const { cosmology, redshifts } = request.body as { cosmology: string; redshifts: number[] };
  return {
    body: {
      cosmology: { id: cosmology, title: cosmology, source: null },
      engineVersion: '0.1.0',
      notices: [],
      rows: redshifts.map((redshift) => ({
        redshift,
        comovingDistanceMpc: 1,
        transverseComovingDistanceMpc: 1,
        angularDiameterDistanceMpc: 1,
        luminosityDistanceMpc: cosmology === 'conv70' ? 99 : 100,
        distanceModulusMag: redshift === 0 ? null : 35,
        kpcPerArcsec: 1,
        comovingVolumeMpc3: 1,
        lookbackTimeGyr: 1,
        ageGyr: 1,
        hubbleKmSMpc: 70,
        criticalDensityGCm3: 1e-29,
        bolometricDimmingMag: 1,
        perFrequencyDimmingMag: 1,
        perWavelengthDimmingMag: 1,
        photonRateDimmingMag: 1,
      })),
    },
  };
}

describe('the front page', () => {
  it('shows the open call with its deadline in three times and the hours', async () => {
    answerWith(nobody);
    renderRoute('/');
    expect(await screen.findByRole('heading', { name: 'Oct 2027 to Mar 2028' }, wait)).toBeVisible();
    expect(screen.getByText(/2099-03-31 18:00 UTC · 15:00 site/, { selector: 'time' })).toBeVisible();
    expect(screen.getByRole('row', { name: /Lumbre 620 340 410/ })).toBeVisible();
  });

  it('says that the calls could not be loaded, and loads them on Retry', async () => {
    const { handlers } = answerWith({ ...nobody, 'GET /calls': failure });
    renderRoute('/');
    const alert = await screen.findByRole('alert', {}, wait);
    expect(alert).toHaveTextContent('The calls could not be loaded. Detail of unavailable.');
    expect(alert).toHaveTextContent('e-17');
    handlers['GET /calls'] = { body: calls };
    await userEvent.click(within(alert).getByRole('button', { name: 'Retry' }));
    expect(await screen.findByRole('heading', { name: 'Oct 2027 to Mar 2028' })).toBeVisible();
  });

  it('says so when no call is open', async () => {
    answerWith({ ...nobody, 'GET /calls': { body: { ...calls, calls: [] } } });
    renderRoute('/');
    expect(await screen.findByText('No call is open', {}, wait)).toBeVisible();
  });
});

describe('signing in', () => {
  it('refuses wrong credentials in the server’s words and keeps the address typed', async () => {
    answerWith({
      ...nobody,
      'GET /demo-people': problem(404, 'not-found'),
      'POST /session': problem(401, 'wrong-credentials'),
    });
    renderRoute('/sign-in');
    await userEvent.type(await screen.findByLabelText('E-mail', {}, wait), 'a@b.example');
    await userEvent.type(screen.getByLabelText('Password'), 'wrong');
    await userEvent.click(screen.getByRole('button', { name: 'Sign in' }));
    expect(await screen.findByRole('alert')).toHaveTextContent('Detail of wrong-credentials.');
    expect(screen.getByLabelText('E-mail')).toHaveValue('a@b.example');
  });

  it('puts a mistake under its field and the focus on it', async () => {
    answerWith({ ...nobody, 'GET /demo-people': problem(404, 'not-found') });
    renderRoute('/sign-in');
    await userEvent.type(await screen.findByLabelText('E-mail', {}, wait), 'nobody');
    await userEvent.type(screen.getByLabelText('Password'), 'x');
    await userEvent.click(screen.getByRole('button', { name: 'Sign in' }));
    expect(await screen.findByText(/Please give an e-mail address/)).toBeVisible();
    await waitFor(() => expect(screen.getByLabelText('E-mail')).toHaveFocus());
  });

  it('signs a demo person in with one click and goes where they were going, never out of the application', async () => {
    const { seen } = answerWith({
      ...nobody,
      'GET /demo-people': {
        body: {
          password: 'a long demo password',
          people: [{ email: me.email, name: 'Maddalena Orlandi', institutionName: null, part: 'administrator' }],
        },
      },
      'POST /session': { body: me },
      'GET /semesters': { body: { rows: [semester] } },
    });
    const { router } = renderRoute('/sign-in?next=%2Fsemesters');
    await userEvent.click(await screen.findByRole('button', { name: /Maddalena Orlandi/ }, wait));
    expect(await screen.findByRole('heading', { level: 1, name: 'Semesters' }, wait)).toBeVisible();
    expect(router.state.location.pathname).toBe('/semesters');
    expect(seen.find((request) => request.method === 'POST' && request.path === '/session')?.body).toEqual({
      email: me.email,
      password: 'a long demo password',
    });
  });
});

describe('pages behind a person', () => {
  it('send others to sign in and remember where they were going', async () => {
    answerWith({ ...nobody, 'GET /demo-people': problem(404, 'not-found') });
    const { router } = renderRoute('/profile?x=1');
    expect(await screen.findByRole('heading', { level: 1, name: 'Sign in' }, wait)).toBeVisible();
    expect(router.state.location.search).toBe('?next=%2Fprofile%3Fx%3D1');
  });

  it('say that the session could not be read instead of sending people away', async () => {
    answerWith({ ...nobody, 'GET /session': failure });
    renderRoute('/profile');
    expect(await screen.findByText(/Your session could not be read/, {}, wait)).toBeVisible();
  });

  it('do not exist for people who may not see them', async () => {
    answerWith({ ...somebody, 'GET /session': { body: { ...me, isAdministrator: false } } });
    renderRoute('/administration/people');
    expect(await screen.findByText(/nothing here, or nothing that you may see/, {}, wait)).toBeVisible();
  });

  it.each([
    ['/semesters', 'GET /semesters', 'The semesters could not be loaded'],
    [`/semesters/${id(1)}`, `GET /semesters/${id(1)}`, 'The semester could not be loaded'],
    ['/administration/people', 'GET /administration/people', 'The people could not be loaded'],
    ['/administration/mail', 'GET /administration/mail', 'The letters could not be loaded'],
    ['/administration/changes', 'GET /administration/changes', 'The changes could not be loaded'],
    ['/mailbox', 'GET /mailbox', 'The mailbox could not be loaded'],
    ['/instruments', 'GET /telescopes', 'The instruments could not be loaded'],
    ['/calculators/exposure', 'GET /telescopes', 'The instruments could not be loaded'],
  ])('%s says what failed', async (address, request, words) => {
    answerWith({ ...somebody, [request]: failure });
    renderRoute(address);
    const alert = await screen.findByText(new RegExp(words), {}, wait);
    expect(alert).toBeVisible();
    expect(screen.getByText('e-17')).toBeVisible();
  });
});

describe('the other account pages', () => {
  it('sign-up shows the server’s refusal under its field', async () => {
    answerWith({
      ...nobody,
      'GET /institutions': { body: { rows: [] } },
      'POST /accounts': problem(409, 'already-exists', {
        fieldErrors: [{ path: 'email', message: 'There is an account with this address already.' }],
      }),
    });
    renderRoute('/sign-up');
    await userEvent.type(await screen.findByLabelText('Given name', {}, wait), 'Ines');
    await userEvent.type(screen.getByLabelText('Family name'), 'Fakhoury');
    await userEvent.type(screen.getByLabelText('E-mail'), 'ines@lumbre.example');
    await userEvent.type(screen.getByLabelText('Password'), 'a sentence of my own');
    await userEvent.click(screen.getByRole('button', { name: 'Sign up' }));
    expect(await screen.findByText('There is an account with this address already.')).toBeVisible();
    expect(screen.getByLabelText('Password')).toHaveValue('a sentence of my own');
  });

  it('a password link that has expired offers a new one', async () => {
    answerWith({ ...nobody, 'PUT /password-resets/abc': problem(410, 'link-expired') });
    renderRoute('/password-reset/abc');
    await userEvent.type(await screen.findByLabelText('New password', {}, wait), 'a sentence of my own');
    await userEvent.click(screen.getByRole('button', { name: 'Set the password' }));
    expect(await screen.findByRole('link', { name: 'Ask for a new link' })).toHaveAttribute(
      'href',
      '/forgotten-password',
    );
  });

  it('a forgotten password that cannot be asked for says so', async () => {
    answerWith({ ...nobody, 'POST /password-resets': problem(429, 'rate-limited', { retryAfterSeconds: 30 }) });
    renderRoute('/forgotten-password');
    await userEvent.type(await screen.findByLabelText('E-mail', {}, wait), 'a@b.example');
    await userEvent.click(screen.getByRole('button', { name: 'Send the link' }));
    expect(await screen.findByRole('alert')).toHaveTextContent('Try again in 30 s.');
  });

  it('a profile that could not be saved keeps what was typed', async () => {
    answerWith({ ...somebody, 'GET /institutions': { body: { rows: [] } }, 'PATCH /profile': failure });
    renderRoute('/profile');
    const name = await screen.findByLabelText('Given name', {}, wait);
    await userEvent.clear(name);
    await userEvent.type(name, 'Magda');
    await userEvent.click(screen.getByRole('button', { name: 'Save the profile' }));
    expect(await screen.findByRole('alert')).toHaveTextContent('Not saved. Detail of unavailable.');
    expect(name).toHaveValue('Magda');
  });
});

describe('the calculators', () => {
  it('show both cosmologies side by side and the difference', async () => {
    answerWith({ ...nobody, 'GET /cosmologies': { body: { rows: [] } }, 'POST /distances': distancesOf });
    renderRoute('/calculators/distances?z=0.5');
    const row = await screen.findByRole('row', { name: /^Luminosity distance/ }, wait);
    await waitFor(() => expect(row).toHaveTextContent(/100\.000.Mpc99\.0000.Mpc−1\.00 %/));
  });

  it('say which word is no number, and ask the server nothing', async () => {
    const { seen } = answerWith({
      ...nobody,
      'GET /cosmologies': { body: { rows: [] } },
      'POST /distances': distancesOf,
    });
    renderRoute('/calculators/distances?z=0.5%20abc');
    expect(await screen.findByText(/“abc”: not a number/, {}, wait)).toBeVisible();
    expect(seen.some((request) => request.path === '/distances')).toBe(false);
  });

  it('put the server’s refusal of one redshift under the field', async () => {
    answerWith({
      ...nobody,
      'GET /cosmologies': { body: { rows: [] } },
      'POST /distances': problem(400, 'validation-failed', {
        fieldErrors: [{ path: 'redshifts.1', message: 'A redshift lies above −1.' }],
      }),
    });
    renderRoute('/calculators/distances?z=0.5,-3');
    expect(await screen.findByText('No. 2, -3: A redshift lies above −1.', {}, wait)).toBeVisible();
  });

  it('draw an infeasible estimate as an answer', async () => {
    answerWith({
      ...nobody,
      'GET /telescopes': { body: { observatoryName: 'Cerro Lumbre', rows: [telescope] } },
      'POST /estimates': { body: infeasible },
    });
    renderRoute('/calculators/exposure');
    expect(await screen.findByText('No light of this source reaches the band.', {}, wait)).toBeVisible();
  });

  it('keep what was typed in the address', async () => {
    answerWith({
      ...nobody,
      'GET /telescopes': { body: { observatoryName: 'Cerro Lumbre', rows: [telescope] } },
      'POST /estimates': failure,
    });
    const { router } = renderRoute('/calculators/exposure?redshift=3.1');
    const field = await screen.findByLabelText('Redshift', {}, wait);
    expect(field).toHaveValue('3.1');
    await userEvent.clear(field);
    await userEvent.type(field, '8.68');
    await waitFor(() => expect(router.state.location.search).toContain('redshift=8.68'));
    expect(await screen.findByText(/The estimate could not be loaded/)).toBeVisible();
  });
});

it('an address that does not exist says so', async () => {
  answerWith(nobody);
  renderRoute('/nowhere/at/all');
  expect(await screen.findByRole('heading', { level: 1, name: 'Not found' }, wait)).toBeVisible();
});

const telescope = {
  telescopeId: id(2),
  name: 'Lumbre',
  diameterM: 5,
  obstructionDiameterM: 1.3,
  altitudeLowDeg: 20,
  altitudeHighDeg: 87,
  site: {
    name: 'Cerro Lumbre',
    latitudeDeg: -27.85,
    longitudeDegEast: -69.95,
    elevationM: 3180,
    timeZone: 'America/Santiago',
    zenithSeeingArcsec: 0.85,
    outerScaleM: 25,
  },
  instruments: [
    {
      instrumentId: id(5),
      name: 'Kiln',
      description: 'Imager.',
      isOffered: true,
      modes: [
        {
          modeId: id(6),
          name: 'Imaging J',
          isOffered: true,
          configurationVersion: 1,
          inForceSince: '2026-01-01T00:00:00Z',
          configuration: {
            kind: 'imaging',
            bandId: 'J',
            label: 'J',
            wavelengthLowNm: 1170,
            wavelengthHighNm: 1330,
            throughput: 0.4,
            extinctionMagPerAirmass: 0.1,
            skyAbMagPerArcsec2: { dark: 16, grey: 16, bright: 16 },
            detector: {
              pixelScaleArcsec: 0.15,
              darkElectronsPerSecond: 0.02,
              readNoiseElectrons: 6,
              fullWellElectrons: 90000,
              gainElectronsPerAdu: 2,
            },
            exposureLimits: { minimumExposureSeconds: 2, maximumExposureSeconds: 120 },
            overheads: {
              acquisitionSeconds: 180,
              setupSeconds: 60,
              readoutSeconds: 4,
              ditherSeconds: 8,
              maximumBlockSeconds: 5400,
            },
          },
        },
      ],
    },
  ],
};
