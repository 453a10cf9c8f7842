import { Injectable } from '@nestjs/common';
import { hash, verify } from '@node-rs/argon2';

/** Argon2id (the library's default variant) with OWASP's second recommended setting: 19 MiB, two passes, one lane. */
const SETTINGS = { memoryCost: 19_456, timeCost: 2, parallelism: 1 };

@Injectable()
export class PasswordHasher {
  private decoy: Promise<string> | undefined;

  /** About 50 ms of a worker thread; never call it inside a transaction. */
  hash(password: string): Promise<string> {
    return hash(password, SETTINGS);
  }

  /**
   * Whether the password fits. Without a hash (no such person, or no password yet) a decoy is checked all the same, so that
   * the time of the answer does not tell whether an e-mail address is known.
   */
  async fits(password: string, passwordHash: string | null | undefined): Promise<boolean> {
    this.decoy ??= this.hash('a password that nobody has');
    const isRight = await verify(passwordHash ?? (await this.decoy), password);
    return isRight && passwordHash != null;
  }
}
