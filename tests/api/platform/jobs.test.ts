import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { outgoingMail } from '../../../apps/api/src/database/schema/accounts.js';
import { DatabaseService } from '../../../apps/api/src/database/transaction.js';
import { JobsService } from '../../../apps/api/src/platform/jobs.js';
import { MAIL_QUEUE, MailService } from '../../../apps/api/src/platform/mail/mail.service.js';
import { createTestApp, type TestApp } from '../support/app.js';

const LETTER = { to: 'somebody@institute.example', subject: 'Subject', text: 'Text', html: '<p>Text</p>' };

describe('a job', () => {
  let app: TestApp;

  afterEach(() => app.close());

  describe('worked by hand', () => {
    beforeEach(async () => {
      app = await createTestApp();
    });

    it('is stored with the transaction that is its reason, and gone with it when that fails', async () => {
      const database = app.get(DatabaseService);
      const send = () => app.get(MailService).send(LETTER);
      await expect(
        database.transaction(async () => {
          await send();
          throw new Error('no');
        }),
      ).rejects.toThrow('no');
      expect(await app.get(JobsService).drain(MAIL_QUEUE)).toBe(0);
      await database.transaction(send);
      expect(await app.get(JobsService).drain(MAIL_QUEUE)).toBe(1);
      expect(await app.db.select().from(outgoingMail)).toMatchObject([{ state: 'sent' }]);
    });

    it('does its work once although it is run twice', async () => {
      await app.get(MailService).send(LETTER);
      await app.work(MAIL_QUEUE);
      const [mail] = await app.db.select().from(outgoingMail);
      await app.get(JobsService).enqueue(MAIL_QUEUE, { mailId: mail?.id });
      await app.work(MAIL_QUEUE);
      expect(await app.db.select().from(outgoingMail)).toMatchObject([{ state: 'sent', attemptCount: 1 }]);
    });
  });

  it('is worked by itself in the running application', async () => {
    app = await createTestApp({ areJobsPolled: true });
    await app.get(MailService).send(LETTER);
    await vi.waitFor(
      async () => expect(await app.db.select().from(outgoingMail)).toMatchObject([{ state: 'sent', attemptCount: 1 }]),
      { timeout: 20_000, interval: 200 },
    );
  });
});
