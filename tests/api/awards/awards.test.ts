import { eq } from 'drizzle-orm';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { conflicts } from '../../../apps/api/src/database/schema/assignments.js';
import { awards } from '../../../apps/api/src/database/schema/awards.js';
import { changes } from '../../../apps/api/src/database/schema/history.js';
import { panels } from '../../../apps/api/src/database/schema/panels.js';
import { proposals } from '../../../apps/api/src/database/schema/proposals.js';
import { semesters } from '../../../apps/api/src/database/schema/semesters.js';
import { AwardsReadModel } from '../../../apps/api/src/modules/awards/awards.read-model.js';
import { aPanel, aPanelMember, aReview, aSubmittedProposal, inDays } from '../../factories/committee.js';
import { aPerson, signedInAs, type TestPerson } from '../../factories/people.js';
import { type Agent, createTestApp, type TestApp } from '../support/app.js';

const AWARD = { hours: 8, moonClass: 'dark', standing: 'firm', reason: 'Convincing.' };

describe('awards', () => {
  let app: TestApp;
  let panel: Awaited<ReturnType<typeof aPanel>>;
  let chair: TestPerson;
  let agent: Agent;
  let proposal: Awaited<ReturnType<typeof aSubmittedProposal>>;
  let path: string;

  beforeAll(async () => {
    app = await createTestApp();
  });
  beforeEach(async () => {
    await app.empty();
    panel = await aPanel(app);
    chair = await aPanelMember(app, panel, 'chair');
    agent = await signedInAs(app, chair);
    proposal = await aSubmittedProposal(app, panel);
    path = `/api/v1/panels/${panel.id}/awards/${proposal.id}`;
  });
  afterAll(() => app.close());

  function finalise(key = 'finalise-key') {
    return agent.post(`/api/v1/panels/${panel.id}/finalisation`).set('Idempotency-Key', key);
  }

  async function stateOf(proposalId: string) {
    const [row] = await app.db.select().from(proposals).where(eq(proposals.id, proposalId));
    return row?.state;
  }

  it('are given by the chair and answered with the fresh ranking', async () => {
    const { body } = await agent.put(path).send(AWARD).expect(200);
    expect(body.rows[0].award).toEqual({ ...AWARD, version: 1 });
    expect(body.awardedHours).toEqual({ dark: 8, grey: 0, bright: 0 });
    const [entry] = await app.db.select().from(changes).where(eq(changes.subject, 'award'));
    expect(entry).toMatchObject({ personId: chair.id, scope: 'panel', scopeId: panel.id, action: 'created' });
    expect(entry?.details).toMatchObject({ hours: { before: null, after: 8 } });
  });

  it('are given once for a repeated key, and the repetition answers what stands by then', async () => {
    const send = () => agent.put(path).set('Idempotency-Key', 'award-key-1').send(AWARD).expect(200);
    await send();
    const { body } = await send();
    expect(body.rows[0].award.version).toBe(1);
    expect(await app.db.select().from(awards)).toHaveLength(1);
    expect(await app.db.select().from(changes).where(eq(changes.subject, 'award'))).toHaveLength(1);
    const other = await agent
      .put(path)
      .set('Idempotency-Key', 'award-key-1')
      .send({ ...AWARD, hours: 9 })
      .expect(409);
    expect(other.body.code).toBe('idempotency-mismatch');
  });

  it('need the version to be changed, and never overwrite another chair’s decision', async () => {
    await agent.put(path).send(AWARD).expect(200);
    await agent
      .put(path)
      .send({ ...AWARD, hours: 5 })
      .expect(428);
    const changed = await agent
      .put(path)
      .set('If-Match', '"1"')
      .send({ ...AWARD, hours: 5 })
      .expect(200);
    expect(changed.body.rows[0].award).toMatchObject({ hours: 5, version: 2 });
    const stale = await agent
      .put(path)
      .set('If-Match', '"1"')
      .send({ ...AWARD, hours: 1 })
      .expect(412);
    expect(stale.body.current).toMatchObject({ hours: 5, version: 2 });
  });

  it('can be taken back', async () => {
    await agent.put(path).send(AWARD).expect(200);
    await agent.delete(path).expect(428);
    await agent.delete(path).set('If-Match', '"7"').expect(412);
    const { body } = await agent.delete(path).set('If-Match', '"1"').expect(200);
    expect(body.rows[0].award).toBeNull();
    await agent.delete(path).set('If-Match', '"1"').expect(404);
  });

  it.each([
    ['hours', { hours: -1 }],
    ['hours', { hours: 101 }],
    ['hours', { hours: 'many' }],
    ['moonClass', { moonClass: 'dim' }],
    ['standing', { standing: 'maybe' }],
  ])('with impossible %s are refused at the field (%o)', async (field, overrides) => {
    // The semester has 100 h of dark time.
    const { body } = await agent
      .put(path)
      .send({ ...AWARD, ...overrides })
      .expect(422);
    expect(body.fieldErrors.map((error: { path: string }) => error.path)).toEqual([field]);
    expect(await app.db.select().from(awards)).toEqual([]);
  });

  it('go only to proposals submitted to the chair’s own panel', async () => {
    const elsewhere = await aSubmittedProposal(app, await aPanel(app, { semesterId: panel.semesterId }));
    const draft = await aSubmittedProposal(app, panel, { state: 'draft' });
    for (const { id } of [elsewhere, draft]) {
      await agent.put(`/api/v1/panels/${panel.id}/awards/${id}`).send(AWARD).expect(404);
    }
  });

  it('are the chair’s alone', async () => {
    for (const person of [
      await aPanelMember(app, panel),
      proposal.principal,
      await aPerson(app, { isStaff: true }),
      await aPerson(app, { isAdministrator: true }),
      await aPanelMember(app, await aPanel(app, { semesterId: panel.semesterId }), 'chair'),
    ]) {
      const other = await signedInAs(app, person);
      await other.put(path).send(AWARD).expect(404);
      await other.delete(path).set('If-Match', '"1"').expect(404);
      await other.post(`/api/v1/panels/${panel.id}/finalisation`).expect(404);
    }
    expect(await app.db.select().from(awards)).toEqual([]);
  });

  it('cannot be given, taken back or read where the chair has a conflict, not even by repeating a key', async () => {
    const send = () => agent.put(path).set('Idempotency-Key', 'award-key-1').send(AWARD);
    await send().expect(200);
    await app.db.insert(conflicts).values({ proposalId: proposal.id, personId: chair.id, kind: 'declared' });
    const answers = [
      await send(),
      await agent
        .put(path)
        .set('If-Match', '"1"')
        .send({ ...AWARD, hours: 1 }),
      await agent.delete(path).set('If-Match', '"1"'),
    ];
    expect(answers.map(({ status }) => status)).toEqual([404, 404, 404]);
    expect(JSON.stringify(answers.map(({ body }) => body))).not.toContain(proposal.title);
    // Another award under another key shows the fresh ranking, without the hidden one.
    const other = await aSubmittedProposal(app, panel);
    const { body } = await agent.put(`/api/v1/panels/${panel.id}/awards/${other.id}`).send(AWARD).expect(200);
    expect(body.rows).toHaveLength(1);
    expect(body.awardedHours.dark).toBe(8);
  });

  describe('finalisation', () => {
    it('awards what was given hours, declines the rest, and closes the panel', async () => {
      const nothing = await aSubmittedProposal(app, panel);
      const zero = await aSubmittedProposal(app, panel, { state: 'inReview' });
      await agent.put(path).send(AWARD).expect(200);
      await agent
        .put(`/api/v1/panels/${panel.id}/awards/${zero.id}`)
        .send({ ...AWARD, hours: 0 })
        .expect(200);
      const { body } = await finalise().expect(200);
      expect(body.isFinal).toBe(true);
      expect([await stateOf(proposal.id), await stateOf(nothing.id), await stateOf(zero.id)]).toEqual([
        'awarded',
        'declined',
        'declined',
      ]);
      const late = await agent
        .put(path)
        .set('If-Match', '"1"')
        .send({ ...AWARD, hours: 1 })
        .expect(409);
      expect(late.body.code).toBe('wrong-state');
      expect((await agent.delete(path).set('If-Match', '"1"').expect(409)).body.code).toBe('wrong-state');
    });

    it('is recorded for the panel and, without a name, in each proposal’s history', async () => {
      await finalise().expect(200);
      const entries = await app.db.select().from(changes);
      expect(entries.find((entry) => entry.action === 'finalised')).toMatchObject({
        personId: chair.id,
        scope: 'panel',
      });
      expect(entries.find((entry) => entry.scope === 'proposal')).toMatchObject({
        personId: null,
        scopeId: proposal.id,
        details: { state: { before: 'submitted', after: 'declined' } },
      });
    });

    it('happens once: the same key is answered again, another is refused', async () => {
      await finalise('finalise-key-1').expect(200);
      expect((await finalise('finalise-key-1').expect(200)).body.isFinal).toBe(true);
      const { body } = await finalise('finalise-key-2').expect(409);
      expect(body.code).toBe('wrong-state');
      const entries = await app.db.select().from(changes).where(eq(changes.action, 'finalised'));
      expect(entries).toHaveLength(1);
    });

    it('waits for the deadline', async () => {
      await app.db
        .update(semesters)
        .set({ deadlineAt: inDays(1) })
        .where(eq(semesters.id, panel.semesterId));
      const { body } = await finalise().expect(409);
      expect(body.code).toBe('wrong-state');
      const [stored] = await app.db.select().from(panels).where(eq(panels.id, panel.id));
      expect(stored?.finalisedAt).toBeNull();
      expect(await stateOf(proposal.id)).toBe('submitted');
    });

    it('decides the semester when the last of its panels is final', async () => {
      const other = await aPanel(app, { semesterId: panel.semesterId });
      const otherChair = await signedInAs(app, await aPanelMember(app, other, 'chair'));
      await finalise().expect(200);
      expect((await agent.get(`/api/v1/semesters/${panel.semesterId}`)).body.stage).toBe('reviewing');
      await otherChair.post(`/api/v1/panels/${other.id}/finalisation`).expect(200);
      const { body } = await agent.get(`/api/v1/semesters/${panel.semesterId}`).expect(200);
      expect(body.stage).toBe('decided');
      expect(body.decidedAt).not.toBeNull();
    });

    it('does not decide by omission on what the chair may not see: another chair does', async () => {
      const hidden = await aSubmittedProposal(app, panel, { title: 'Own work', coInvestigators: [chair] });
      const refused = await finalise('finalise-key-1').expect(409);
      expect(refused.body.code).toBe('wrong-state');
      expect(JSON.stringify(refused.body)).not.toMatch(/Own work/);
      const deputy = await signedInAs(app, await aPanelMember(app, panel, 'chair'));
      await deputy.put(`/api/v1/panels/${panel.id}/awards/${hidden.id}`).send(AWARD).expect(200);
      const { body } = await finalise('finalise-key-2').expect(200);
      expect(body.rows.map((row: { proposalId: string }) => row.proposalId)).toEqual([proposal.id]);
      expect(await stateOf(hidden.id)).toBe('awarded');
    });

    it('tells teams their award, which nobody told them before', async () => {
      await agent.put(path).send(AWARD).expect(200);
      const readModel = app.get(AwardsReadModel);
      expect(await readModel.mapTold([proposal.id])).toEqual(new Map());
      await finalise().expect(200);
      expect((await readModel.mapTold([proposal.id])).get(proposal.id)).toMatchObject(AWARD);
    });

    it('meets an award that is being given in one order or the other: it counts, or it is refused', async () => {
      const [given, final] = await Promise.all([agent.put(path).send(AWARD), finalise()]);
      expect(final.status).toBe(200);
      const stored = await app.db.select().from(awards);
      expect([given.status, stored.length, await stateOf(proposal.id)]).toEqual(
        given.status === 200 ? [200, 1, 'awarded'] : [409, 0, 'declined'],
      );
    });

    it('closes reviews', async () => {
      const reviewer = await aPanelMember(app, panel);
      await aReview(app, proposal, reviewer, 7);
      await finalise().expect(200);
      const other = await signedInAs(app, reviewer);
      const { body } = await other
        .put(`/api/v1/reviews/${proposal.id}`)
        .set('If-Match', '"1"')
        .send({ answers: { merit: { kind: 'score', score: 0 } } })
        .expect(409);
      expect(body.code).toBe('wrong-state');
    });
  });
});
