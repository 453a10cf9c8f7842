import { mkdirSync, realpathSync } from 'node:fs';
import net from 'node:net';
import os from 'node:os';
import path from 'node:path';
import process from 'node:process';
import { shortHash } from '../config/config.js';

/** Another process holds the data folder. Two processes on one embedded database would lose each other's writes silently. */
export class DataFolderInUse extends Error {
  override readonly name = 'DataFolderInUse';
  constructor(dataDir: string) {
    super(
      `Another Faintward process uses the data folder ${dataDir}. Stop it first, or give this one its own folder with DATA_DIR.`,
    );
  }
}

/**
 * Takes the data folder for this process and returns what gives it back.
 *
 * The lock is a listening local socket named after the folder's real path: the kernel frees it when the process ends in
 * whatever way, so a killed process leaves nothing to clean up. On Linux the name is in the abstract namespace, which is
 * shared by one machine's network namespace: two containers that mount one folder do not see each other's lock.
 *
 * @throws {DataFolderInUse} when another process holds it
 */
export async function lockDataFolder(dataDir: string): Promise<() => Promise<void>> {
  mkdirSync(dataDir, { recursive: true });
  const name = `faintward-${shortHash(realpathSync(dataDir))}`;
  const address =
    process.platform === 'linux'
      ? `\0${name}`
      : process.platform === 'win32'
        ? `\\\\.\\pipe\\${name}`
        : path.join(os.tmpdir(), `${name}.sock`);
  const server = net.createServer((socket) => socket.destroy());
  await new Promise<void>((resolve, reject) => {
    server.once('error', (error: NodeJS.ErrnoException) =>
      reject(error.code === 'EADDRINUSE' ? new DataFolderInUse(dataDir) : error),
    );
    server.listen(address, resolve);
  });
  server.unref();
  return () => new Promise<void>((resolve) => server.close(() => resolve()));
}
