import { eq } from 'drizzle-orm';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { people } from '../../../apps/api/src/database/schema/people.js';
import { DatabaseService } from '../../../apps/api/src/database/transaction.js';
import { toDomainError } from '../../../apps/api/src/platform/problem.filter.js';
import { aPerson } from '../../factories/people.js';
import { createTestApp, type TestApp } from '../support/app.js';

describe('the transaction service', () => {
  let app: TestApp;
  let database: DatabaseService;

  beforeAll(async () => {
    app = await createTestApp();
    database = app.get(DatabaseService);
  });
  afterAll(() => app.close());

  const rename = (id: string, givenName: string) =>
    database.current().update(people).set({ givenName }).where(eq(people.id, id));
  const nameOf = async (id: string) =>
    (await database.current().select().from(people).where(eq(people.id, id)))[0]?.givenName;

  it('rolls everything back when the work fails', async () => {
    const { id } = await aPerson(app, { givenName: 'Before' });
    await expect(
      database.transaction(async () => {
        await rename(id, 'After');
        throw new Error('no');
      }),
    ).rejects.toThrow('no');
    expect(await nameOf(id)).toBe('Before');
  });

  it('keeps the outer work when an inner transaction fails and is caught', async () => {
    const { id } = await aPerson(app);
    await database.transaction(async () => {
      await rename(id, 'Outer');
      await expect(
        database.transaction(async () => {
          await rename(id, 'Inner');
          throw new Error('inner');
        }),
      ).rejects.toThrow('inner');
    });
    expect(await nameOf(id)).toBe('Outer');
  });

  it('runs effects once the outermost transaction is stored, and never after a roll-back', async () => {
    const effects: string[] = [];
    await database.transaction(async () => {
      await database.transaction(async () => {
        await database.afterCommit(() => void effects.push('inner'));
      });
      await database.afterCommit(() => void effects.push('outer'));
      expect(effects).toEqual([]);
    });
    await expect(
      database.transaction(async () => {
        await database.afterCommit(() => void effects.push('rolled back'));
        throw new Error('no');
      }),
    ).rejects.toThrow('no');
    expect(effects).toEqual(['inner', 'outer']);
  });

  it('serves simultaneous read-modify-write transactions without losing one', async () => {
    const { id } = await aPerson(app, { familyName: '0' });
    await Promise.all(
      Array.from({ length: 20 }, () =>
        database.transaction(async () => {
          const [row] = await database.current().select().from(people).where(eq(people.id, id)).for('update');
          await database
            .current()
            .update(people)
            .set({ familyName: String(Number(row?.familyName) + 1) })
            .where(eq(people.id, id));
        }),
      ),
    );
    expect((await database.current().select().from(people).where(eq(people.id, id)))[0]?.familyName).toBe('20');
  });

  it('turns a violated constraint that nobody foresaw into a conflict, without the values of the query', async () => {
    const { email } = await aPerson(app);
    const failure: unknown = await aPerson(app, { email: email.toUpperCase(), passwordHash: 'secret-hash' }).catch(
      (error: unknown) => error,
    );
    const answer = toDomainError(failure);
    expect(answer.code).toBe('already-exists');
    expect(answer.message).not.toContain('secret-hash');
  });
});
