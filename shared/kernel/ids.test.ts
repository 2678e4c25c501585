import { describe, expect, it } from 'vitest';
import { isUuid, uuidV7 } from './ids';

const ones = new Uint8Array(16).fill(0xff);

describe('uuidV7', () => {
  it('keeps version and variant whatever the random bytes are', () => {
    expect(uuidV7(0, ones)).toBe('00000000-0000-7fff-bfff-ffffffffffff');
    expect(uuidV7(2 ** 48 - 1, new Uint8Array(16))).toBe('ffffffff-ffff-7000-8000-000000000000');
  });

  it('sorts as text by time', () => {
    expect(uuidV7(1_000, ones) < uuidV7(1_001, new Uint8Array(16))).toBe(true);
  });

  it('throws on too few bytes or an impossible time', () => {
    expect(() => uuidV7(0, new Uint8Array(10))).toThrow('16 random bytes');
    expect(() => uuidV7(-1, ones)).toThrow('2^48');
    expect(() => uuidV7(1.5, ones)).toThrow('2^48');
    expect(() => uuidV7(2 ** 48, ones)).toThrow('2^48');
  });
});

describe('isUuid', () => {
  it.each([
    '',
    '017f22e2-79b0-7cc3-98c4-dc0c0c07398',
    '017F22E2-79B0-7CC3-98C4-DC0C0C07398F',
    'g17f22e2-79b0-7cc3-98c4-dc0c0c07398f',
    '017f22e2-79b0-7cc3-78c4-dc0c0c07398f',
  ])('refuses %j', (text) => expect(isUuid(text)).toBe(false));

  it('accepts what uuidV7 makes', () => expect(isUuid(uuidV7(5, ones))).toBe(true));
});
