import process from 'node:process';
import { InvalidConfiguration } from './config/config.js';
import { databaseFailure } from './platform/database-errors.js';
import { DataFolderInUse } from './database/lock.js';

/** A reason to stop that is the operator's to solve: told without a stack. */
export class CommandRefused extends Error {
  override readonly name = 'CommandRefused';
}

/** Runs a command to its end; on failure says why in one paragraph and ends with 1. */
export async function runCommand(command: () => Promise<void>): Promise<void> {
  try {
    await command();
  } catch (error) {
    console.error(explain(error));
    process.exitCode = 1;
    // Whatever is still open (a database, a timer) must not keep a failed command alive.
    setTimeout(() => process.exit(1), 100).unref();
  }
}

function explain(error: unknown): string {
  if (error instanceof InvalidConfiguration || error instanceof DataFolderInUse || error instanceof CommandRefused) {
    return error.message;
  }
  const { code, port, address } = error as { code?: unknown; port?: unknown; address?: unknown };
  if (code === 'EADDRINUSE')
    return `Port ${String(port)} on ${String(address)} is taken. Stop what uses it, or choose another with PORT.`;
  if (code === 'EACCES' && port !== undefined)
    return `This account may not listen on port ${String(port)}. Choose one above 1023 with PORT.`;
  if (code === 'ECONNREFUSED' || code === 'ENOTFOUND') return 'The database server of DATABASE_URL cannot be reached.';
  const failure = databaseFailure(error);
  // The text of a failed query holds its parameters.
  if (failure !== undefined)
    return `The database refused (${failure.code}${failure.constraint ? `, ${failure.constraint}` : ''}).\n${framesOf(error)}`;
  return error instanceof Error ? (error.stack ?? error.message) : String(error);
}

function framesOf(error: unknown): string {
  return error instanceof Error
    ? (error.stack ?? '')
        .split('\n')
        .filter((line) => /^\s+at /.test(line))
        .join('\n')
    : '';
}
