import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { canonicalJson } from './canonicalJson';

const NUL = String.fromCharCode(0);
const hasNul = (value: unknown): boolean => JSON.stringify(value)?.includes('\\u0000') ?? false;

describe('canonicalJson', () => {
  it('sorts members by code unit and writes no spaces', () => {
    expect(canonicalJson({ b: [1, 'x', null, true], a: { z: 0, A: -0 }, ä: 1, '': 2 })).toBe(
      '{"":2,"a":{"A":0,"z":0},"b":[1,"x",null,true],"ä":1}',
    );
  });

  it.each([
    ['a lone high surrogate', 'a\ud800', 'loneSurrogate'],
    ['a lone low surrogate', '\udc00', 'loneSurrogate'],
    ['a lone surrogate in a name', { '\ud800': 1 }, 'loneSurrogate'],
    ['U+0000', `a${NUL}`, 'nullCharacter'],
    ['NaN', Number.NaN, 'notFinite'],
    ['infinity', [Number.NEGATIVE_INFINITY], 'notFinite'],
    ['undefined', undefined, 'notJson'],
    ['an undefined member', { a: undefined }, 'notJson'],
    ['a hole in an array', Object.assign([1], { length: 2 }), 'notJson'],
    ['a big integer', 1n, 'notJson'],
    ['a function', () => 1, 'notJson'],
    ['a date', new Date(0), 'notJson'],
    ['a map', new Map(), 'notJson'],
  ])('throws on %s', (_what, value, code) => {
    expect(() => canonicalJson(value)).toThrow(expect.objectContaining({ code }) as Error);
  });

  it('throws on nesting that could exhaust the stack', () => {
    const deep = JSON.parse('['.repeat(5_000) + ']'.repeat(5_000)) as unknown;
    expect(() => canonicalJson(deep)).toThrow('tooDeep');
  });

  it('accepts paired surrogates', () => expect(canonicalJson('😂')).toBe('"😂"'));

  it('says the same value, and does so again when read back', () => {
    fc.assert(
      fc.property(fc.jsonValue({ maxDepth: 5 }), (value) => {
        fc.pre(!hasNul(value));
        const text = canonicalJson(value);
        expect(JSON.parse(text)).toEqual(JSON.parse(JSON.stringify(value)));
        expect(canonicalJson(JSON.parse(text))).toBe(text);
      }),
    );
  });

  it('does not hang on the order in which members were made', () => {
    fc.assert(
      fc.property(fc.dictionary(fc.string(), fc.integer()), (members) => {
        fc.pre(!hasNul(members));
        const backwards = Object.fromEntries(Object.entries(members).reverse());
        expect(canonicalJson(backwards)).toBe(canonicalJson(members));
      }),
    );
  });
});
