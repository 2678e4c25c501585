import { describe, expect, it } from 'vitest';
import { makeMacToken, readMacToken } from './macToken';

const until = new Date('2026-06-13T15:15:00.000Z');
const before = new Date('2026-06-13T15:14:59.999Z');
const after = new Date('2026-06-13T15:15:00.001Z');
const token = makeMacToken('secret of this server', 'tablet token', ['shop', 'tablet'], until);

describe('a token the server need not store', () => {
  it('gives its fields back, and says when its time is over', () => {
    expect(readMacToken('secret of this server', 'tablet token', token, before)).toEqual({
      fields: ['shop', 'tablet'],
      expired: false,
    });
    expect(readMacToken('secret of this server', 'tablet token', token, after)?.expired).toBe(true);
  });

  it('is none with another secret, for another purpose, or with anything changed', () => {
    expect(readMacToken('another secret', 'tablet token', token, before)).toBeNull();
    expect(readMacToken('secret of this server', 'tablet challenge', token, before)).toBeNull();
    for (const forged of [token.replace('tablet', 'tablex'), `x.${token}`, token.slice(0, -1), '', '....']) {
      expect(readMacToken('secret of this server', 'tablet token', forged, before)).toBeNull();
    }
  });
});
