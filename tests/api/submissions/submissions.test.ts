import { createHash } from 'node:crypto';
import { eq } from 'drizzle-orm';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { mailboxMessages } from '../../../apps/api/src/database/schema/accounts.js';
import { conflicts } from '../../../apps/api/src/database/schema/assignments.js';
import { semesters } from '../../../apps/api/src/database/schema/semesters.js';
import { canonicalJson } from '../../../apps/api/src/engine/canonical-json.js';
import { SubmissionsReadModel } from '../../../apps/api/src/modules/submissions/submissions.read-model.js';
import { MAIL_QUEUE } from '../../../apps/api/src/platform/mail/mail.service.js';
import { aPanelMember, inDays } from '../../factories/committee.js';
import { anInstitution, aPerson } from '../../factories/people.js';
import { aDraft, aReadyDraft, aTarget, aTeamMember, planAll } from '../../factories/proposals.js';
import { createTestApp, type TestApp } from '../support/app.js';

let app: TestApp;
beforeAll(async () => {
  app = await createTestApp();
});
afterAll(() => app.close());

interface Finding {
  code: string;
  severity: string;
  section: string;
}

describe('the checks', () => {
  it('of an empty draft block its submission and link to where each is mended', async () => {
    const draft = await aDraft(app);
    const { body } = await draft.pi.get(`${draft.base}/checks`).expect(200);
    expect(body.canSubmit).toBe(false);
    expect(body.findings.map(({ code, severity, section }: Finding) => [code, severity, section])).toEqual([
      ['noTargets', 'blocking', 'targets'],
      ['emptySection', 'blocking', 'case'],
      ['emptySection', 'blocking', 'case'],
      ['noAbstract', 'warning', 'submit'],
      ['noPanel', 'blocking', 'submit'],
    ]);
    const refused = await draft.pi.post(`${draft.base}/submissions`).expect(422);
    expect(refused.body.code).toBe('checks-failed');
    expect(refused.body.fieldErrors.map(({ path }: { path: string }) => path)).toEqual([
      'targets',
      'case.science',
      'case.technical',
      'submit.panelId',
    ]);
    expect((await draft.pi.get(draft.base).expect(200)).body.state).toBe('draft');
  });

  it('find targets without brightness or observation, doubles, and those never up', async () => {
    const draft = await aReadyDraft(app);
    await aTarget(draft, { name: 'Double' });
    await aTarget(draft, { name: 'Dark', rightAscensionDeg: 80, light: null });
    await aTarget(draft, { name: 'North', declinationDeg: 85 });
    const codes = async () =>
      new Set(
        (await draft.pi.get(`${draft.base}/checks`).expect(200)).body.findings.map(
          ({ code, severity }: Finding) => `${severity} ${code}`,
        ),
      );
    expect(await codes()).toEqual(
      new Set(['warning noBrightness', 'warning neverUp', 'warning duplicate', 'warning withoutObservation']),
    );
    await planAll(app, draft);
    const planned = await codes();
    expect(planned).toContain('blocking noBrightness');
    expect(planned).toContain('blocking lackingEstimate');
  });

  it('count the words of a section that is too long', async () => {
    const draft = await aReadyDraft(app);
    await draft.pi
      .put(`${draft.base}/case/science`)
      .set('If-Match', '"2"')
      .send({ body: 'word '.repeat(1001) })
      .expect(200);
    const { body } = await draft.pi.get(`${draft.base}/checks`).expect(200);
    expect(body.findings).toEqual([
      expect.objectContaining({
        code: 'longSection',
        severity: 'blocking',
        message: expect.stringContaining('1001 words'),
      }),
    ]);
  });

  it('warn of unsigned co-investigators without blocking', async () => {
    const draft = await aReadyDraft(app);
    const member = await aTeamMember(app, draft, 'reads');
    const { body } = await draft.pi.get(`${draft.base}/checks`).expect(200);
    expect(body).toMatchObject({ canSubmit: true, warningCount: 1, findings: [{ code: 'unsigned', section: 'team' }] });
    await member.agent.post(`${draft.base}/members/me/signature`).expect(200);
    expect((await draft.pi.get(`${draft.base}/checks`).expect(200)).body.findings).toEqual([]);
  });
});

describe('a submission', () => {
  it('freezes its content under a fingerprint that anybody can take again', async () => {
    const draft = await aReadyDraft(app);
    const { body: made } = await draft.pi.post(`${draft.base}/submissions`).expect(201);
    expect(made).toMatchObject({ number: 1, isCurrent: true, targetCount: 1 });
    // The content is answered to who asks for it: it may be large.
    expect(made).not.toHaveProperty('content');
    const { body } = await draft.pi.get(`${draft.base}/submissions/${made.submissionId}`).expect(200);
    expect(body).toMatchObject(made);
    expect(createHash('sha256').update(canonicalJson(body.content)).digest('hex')).toBe(body.fingerprint);
    const [target] = (await draft.pi.get(`${draft.base}/targets`).expect(200)).body.rows;
    await draft.pi
      .patch(`${draft.base}/targets/${target.targetId}`)
      .set('If-Match', `"${target.version}"`)
      .send({ redshift: 4 })
      .expect(200);
    const { body: later } = await draft.pi.get(`${draft.base}/submissions/${body.submissionId}`).expect(200);
    expect(later).toEqual(body);
    expect(later.content.targets[0].redshift).toBe(3);
    const read = await app.get(SubmissionsReadModel).currentContent(draft.proposalId);
    expect(read?.content).toEqual(body.content);
    expect(await app.get(SubmissionsReadModel).currentByPanel(draft.panelId)).toMatchObject([
      { proposalId: draft.proposalId, title: 'Light from far away', targetCount: 1 },
    ]);
  });

  it('can be replaced until the deadline; the last one counts', async () => {
    const draft = await aReadyDraft(app);
    await draft.pi.post(`${draft.base}/submissions`).expect(201);
    const { body: second } = await draft.pi.post(`${draft.base}/submissions`).expect(201);
    expect(second.number).toBe(2);
    const { body } = await draft.pi.get(`${draft.base}/submissions`).expect(200);
    expect(
      body.rows.map(({ number, isCurrent }: { number: number; isCurrent: boolean }) => [number, isCurrent]),
    ).toEqual([
      [2, true],
      [1, false],
    ]);
    await app.db
      .update(semesters)
      .set({ deadlineAt: inDays(-1) })
      .where(eq(semesters.id, draft.semesterId));
    expect((await draft.pi.post(`${draft.base}/submissions`).expect(409)).body.code).toBe('deadline-passed');
  });

  it('repeated with its key is made once', async () => {
    const draft = await aReadyDraft(app);
    const send = () => draft.pi.post(`${draft.base}/submissions`).set('Idempotency-Key', 'submit-once').expect(201);
    const first = await send();
    const again = await send();
    expect(again.body).toEqual(first.body);
    expect((await draft.pi.get(`${draft.base}/submissions`).expect(200)).body.rows).toHaveLength(1);
  });

  it('is the principal investigator’s to make and to withdraw', async () => {
    const draft = await aReadyDraft(app);
    const member = await aTeamMember(app, draft, 'editsEverything');
    await member.agent.post(`${draft.base}/submissions`).expect(403);
    await draft.pi.post(`${draft.base}/submissions`).expect(201);
    await member.agent.post(`${draft.base}/withdrawal`).expect(403);
    const { body } = await draft.pi.post(`${draft.base}/withdrawal`).expect(200);
    expect(body.state).toBe('withdrawn');
    expect(await app.get(SubmissionsReadModel).currentContent(draft.proposalId)).toBeUndefined();
    await draft.pi.post(`${draft.base}/withdrawal`).expect(409);
    await draft.pi.post(`${draft.base}/submissions`).expect(409);
  });

  it('sends a receipt with the fingerprint', async () => {
    const draft = await aReadyDraft(app);
    const { body } = await draft.pi.post(`${draft.base}/submissions`).expect(201);
    await app.work(MAIL_QUEUE);
    await expect
      .poll(async () =>
        app.db.select().from(mailboxMessages).where(eq(mailboxMessages.toAddress, draft.principal.email)),
      )
      .toEqual([expect.objectContaining({ textBody: expect.stringContaining(body.fingerprint) })]);
  });

  it('finds the panel members who are on the team or of an institution of the team', async () => {
    const institution = await anInstitution(app);
    const draft = await aReadyDraft(app);
    const colleague = await aPerson(app, { institutionId: institution.id });
    await draft.pi.post(`${draft.base}/members`).send({ personId: colleague.id, access: 'reads' }).expect(201);
    const panel = { id: draft.panelId };
    const neighbour = await aPanelMember(app, panel, 'member', { institutionId: institution.id });
    const judge = await aPanelMember(app, panel);
    await draft.pi.post(`${draft.base}/members`).send({ personId: judge.id, access: 'reads' }).expect(201);
    await aPanelMember(app, panel);
    await draft.pi.post(`${draft.base}/submissions`).expect(201);
    const found = await app.db.select().from(conflicts).where(eq(conflicts.proposalId, draft.proposalId));
    expect(found.map(({ personId, kind }) => [personId, kind]).sort()).toEqual(
      [
        [neighbour.id, 'institution'],
        [judge.id, 'team'],
      ].sort(),
    );
  });
});
