import { eq } from 'drizzle-orm';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { assignments, conflicts } from '../../../apps/api/src/database/schema/assignments.js';
import { awards } from '../../../apps/api/src/database/schema/awards.js';
import { panelMembers } from '../../../apps/api/src/database/schema/panels.js';
import { proposalMembers, proposals } from '../../../apps/api/src/database/schema/proposals.js';
import { submissions } from '../../../apps/api/src/database/schema/submissions.js';
import { aMode, aPanel, aReview, aSemester, aSubmittedProposal, anAssignment } from '../../factories/committee.js';
import { aPerson, signedInAs, type TestPerson } from '../../factories/people.js';
import { aDraft, anOpenSemester, aTarget, CONDITIONS, GOAL, planAll } from '../../factories/proposals.js';
import { type Agent, createTestApp, type TestApp } from '../support/app.js';

const TEAM = ['reads', 'editsTargets', 'editsEverything', 'principal'] as const;
const COMMITTEE = ['assigned', 'unassigned', 'conflicted', 'chair', 'conflictedChair', 'otherPanel'] as const;
const OTHERS = ['outsider', 'staff', 'administrator'] as const;
const ACTORS = [...TEAM, ...COMMITTEE, ...OTHERS] as const;
type Actor = (typeof ACTORS)[number];

/** What a person meets at a route: the thing is absent, the deed is forbidden, or the service itself answers. */
type Reception = 'absent' | 'forbidden' | 'received';

/** Who is received, and who is told that it is forbidden; to everybody else there is nothing. */
interface Rule {
  received: readonly Actor[];
  forbidden?: readonly Actor[];
}

const READS: Rule = { received: TEAM };
const TARGETS: Rule = { received: ['editsTargets', 'editsEverything', 'principal'], forbidden: ['reads'] };
const EVERYTHING: Rule = { received: ['editsEverything', 'principal'], forbidden: ['reads', 'editsTargets'] };
const PRINCIPAL: Rule = { received: ['principal'], forbidden: ['reads', 'editsTargets', 'editsEverything'] };
const CHAIRS: Rule = { received: ['chair', 'conflictedChair'] };
const FREE_CHAIR: Rule = { received: ['chair'] };
const REVIEWER: Rule = { received: ['assigned'] };

interface Ids {
  proposalId: string;
  panelId: string;
  targetId: string;
  observationId: string;
  spectrumId: string;
  submissionId: string;
  memberId: string;
  modeId: string;
  outsiderId: string;
  reviewerId: string;
}

interface Entry extends Rule {
  /** Whatever is received must change nothing that another actor's turn depends on: stale versions, unknown rows. */
  body?: (ids: Ids) => object;
  isVersioned?: boolean;
  parameters?: Record<string, string>;
}

const P = '/api/v1/proposals/{proposalId}';
const B = '/api/v1/panels/{panelId}';
const NOTHING = 'c0ffee00-0000-4000-8000-000000000000';
const TABLE = { text: 'name,ra,dec,z\nA,10,10,-1' };

/** Every route with the id of a proposal or a panel in it. One that is missing here fails the first test. */
const OF_TEAMS: Record<string, Entry> = {
  [`GET ${P}`]: READS,
  [`PATCH ${P}`]: { ...EVERYTHING, isVersioned: true, body: () => ({ title: 'Another' }) },
  [`DELETE ${P}`]: { ...PRINCIPAL, isVersioned: true },
  [`GET ${P}/choices`]: READS,
  [`GET ${P}/case`]: READS,
  [`PUT ${P}/case/{sectionId}`]: {
    ...EVERYTHING,
    isVersioned: true,
    body: () => ({ body: 'Text' }),
    parameters: { sectionId: 'science' },
  },
  [`GET ${P}/history`]: READS,
  [`GET ${P}/members`]: READS,
  [`POST ${P}/members`]: { ...PRINCIPAL, body: () => ({ personId: NOTHING, access: 'reads' }) },
  [`POST ${P}/members/me/signature`]: READS,
  [`PATCH ${P}/members/{memberId}`]: { ...PRINCIPAL, isVersioned: true, body: () => ({ access: 'reads' }) },
  [`DELETE ${P}/members/{memberId}`]: { ...PRINCIPAL, isVersioned: true },
  [`GET ${P}/targets`]: READS,
  [`POST ${P}/targets`]: { ...TARGETS, body: () => ({ name: 'N' }) },
  [`GET ${P}/targets/cosmic-time`]: READS,
  [`GET ${P}/targets/export.csv`]: READS,
  [`POST ${P}/targets/removal`]: { ...TARGETS, body: () => ({ targetIds: [NOTHING] }) },
  [`POST ${P}/targets/import-preview`]: { ...TARGETS, body: () => TABLE },
  [`POST ${P}/targets/import`]: { ...TARGETS, body: () => TABLE },
  [`GET ${P}/targets/{targetId}`]: READS,
  [`PATCH ${P}/targets/{targetId}`]: { ...TARGETS, isVersioned: true, body: () => ({ redshift: 9 }) },
  [`GET ${P}/targets/{targetId}/light`]: READS,
  [`GET ${P}/cosmologies`]: READS,
  [`GET ${P}/spectra`]: READS,
  [`POST ${P}/spectra`]: { ...TARGETS, body: () => ({ name: 'S', text: 'too short' }) },
  [`DELETE ${P}/spectra/{spectrumId}`]: TARGETS,
  [`GET ${P}/observations`]: READS,
  [`POST ${P}/observations/apply`]: {
    ...TARGETS,
    body: ({ modeId }) => ({ modeId, goal: GOAL, conditions: CONDITIONS, targetIds: [NOTHING] }),
  },
  [`PATCH ${P}/observations/{observationId}`]: { ...TARGETS, isVersioned: true, body: () => ({ repeatCount: 2 }) },
  [`POST ${P}/observations/removal`]: { ...TARGETS, body: () => ({ observationIds: [NOTHING] }) },
  [`GET ${P}/time-request`]: READS,
  [`GET ${P}/checks`]: READS,
  [`GET ${P}/submissions`]: READS,
  [`POST ${P}/submissions`]: PRINCIPAL,
  [`GET ${P}/submissions/{submissionId}`]: READS,
  [`POST ${P}/withdrawal`]: PRINCIPAL,
};

const OF_COMMITTEES: Record<string, Entry> = {
  [`GET ${B}`]: CHAIRS,
  [`GET ${B}/ranking`]: CHAIRS,
  [`GET ${B}/ranking.csv`]: CHAIRS,
  [`POST ${B}/assignments`]: {
    ...FREE_CHAIR,
    body: ({ proposalId, outsiderId }) => ({ proposalId, personId: outsiderId, isLead: false }),
  },
  // Of a review that was begun: refused to whoever may ask.
  [`DELETE ${B}/assignments/{proposalId}/{personId}`]: FREE_CHAIR,
  [`POST ${B}/automatic-assignment`]: { ...CHAIRS, body: () => ({ reviewersPerProposal: 1 }) },
  [`PUT ${B}/awards/{proposalId}`]: {
    ...FREE_CHAIR,
    isVersioned: true,
    body: () => ({ hours: 4000, moonClass: 'dark', standing: 'firm' }),
  },
  [`DELETE ${B}/awards/{proposalId}`]: { ...FREE_CHAIR, isVersioned: true },
  // Refused to whoever may ask: a proposal that no chair may see is undecided.
  [`POST ${B}/finalisation`]: CHAIRS,
  [`GET /api/v1/reviews/{proposalId}`]: REVIEWER,
  [`PUT /api/v1/reviews/{proposalId}`]: { ...REVIEWER, isVersioned: true, body: () => ({ confidentialComment: 'x' }) },
};

/** It changes what its sender sees afterwards, and comes last. */
const CONFLICT = 'POST /api/v1/reviews/{proposalId}/conflict';
const DECLARED = { reason: 'We work together.' };

const METHODS = ['get', 'post', 'put', 'patch', 'delete'] as const;

describe('who is received where', () => {
  let app: TestApp;
  const people = {} as Record<Actor, TestPerson>;
  const agents = {} as Record<Actor, Agent>;

  beforeAll(async () => {
    app = await createTestApp();
    for (const actor of ACTORS) {
      people[actor] = await aPerson(app, { isStaff: actor === 'staff', isAdministrator: actor === 'administrator' });
      agents[actor] = await signedInAs(app, people[actor]);
    }
  });
  afterAll(() => app.close());

  async function receptionOf(actor: Actor, route: string, entry: Entry, ids: Ids): Promise<Reception | number> {
    const [verb = '', template = ''] = route.split(' ');
    const method = METHODS.find((name) => name.toUpperCase() === verb);
    if (method === undefined) throw new Error(`${route} has a method this test does not know.`);
    const values: Record<string, string> = { ...ids, personId: ids.reviewerId, ...entry.parameters };
    const path = template.replaceAll(/\{([^}]+)\}/g, (_, name: string) => values[name] ?? `no-${name}`);
    const request = agents[actor][method](path);
    if (entry.isVersioned === true) void request.set('If-Match', '"99999"');
    const body = entry.body?.(ids);
    const { status } = await (body === undefined ? request : request.send(body));
    if (status === 404) return 'absent';
    if (status === 403) return 'forbidden';
    return [200, 201, 204, 409, 412, 422].includes(status) ? 'received' : status;
  }

  function expected(actor: Actor, { received, forbidden }: Rule): Reception {
    if (received.includes(actor)) return 'received';
    return forbidden?.includes(actor) === true ? 'forbidden' : 'absent';
  }

  async function walk(routes: Record<string, Entry>, ids: Ids, ruleOf: (entry: Entry) => Rule = (entry) => entry) {
    const found: string[] = [];
    const wanted: string[] = [];
    for (const [route, entry] of Object.entries(routes)) {
      for (const actor of ACTORS) {
        wanted.push(`${route}: ${actor} ${expected(actor, ruleOf(entry))}`);
        found.push(`${route}: ${actor} ${await receptionOf(actor, route, entry, ids)}`);
      }
    }
    expect(found).toEqual(wanted);
  }

  /** Panel members and team as the matrix names them. */
  async function seat(panelId: string): Promise<void> {
    await app.db.insert(panelMembers).values(
      COMMITTEE.filter((actor) => actor !== 'otherPanel').map((actor) => ({
        panelId,
        personId: people[actor].id,
        role: actor === 'chair' || actor === 'conflictedChair' ? ('chair' as const) : ('member' as const),
      })),
    );
  }

  async function seatElsewhere(semesterId: string): Promise<void> {
    const other = await aPanel(app, { semesterId });
    await app.db.insert(panelMembers).values({ panelId: other.id, personId: people.otherPanel.id, role: 'chair' });
  }

  async function joinTeam(proposalId: string): Promise<string> {
    const rows = await app.db
      .insert(proposalMembers)
      .values(
        (['reads', 'editsTargets', 'editsEverything'] as const).map((access) => ({
          proposalId,
          personId: people[access].id,
          access,
        })),
      )
      .returning();
    // Somebody beside those who ask: leaving is everybody's own affair.
    const [other] = await app.db
      .insert(proposalMembers)
      .values({ proposalId, personId: (await aPerson(app)).id, access: 'reads' })
      .returning();
    if (rows.length !== 3 || other === undefined) throw new Error('The team was not stored.');
    return other.id;
  }

  async function assignAndConflict(proposal: { id: string; panelId: string | null }): Promise<void> {
    await anAssignment(app, proposal, people.conflicted);
    await app.db.insert(conflicts).values(
      (['conflicted', 'conflictedChair'] as const).map((actor) => ({
        proposalId: proposal.id,
        personId: people[actor].id,
        kind: 'declared' as const,
        reason: 'Declared before.',
      })),
    );
  }

  /** A draft in an open semester whose panel sits already and was even given the draft to read. */
  async function aDraftOfAll(): Promise<Ids> {
    const semester = await anOpenSemester(app);
    const panel = await aPanel(app, { semesterId: semester.id });
    await seat(panel.id);
    await seatElsewhere(semester.id);
    const draft = await aDraft(app, { semesterId: semester.id, principal: people.principal });
    const memberId = await joinTeam(draft.proposalId);
    const text = Array.from({ length: 20 }, (_, index) => `${100 + 60 * index} 1`).join('\n');
    const { body: spectrum } = await draft.pi.post(`${draft.base}/spectra`).send({ name: 'Flat', text }).expect(201);
    const { spectrumId } = spectrum as { spectrumId: string };
    // In use, so that nobody can remove it.
    const { targetId } = await aTarget(draft, {
      light: { kind: 'apparentMagnitude', magnitude: 22, bandId: 'r', spectrum: { kind: 'uploaded', spectrumId } },
    });
    const modeId = await planAll(app, draft);
    const { body } = await draft.pi.get(`${draft.base}/observations`).expect(200);
    await app.db.update(proposals).set({ panelId: panel.id }).where(eq(proposals.id, draft.proposalId));
    await anAssignment(app, { id: draft.proposalId, panelId: panel.id }, people.assigned);
    return {
      proposalId: draft.proposalId,
      panelId: panel.id,
      targetId,
      observationId: body.rows[0].observationId,
      spectrumId,
      submissionId: NOTHING,
      memberId,
      modeId,
      outsiderId: people.outsider.id,
      reviewerId: people.assigned.id,
    };
  }

  /** A proposal under review, with a reviewer who has begun and an award. */
  async function underReview(): Promise<Ids & { row: { id: string; panelId: string | null } }> {
    const semester = await aSemester(app);
    const panel = await aPanel(app, { semesterId: semester.id });
    await seat(panel.id);
    await seatElsewhere(semester.id);
    const row = await aSubmittedProposal(app, panel, { principal: people.principal });
    await aReview(app, row, people.assigned, 7);
    await assignAndConflict(row);
    await app.db.insert(awards).values({
      proposalId: row.id,
      hours: 5,
      moonClass: 'dark',
      standing: 'firm',
      decidedBy: people.chair.id,
    });
    // Hidden from both chairs and undecided: nobody can make the panel final. It has its reviewer.
    const hidden = await aSubmittedProposal(app, panel);
    await anAssignment(app, hidden, people.unassigned);
    await app.db.insert(conflicts).values(
      (['chair', 'conflictedChair'] as const).map((actor) => ({
        proposalId: hidden.id,
        personId: people[actor].id,
        kind: 'declared' as const,
        reason: 'Both.',
      })),
    );
    const memberId = await joinTeam(row.id);
    const [submission] = await app.db.select().from(submissions).where(eq(submissions.proposalId, row.id));
    const { mode } = await aMode(app);
    return {
      row,
      proposalId: row.id,
      panelId: panel.id,
      targetId: NOTHING,
      observationId: NOTHING,
      spectrumId: NOTHING,
      submissionId: submission?.id ?? NOTHING,
      memberId,
      modeId: mode.id,
      outsiderId: people.outsider.id,
      reviewerId: people.assigned.id,
    };
  }

  const nobody = (): Rule => ({ received: [] });
  const isOfProposal = ([route]: [string, Entry]) => route.includes('{proposalId}');
  const onProposals = Object.fromEntries(Object.entries(OF_COMMITTEES).filter(isOfProposal));
  /** Without those that ask for rows only a draft of this test has. */
  const reading = Object.fromEntries(
    Object.entries(OF_TEAMS).filter(([route]) => route.startsWith('GET') && !/targetId|observationId/.test(route)),
  );

  it('is written down for every documented route with the id of a proposal or a panel', async () => {
    const { body } = await app.http().get('/api/v1/openapi.json').expect(200);
    const documented = Object.entries(body.paths as Record<string, object>).flatMap(([path, methods]) =>
      /\{(?:proposalId|panelId)\}/.test(path)
        ? Object.keys(methods).map((method) => `${method.toUpperCase()} ${path}`)
        : [],
    );
    const written = [...Object.keys(OF_TEAMS), ...Object.keys(OF_COMMITTEES), CONFLICT];
    expect(documented.sort()).toEqual(written.sort());
  });

  it('on a draft: the team by its access, and to staff, administrators and the committee it is absent', async () => {
    const ids = await aDraftOfAll();
    const routes = { ...OF_TEAMS };
    // A draft has no submission to read.
    delete routes[`GET ${P}/submissions/{submissionId}`];
    await walk(routes, ids);
    await walk(onProposals, ids, (entry) =>
      // Before the deadline a chair hears that it is too early, whatever the proposal.
      entry === OF_COMMITTEES[`POST ${B}/assignments`] ? CHAIRS : nobody(),
    );
  });

  it('on a submitted proposal before the deadline: the team alone', async () => {
    const ids = await aDraftOfAll();
    await app.db.update(proposals).set({ state: 'submitted' }).where(eq(proposals.id, ids.proposalId));
    const [submission] = await app.db
      .insert(submissions)
      .values({
        proposalId: ids.proposalId,
        number: 1,
        submittedBy: people.principal.id,
        content: {} as never,
        fingerprint: 'f',
        requestedHours: { dark: 1, grey: 0, bright: 0 },
        targetCount: 1,
      })
      .returning();
    expect(submission).toBeDefined();
    await walk(onProposals, ids, (entry) => (entry === OF_COMMITTEES[`POST ${B}/assignments`] ? CHAIRS : nobody()));
    for (const actor of ACTORS) {
      const { body } = await agents[actor].get('/api/v1/reading-list');
      expect(JSON.stringify(body)).not.toContain(ids.proposalId);
    }
    const { body: panel } = await agents.chair.get(`/api/v1/panels/${ids.panelId}`).expect(200);
    expect(panel).toMatchObject({ proposals: [], hiddenCount: 0 });
    const early = await agents.chair
      .post(`/api/v1/panels/${ids.panelId}/automatic-assignment`)
      .send({ reviewersPerProposal: 2 })
      .expect(409);
    expect(early.body).toMatchObject({ code: 'wrong-state', detail: expect.stringContaining('deadline') });
  });

  it('under review, and after a withdrawal', async () => {
    const ids = await underReview();
    await walk(OF_COMMITTEES, ids);
    await walk(reading, ids);
    expect((await app.db.select().from(assignments).where(eq(assignments.proposalId, ids.proposalId))).length).toBe(2);

    await agents.principal.post(`/api/v1/proposals/${ids.proposalId}/withdrawal`);
    await walk(onProposals, ids, nobody);
    await walk(reading, ids);
    const { body: panel } = await agents.chair.get(`/api/v1/panels/${ids.panelId}`).expect(200);
    const { body: ranking } = await agents.chair.get(`/api/v1/panels/${ids.panelId}/ranking`).expect(200);
    expect(JSON.stringify([panel, ranking])).not.toContain(ids.proposalId);
  });

  it('when the outcome is stored: reviewers and chairs still read, and drafts’ routes stay the team’s', async () => {
    const ids = await underReview();
    await app.db.update(proposals).set({ state: 'awarded' }).where(eq(proposals.id, ids.proposalId));
    await walk(OF_COMMITTEES, ids);
    await walk(reading, ids);
  });

  it('declaring a conflict: the reviewer it is assigned to and the chair', async () => {
    const ids = await underReview();
    const entry: Entry = { received: ['assigned', 'chair'], body: () => DECLARED };
    await walk({ [CONFLICT]: entry }, ids);
    // From then on it is absent to both.
    await walk(onProposals, ids, nobody);
  });
});
