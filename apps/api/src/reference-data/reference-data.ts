import { createHash } from 'node:crypto';
import { readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import type { ReferenceDataList } from '@faintward/contracts/light-report';
import {
  type PhotometryFiles,
  photometryFilesFrom,
  ReferenceFileError,
  referenceMetaOf,
} from '@faintward/photometry/reference-files';
import { REPOSITORY_ROOT } from '../version.js';

type ReferenceDataFile = ReferenceDataList['rows'][number];

export interface ReferenceFiles {
  /** Of all files together: changes when any of them does. Stored beside what is computed with them. */
  readonly version: string;
  /** By name. */
  readonly files: readonly ReferenceDataFile[];
  readonly photometry: PhotometryFiles;
}

export const REFERENCE_FOLDER = path.join(REPOSITORY_ROOT, 'seed/reference');

const HASH_LENGTH = 12;

let loaded: ReferenceFiles | undefined;

/**
 * The reference data of this installation, read and checked at the first call.
 *
 * @throws {ReferenceFileError} naming the first file that is missing or wrong, and the place in it
 */
export function loadReferenceFiles(): ReferenceFiles {
  return (loaded ??= readReferenceFiles(REFERENCE_FOLDER));
}

/** The reference data in a folder, read and checked. */
export function readReferenceFiles(folder: string): ReferenceFiles {
  const names = namesIn(folder);
  const texts = new Map(names.map((name) => [name, readFileSync(path.join(folder, name), 'utf8')]));
  const contents = new Map([...texts].map(([name, text]) => [name, parseJson(name, text)]));
  const files = names.map((file): ReferenceDataFile => {
    const { title, source, licence, units, provenance } = referenceMetaOf(file, contents.get(file));
    return { file, title, source, licence, units, provenance, contentHash: hashOf(texts.get(file)!) };
  });
  return {
    version: hashOf(files.map(({ file, contentHash }) => `${file} ${contentHash}`).join('\n')),
    files,
    photometry: photometryFilesFrom(contents),
  };
}

function namesIn(folder: string): string[] {
  try {
    return readdirSync(folder)
      .filter((name) => name.endsWith('.json'))
      .sort();
  } catch (error) {
    throw new ReferenceFileError(folder, `cannot be listed: ${messageOf(error)}`);
  }
}

function parseJson(file: string, text: string): unknown {
  try {
    return JSON.parse(text);
  } catch (error) {
    throw new ReferenceFileError(file, `is not JSON: ${messageOf(error)}`);
  }
}

function messageOf(error: unknown): string {
  return error instanceof Error ? error.message : String(error);
}

function hashOf(text: string): string {
  return createHash('sha256').update(text).digest('hex').slice(0, HASH_LENGTH);
}
