import { institutions, people } from '../../apps/api/src/database/schema/people.js';
import { PasswordHasher } from '../../apps/api/src/modules/accounts/passwords.js';
import type { Agent, TestApp } from '../api/support/app.js';

/** What every person of a test signs in with. */
export const PASSWORD = 'correct horse battery staple';

let serial = 0;
let passwordHash: Promise<string> | undefined;

export type TestPerson = typeof people.$inferSelect;

/** A stored person with plausible, distinct values. */
export async function aPerson(app: TestApp, overrides: Partial<typeof people.$inferInsert> = {}): Promise<TestPerson> {
  serial += 1;
  passwordHash ??= app.get(PasswordHasher).hash(PASSWORD);
  const [person] = await app.db
    .insert(people)
    .values({
      email: `person-${serial}@institute.example`,
      givenName: `Given${serial}`,
      familyName: `Family${serial}`,
      passwordHash: await passwordHash,
      ...overrides,
    })
    .returning();
  if (person === undefined) throw new Error('An insert returned no row.');
  return person;
}

export async function anInstitution(app: TestApp, overrides: Partial<typeof institutions.$inferInsert> = {}) {
  serial += 1;
  const [institution] = await app.db
    .insert(institutions)
    .values({ name: `Institute ${serial}`, country: 'Norway', ...overrides })
    .returning();
  if (institution === undefined) throw new Error('An insert returned no row.');
  return institution;
}

/** A client that is signed in as the person. */
export async function signedInAs(app: TestApp, person: { email: string }): Promise<Agent> {
  const agent = app.agent();
  await agent.post('/api/v1/session').send({ email: person.email, password: PASSWORD }).expect(200);
  return agent;
}
