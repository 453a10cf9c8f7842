import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { aPerson, signedInAs } from '../../factories/people.js';
import { aDraft, aTeamMember } from '../../factories/proposals.js';
import { createTestApp, type TestApp } from '../support/app.js';

let app: TestApp;
beforeAll(async () => {
  app = await createTestApp();
});
afterAll(() => app.close());

interface Row {
  memberId: string;
  personId: string;
  access: string;
  isPrincipal: boolean;
  signedAt: string | null;
  isMe: boolean;
  version: number;
}

describe('a team', () => {
  it('is made by its principal investigator, who is its first member', async () => {
    const draft = await aDraft(app);
    const person = await aPerson(app);
    const members = `${draft.base}/members`;
    const { body } = await draft.pi.post(members).send({ personId: person.id, access: 'editsTargets' }).expect(201);
    expect(body.rows.map(({ isPrincipal, isMe, access }: Row) => [isPrincipal, isMe, access])).toEqual([
      [true, true, 'editsEverything'],
      [false, false, 'editsTargets'],
    ]);
    const again = await draft.pi.post(members).send({ personId: person.id, access: 'reads' }).expect(409);
    expect(again.body.code).toBe('already-exists');
    await draft.pi
      .post(members)
      .send({ personId: '3f0d4c5e-8a35-4c1b-9d5c-0f1a2b3c4d5e', access: 'reads' })
      .expect(422);
    await (await signedInAs(app, person)).get(draft.base).expect(200);
  });

  it('lets its members neither invite, nor raise themselves, nor remove others', async () => {
    const draft = await aDraft(app);
    const member = await aTeamMember(app, draft, 'editsEverything');
    const outsider = await aPerson(app);
    const members = `${draft.base}/members`;
    const rows = (await member.agent.get(members).expect(200)).body.rows as Row[];
    const principal = rows.find(({ isPrincipal }) => isPrincipal);
    const own = rows.find(({ isMe }) => isMe);
    await member.agent.post(members).send({ personId: outsider.id, access: 'reads' }).expect(403);
    await member.agent
      .patch(`${members}/${own?.memberId}`)
      .set('If-Match', '"1"')
      .send({ access: 'editsEverything' })
      .expect(403);
    await member.agent.delete(`${members}/${principal?.memberId}`).set('If-Match', '"1"').expect(403);
  });

  it('lets a member leave, who then finds the proposal absent', async () => {
    const draft = await aDraft(app);
    const member = await aTeamMember(app, draft, 'reads');
    const rows = (await member.agent.get(`${draft.base}/members`).expect(200)).body.rows as Row[];
    const own = rows.find(({ isMe }) => isMe);
    const { body } = await member.agent
      .delete(`${draft.base}/members/${own?.memberId}`)
      .set('If-Match', '"1"')
      .expect(200);
    expect(body.rows).toEqual([]);
    await member.agent.get(draft.base).expect(404);
    expect((await draft.pi.get(`${draft.base}/members`).expect(200)).body.rows).toHaveLength(1);
  });

  it('keeps exactly one principal investigator', async () => {
    const draft = await aDraft(app);
    const [principal] = (await draft.pi.get(`${draft.base}/members`).expect(200)).body.rows as Row[];
    const url = `${draft.base}/members/${principal?.memberId}`;
    await draft.pi.delete(url).set('If-Match', '"1"').expect(409);
    await draft.pi.patch(url).set('If-Match', '"1"').send({ access: 'reads' }).expect(409);
  });

  it('changes access with the version of the member, and takes effect at once', async () => {
    const draft = await aDraft(app);
    const member = await aTeamMember(app, draft, 'reads');
    const rows = (await draft.pi.get(`${draft.base}/members`).expect(200)).body.rows as Row[];
    const url = `${draft.base}/members/${rows.find(({ isPrincipal }) => !isPrincipal)?.memberId}`;
    const target = { name: 'N', rightAscensionDeg: 1, declinationDeg: 1, redshift: 1 };
    await member.agent.post(`${draft.base}/targets`).send(target).expect(403);
    await draft.pi.patch(url).set('If-Match', '"1"').send({ access: 'editsTargets' }).expect(200);
    await draft.pi.patch(url).set('If-Match', '"1"').send({ access: 'reads' }).expect(412);
    await member.agent.post(`${draft.base}/targets`).send(target).expect(201);
  });

  it('is signed by each for themselves, once', async () => {
    const draft = await aDraft(app);
    const member = await aTeamMember(app, draft, 'reads');
    const sign = async () =>
      ((await member.agent.post(`${draft.base}/members/me/signature`).expect(200)).body.rows as Row[]).find(
        ({ isMe }) => isMe,
      );
    const first = await sign();
    expect(first?.signedAt).not.toBeNull();
    expect((await sign())?.signedAt).toBe(first?.signedAt);
  });
});
