import { Injectable } from '@nestjs/common';
import { count, eq } from 'drizzle-orm';
import { Config } from '../config/config.js';
import { installationFacts } from '../database/schema/accounts.js';
import { people } from '../database/schema/people.js';
import { DatabaseService } from '../database/transaction.js';

const FACT = 'demo';

/**
 * Whether this installation shows the demo scenario. Only a database that the demo itself filled is one: its one-click
 * sign-in and open mailbox must never appear on an observatory's real data, whatever the environment says.
 */
@Injectable()
export class DemoMode {
  constructor(
    private readonly config: Config,
    private readonly database: DatabaseService,
  ) {}

  /** Called by the seed in its transaction: this database is the demo, and all its people have this password. */
  async enable(password: string): Promise<void> {
    await this.database.current().insert(installationFacts).values({ name: FACT, value: { password } });
  }

  /** The password of the demo people, or undefined outside of demo mode. */
  async findPassword(): Promise<string | undefined> {
    if (this.config.demo === 'off') return undefined;
    const [fact] = await this.database
      .current()
      .select({ value: installationFacts.value })
      .from(installationFacts)
      .where(eq(installationFacts.name, FACT));
    return (fact?.value as { password: string } | undefined)?.password;
  }

  /** An empty database gets the demo when it is the embedded one, or when the environment asks for it. */
  async shouldSeed(): Promise<boolean> {
    if (this.config.demo === 'off') return false;
    if (this.config.demo === 'auto' && this.database.engine === 'server') return false;
    const [total] = await this.database.current().select({ peopleCount: count() }).from(people);
    return total?.peopleCount === 0;
  }
}
