import { readFileSync } from 'node:fs';
import path from 'node:path';

/** Root of the repository: the same from the sources and from the build. */
export const REPOSITORY_ROOT = path.resolve(import.meta.dirname, '../../..');

/** Version of the whole application. */
export const VERSION = (
  JSON.parse(readFileSync(path.join(REPOSITORY_ROOT, 'package.json'), 'utf8')) as { version: string }
).version;
