import { readdirSync, readFileSync } from 'node:fs';
import { type PhotometryFiles, photometryFilesFrom } from '@faintward/photometry/reference-files';

const FOLDER = new URL('../../seed/reference/', import.meta.url);

let read: PhotometryFiles | undefined;

/** The reference data of photometry as they are in the repository: libraries read no files, so their tests do. */
export function photometryFiles(): PhotometryFiles {
  return (read ??= photometryFilesFrom(referenceContents()));
}

/** Every file of reference data by name, parsed and not checked. */
export function referenceContents(): Map<string, unknown> {
  const names = readdirSync(FOLDER).filter((name) => name.endsWith('.json'));
  return new Map(names.map((name) => [name, JSON.parse(readFileSync(new URL(name, FOLDER), 'utf8'))]));
}
