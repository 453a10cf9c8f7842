import { createHash } from 'node:crypto';
import type { SubmittedContent } from '@faintward/contracts/submissions';
import { Submission } from '@faintward/contracts/submissions';
import { Light } from '@faintward/contracts/light';
import { eq, sql } from 'drizzle-orm';
import { afterAll, afterEach, beforeAll, describe, expect, it, vi } from 'vitest';
import { submissionParts, submissions } from '../../../apps/api/src/database/schema/submissions.js';
import { targets } from '../../../apps/api/src/database/schema/targets.js';
import { canonicalJson } from '../../../apps/api/src/engine/canonical-json.js';
import { SubmissionRows } from '../../../apps/api/src/modules/submissions/submission-rows.service.js';
import {
  upgradeSubmittedObservation,
  upgradeSubmittedTarget,
} from '../../../apps/api/src/modules/submissions/upgrade-submitted-content.js';
import { type Draft, aReadyDraft, planAll } from '../../factories/proposals.js';
import { createTestApp, type TestApp } from '../support/app.js';

let app: TestApp;
beforeAll(async () => {
  app = await createTestApp();
});
afterAll(() => app.close());
afterEach(() => {
  vi.restoreAllMocks();
});

const submit = async (draft: Draft) =>
  (await draft.pi.post(`${draft.base}/submissions`).expect(201)).body as { submissionId: string; fingerprint: string };
const contentOf = async (draft: Draft, submissionId: string): Promise<SubmittedContent> =>
  (await draft.pi.get(`${draft.base}/submissions/${submissionId}`).expect(200)).body.content;
const partsOf = (submissionId: string) =>
  app.db.select().from(submissionParts).where(eq(submissionParts.submissionId, submissionId));
const sha256 = (value: unknown) => createHash('sha256').update(canonicalJson(value)).digest('hex');

async function manyTargets(draft: Draft, count: number): Promise<void> {
  const rows = Array.from(
    { length: count },
    (_, index) => `T${index},${(20 + index * 0.05).toFixed(4)},-30,${(1 + index / 100).toFixed(2)},21`,
  );
  await draft.pi
    .post(`${draft.base}/targets/import`)
    .send({ text: `name,ra,dec,z,mag\n${rows.join('\n')}` })
    .expect(200);
  await planAll(app, draft);
}

describe('the content of a submission', () => {
  it('is stored in parts and comes back whole, in its order, under its fingerprint', async () => {
    const draft = await aReadyDraft(app);
    await manyTargets(draft, 230);
    const { submissionId, fingerprint } = await submit(draft);
    const parts = await partsOf(submissionId);
    expect(parts.map(({ kind, content }) => [kind, content.length]).sort()).toEqual([
      ['observations', 100],
      ['observations', 100],
      // One target was planned before, with another mode.
      ['observations', 32],
      ['targets', 100],
      ['targets', 100],
      ['targets', 31],
    ]);
    const [row] = await app.db.select().from(submissions).where(eq(submissions.id, submissionId));
    expect(row?.content).not.toHaveProperty('targets');
    const content = await contentOf(draft, submissionId);
    const positions = content.targets.map(({ position }) => position);
    expect(positions).toHaveLength(231);
    expect(positions).toEqual(positions.toSorted((a, b) => a - b));
    const order = new Map(content.targets.map(({ targetId, position }) => [targetId, position]));
    const observed = content.observations.map(({ targetId }) => order.get(targetId) ?? NaN);
    expect(observed).toHaveLength(232);
    expect(observed).toEqual(observed.toSorted((a, b) => a - b));
    expect(sha256(content)).toBe(fingerprint);
  });

  it('is what stands there when it is submitted, also if somebody changes it while it is being frozen', async () => {
    const draft = await aReadyDraft(app);
    const rows = app.get(SubmissionRows);
    const store = rows.store.bind(rows);
    const spy = vi.spyOn(rows, 'store').mockImplementationOnce(async (proposalId, submissionId) => {
      const stored = await store(proposalId, submissionId);
      await app.db
        .update(targets)
        .set({ notes: 'Changed at the last moment', version: sql`${targets.version} + 1` })
        .where(eq(targets.proposalId, proposalId));
      return stored;
    });
    const { submissionId, fingerprint } = await submit(draft);
    expect(spy).toHaveBeenCalledTimes(2);
    const content = await contentOf(draft, submissionId);
    expect(content.targets.map(({ notes }) => notes)).toEqual(['Changed at the last moment']);
    expect(sha256(content)).toBe(fingerprint);
    // Undisturbed it is frozen once.
    await submit(draft);
    expect(spy).toHaveBeenCalledTimes(3);
  });

  it('leaves nothing behind when the submission is refused or was made before', async () => {
    const draft = await aReadyDraft(app);
    const send = () => draft.pi.post(`${draft.base}/submissions`).set('Idempotency-Key', 'parts-once').expect(201);
    const { submissionId } = (await send()).body as { submissionId: string };
    await send();
    vi.spyOn(app.get(SubmissionRows), 'isUnchanged').mockRejectedValueOnce(new Error('no'));
    await draft.pi.post(`${draft.base}/submissions`).expect(500);
    const all = await app.db.select().from(submissionParts).where(eq(submissionParts.proposalId, draft.proposalId));
    expect(new Set(all.map((part) => part.submissionId))).toEqual(new Set([submissionId]));
  });

  it('of a process that ended too early is removed by the next submission, once it is old', async () => {
    const draft = await aReadyDraft(app);
    const [old, young] = ['00000000-0000-4000-8000-000000000001', '00000000-0000-4000-8000-000000000002'];
    const part = { proposalId: draft.proposalId, kind: 'targets' as const, ordinal: 1, content: [] };
    await app.db.insert(submissionParts).values([
      { ...part, submissionId: old, createdAt: new Date(Date.now() - 2 * 3_600_000) },
      { ...part, submissionId: young },
    ]);
    const { submissionId } = await submit(draft);
    expect(await partsOf(submissionId)).toHaveLength(2);
    expect(await partsOf(old)).toEqual([]);
    expect(await partsOf(young)).toHaveLength(1);
  });
});

describe('a submission from before sources had spectra', () => {
  it('stays as it was frozen, and is read as the contract is now', async () => {
    const draft = await aReadyDraft(app);
    const { submissionId } = await submit(draft);
    const content = await contentOf(draft, submissionId);
    const former = {
      ...content,
      targets: content.targets.map(formerTarget),
      observations: content.observations.map(formerObservation),
    };
    await app.db
      .update(submissions)
      .set({ content: former as unknown as SubmittedContent, fingerprint: sha256(former) })
      .where(eq(submissions.id, submissionId));
    await app.db.delete(submissionParts).where(eq(submissionParts.submissionId, submissionId));

    const { body } = await draft.pi.get(`${draft.base}/submissions/${submissionId}`).expect(200);
    const read = Submission.parse(body).content;
    expect(read.targets[0]).toMatchObject({
      redshiftUncertainty: { kind: 'gaussian', sigma: 0.02 },
      redshiftUncertaintyText: '0.02',
      redshiftKind: 'spectroscopic',
      brightnessText: content.targets[0]?.brightnessText,
      light: { kind: 'apparentMagnitude', magnitude: 22, spectrum: { kind: 'powerLaw', slopeBeta: -1.5 } },
      computed: { referenceDataVersion: 'none', bandMagnitudesAb: {} },
    });
    expect(read.observations[0]?.estimate?.referenceDataVersion).toBe('none');
    const [row] = await app.db.select().from(submissions).where(eq(submissions.id, submissionId));
    expect(sha256(row?.content)).toBe(row?.fingerprint);
  });

  it.each([
    [
      { kind: 'absoluteMagnitude', magnitudeAb: -21.5, restWavelengthNm: 150, spectralSlopeBeta: -2.2, sigmaMag: 0.1 },
      { kind: 'absoluteMagnitude', magnitude: -21.5, sigmaMag: 0.1, spectrum: { kind: 'powerLaw', slopeBeta: -2.2 } },
    ],
    [
      { kind: 'lineFlux', fluxErgSCm2: 2e-17, restWavelengthNm: 121.567, velocityWidthKmS: 250 },
      { kind: 'lineFlux', fluxErgSCm2: 2e-17, restWavelengthNm: 121.567, velocityWidthKmS: 250 },
    ],
    [
      { kind: 'lineLuminosity', luminosityErgS: 1e42, restWavelengthNm: 656.46, velocityWidthKmS: 200 },
      { kind: 'lineLuminosity', luminosityErgS: 1e42, restWavelengthNm: 656.46 },
    ],
  ])('gets the light %j in its form of now', (light, now) => {
    type Former = Parameters<typeof upgradeSubmittedTarget>[0];
    const upgraded = upgradeSubmittedTarget({ light, redshiftSigma: 0, computed: {} } as unknown as Former);
    expect(upgraded.light).toEqual(Light.parse(now));
    expect(upgraded.redshiftUncertainty).toBeNull();
    expect(upgradeSubmittedTarget(upgraded)).toBe(upgraded);
  });

  it('keeps an observation without an estimate, and one of now, as they are', () => {
    type Stored = Parameters<typeof upgradeSubmittedObservation>[0];
    for (const observation of [
      { estimate: null },
      { estimate: { referenceDataVersion: 'abc' } },
    ] as unknown as Stored[]) {
      expect(upgradeSubmittedObservation(observation)).toBe(observation);
    }
  });
});

/** As targets were frozen before. */
function formerTarget(target: SubmittedContent['targets'][number]): object {
  const {
    redshiftUncertainty: _u,
    redshiftUncertaintyText: _t,
    redshiftKind: _k,
    computed: {
      bandMagnitudesAb: _b,
      lineObservedWavelengthNm: _l,
      lineFluxErgSCm2: _f,
      referenceDataVersion: _r,
      ...computed
    },
    ...rest
  } = target;
  return {
    ...rest,
    redshiftSigma: 0.02,
    light: { kind: 'apparentMagnitude', magnitude: 22, system: 'AB', bandId: 'r', spectralSlopeBeta: -1.5 },
    computed,
  };
}

function formerObservation({ estimate, ...rest }: SubmittedContent['observations'][number]): object {
  if (estimate === null) return { ...rest, estimate };
  const { referenceDataVersion: _r, ...former } = estimate;
  return { ...rest, estimate: former };
}
