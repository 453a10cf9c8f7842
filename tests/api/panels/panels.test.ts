import { and, eq } from 'drizzle-orm';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { assignments, conflicts } from '../../../apps/api/src/database/schema/assignments.js';
import { panels } from '../../../apps/api/src/database/schema/panels.js';
import { reviews } from '../../../apps/api/src/database/schema/reviews.js';
import { ConflictsService } from '../../../apps/api/src/modules/panels/conflicts.service.js';
import { PanelsReadModel } from '../../../apps/api/src/modules/panels/panels.read-model.js';
import { aPanel, aPanelMember, aReview, aSubmittedProposal, anAssignment } from '../../factories/committee.js';
import { anInstitution, aPerson, signedInAs, type TestPerson } from '../../factories/people.js';
import { type Agent, createTestApp, type TestApp } from '../support/app.js';

describe('panels', () => {
  let app: TestApp;
  let panel: Awaited<ReturnType<typeof aPanel>>;
  let chair: TestPerson;
  let chairAgent: Agent;
  let path: string;

  beforeAll(async () => {
    app = await createTestApp();
  });
  beforeEach(async () => {
    await app.empty();
    panel = await aPanel(app);
    chair = await aPanelMember(app, panel, 'chair');
    chairAgent = await signedInAs(app, chair);
    path = `/api/v1/panels/${panel.id}`;
  });
  afterAll(() => app.close());

  describe('conflicts that the system finds', () => {
    it('are being on the team and belonging to the institution of anybody on it', async () => {
      const institution = await anInstitution(app);
      const onTeam = await aPanelMember(app, panel);
      const colleague = await aPanelMember(app, panel, 'member', { institutionId: institution.id });
      const free = await aPanelMember(app, panel, 'member', { institutionId: (await anInstitution(app)).id });
      const proposal = await aSubmittedProposal(app, panel, {
        principal: await aPerson(app, { institutionId: institution.id }),
        coInvestigators: [onTeam],
      });
      expect(await app.get(ConflictsService).detectForProposal(proposal.id)).toEqual({ addedCount: 2 });
      const rows = await app.db.select().from(conflicts).where(eq(conflicts.proposalId, proposal.id));
      expect(new Map(rows.map((row) => [row.personId, row.kind]))).toEqual(
        new Map([
          [onTeam.id, 'team'],
          [colleague.id, 'institution'],
        ]),
      );
      expect(rows.map((row) => row.personId)).not.toContain(free.id);
    });

    it('are found once, and one that was withdrawn stays withdrawn', async () => {
      const institution = await anInstitution(app);
      const colleague = await aPanelMember(app, panel, 'member', { institutionId: institution.id });
      const proposal = await aSubmittedProposal(app, panel, {
        principal: await aPerson(app, { institutionId: institution.id }),
      });
      const service = app.get(ConflictsService);
      await service.detectForProposal(proposal.id);
      await app.db.update(conflicts).set({ withdrawnAt: new Date() }).where(eq(conflicts.personId, colleague.id));
      expect(await service.detectForProposal(proposal.id)).toEqual({ addedCount: 0 });
      await chairAgent
        .post(`${path}/assignments`)
        .send({ proposalId: proposal.id, personId: colleague.id })
        .expect(201);
    });

    it('do not make two people without an institution colleagues', async () => {
      await aPanelMember(app, panel);
      const proposal = await aSubmittedProposal(app, panel);
      expect(await app.get(ConflictsService).detectForProposal(proposal.id)).toEqual({ addedCount: 0 });
    });
  });

  describe('the chair’s view', () => {
    it('shows members with their load and proposals, as submitted, with reviewers and conflicts', async () => {
      const reader = await aPanelMember(app, panel, 'member', { givenName: 'Rea', familyName: 'Reader' });
      const conflicted = await aPanelMember(app, panel);
      const proposal = await aSubmittedProposal(app, panel, { title: 'As submitted', coInvestigators: [conflicted] });
      const other = await aSubmittedProposal(app, panel);
      await aReview(app, proposal, reader, 8);
      await anAssignment(app, other, reader);
      const { body } = await chairAgent.get(path).expect(200);
      expect(body).toMatchObject({ panelId: panel.id, isFinal: false, hiddenCount: 0 });
      const member = body.members.find((row: { personId: string }) => row.personId === reader.id);
      expect(member).toMatchObject({ name: 'Rea Reader', assignedCount: 2, completeCount: 1, conflictCount: 0 });
      expect(body.proposals[0]).toMatchObject({
        title: 'As submitted',
        reviewers: [{ personId: reader.id, name: 'Rea Reader', state: 'complete' }],
        conflictedPersonIds: [conflicted.id],
      });
      expect(body.proposals[1].reviewers[0].state).toBe('toRead');
    });

    it('does not hold drafts and withdrawn proposals', async () => {
      await aSubmittedProposal(app, panel, { state: 'draft' });
      await aSubmittedProposal(app, panel, { state: 'withdrawn' });
      const { body } = await chairAgent.get(path).expect(200);
      expect(body.proposals).toEqual([]);
    });

    it('leaves out what the chair has a conflict with, in every list and every count', async () => {
      const reader = await aPanelMember(app, panel);
      const hidden = await aSubmittedProposal(app, panel, { title: 'Own proposal', coInvestigators: [chair, reader] });
      const alsoHidden = await aSubmittedProposal(app, panel, { title: 'Rival proposal', coInvestigators: [chair] });
      await aReview(app, alsoHidden, reader, 3);
      const { body } = await chairAgent.get(path).expect(200);
      expect(body.hiddenCount).toBe(2);
      expect(body.proposals).toEqual([]);
      const member = body.members.find((row: { personId: string }) => row.personId === reader.id);
      expect(member).toMatchObject({ assignedCount: 0, completeCount: 0, conflictCount: 0 });
      expect(JSON.stringify(body)).not.toMatch(new RegExp(`${hidden.id}|${alsoHidden.id}|Own|Rival`));
    });

    it('is absent, in the same words, for members, staff, administrators, teams and other chairs', async () => {
      const proposal = await aSubmittedProposal(app, panel);
      const other = await aPanel(app, { semesterId: panel.semesterId });
      const outsiders = [
        await aPanelMember(app, panel),
        await aPerson(app, { isStaff: true }),
        await aPerson(app, { isAdministrator: true }),
        proposal.principal,
        await aPanelMember(app, other, 'chair'),
      ];
      const absent = await chairAgent.get('/api/v1/panels/c0ffee00-0000-4000-8000-000000000000').expect(404);
      for (const person of outsiders) {
        const agent = await signedInAs(app, person);
        for (const answer of [
          await agent.get(path),
          await agent.post(`${path}/assignments`).send({ proposalId: proposal.id, personId: person.id }),
          await agent.post(`${path}/automatic-assignment`).send({ reviewersPerProposal: 1 }),
          await agent.delete(`${path}/assignments/${proposal.id}/${person.id}`),
        ]) {
          expect([answer.status, answer.body.code, answer.body.detail]).toEqual([404, 'not-found', absent.body.detail]);
        }
      }
      expect(await app.db.select().from(assignments)).toEqual([]);
    });
  });

  describe('assigning by hand', () => {
    it('assigns a member, makes them lead, and takes the lead from whoever had it', async () => {
      const [first, second] = [await aPanelMember(app, panel), await aPanelMember(app, panel)];
      const proposal = await aSubmittedProposal(app, panel);
      const send = (person: TestPerson) =>
        chairAgent
          .post(`${path}/assignments`)
          .send({ proposalId: proposal.id, personId: person.id, isLead: true })
          .expect(201);
      await send(first);
      const { body } = await send(second);
      const leads = body.proposals[0].reviewers.map((row: { personId: string; isLead: boolean }) => [
        row.personId,
        row.isLead,
      ]);
      expect(new Map(leads)).toEqual(
        new Map([
          [first.id, false],
          [second.id, true],
        ]),
      );
    });

    it('does its work once for a repeated key, and refuses the same pair under another', async () => {
      const member = await aPanelMember(app, panel);
      const proposal = await aSubmittedProposal(app, panel);
      const send = (key: string) =>
        chairAgent
          .post(`${path}/assignments`)
          .set('Idempotency-Key', key)
          .send({ proposalId: proposal.id, personId: member.id });
      expect((await send('assign-key-1')).status).toBe(201);
      expect((await send('assign-key-1')).status).toBe(201);
      const again = await send('assign-key-2');
      expect([again.status, again.body.code]).toEqual([409, 'already-exists']);
      expect(await app.db.select().from(assignments)).toHaveLength(1);
    });

    it('refuses a member with a conflict, even one that nobody had looked for yet', async () => {
      const institution = await anInstitution(app);
      const colleague = await aPanelMember(app, panel, 'member', { institutionId: institution.id });
      const proposal = await aSubmittedProposal(app, panel, {
        principal: await aPerson(app, { institutionId: institution.id }),
      });
      const { body } = await chairAgent
        .post(`${path}/assignments`)
        .send({ proposalId: proposal.id, personId: colleague.id })
        .expect(409);
      expect(body.code).toBe('conflict');
      expect(await app.db.select().from(assignments)).toEqual([]);
    });

    it('refuses somebody who does not sit on the panel, and proposals of another panel', async () => {
      const proposal = await aSubmittedProposal(app, panel);
      const stranger = await aPerson(app);
      const { body } = await chairAgent
        .post(`${path}/assignments`)
        .send({ proposalId: proposal.id, personId: stranger.id })
        .expect(422);
      expect(body.fieldErrors[0].path).toBe('personId');
      const elsewhere = await aSubmittedProposal(app, await aPanel(app, { semesterId: panel.semesterId }));
      const member = await aPanelMember(app, panel);
      await chairAgent.post(`${path}/assignments`).send({ proposalId: elsewhere.id, personId: member.id }).expect(404);
    });

    it('takes an assignment back until the review is begun', async () => {
      const [idle, busy] = [await aPanelMember(app, panel), await aPanelMember(app, panel)];
      const proposal = await aSubmittedProposal(app, panel);
      await anAssignment(app, proposal, idle);
      await aReview(app, proposal, busy, 6);
      const { body } = await chairAgent.delete(`${path}/assignments/${proposal.id}/${idle.id}`).expect(200);
      expect(body.proposals[0].reviewers).toHaveLength(1);
      const refused = await chairAgent.delete(`${path}/assignments/${proposal.id}/${busy.id}`).expect(409);
      expect(refused.body.code).toBe('wrong-state');
      await chairAgent.delete(`${path}/assignments/${proposal.id}/${idle.id}`).expect(404);
    });

    it('never takes an assignment back from under a review that is being saved', async () => {
      const member = await aPanelMember(app, panel);
      const memberAgent = await signedInAs(app, member);
      const proposal = await aSubmittedProposal(app, panel);
      await anAssignment(app, proposal, member);
      const [saved, removed] = await Promise.all([
        memberAgent
          .put(`/api/v1/reviews/${proposal.id}`)
          .set('If-Match', '"1"')
          .send({ answers: { merit: { kind: 'score', score: 7 } } }),
        chairAgent.delete(`${path}/assignments/${proposal.id}/${member.id}`),
      ]);
      const stored = await app.db.select().from(reviews);
      expect([saved.status, removed.status, stored.length]).toEqual(
        saved.status === 200 ? [200, 409, 1] : [404, 200, 0],
      );
    });

    it('is closed once the panel is final', async () => {
      const member = await aPanelMember(app, panel);
      const proposal = await aSubmittedProposal(app, panel);
      await anAssignment(app, proposal, member);
      await app.db.update(panels).set({ finalisedAt: new Date() }).where(eq(panels.id, panel.id));
      const answers = [
        await chairAgent.post(`${path}/assignments`).send({ proposalId: proposal.id, personId: chair.id }),
        await chairAgent.post(`${path}/automatic-assignment`).send({ reviewersPerProposal: 1 }),
        await chairAgent.delete(`${path}/assignments/${proposal.id}/${member.id}`),
      ];
      expect(answers.map(({ body }) => body.code)).toEqual(['wrong-state', 'wrong-state', 'wrong-state']);
    });
  });

  describe('automatic assignment', () => {
    it('fills every proposal evenly, keeps what stands, and leaves the chair out', async () => {
      const members = [];
      for (let count = 0; count < 3; count += 1) members.push(await aPanelMember(app, panel));
      const proposals = [];
      for (let count = 0; count < 6; count += 1) proposals.push(await aSubmittedProposal(app, panel));
      const [proposal] = proposals;
      const [member] = members;
      if (proposal === undefined || member === undefined) throw new Error('The factories made nothing.');
      await anAssignment(app, proposal, member);
      const { body } = await chairAgent
        .post(`${path}/automatic-assignment`)
        .send({ reviewersPerProposal: 2 })
        .expect(200);
      expect(body).toEqual({
        assignedCount: 11,
        shortProposalLabels: [],
        reviewsPerMember: { least: 4, most: 4 },
      });
      const rows = await app.db.select().from(assignments);
      expect(rows.filter((row) => row.personId === chair.id)).toEqual([]);
      // Each proposal has one lead, and leading is spread as well.
      const leads = rows.filter((row) => row.isLead);
      expect(new Set(leads.map((row) => row.proposalId)).size).toBe(6);
      expect(leads).toHaveLength(6);
      expect(members.map(({ id }) => leads.filter((row) => row.personId === id).length)).toEqual([2, 2, 2]);
    });

    it('names the proposals that fall short for conflicts', async () => {
      const onTeam = await aPanelMember(app, panel);
      await aPanelMember(app, panel);
      await aSubmittedProposal(app, panel, { coInvestigators: [onTeam] });
      await aSubmittedProposal(app, panel);
      const { body } = await chairAgent
        .post(`${path}/automatic-assignment`)
        .send({ reviewersPerProposal: 2 })
        .expect(200);
      const view = await chairAgent.get(path).expect(200);
      expect(body.shortProposalLabels).toEqual([view.body.proposals[0].label]);
      expect(body.assignedCount).toBe(3);
    });

    it('serves proposals that the chair may not see, and tells the chair nothing of them', async () => {
      const member = await aPanelMember(app, panel);
      const hidden = await aSubmittedProposal(app, panel, { coInvestigators: [chair] });
      const { body } = await chairAgent
        .post(`${path}/automatic-assignment`)
        .send({ reviewersPerProposal: 2 })
        .expect(200);
      expect(body).toEqual({ assignedCount: 0, shortProposalLabels: [], reviewsPerMember: { least: 0, most: 0 } });
      const stored = await app.db
        .select()
        .from(assignments)
        .where(and(eq(assignments.proposalId, hidden.id), eq(assignments.personId, member.id)));
      expect(stored).toHaveLength(1);
    });

    it('needs members', async () => {
      const { body } = await chairAgent
        .post(`${path}/automatic-assignment`)
        .send({ reviewersPerProposal: 2 })
        .expect(409);
      expect(body.code).toBe('wrong-state');
    });
  });

  it('are listed for a semester and for a person', async () => {
    const readModel = app.get(PanelsReadModel);
    const later = await aPanel(app, { semesterId: panel.semesterId, position: 1, name: 'A later panel' });
    expect((await readModel.listOfSemester(panel.semesterId)).map(({ panelId }) => panelId)).toEqual([
      panel.id,
      later.id,
    ]);
    expect(await readModel.listOfPerson(chair.id)).toMatchObject([{ panelId: panel.id, role: 'chair' }]);
  });
});
