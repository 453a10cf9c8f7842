import process from 'node:process';
import { ReferenceFileError } from '@faintward/photometry/reference-files';
import { InvalidConfiguration } from './config/config.js';
import { DatabaseUnreadable } from './database/connection.js';
import { DataFolderInUse } from './database/lock.js';
import { databaseFailure } from './platform/database-errors.js';

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

/** What an operator reads of a failure that is theirs to solve; anything else keeps its stack. */
export function explain(error: unknown): string {
  if (
    [InvalidConfiguration, DataFolderInUse, DatabaseUnreadable, ReferenceFileError, CommandRefused].some(
      (kind) => error instanceof kind,
    )
  ) {
    return (error as Error).message;
  }
  return (
    explainFile(error) ??
    explainListening(error) ??
    explainDatabase(error) ??
    (error instanceof Error ? (error.stack ?? error.message) : String(error))
  );
}

const FILE_REASONS: Readonly<Record<string, string>> = {
  EACCES: 'this account may not',
  EPERM: 'this account may not',
  EROFS: 'the file system can only be read',
  ENOSPC: 'the disk is full',
  EDQUOT: 'the quota of this account is used up',
  ENOTDIR: 'a part of the path is not a folder',
  EEXIST: 'something else has this name',
  EISDIR: 'it is a folder',
  ENOENT: 'it does not exist',
};

function explainFile(error: unknown): string | undefined {
  const { code, path } = error as { code?: unknown; path?: unknown };
  const reason = typeof code === 'string' ? FILE_REASONS[code] : undefined;
  if (reason === undefined || typeof path !== 'string') return undefined;
  return `${path} cannot be read or written: ${reason} (${String(code)}). DATA_DIR names the folder that Faintward keeps its data in.`;
}

function explainListening(error: unknown): string | undefined {
  const { code, syscall, port, address, hostname } = error as Record<string, unknown>;
  if (code === 'EADDRINUSE')
    return `Port ${String(port)} on ${String(address)} is taken. Stop what uses it, or choose another with PORT.`;
  if (syscall === 'listen' && code === 'EACCES')
    return `This account may not listen on port ${String(port)}. Choose one above 1023 with PORT.`;
  if (syscall === 'listen') return `${String(address)} is no address of this machine (${String(code)}). Correct HOST.`;
  if (hostname !== undefined) return `There is no machine called ${String(hostname)} (${String(code)}).`;
  return undefined;
}

function explainDatabase(error: unknown): string | undefined {
  const failure = databaseFailure(error);
  switch (failure?.code) {
    case undefined:
      return undefined;
    case '08006':
      return 'The database server of DATABASE_URL cannot be reached.';
    case '28P01':
    case '28000':
      return 'The database server of DATABASE_URL does not accept this user and password.';
    case '3D000':
      return 'The database that DATABASE_URL names does not exist on its server. Create it first.';
    case '42501':
      return 'The user of DATABASE_URL may not create tables in its database.';
    default:
      // The text of a failed query holds its parameters.
      return `The database refused (${failure?.code}${failure?.constraint ? `, ${failure.constraint}` : ''}).\n${framesOf(error)}`;
  }
}

function framesOf(error: unknown): string {
  return error instanceof Error
    ? (error.stack ?? '')
        .split('\n')
        .filter((line) => /^\s+at /.test(line))
        .join('\n')
    : '';
}
