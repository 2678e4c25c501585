import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { parseEntry } from './entry';
import { compare, decimalToRational } from './rational';

describe('parseEntry', () => {
  it.each([
    ['30', '30'],
    ['30.0', '30.0'],
    [' 30.50 ', '30.50'],
    ['+30', '30'],
    ['007', '7'],
    ['.5', '0.5'],
    ['0.50', '0.50'],
  ])('takes %j as %s', (typed, value) => expect(parseEntry(typed)).toEqual({ ok: true, value }));

  it.each([
    ['', { code: 'empty' }],
    ['   ', { code: 'empty' }],
    ['1O.5', { code: 'letterForDigit', at: 1, character: 'O', suggestion: '10.5' }],
    ['l0', { code: 'letterForDigit', at: 0, character: 'l', suggestion: '10' }],
    ['9S', { code: 'letterForDigit', at: 1, character: 'S', suggestion: '95' }],
    ['30,5', { code: 'decimalComma', at: 2, character: ',', suggestion: '30.5' }],
    ['1,234.5', { code: 'mixedSeparators', at: 1, character: ',' }],
    ['1,2,3', { code: 'mixedSeparators', at: 1, character: ',' }],
    ['1.2.3', { code: 'twoPoints', at: 3 }],
    ['1..2', { code: 'twoPoints', at: 2 }],
    ['30.', { code: 'endsWithPoint', at: 2, suggestion: '30' }],
    ['30 N·m', { code: 'unitTyped', at: 2, suggestion: '30' }],
    ['90°', { code: 'unitTyped', at: 2, suggestion: '90' }],
    ['22 lb-ft', { code: 'unitTyped', at: 2, suggestion: '22' }],
    ['3 0', { code: 'spaceInside', at: 1, character: ' ', suggestion: '30' }],
    ['1e3', { code: 'notANumber', at: 1, character: 'e' }],
    ['thirty', { code: 'notANumber', at: 0, character: 't' }],
    ['3-0', { code: 'notANumber', at: 1, character: '-' }],
    ['٣٠', { code: 'notANumber', at: 0, character: '٣' }],
    ['1234567890123', { code: 'tooLong' }],
    ['-5', { code: 'negative', at: 0, suggestion: '5' }],
    ['−5', { code: 'negative', at: 0, suggestion: '5' }],
    ['0', { code: 'zero' }],
    ['0.00', { code: 'zero' }],
  ])('refuses %j with its own reason', (typed, error) => expect(parseEntry(typed)).toEqual({ ok: false, error }));

  it('allows what is asked for', () => {
    expect(parseEntry('−30.5', { allowNegative: true })).toEqual({ ok: true, value: '-30.5' });
    expect(parseEntry('0', { allowZero: true })).toEqual({ ok: true, value: '0' });
    expect(parseEntry('-0.0', { allowZero: true })).toEqual({ ok: true, value: '0.0' });
    expect(parseEntry('1234', { maxLength: 3 })).toEqual({ ok: false, error: { code: 'tooLong' } });
  });

  it('survives any text, and whatever it suggests it would take', () => {
    fc.assert(
      fc.property(fc.oneof(fc.string(), fc.stringMatching(/^[0-9OolI.,\- NmS°]{1,12}$/)), (typed) => {
        const entry = parseEntry(typed);
        if (!entry.ok && entry.error.suggestion !== undefined) {
          expect(parseEntry(entry.error.suggestion, { allowNegative: true, allowZero: true }).ok).toBe(true);
        }
      }),
      { numRuns: 500 },
    );
  });

  it('keeps the value and every decimal of what it takes', () => {
    fc.assert(
      fc.property(fc.stringMatching(/^\d{1,5}(\.\d{1,5})?$/), (typed) => {
        const entry = parseEntry(typed, { allowZero: true });
        if (!entry.ok) throw new Error(`${typed} was refused`);
        expect(compare(decimalToRational(entry.value), decimalToRational(typed))).toBe(0);
        expect(entry.value.split('.')[1]).toBe(typed.split('.')[1]);
      }),
    );
  });
});
