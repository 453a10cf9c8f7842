import { createHash } from 'node:crypto';
import { mapInSlices } from './slices.js';

/**
 * JSON with sorted keys and without absent fields, so that the same content always gives the same text: what fingerprints
 * and input hashes are taken of.
 */
export function canonicalJson(value: unknown): string {
  if (value === null || typeof value !== 'object') return JSON.stringify(value) ?? 'null';
  if (Array.isArray(value)) return `[${value.map(canonicalJson).join(',')}]`;
  const fields = Object.entries(value)
    .filter(([, part]) => part !== undefined)
    .sort(([a], [b]) => (a < b ? -1 : 1))
    .map(([key, part]) => `${JSON.stringify(key)}:${canonicalJson(part)}`);
  return `{${fields.join(',')}}`;
}

/** SHA-256 in hexadecimal digits. */
export function sha256(text: string): string {
  return createHash('sha256').update(text).digest('hex');
}

/** SHA-256 of the canonical JSON of an object whose long lists are taken row by row, giving others a turn. */
export async function fingerprintOf(content: object): Promise<string> {
  const hash = createHash('sha256');
  const fields = Object.entries(content)
    .filter(([, part]) => part !== undefined)
    .sort(([a], [b]) => (a < b ? -1 : 1));
  hash.update('{');
  for (const [index, [key, part]] of fields.entries()) {
    hash.update(`${index === 0 ? '' : ','}${JSON.stringify(key)}:`);
    if (Array.isArray(part)) {
      hash.update('[');
      await mapInSlices(part as unknown[], (row, at) => {
        hash.update(`${at === 0 ? '' : ','}${canonicalJson(row)}`);
      });
      hash.update(']');
    } else hash.update(canonicalJson(part));
  }
  return hash.update('}').digest('hex');
}
