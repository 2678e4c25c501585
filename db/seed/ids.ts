import { createHash } from 'node:crypto';

/** An id that is the same at every seeding: SHA-256 of a name, shaped as a UUID (version 8, RFC 9562). */
export function seedId(name: string): string {
  const hex = createHash('sha256').update(`boltwalk demo ${name}`).digest('hex');
  const variant = ((Number.parseInt(hex.slice(16, 17), 16) & 0x3) | 0x8).toString(16);
  return [
    hex.slice(0, 8),
    hex.slice(8, 12),
    `8${hex.slice(13, 16)}`,
    `${variant}${hex.slice(17, 20)}`,
    hex.slice(20, 32),
  ].join('-');
}
