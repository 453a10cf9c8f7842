import { Light } from '@faintward/contracts/light';
import { StoredSpectrum } from '@faintward/contracts/light-report';
import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest';
import { ProposalSpectra } from '../../../apps/api/src/engine/proposal-spectra.service.js';
import { SpectraReadModel } from '../../../apps/api/src/modules/spectra/spectra.read-model.js';
import { aPerson, signedInAs } from '../../factories/people.js';
import { aDraft, aReadyDraft, aTarget, aTeamMember, type Draft } from '../../factories/proposals.js';
import { createTestApp, type TestApp } from '../support/app.js';

let app: TestApp;
let draft: Draft;
beforeAll(async () => {
  app = await createTestApp();
  draft = await aDraft(app);
});
afterAll(() => app.close());

/** Invented: a blue continuum from 120 to 900 nm with a break. */
const TEXT = ['wavelength_nm,flux']
  .concat(Array.from({ length: 79 }, (_, index) => `${120 + 10 * index},${index < 5 ? 0.2 : 3 / (1 + index / 20)}`))
  .join('\n');

const upload = (of: Draft, input: object = {}) =>
  of.pi.post(`${of.base}/spectra`).send({ name: 'Stack', text: TEXT, source: 'Invented', ...input });
const stored = async (of: Draft, input: object = {}) =>
  StoredSpectrum.parse((await upload(of, input).expect(201)).body);
const listOf = async (of: Draft): Promise<StoredSpectrum[]> =>
  (await of.pi.get(`${of.base}/spectra`).expect(200)).body.rows;
const uses = (spectrumId: string) => ({
  light: { kind: 'apparentMagnitude', magnitude: 22, bandId: 'r', spectrum: { kind: 'uploaded', spectrumId } },
});

describe('the spectra of a proposal', () => {
  it('are uploaded, listed and removed, and each step is recorded', async () => {
    const own = await aDraft(app);
    const spectrum = await stored(own, { observedAtRedshift: 1 });
    expect(spectrum).toMatchObject({
      name: 'Stack',
      source: 'Invented',
      pointCount: 79,
      restLowNm: 60,
      restHighNm: 450,
      observedAtRedshift: 1,
      usedByCount: 0,
      notices: [expect.objectContaining({ code: 'wavelengthUnit' })],
    });
    expect(await listOf(own)).toEqual([spectrum]);
    await own.pi.delete(`${own.base}/spectra/${spectrum.spectrumId}`).expect(204);
    expect(await listOf(own)).toEqual([]);
    await own.pi.delete(`${own.base}/spectra/${spectrum.spectrumId}`).expect(404);
    const { body: history } = await own.pi.get(`${own.base}/history`).expect(200);
    expect(
      history.rows.slice(0, 2).map(({ subject, action }: { subject: string; action: string }) => [subject, action]),
    ).toEqual([
      ['spectrum', 'removed'],
      ['spectrum', 'created'],
    ]);
  });

  it('are refused with the row that cannot be read, and nothing is stored', async () => {
    const before = await listOf(draft);
    const { body } = await upload(draft, { text: TEXT.replace('\n140,0.2', '\n140,abc') }).expect(422);
    expect(body.fieldErrors).toEqual([{ path: 'text', message: expect.stringMatching(/^Row 4: .*abc/) }]);
    expect((await upload(draft, { name: ' ' }).expect(422)).body.fieldErrors[0].path).toBe('name');
    expect(await listOf(draft)).toEqual(before);
  });

  it('of fifty thousand points are stored and given back to what computes with them', async () => {
    const text = Array.from({ length: 50_000 }, (_, index) => `${(300 + index / 100).toFixed(2)}\t${1 + (index % 7)}`);
    const { spectrumId, pointCount, contentHash } = await stored(draft, { text: text.join('\n') });
    expect(pointCount).toBe(50_000);
    const points = await app.get(SpectraReadModel).findPoints(draft.proposalId, spectrumId);
    expect(points?.wavelengthsNm).toHaveLength(50_000);
    expect(points?.wavelengthsNm[1]).toBe(300.01);
    expect(points?.wavelengthsNm[49_999]).toBe(799.99);
    expect(points?.fluxPerNm.slice(2499, 2502)).toEqual([1, 2, 3].map((step) => 1 + ((2498 + step) % 7)));
    expect(points).toMatchObject({ name: 'Stack', source: 'Invented', contentHash });
    const other = await aDraft(app);
    expect(await app.get(SpectraReadModel).findPoints(other.proposalId, spectrumId)).toBeUndefined();
  });

  it('are read from the database once, and still only for their own proposal', async () => {
    const { spectrumId } = await stored(draft);
    const { light } = uses(spectrumId);
    const spectra = app.get(ProposalSpectra);
    const first = await spectra.ofLights(draft.proposalId, [Light.parse(light)]);
    expect(first.get(spectrumId)).toBeDefined();
    const reading = vi.spyOn(app.get(SpectraReadModel), 'findPoints');
    const again = await spectra.ofLights(draft.proposalId, [Light.parse(light)]);
    expect(again.get(spectrumId)).toBe(first.get(spectrumId));
    expect(reading).not.toHaveBeenCalled();
    reading.mockRestore();
    const other = await aDraft(app);
    expect((await spectra.ofLights(other.proposalId, [Light.parse(light)])).size).toBe(0);
  });

  it('are used by targets of the same proposal only, and stay while one uses them', async () => {
    const { spectrumId } = await stored(draft);
    const target = await aTarget(draft, uses(spectrumId));
    expect(target['computed']).toMatchObject({ apparentMagnitudeAb: expect.closeTo(22, 6) });
    expect((await listOf(draft)).find((row) => row.spectrumId === spectrumId)?.usedByCount).toBe(1);
    const { body } = await draft.pi.delete(`${draft.base}/spectra/${spectrumId}`).expect(409);
    expect(body.code).toBe('conflict');
    expect(body.detail).toMatch(/^One target uses/);
    await aTarget(draft, { ...uses(spectrumId), name: 'Second' });
    expect((await draft.pi.delete(`${draft.base}/spectra/${spectrumId}`).expect(409)).body.detail).toMatch(
      /^2 targets/,
    );

    const other = await aDraft(app);
    const { body: refused } = await other.pi
      .post(`${other.base}/targets`)
      .send({ name: 'X', rightAscensionDeg: 10, declinationDeg: -20, redshift: 1, ...uses(spectrumId) })
      .expect(422);
    expect(refused.fieldErrors[0].path).toBe('light.spectrum.spectrumId');
    await other.pi.delete(`${other.base}/spectra/${spectrumId}`).expect(404);
  });

  it('stay while a submission explains its numbers by them', async () => {
    const ready = await aReadyDraft(app);
    const { spectrumId } = await stored(ready);
    const [target] = (await ready.pi.get(`${ready.base}/targets`).expect(200)).body.rows;
    const change = (version: number, body: object) =>
      ready.pi.patch(`${ready.base}/targets/${target.targetId}`).set('If-Match', `"${version}"`).send(body).expect(200);
    const { body: used } = await change(target.version, uses(spectrumId));
    await ready.pi.post(`${ready.base}/submissions`).expect(201);
    await change(used.version, { light: { kind: 'apparentMagnitude', magnitude: 22, bandId: 'r' } });
    const { body } = await ready.pi.delete(`${ready.base}/spectra/${spectrumId}`).expect(409);
    expect(body.detail).toMatch(/submission/);
  });

  it('are for the team to see and for those who edit targets to change', async () => {
    const { spectrumId } = await stored(draft);
    const reader = (await aTeamMember(app, draft, 'reads')).agent;
    await reader.get(`${draft.base}/spectra`).expect(200);
    await reader.post(`${draft.base}/spectra`).send({ name: 'Mine', text: TEXT }).expect(403);
    await reader.delete(`${draft.base}/spectra/${spectrumId}`).expect(403);
    const editor = (await aTeamMember(app, draft, 'editsTargets')).agent;
    const { body } = await editor.post(`${draft.base}/spectra`).send({ name: 'Mine', text: TEXT }).expect(201);
    await editor.delete(`${draft.base}/spectra/${body.spectrumId}`).expect(204);
    const stranger = await signedInAs(app, await aPerson(app));
    await stranger.get(`${draft.base}/spectra`).expect(404);
    await stranger.post(`${draft.base}/spectra`).send({ name: 'Mine', text: TEXT }).expect(404);
    await stranger.delete(`${draft.base}/spectra/${spectrumId}`).expect(404);
  });
});
