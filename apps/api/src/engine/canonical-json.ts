import { createHash } from 'node:crypto';

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
