import { proposalMembers } from '../../apps/api/src/database/schema/proposals.js';
import type { TeamAccess } from '@faintward/contracts/permissions';
import type { Agent, TestApp } from '../api/support/app.js';
import { aMode, aPanel, aSemester, inDays } from './committee.js';
import { aPerson, signedInAs, type TestPerson } from './people.js';

/** A semester whose call is open for ten more days. */
export async function anOpenSemester(app: TestApp, overrides: Parameters<typeof aSemester>[1] = {}) {
  return aSemester(app, { deadlineAt: inDays(10), ...overrides });
}

export interface Draft {
  proposalId: string;
  semesterId: string;
  principal: TestPerson;
  /** A client signed in as the principal investigator. */
  pi: Agent;
  /** `/api/v1/proposals/…` */
  base: string;
}

/** A draft in an open semester, made as its principal investigator makes it. */
export async function aDraft(
  app: TestApp,
  options: { semesterId?: string; principal?: TestPerson } = {},
): Promise<Draft> {
  const semesterId = options.semesterId ?? (await anOpenSemester(app)).id;
  const principal = options.principal ?? (await aPerson(app));
  const pi = await signedInAs(app, principal);
  const created = await pi.post('/api/v1/proposals').send({ semesterId, title: 'Light from far away' }).expect(201);
  const { proposalId } = created.body as { proposalId: string };
  return { proposalId, semesterId, principal, pi, base: `/api/v1/proposals/${proposalId}` };
}

/** A member of the draft's team, signed in. */
export async function aTeamMember(
  app: TestApp,
  draft: Draft,
  access: TeamAccess,
): Promise<{ person: TestPerson; agent: Agent }> {
  const person = await aPerson(app);
  await app.db
    .insert(proposalMembers)
    .values({ proposalId: draft.proposalId, personId: person.id, access, position: 1 });
  return { person, agent: await signedInAs(app, person) };
}

/** A target of about twenty-second magnitude that is up from most southern sites. */
export async function aTarget(
  draft: Draft,
  overrides: Record<string, unknown> = {},
): Promise<Record<string, unknown> & { targetId: string; version: number }> {
  const answer = await draft.pi
    .post(`${draft.base}/targets`)
    .send({
      name: 'Source',
      rightAscensionDeg: 53.1,
      declinationDeg: -27.8,
      redshift: 3,
      light: { kind: 'apparentMagnitude', magnitude: 22, bandId: 'r' },
      ...overrides,
    })
    .expect(201);
  return answer.body as Record<string, unknown> & { targetId: string; version: number };
}

export const CONDITIONS = { seeingArcsec: 0.9, airmass: 1.2, moonClass: 'dark', transparency: 'clear' };
export const GOAL = { kind: 'signalToNoise', value: 20, per: 'aperture' };

/** Applies an imaging mode to all targets. */
export async function planAll(app: TestApp, draft: Draft): Promise<string> {
  const { mode } = await aMode(app);
  await draft.pi
    .post(`${draft.base}/observations/apply`)
    .send({ modeId: mode.id, goal: GOAL, conditions: CONDITIONS, targetIds: 'all' })
    .expect(200);
  return mode.id;
}

/** A draft that passes every check. */
export async function aReadyDraft(app: TestApp): Promise<Draft & { panelId: string }> {
  const draft = await aDraft(app);
  const panel = await aPanel(app, { semesterId: draft.semesterId });
  await aTarget(draft);
  await planAll(app, draft);
  for (const sectionId of ['science', 'technical']) {
    await draft.pi
      .put(`${draft.base}/case/${sectionId}`)
      .set('If-Match', '"1"')
      .send({ body: 'Because of light.' })
      .expect(200);
  }
  await draft.pi
    .patch(draft.base)
    .set('If-Match', '"1"')
    .send({ panelId: panel.id, abstract: 'We ask for time.' })
    .expect(200);
  return { ...draft, panelId: panel.id };
}
