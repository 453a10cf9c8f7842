import { readDelimitedText } from '@faintward/tables';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { awards } from '../../../apps/api/src/database/schema/awards.js';
import { conflicts } from '../../../apps/api/src/database/schema/assignments.js';
import { reviews } from '../../../apps/api/src/database/schema/reviews.js';
import {
  aPanel,
  aPanelMember,
  aReview,
  aSemester,
  aSubmittedProposal,
  anAssignment,
} from '../../factories/committee.js';
import { aPerson, signedInAs, type TestPerson } from '../../factories/people.js';
import { type Agent, createTestApp, type TestApp } from '../support/app.js';

describe('the ranking', () => {
  let app: TestApp;
  let panel: Awaited<ReturnType<typeof aPanel>>;
  let chair: TestPerson;
  let agent: Agent;
  let first: TestPerson;
  let second: TestPerson;
  let third: TestPerson;
  let path: string;

  beforeAll(async () => {
    app = await createTestApp();
  });
  beforeEach(async () => {
    await app.empty();
    const semester = await aSemester(app, { hours: { dark: 30, grey: 20, bright: 0 } });
    panel = await aPanel(app, { semesterId: semester.id });
    chair = await aPanelMember(app, panel, 'chair');
    agent = await signedInAs(app, chair);
    first = await aPanelMember(app, panel, 'member', { givenName: 'Ada', familyName: 'Aster' });
    second = await aPanelMember(app, panel, 'member', { givenName: 'Ben', familyName: 'Briar' });
    third = await aPanelMember(app, panel, 'member', { givenName: 'Cal', familyName: 'Cedar' });
    path = `/api/v1/panels/${panel.id}/ranking`;
  });
  afterAll(() => app.close());

  async function scoredProposal(title: string, scores: number[], dark: number, options: object = {}) {
    const proposal = await aSubmittedProposal(app, panel, {
      title,
      requestedHours: { dark, grey: 0, bright: 0 },
      ...options,
    });
    for (const [index, score] of scores.entries()) {
      const reviewer = [first, second, third][index];
      if (reviewer !== undefined) await aReview(app, proposal, reviewer, score);
    }
    return proposal;
  }

  it('orders by the raw mean, with spread, range and counts', async () => {
    await scoredProposal('good', [7, 8, 9], 5);
    await scoredProposal('best', [9, 9.5, 10], 5);
    const half = await scoredProposal('one review', [6], 5);
    await anAssignment(app, half, second);
    await scoredProposal('unread', [], 5);
    const { body } = await agent.get(path).expect(200);
    expect(body.rows.map((row: { title: string; rank: number | null }) => [row.title, row.rank])).toEqual([
      ['best', 1],
      ['good', 2],
      ['one review', 3],
      ['unread', null],
    ]);
    // Sample standard deviation of 7, 8, 9 is 1.
    expect(body.rows[1]).toMatchObject({ meanScore: 8, spread: 1, lowestScore: 7, highestScore: 9, scoreCount: 3 });
    expect(body.rows[1].scores).toEqual([
      { reviewerName: 'Ada Aster', score: 7 },
      { reviewerName: 'Ben Briar', score: 8 },
      { reviewerName: 'Cal Cedar', score: 9 },
    ]);
    expect(body.rows[2]).toMatchObject({ spread: null, scoreCount: 1, assignedCount: 2 });
    expect(body.rows[3]).toMatchObject({ meanScore: null, spread: null, lowestScore: null, scores: [] });
  });

  it('lets equal means share a rank, the labels deciding their order, and skips the ranks they use up', async () => {
    await scoredProposal('c', [7, 7], 1);
    await scoredProposal('a', [8, 8], 1);
    await scoredProposal('b', [9, 7], 1);
    await scoredProposal('d', [1, 2], 1);
    const { body } = await agent.get(path).expect(200);
    expect(body.rows.map((row: { title: string; rank: number }) => [row.title, row.rank])).toEqual([
      ['a', 1],
      ['b', 1],
      ['c', 3],
      ['d', 4],
    ]);
  });

  it('counts no review that is not complete', async () => {
    const proposal = await scoredProposal('half done', [8], 5);
    await anAssignment(app, proposal, second);
    await app.db.insert(reviews).values({
      proposalId: proposal.id,
      personId: second.id,
      answers: { merit: { kind: 'score', score: 1 } },
      overallScore: 1,
      isComplete: false,
    });
    const { body } = await agent.get(path).expect(200);
    expect(body.rows[0]).toMatchObject({ meanScore: 8, scoreCount: 1, assignedCount: 2 });
  });

  it('cumulates requested hours per moon class and draws the line where one runs out', async () => {
    await scoredProposal('1st', [9, 9], 20);
    await scoredProposal('2nd', [8, 8], 10);
    await scoredProposal('3rd', [7, 7], 1);
    await scoredProposal('grey', [6, 6], 0, { requestedHours: { dark: 0, grey: 20, bright: 0 } });
    const { body } = await agent.get(path).expect(200);
    expect(body.availableHours).toEqual({ dark: 30, grey: 20, bright: 0 });
    expect(body.rows.map((row: { cumulatedHours: { dark: number } }) => row.cumulatedHours.dark)).toEqual([
      20, 30, 31, 31,
    ]);
    expect(
      body.rows.map((row: { isAboveCut: boolean; exhaustedMoonClass: string | null }) => [
        row.isAboveCut,
        row.exhaustedMoonClass,
      ]),
    ).toEqual([
      [true, null],
      [true, null],
      [false, 'dark'],
      [true, null],
    ]);
    expect(body.cutAfterRow).toBe(2);
    expect(body.requestedHours).toEqual({ dark: 31, grey: 20, bright: 0 });
  });

  it('moves the line with the awards, which count instead of what was asked for', async () => {
    const best = await scoredProposal('1st', [9, 9], 20);
    await scoredProposal('2nd', [8, 8], 10);
    await scoredProposal('3rd', [7, 7], 1);
    await app.db
      .insert(awards)
      .values({ proposalId: best.id, hours: 15, moonClass: 'dark', standing: 'firm', decidedBy: chair.id });
    const { body } = await agent.get(path).expect(200);
    expect(body.rows.map((row: { cumulatedHours: { dark: number } }) => row.cumulatedHours.dark)).toEqual([15, 25, 26]);
    expect(body.cutAfterRow).toBeNull();
    expect(body.awardedHours).toEqual({ dark: 15, grey: 0, bright: 0 });
    expect(body.rows[0].award).toEqual({ hours: 15, moonClass: 'dark', standing: 'firm', reason: '', version: 1 });
  });

  it('tells reviewers’ means, and leniency as the offset between reviewers of the same proposals', async () => {
    // The second reviewer gives two points more on both: offsets −1 and +1 about their mean.
    await scoredProposal('x', [5, 7], 1);
    await scoredProposal('y', [6, 8], 1);
    const { body } = await agent.get(path).expect(200);
    expect(body.reviewers).toHaveLength(2);
    expect(body.reviewers[0]).toMatchObject({ name: 'Ada Aster', meanScore: 5.5, scoreCount: 2 });
    expect(body.reviewers[0].leniency).toBeCloseTo(-1, 9);
    expect(body.reviewers[1].leniency).toBeCloseTo(1, 9);
  });

  it('tells no leniency of a reviewer who shares no proposal with anybody', async () => {
    await scoredProposal('x', [5], 1);
    const { body } = await agent.get(path).expect(200);
    expect(body.reviewers).toEqual([{ name: 'Ada Aster', meanScore: 5, scoreCount: 1, leniency: null }]);
  });

  it('is the same, but for the count, as if the chair’s conflicts were not in the panel at all', async () => {
    await scoredProposal('open 1', [9, 6], 12);
    await scoredProposal('open 2', [5, 4], 12);
    const without = (await agent.get(path).expect(200)).body;
    const declared = await scoredProposal('rival', [10, 10, 10], 25);
    await app.db.insert(conflicts).values({ proposalId: declared.id, personId: chair.id, kind: 'declared' });
    const own = await scoredProposal('own', [1, 1, 1], 25, { coInvestigators: [chair] });
    for (const hidden of [declared, own]) {
      await app.db
        .insert(awards)
        .values({ proposalId: hidden.id, hours: 7, moonClass: 'dark', standing: 'firm', decidedBy: first.id });
    }
    const withHidden = (await agent.get(path).expect(200)).body;
    expect(withHidden).toEqual({ ...without, hiddenCount: 2 });
    const csv = await agent.get(`${path}.csv`).expect(200);
    expect(csv.text).not.toMatch(/rival|own/);
  });

  it('in an anonymised semester does not tell the partner until it is final', async () => {
    const semester = await aSemester(app, { isAnonymised: true });
    const anonymised = await aPanel(app, { semesterId: semester.id });
    await aSubmittedProposal(app, anonymised);
    const other = await signedInAs(app, await aPanelMember(app, anonymised, 'chair'));
    const { body } = await other.get(`/api/v1/panels/${anonymised.id}/ranking`).expect(200);
    expect(body.rows[0].partnerName).toBeNull();
    expect(JSON.stringify(body)).not.toMatch(/Pat Principal|Partner of the team/);
    await scoredProposal('named', [5], 1);
    expect((await agent.get(path)).body.rows[0].partnerName).toBe('Partner of the team');
  });

  it('is absent for members, staff, administrators and teams, in the words for what does not exist', async () => {
    const proposal = await scoredProposal('x', [5], 1);
    const absent = await agent.get('/api/v1/panels/c0ffee00-0000-4000-8000-000000000000/ranking').expect(404);
    for (const person of [
      first,
      proposal.principal,
      await aPerson(app, { isStaff: true }),
      await aPerson(app, { isAdministrator: true }),
    ]) {
      const other = await signedInAs(app, person);
      for (const address of [path, `${path}.csv`]) {
        const answer = await other.get(address);
        expect([answer.status, answer.body.detail]).toEqual([404, absent.body.detail]);
      }
    }
  });

  it('is empty for a panel without proposals', async () => {
    const { body } = await agent.get(path).expect(200);
    expect(body).toMatchObject({ rows: [], reviewers: [], cutAfterRow: null, hiddenCount: 0, isFinal: false });
  });

  describe('as a table', () => {
    it('has one line a proposal in rank order, which reads back as it was', async () => {
      await scoredProposal('second, with "quotes"', [5, 6], 3);
      await scoredProposal('first', [9, 8], 4);
      const { text, headers } = await agent.get(`${path}.csv`).expect(200);
      expect(headers['content-type']).toBe('text/csv; charset=utf-8');
      expect(headers['content-disposition']).toMatch(/^attachment; filename="[\w-]+\.csv"$/);
      const table = readDelimitedText(text, { header: 'present' });
      const column = (name: string) => table.columns.indexOf(name);
      expect(table.rows.map((row) => row[column('title')])).toEqual(['first', 'second, with "quotes"']);
      expect(table.rows.map((row) => row[column('meanScore')])).toEqual(['8.5', '5.5']);
      expect(table.rows.map((row) => row[column('cumulatedDarkHours')])).toEqual(['4', '7']);
      expect(table.rows[0]?.[column('scores')]).toBe('Ada Aster 9; Ben Briar 8');
    });

    it('computes nothing in a spreadsheet, whatever a title or a name says', async () => {
      const proposal = await scoredProposal('=HYPERLINK("http://example.test","x")', [5], 1);
      const sly = await aPanelMember(app, panel, 'member', { givenName: '@SUM(1)', familyName: 'Sly' });
      await aReview(app, proposal, sly, 6);
      const { text } = await agent.get(`${path}.csv`).expect(200);
      expect(text).toContain(`"'=HYPERLINK(""http://example.test"",""x"")"`);
      expect(text).not.toMatch(/(^|,)"?[=+@]/m);
    });
  });
});
