import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { base64urlToBytes, bytesToBase64url, bytesToHex, utf8, utf8ToText } from './bytes';

describe('base64url', () => {
  it('agrees with Node and comes back', () => {
    fc.assert(
      fc.property(fc.uint8Array(), (bytes) => {
        const text = bytesToBase64url(bytes);
        expect(text).toBe(Buffer.from(bytes).toString('base64url'));
        expect(base64urlToBytes(text)).toEqual(new Uint8Array(bytes));
      }),
    );
  });

  it.each(['A', 'AA==', 'A+B/', 'AB', 'AAB', 'ä', 'AA A'])('refuses %j', (text) => {
    expect(base64urlToBytes(text)).toBeNull();
  });

  it('has one text for each byte string', () => {
    fc.assert(
      fc.property(fc.stringMatching(/^[A-Za-z0-9_-]{0,12}$/), (text) => {
        const bytes = base64urlToBytes(text);
        if (bytes) expect(bytesToBase64url(bytes)).toBe(text);
      }),
    );
  });
});

describe('utf8 and hex', () => {
  it('agrees with Node', () => {
    expect(bytesToHex(utf8('é😂'))).toBe(Buffer.from('é😂').toString('hex'));
    expect(utf8ToText(utf8('\ufeffé😂'))).toBe('\ufeffé😂');
  });

  it('knows what is no UTF-8', () => expect(utf8ToText(new Uint8Array([0xff]))).toBeNull());
});
