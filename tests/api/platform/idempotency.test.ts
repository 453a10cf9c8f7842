import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { DomainError } from '../../../apps/api/src/platform/domain-error.js';
import { IdempotencyService } from '../../../apps/api/src/platform/idempotency.js';
import { aPerson } from '../../factories/people.js';
import { createTestApp, type TestApp } from '../support/app.js';

describe('an Idempotency-Key', () => {
  let app: TestApp;
  let service: IdempotencyService;
  let personId: string;

  beforeAll(async () => {
    app = await createTestApp();
    service = app.get(IdempotencyService);
    personId = (await aPerson(app)).id;
  });
  afterAll(() => app.close());

  it('makes a repeated request get the first answer, without doing the work again', async () => {
    let workCount = 0;
    const work = async () => ({ number: (workCount += 1) });
    const request = { personId, key: 'first-key', route: 'awards', body: { a: 1, b: [2, { c: 3, d: 4 }] } };
    expect(await service.idempotent(request, work)).toEqual({ number: 1 });
    expect(await service.idempotent({ ...request, body: { b: [2, { d: 4, c: 3 }], a: 1 } }, work)).toEqual({
      number: 1,
    });
    expect(workCount).toBe(1);
  });

  it('refuses another request under the same key', async () => {
    const work = async () => 'done';
    await service.idempotent({ personId, key: 'second-key', route: 'awards', body: { hours: 3 } }, work);
    await expect(
      service.idempotent({ personId, key: 'second-key', route: 'awards', body: { hours: 4 } }, work),
    ).rejects.toMatchObject({ code: 'idempotency-mismatch' });
  });

  it('is one person’s and one operation’s own', async () => {
    const other = await aPerson(app);
    const answers = await Promise.all(
      [
        { personId, route: 'awards' },
        { personId, route: 'imports' },
        { personId: other.id, route: 'awards' },
      ].map((part, index) => service.idempotent({ ...part, key: 'third-key', body: {} }, async () => index)),
    );
    expect(answers).toEqual([0, 1, 2]);
  });

  it('does not remember work that failed', async () => {
    const request = { personId, key: 'fourth-key', route: 'awards', body: {} };
    await expect(
      service.idempotent(request, () => Promise.reject(new DomainError('wrong-state', 'Not yet.'))),
    ).rejects.toMatchObject({ code: 'wrong-state' });
    expect(await service.idempotent(request, async () => 'now')).toBe('now');
  });

  it('lets only one of two simultaneous requests do the work', async () => {
    let workCount = 0;
    const request = { personId, key: 'fifth-key', route: 'awards', body: {} };
    const work = async () => {
      workCount += 1;
      await new Promise((resolve) => setTimeout(resolve, 50));
      return { number: workCount };
    };
    const answers = await Promise.all(Array.from({ length: 5 }, () => service.idempotent(request, work)));
    expect(answers).toEqual(Array.from({ length: 5 }, () => ({ number: 1 })));
    expect(workCount).toBe(1);
  });
});
