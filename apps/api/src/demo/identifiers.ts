import { createHash } from 'node:crypto';

/**
 * The identifier of an object of the demo, made from its name instead of drawn: the same demo has the same addresses after
 * every reset, so that links to it stay good. A UUID of version 8 (RFC 9562, the version for an application's own scheme).
 */
export function demoId(...nameParts: readonly string[]): string {
  const bytes = createHash('sha256')
    .update(['faintward demo', ...nameParts].join('\u0000'))
    .digest();
  bytes[6] = ((bytes[6] ?? 0) & 0x0f) | 0x80;
  bytes[8] = ((bytes[8] ?? 0) & 0x3f) | 0x80;
  const hex = bytes.toString('hex');
  return [hex.slice(0, 8), hex.slice(8, 12), hex.slice(12, 16), hex.slice(16, 20), hex.slice(20, 32)].join('-');
}
