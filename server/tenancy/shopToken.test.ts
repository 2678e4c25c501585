import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { shopOfToken, shopPrefix } from './shopToken';

describe('the shop in a token', () => {
  it('comes back from the prefix, whatever follows it', () => {
    fc.assert(
      fc.property(fc.uuid({ version: [4, 7] }), fc.string({ minLength: 1 }), (shop, rest) => {
        expect(shopOfToken(`${shopPrefix(shop)}${rest}`)).toBe(shop);
      }),
    );
  });

  it.each(['', 'short', '!'.repeat(30), 'A'.repeat(40)])('is not found in %j', (token) => {
    expect(shopOfToken(token)).toBeNull();
  });
});
