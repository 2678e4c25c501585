const UUID = /^[0-9a-f]{8}-[0-9a-f]{4}-[1-8][0-9a-f]{3}-[89ab][0-9a-f]{3}-[0-9a-f]{12}$/;

/** True for a lower-case UUID of RFC 9562 (versions 1 to 8, variant 10). Upper case is refused: ids are compared as text. */
export function isUuid(text: string): boolean {
  return UUID.test(text);
}

/**
 * A UUID version 7 (RFC 9562, 5.7): 48 bits of `ms` since 1970, then 74 random bits taken from bytes 6 to 15 of `random`.
 * `random` must hold 16 bytes; `ms` must be a whole number from 0 to 2^48 − 1. Throws on anything else.
 */
export function uuidV7(ms: number, random: Uint8Array): string {
  if (random.length !== 16) throw new Error('uuidV7 needs 16 random bytes');
  if (!Number.isInteger(ms) || ms < 0 || ms >= 2 ** 48) throw new Error('uuidV7 needs a time from 0 to 2^48 - 1 ms');
  const bytes = Array.from(random);
  for (let i = 0; i < 6; i += 1) bytes[i] = Math.floor(ms / 2 ** (8 * (5 - i))) % 256;
  bytes[6] = 0x70 | ((bytes[6] ?? 0) & 0x0f);
  bytes[8] = 0x80 | ((bytes[8] ?? 0) & 0x3f);
  const hex = bytes.map((byte) => byte.toString(16).padStart(2, '0')).join('');
  return [hex.slice(0, 8), hex.slice(8, 12), hex.slice(12, 16), hex.slice(16, 20), hex.slice(20)].join('-');
}
