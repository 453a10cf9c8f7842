import { eq } from 'drizzle-orm';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { conflicts } from '../../../apps/api/src/database/schema/assignments.js';
import { changes } from '../../../apps/api/src/database/schema/history.js';
import { panelMembers, panels } from '../../../apps/api/src/database/schema/panels.js';
import { reviews } from '../../../apps/api/src/database/schema/reviews.js';
import { semesters } from '../../../apps/api/src/database/schema/semesters.js';
import { submissions } from '../../../apps/api/src/database/schema/submissions.js';
import {
  aPanel,
  aPanelMember,
  aReview,
  aSemester,
  aSubmittedProposal,
  anAssignment,
  someContent,
} from '../../factories/committee.js';
import { aPerson, signedInAs, type TestPerson } from '../../factories/people.js';
import { type Agent, createTestApp, type TestApp } from '../support/app.js';

const NOWHERE = 'c0ffee00-0000-4000-8000-000000000000';

function scored(score: number) {
  return { kind: 'score', score };
}

describe('reviews', () => {
  let app: TestApp;
  let panel: Awaited<ReturnType<typeof aPanel>>;
  let reviewer: TestPerson;
  let agent: Agent;
  let proposal: Awaited<ReturnType<typeof aSubmittedProposal>>;
  let path: string;

  beforeAll(async () => {
    app = await createTestApp();
  });
  beforeEach(async () => {
    await app.empty();
    panel = await aPanel(app);
    reviewer = await aPanelMember(app, panel);
    agent = await signedInAs(app, reviewer);
    proposal = await aSubmittedProposal(app, panel, { title: 'Faint arcs' });
    await anAssignment(app, proposal, reviewer);
    path = `/api/v1/reviews/${proposal.id}`;
  });
  afterAll(() => app.close());

  function save(version: number, body: object) {
    return agent.put(path).set('If-Match', `"${version}"`).send(body);
  }

  describe('the reading list', () => {
    it('holds the own assignments of all panels with the state of each review', async () => {
      const second = await aPanel(app, { semesterId: panel.semesterId });
      await app.db.insert(panelMembers).values({ panelId: second.id, personId: reviewer.id, role: 'member' });
      await aReview(app, await aSubmittedProposal(app, second, { title: 'Lensed quasar' }), reviewer, 8);
      await aSubmittedProposal(app, panel, { title: 'Not assigned' });
      const dueAt = new Date('2031-05-01T12:00:00Z');
      await app.db.update(semesters).set({ reviewsDueAt: dueAt }).where(eq(semesters.id, panel.semesterId));
      const { body } = await agent.get('/api/v1/reading-list').expect(200);
      expect(
        body.rows.map((row: { title: string; state: string; overallScore: number }) => [
          row.title,
          row.state,
          row.overallScore,
        ]),
      ).toEqual([
        ['Faint arcs', 'toRead', null],
        ['Lensed quasar', 'complete', 8],
      ]);
      expect(body).toMatchObject({ conflictCount: 0, reviewsDueAt: dueAt.toISOString() });
    });

    it('counts a conflict and does not name it', async () => {
      const conflicted = await aSubmittedProposal(app, panel, { title: 'Secret title', coInvestigators: [reviewer] });
      await anAssignment(app, conflicted, reviewer);
      const { body } = await agent.get('/api/v1/reading-list').expect(200);
      expect(body.conflictCount).toBe(1);
      expect(body.rows).toHaveLength(1);
      expect(JSON.stringify(body)).not.toMatch(new RegExp(`Secret|${conflicted.id}`));
    });

    it('loses what was withdrawn, what belongs to a panel the person has left, and panels that are final', async () => {
      await app.db.update(panels).set({ finalisedAt: new Date() }).where(eq(panels.id, panel.id));
      expect((await agent.get('/api/v1/reading-list')).body.rows).toEqual([]);
      await app.db.update(panels).set({ finalisedAt: null }).where(eq(panels.id, panel.id));
      expect((await agent.get('/api/v1/reading-list')).body.rows).toHaveLength(1);
      await app.db.delete(panelMembers).where(eq(panelMembers.personId, reviewer.id));
      expect((await agent.get('/api/v1/reading-list')).body.rows).toEqual([]);
    });

    it('is empty for somebody on no panel', async () => {
      const other = await signedInAs(app, await aPerson(app));
      expect((await other.get('/api/v1/reading-list').expect(200)).body).toEqual({
        rows: [],
        conflictCount: 0,
        reviewsDueAt: null,
      });
    });
  });

  describe('reading', () => {
    it('shows what was submitted last, the criteria and the own answers', async () => {
      await app.db.update(submissions).set({ isCurrent: false }).where(eq(submissions.proposalId, proposal.id));
      await app.db.insert(submissions).values({
        proposalId: proposal.id,
        number: 2,
        submittedBy: proposal.principal.id,
        content: someContent({ title: 'Faint arcs, revised' }),
        fingerprint: 'a'.repeat(64),
        requestedHours: { dark: 5, grey: 0, bright: 0 },
        targetCount: 1,
      });
      const { body, headers } = await agent.get(path).expect(200);
      expect(body.content.title).toBe('Faint arcs, revised');
      expect(body.content.team).toHaveLength(1);
      expect(body.criteria.map((criterion: { criterionId: string }) => criterion.criterionId)).toEqual([
        'merit',
        'method',
      ]);
      expect(body).toMatchObject({ answers: {}, state: 'toRead', overallScore: null, canEdit: true, version: 1 });
      expect(headers['etag']).toBe('"1"');
    });

    it('in an anonymised semester shows neither names nor institutions nor the size of the team nor its partner', async () => {
      await app.db.update(semesters).set({ isAnonymised: true }).where(eq(semesters.id, panel.semesterId));
      const { body } = await agent.get(path).expect(200);
      expect(body.isAnonymised).toBe(true);
      expect(body.content).toMatchObject({ team: null, partnerName: null });
      const everything = JSON.stringify([body, (await agent.get('/api/v1/reading-list').expect(200)).body]);
      expect(everything).not.toMatch(/Pat Principal|Institute of Names|Partner of the team/);
      expect(everything).not.toContain(proposal.principal.familyName);
    });

    it('shows the names of an anonymised semester once the ranking is final, and edits nothing any more', async () => {
      await app.db.update(semesters).set({ isAnonymised: true }).where(eq(semesters.id, panel.semesterId));
      await app.db.update(panels).set({ finalisedAt: new Date() }).where(eq(panels.id, panel.id));
      const { body } = await agent.get(path).expect(200);
      expect(body.content.team[0].name).toBe('Pat Principal');
      expect(body.canEdit).toBe(false);
    });
  });

  describe('writing', () => {
    it('saves unfinished work, and is complete when every criterion is answered and one is scored', async () => {
      const begun = await save(1, { answers: { merit: scored(7.5) } }).expect(200);
      expect(begun.body).toMatchObject({ state: 'begun', overallScore: 7.5, version: 2 });
      expect(begun.headers['etag']).toBe('"2"');
      const complete = await save(2, { answers: { method: scored(3.5) } }).expect(200);
      // Weights 3 and 1: (3 × 7.5 + 3.5) / 4.
      expect(complete.body).toMatchObject({ state: 'complete', overallScore: 6.5, version: 3 });
      expect(complete.body.answers).toEqual({ merit: scored(7.5), method: scored(3.5) });
    });

    it('leaves “cannot judge” out of the score, and is not complete on it alone', async () => {
      const answered = await save(1, { answers: { merit: scored(8), method: { kind: 'cannotJudge' } } }).expect(200);
      expect(answered.body).toMatchObject({ state: 'complete', overallScore: 8 });
      const none = await save(2, { answers: { merit: { kind: 'cannotJudge' } } }).expect(200);
      expect(none.body).toMatchObject({ state: 'begun', overallScore: null });
    });

    it('takes an answer back with null and leaves alone what is not mentioned', async () => {
      await save(1, { answers: { merit: scored(8), method: scored(4) }, commentToPrincipal: 'Clear.' }).expect(200);
      const { body } = await save(2, { answers: { method: null }, confidentialComment: 'Doubtful.' }).expect(200);
      expect(body).toMatchObject({
        answers: { merit: scored(8) },
        state: 'begun',
        commentToPrincipal: 'Clear.',
        confidentialComment: 'Doubtful.',
      });
    });

    it.each([0, 0.5, 10])('takes the score %d', async (score) => {
      await save(1, { answers: { merit: scored(score) } }).expect(200);
    });

    it.each([
      [7.25, 'Scores go in half steps.'],
      [-0.5, 'Scores run from 0 to 10.'],
      [10.5, 'Scores run from 0 to 10.'],
      ['7', 'A score is a number from 0 to 10.'],
    ])('refuses the score %s at its field', async (score, message) => {
      const { body } = await agent
        .put(path)
        .set('If-Match', '"1"')
        .send({ answers: { merit: { kind: 'score', score } } })
        .expect(422);
      expect(body.fieldErrors).toContainEqual({ path: 'answers.merit.score', message });
      expect(await app.db.select().from(reviews)).toEqual([]);
    });

    it('refuses a criterion that the semester does not have', async () => {
      const { body } = await save(1, { answers: { merit: scored(5), beauty: scored(9) } }).expect(422);
      expect(body.fieldErrors.map((error: { path: string }) => error.path)).toEqual(['answers.beauty']);
      expect(await app.db.select().from(reviews)).toEqual([]);
    });

    it('needs the version it changes, and never overwrites another window’s work', async () => {
      await agent.put(path).send({ commentToPrincipal: 'x' }).expect(428);
      await save(1, { commentToPrincipal: 'From one window.' }).expect(200);
      const { body } = await save(1, { commentToPrincipal: 'From another.' }).expect(412);
      expect(body.current).toMatchObject({ commentToPrincipal: 'From one window.', version: 2 });
      expect((await agent.get(path)).body.commentToPrincipal).toBe('From one window.');
    });

    it('lets one of two simultaneous first saves through', async () => {
      const answers = await Promise.all([save(1, { commentToPrincipal: 'a' }), save(1, { commentToPrincipal: 'b' })]);
      expect(answers.map(({ status }) => status).sort()).toEqual([200, 412]);
    });

    it('is closed once the panel is final', async () => {
      await app.db.update(panels).set({ finalisedAt: new Date() }).where(eq(panels.id, panel.id));
      const { body } = await save(1, { answers: { merit: scored(5) } }).expect(409);
      expect(body.code).toBe('wrong-state');
    });

    it('records every changed score, before and after', async () => {
      await save(1, { answers: { merit: scored(5) } }).expect(200);
      await save(2, { answers: { merit: scored(6) } }).expect(200);
      await save(3, { commentToPrincipal: 'No score changed.' }).expect(200);
      const entries = await app.db.select().from(changes).where(eq(changes.subject, 'review'));
      expect(entries).toHaveLength(2);
      expect(entries.find((entry) => entry.action === 'changed')?.details).toMatchObject({
        merit: { before: scored(5), after: scored(6) },
      });
      // Not under the proposal, whose history its team reads.
      expect(entries.map((entry) => entry.scope)).toEqual(['panel', 'panel']);
    });
  });

  describe('a declared conflict', () => {
    it('hides the proposal at once, everywhere, in the words for what does not exist', async () => {
      await save(1, { answers: { merit: scored(9) } }).expect(200);
      await agent.post(`${path}/conflict`).send({ reason: 'We write a paper together.' }).expect(200);
      const absent = await agent.get(`/api/v1/reviews/${NOWHERE}`).expect(404);
      for (const answer of [
        await agent.get(path),
        await save(2, { answers: { merit: scored(1) } }),
        await agent.post(`${path}/conflict`).send({ reason: 'Once more.' }),
      ]) {
        expect([answer.status, answer.body.code, answer.body.detail]).toEqual([404, 'not-found', absent.body.detail]);
      }
      const list = await agent.get('/api/v1/reading-list').expect(200);
      expect(list.body).toMatchObject({ rows: [], conflictCount: 1 });
    });

    it('is seen by the chair as a state, without its reason, and the review counts no more', async () => {
      const chair = await signedInAs(app, await aPanelMember(app, panel, 'chair'));
      await save(1, { answers: { merit: scored(9), method: scored(9) } }).expect(200);
      await agent.post(`${path}/conflict`).send({ reason: 'My former student.' }).expect(200);
      const view = await chair.get(`/api/v1/panels/${panel.id}`).expect(200);
      expect(view.body.proposals[0].reviewers[0].state).toBe('conflict');
      expect(view.body.proposals[0].conflictedPersonIds).toEqual([reviewer.id]);
      expect(JSON.stringify(view.body)).not.toContain('student');
      const ranking = await chair.get(`/api/v1/panels/${panel.id}/ranking`).expect(200);
      expect(ranking.body.rows[0]).toMatchObject({ scoreCount: 0, meanScore: null, assignedCount: 0, scores: [] });
      expect(ranking.body.reviewers).toEqual([]);
    });

    it('can be declared by the chair of a proposal that is not assigned to them', async () => {
      const chair = await signedInAs(app, await aPanelMember(app, panel, 'chair'));
      await chair.post(`${path}/conflict`).send({ reason: 'A close friend.' }).expect(200);
      const view = await chair.get(`/api/v1/panels/${panel.id}`).expect(200);
      expect(view.body).toMatchObject({ proposals: [], hiddenCount: 1 });
    });

    it('needs a reason, and cannot be declared by a member for a proposal that is not theirs to read', async () => {
      await agent.post(`${path}/conflict`).send({ reason: '' }).expect(422);
      const other = await signedInAs(app, await aPanelMember(app, panel));
      await other.post(`${path}/conflict`).send({ reason: 'I want to know whether it exists.' }).expect(404);
      expect(await app.db.select().from(conflicts)).toEqual([]);
    });
  });

  describe('around the screens', () => {
    it('a review exists for its reviewer alone', async () => {
      await save(1, { answers: { merit: scored(9) } }).expect(200);
      const absent = await agent.get(`/api/v1/reviews/${NOWHERE}`).expect(404);
      const outsiders = [
        proposal.principal,
        await aPanelMember(app, panel),
        await aPanelMember(app, panel, 'chair'),
        await aPerson(app, { isStaff: true }),
        await aPerson(app, { isAdministrator: true }),
        await aPanelMember(app, await aPanel(app, { semesterId: panel.semesterId })),
      ];
      for (const person of outsiders) {
        const other = await signedInAs(app, person);
        for (const answer of [
          await other.get(path),
          await other
            .put(path)
            .set('If-Match', '"2"')
            .send({ answers: { merit: scored(0) } }),
        ]) {
          expect([answer.status, answer.body.detail]).toEqual([404, absent.body.detail]);
        }
      }
      expect((await agent.get(path)).body.answers).toEqual({ merit: scored(9) });
    });

    it('a reviewer reads no score and no comment of another reviewer', async () => {
      await aReview(app, proposal, await aPanelMember(app, panel), 2);
      const everything = JSON.stringify([
        (await agent.get(path).expect(200)).body,
        (await agent.get('/api/v1/reading-list').expect(200)).body,
      ]);
      expect(everything).not.toContain('Well argued.');
      expect((await agent.get(path)).body).toMatchObject({ answers: {}, overallScore: null });
      await agent.get(`/api/v1/panels/${panel.id}/ranking`).expect(404);
      await agent.get(`/api/v1/panels/${panel.id}/ranking.csv`).expect(404);
      await agent.get(`/api/v1/panels/${panel.id}`).expect(404);
    });

    it('a reviewer on the team, or with a conflict found after the assignment, is shut out', async () => {
      const own = await aSubmittedProposal(app, panel, { coInvestigators: [reviewer] });
      await anAssignment(app, own, reviewer);
      await agent.get(`/api/v1/reviews/${own.id}`).expect(404);
      await agent.get(path).expect(200);
      await app.db.insert(conflicts).values({ proposalId: proposal.id, personId: reviewer.id, kind: 'institution' });
      await agent.get(path).expect(404);
      await save(1, { answers: { merit: scored(9) } }).expect(404);
    });

    it('a reviewer who has left the panel is shut out', async () => {
      await app.db.delete(panelMembers).where(eq(panelMembers.personId, reviewer.id));
      await agent.get(path).expect(404);
    });

    it('a proposal that was withdrawn is gone for its reviewer', async () => {
      const withdrawn = await aSubmittedProposal(app, panel, { state: 'withdrawn' });
      await anAssignment(app, withdrawn, reviewer);
      await agent.get(`/api/v1/reviews/${withdrawn.id}`).expect(404);
      expect((await agent.get('/api/v1/reading-list')).body.rows).toHaveLength(1);
    });
  });

  it('of another semester have its own criteria', async () => {
    const semester = await aSemester(app, {
      criteria: [
        { criterionId: 'reach', title: 'Reach', weight: 1, anchors: { low: 'near', middle: 'far', high: 'farther' } },
      ],
    });
    const other = await aPanel(app, { semesterId: semester.id });
    await app.db.insert(panelMembers).values({ panelId: other.id, personId: reviewer.id, role: 'member' });
    const there = await aSubmittedProposal(app, other);
    await anAssignment(app, there, reviewer);
    const { body } = await agent
      .put(`/api/v1/reviews/${there.id}`)
      .set('If-Match', '"1"')
      .send({ answers: { reach: scored(4.5) } })
      .expect(200);
    expect(body).toMatchObject({ state: 'complete', overallScore: 4.5 });
  });
});
