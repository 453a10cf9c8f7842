import { desc, eq, sql } from 'drizzle-orm';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { DemoPeople, Panel, Ranking, ReadingList } from '@faintward/contracts';
import { assignments, conflicts } from '../../../apps/api/src/database/schema/assignments.js';
import { awards } from '../../../apps/api/src/database/schema/awards.js';
import { observations } from '../../../apps/api/src/database/schema/observations.js';
import { people } from '../../../apps/api/src/database/schema/people.js';
import { proposals } from '../../../apps/api/src/database/schema/proposals.js';
import { reviews } from '../../../apps/api/src/database/schema/reviews.js';
import { submissions } from '../../../apps/api/src/database/schema/submissions.js';
import { targets } from '../../../apps/api/src/database/schema/targets.js';
import { readDemoData } from '../../../apps/api/src/demo/demo-data.js';
import { demoId } from '../../../apps/api/src/demo/identifiers.js';
import { DEMO_PASSWORD, seedDemo } from '../../../apps/api/src/demo/index.js';
import { buildScenario, type Scenario } from '../../../apps/api/src/demo/scenario.js';
import { canonicalJson, sha256 } from '../../../apps/api/src/engine/canonical-json.js';
import { SpectraReadModel } from '../../../apps/api/src/modules/spectra/spectra.read-model.js';
import { SubmissionsReadModel } from '../../../apps/api/src/modules/submissions/submissions.read-model.js';
import { TargetRecomputation } from '../../../apps/api/src/modules/targets/target-recomputation.service.js';
import { DatabaseService } from '../../../apps/api/src/database/transaction.js';
import { createTestApp, type TestApp } from '../support/app.js';

describe('a database filled with the demo', () => {
  const now = new Date();
  let app: TestApp;
  let scenario: Scenario;
  beforeAll(async () => {
    app = await createTestApp();
    scenario = buildScenario(await readDemoData(), now);
    await seedDemo(app.app, now);
  });
  afterAll(() => app.close());

  async function signedInAs(key: string) {
    const person = scenario.people.find((candidate) => candidate.key === key);
    const agent = app.agent();
    await agent.post('/api/v1/session').send({ email: person?.email, password: DEMO_PASSWORD }).expect(200);
    return agent;
  }
  const countOf = async (table: typeof people | typeof proposals | typeof targets | typeof observations) => {
    const [row] = await app.db.select({ count: sql<number>`count(*)::int` }).from(table);
    return row?.count;
  };

  it('holds the whole scenario', async () => {
    expect(await countOf(people)).toBe(scenario.people.length);
    expect(await countOf(proposals)).toBe(scenario.proposals.length);
    expect(await countOf(targets)).toBe(scenario.proposals.reduce((sum, proposal) => sum + proposal.targets.length, 0));
    expect(await countOf(observations)).toBe(
      scenario.proposals.reduce((sum, proposal) => sum + proposal.observations.length, 0),
    );
  });

  it('has an estimate that can be done for every observation of a target with light', async () => {
    const undone = await app.db
      .select({ name: targets.name, lacking: observations.lacking, estimate: observations.estimate })
      .from(observations)
      .innerJoin(targets, eq(targets.id, observations.targetId))
      .where(sql`${observations.totalSeconds} is null and ${targets.light} is not null`);
    expect(undone).toEqual([]);
    const [dark] = await app.db
      .select({ count: sql<number>`count(*)::int` })
      .from(observations)
      .innerJoin(targets, eq(targets.id, observations.targetId))
      .where(sql`${targets.light} is null and ${observations.lacking} is null`);
    expect(dark?.count).toBe(0);
  });

  it('holds the numbers that the application itself would compute', async () => {
    const id = demoId('proposal', 'O01');
    const stored = () =>
      app.db
        .select({ id: observations.id, estimate: observations.estimate, totalSeconds: observations.totalSeconds })
        .from(observations)
        .where(eq(observations.proposalId, id))
        .orderBy(observations.id);
    const columns = () =>
      app.db
        .select({ id: targets.id, computed: targets.computed })
        .from(targets)
        .where(eq(targets.proposalId, id))
        .orderBy(targets.id);
    const before = { observations: await stored(), targets: await columns() };
    const row = scenario.proposals.find((proposal) => proposal.id === id);
    await app
      .get(DatabaseService)
      .transaction(() => app.get(TargetRecomputation).recomputeAll(id, row?.semesterId ?? '', 'planck18'));
    expect({ observations: await stored(), targets: await columns() }).toEqual(before);
    expect(before.observations.length).toBeGreaterThan(10);
  });

  it('shows a spectrum that was uploaded, and what uses it', async () => {
    const [spectrum, ...others] = await app.get(SpectraReadModel).list(demoId('proposal', 'O10'));
    expect(others).toEqual([]);
    expect(spectrum?.usedByCount).toBe(10);
    expect(spectrum?.source).toMatch(/^Invented/);
  });

  it('labels as such a brightness that is only typical of its kind', async () => {
    const rows = await app.db
      .select({ light: targets.light, computed: targets.computed })
      .from(targets)
      .where(sql`${targets.light} ->> 'kind' = 'typical'`);
    expect(rows).toHaveLength(3);
    for (const { computed } of rows) expect(computed.notices.map(({ code }) => code)).toContain('typicalLight');
  });

  it('asks for hours that can be argued about', async () => {
    const rows = await app.db
      .select({
        proposalId: observations.proposalId,
        hours: sql<number>`sum(${observations.totalSeconds}) / 3600`,
        largestCount: sql<number>`max((${observations.estimate} ->> 'exposureCount')::int)`,
      })
      .from(observations)
      .groupBy(observations.proposalId);
    for (const { proposalId, hours } of rows) {
      const key = scenario.proposals.find(({ id }) => id === proposalId)?.key;
      expect(hours, key).toBeGreaterThan(2);
      expect(hours, key).toBeLessThan(45);
    }
  });

  it('keeps submissions in the form and with the fingerprint of any other', async () => {
    const rows = await app.db.select().from(submissions);
    const submitted = scenario.proposals.filter(({ submittedAt }) => submittedAt !== null);
    expect(rows).toHaveLength(submitted.length);
    for (const { id, fingerprint, requestedHours, targetCount, proposalId } of rows) {
      const content = await app.get(SubmissionsReadModel).contentOf(id);
      if (content === undefined) throw new Error('A submission has no content.');
      const proposal = submitted.find(({ id }) => id === proposalId);
      expect(fingerprint).toMatch(/^[0-9a-f]{64}$/);
      expect(targetCount).toBe(proposal?.targets.length);
      expect(content.title).toBe(proposal?.title);
      expect(sha256(canonicalJson(content))).toBe(fingerprint);
      expect(content.targets).toHaveLength(targetCount);
      expect(content.observations).toHaveLength(proposal?.observations.length ?? 0);
      expect(content.observations.every(({ totalSeconds }) => totalSeconds !== null)).toBe(true);
      expect(requestedHours).toEqual(content.timeRequest.totals);
    }
    expect(new Set(rows.map(({ fingerprint }) => fingerprint)).size).toBe(rows.length);
  });

  it('lets nobody review across a conflict', async () => {
    const crossing = await app.db
      .select({ proposalId: reviews.proposalId })
      .from(reviews)
      .innerJoin(
        conflicts,
        sql`${conflicts.proposalId} = ${reviews.proposalId} and ${conflicts.personId} = ${reviews.personId}`,
      );
    expect(crossing).toEqual([]);
    const declared = await app.db.select().from(conflicts).where(eq(conflicts.kind, 'declared'));
    expect(declared).toHaveLength(1);
    expect(
      await app.db
        .select()
        .from(assignments)
        .where(eq(assignments.proposalId, declared[0]?.proposalId ?? '')),
    ).toContainEqual(expect.objectContaining({ personId: declared[0]?.personId }));
  });

  it('has decided on everything in the semester that is observed, within its hours', async () => {
    const decided = scenario.proposals.filter(
      ({ semesterKey, fate }) => semesterKey === 'running' && fate === 'submitted',
    );
    const rows = await app.db
      .select({ award: awards, state: proposals.state })
      .from(awards)
      .innerJoin(proposals, eq(proposals.id, awards.proposalId))
      .orderBy(desc(awards.hours));
    expect(rows.map(({ award }) => award.proposalId).sort()).toEqual(decided.map(({ id }) => id).sort());
    for (const { award, state } of rows) expect(state).toBe(award.hours > 0 ? 'awarded' : 'declined');
    expect(new Set(rows.filter(({ state }) => state === 'awarded').map(({ award }) => award.standing))).toEqual(
      new Set(['firm', 'flexible', 'filler']),
    );
    const mine = scenario.proposals.find(({ key }) => key === 'R01');
    expect(rows.find(({ award }) => award.proposalId === mine?.id)?.award.standing).toBe('firm');
  });

  it('is offered as a demo, with one-click people who can sign in', async () => {
    const { body } = await app.http().get('/api/v1/demo-people').expect(200);
    const demo = body as DemoPeople;
    expect(demo.password).toBe(DEMO_PASSWORD);
    expect(demo.people).toHaveLength(scenario.people.filter(({ demoPart }) => demoPart !== null).length);
    for (const { email } of demo.people) {
      await app.agent().post('/api/v1/session').send({ email, password: demo.password }).expect(200);
    }
  });

  it('gives a principal investigator a draft that is nearly ready and a programme', async () => {
    const agent = await signedInAs('marisol');
    const { body } = await agent.get('/api/v1/proposals').expect(200);
    const states = (body as { rows: { state: string; lacking: string[] }[] }).rows;
    const draft = states.find(({ state }) => state === 'draft');
    // A target without brightness, and with it an observation without a time.
    expect(draft?.lacking).toHaveLength(2);
    expect(draft?.lacking.join()).not.toContain('without observation');
    expect(states.some(({ state }) => state === 'awarded')).toBe(true);
    expect(states.some(({ state }) => state === 'inReview')).toBe(true);
  });

  it('gives a reviewer a reading list that is begun, without the proposals in conflict', async () => {
    const agent = await signedInAs('haruka');
    const { body } = await agent.get('/api/v1/reading-list').expect(200);
    const { rows, reviewsDueAt } = body as ReadingList;
    expect(rows.length).toBeGreaterThan(3);
    expect(rows.some(({ state }) => state === 'complete')).toBe(true);
    expect(rows.some(({ state }) => state !== 'complete')).toBe(true);
    expect(Date.parse(reviewsDueAt ?? '')).toBeGreaterThan(now.getTime());
    const own = scenario.proposals.filter(({ members }) =>
      members.some(({ personId }) => personId === demoId('person', 'haruka')),
    );
    expect(rows.some(({ proposalId }) => own.some(({ id }) => id === proposalId))).toBe(false);
    // Half-way through the list, and one proposal put aside as a conflict of interest.
    const other = (await (await signedInAs('benoit')).get('/api/v1/reading-list').expect(200)).body as ReadingList;
    expect(other.conflictCount).toBe(1);
  });

  it('gives a chair a ranking with a cut line inside it', async () => {
    const agent = await signedInAs('leonor');
    const panelId = demoId('panel', 'reviewing', 'galaxies');
    const { body } = await agent.get(`/api/v1/panels/${panelId}/ranking`).expect(200);
    const ranking = body as Ranking;
    expect(ranking.isFinal).toBe(false);
    expect(ranking.rows.length).toBeGreaterThanOrEqual(8);
    expect(ranking.cutAfterRow).not.toBeNull();
    expect(ranking.cutAfterRow).toBeGreaterThan(0);
    expect(ranking.cutAfterRow).toBeLessThan(ranking.rows.length - 1);
    expect(ranking.hiddenCount).toBeGreaterThan(0);
    expect(ranking.reviewers.filter(({ leniency }) => leniency !== null).length).toBeGreaterThanOrEqual(6);
    const panel = (await agent.get(`/api/v1/panels/${panelId}`).expect(200)).body as Panel;
    expect(panel.members.some(({ completeCount, assignedCount }) => completeCount < assignedCount)).toBe(true);
  });

  it('has the same fingerprints when it is filled again as of the same moment', async () => {
    const fingerprints = () =>
      app.db
        .select({ id: submissions.proposalId, fingerprint: submissions.fingerprint })
        .from(submissions)
        .orderBy(submissions.proposalId);
    const opinions = () =>
      app.db
        .select({ id: reviews.id, answers: reviews.answers, overallScore: reviews.overallScore })
        .from(reviews)
        .orderBy(reviews.id);
    const before = { fingerprints: await fingerprints(), opinions: await opinions() };
    await app.empty();
    await seedDemo(app.app, now);
    expect({ fingerprints: await fingerprints(), opinions: await opinions() }).toEqual(before);
  });
});
