import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  abs,
  add,
  compare,
  decimalToRational,
  divide,
  isZero,
  multiply,
  negate,
  parseDecimal,
  rational,
  rationalToDecimal,
  subtract,
  toNumber,
  type Rounding,
} from './rational';

const fraction = fc
  .tuple(fc.bigInt(-(10n ** 12n), 10n ** 12n), fc.bigInt(1n, 10n ** 6n))
  .map(([n, d]) => rational(n, d));
const decimals = fc.integer({ min: 0, max: 6 });
const roundings: Rounding[] = ['nearest', 'down', 'up'];

describe('rational', () => {
  it('reduces and keeps the sign above', () => {
    expect(rational(6n, -4n)).toEqual({ n: -3n, d: 2n });
    expect(rational(0n, -7n)).toEqual({ n: 0n, d: 1n });
    expect(() => rational(1n, 0n)).toThrow('denominator 0');
    expect(() => divide(rational(1n), rational(0n))).toThrow('denominator 0');
  });

  it('obeys the field laws', () => {
    fc.assert(
      fc.property(fraction, fraction, fraction, (a, b, c) => {
        expect(subtract(add(a, b), b)).toEqual(a);
        expect(multiply(a, add(b, c))).toEqual(add(multiply(a, b), multiply(a, c)));
        if (!isZero(b)) expect(multiply(divide(a, b), b)).toEqual(a);
        expect(add(a, negate(a))).toEqual(rational(0n));
      }),
    );
  });

  it('orders as the difference does', () => {
    fc.assert(
      fc.property(fraction, fraction, (a, b) => {
        const sign = subtract(a, b).n;
        expect(compare(a, b)).toBe(sign < 0n ? -1 : sign > 0n ? 1 : 0);
        expect(compare(b, a) + compare(a, b)).toBe(0);
        expect(compare(abs(a), rational(0n))).not.toBe(-1);
      }),
    );
  });

  it('turns into the number meant', () => expect(toNumber(rational(-1n, 8n))).toBe(-0.125));
});

describe('decimals', () => {
  it.each(['', '.', '1.', '.5', '+1', '1e3', '1,5', ' 1', '--1', '0x1', '١'])('refuses %j', (text) => {
    expect(parseDecimal(text)).toEqual({ ok: false, error: { code: 'malformed' } });
    expect(() => decimalToRational(text)).toThrow('malformed');
  });

  it('refuses a text too long to be a reading', () => {
    expect(parseDecimal('1'.repeat(41))).toEqual({ ok: false, error: { code: 'tooLong' } });
  });

  it('rounds a half away from zero, and inward or outward on demand', () => {
    const of = (text: string, rounding: Rounding) => rationalToDecimal(decimalToRational(text), 1, rounding);
    expect(['12.25', '12.35', '-12.25', '-0.04'].map((text) => of(text, 'nearest'))).toEqual([
      '12.3',
      '12.4',
      '-12.3',
      '0.0',
    ]);
    expect(['12.21', '-12.21'].map((text) => of(text, 'down'))).toEqual(['12.2', '-12.3']);
    expect(['12.21', '-12.21'].map((text) => of(text, 'up'))).toEqual(['12.3', '-12.2']);
    expect(rationalToDecimal(rational(5n), 0)).toBe('5');
  });

  it('writes and reads back to within one step, on the side asked for', () => {
    fc.assert(
      fc.property(fraction, decimals, fc.constantFrom(...roundings), (a, places, rounding) => {
        const back = decimalToRational(rationalToDecimal(a, places, rounding));
        const off = subtract(back, a);
        const step = rational(1n, 10n ** BigInt(places));
        expect(compare(abs(off), step)).toBe(-1);
        if (rounding === 'down') expect(off.n <= 0n).toBe(true);
        if (rounding === 'up') expect(off.n >= 0n).toBe(true);
        if (rounding === 'nearest') expect(compare(abs(off), divide(step, rational(2n)))).not.toBe(1);
      }),
    );
  });
});
