import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { checkVin, normalizeVin, vinBlocks, vinSearchKey } from './vin';
import { vinCheckDigit } from './vinCheckDigit';

describe('checkVin', () => {
  it('accepts a VIN as typed with spaces, small letters and hyphens', () => {
    expect(checkVin(' 1m8g dm9a-xkp042788 ')).toEqual({ vin: '1M8GDM9AXKP042788', problems: [] });
  });

  it('names each letter that no VIN holds, where it stands and what is meant', () => {
    const { problems } = checkVin('IM8GDM9AXKPO42788');
    expect(problems).toEqual([
      { code: 'letterIOQ', at: 1, character: 'I', meant: '1' },
      { code: 'letterIOQ', at: 12, character: 'O', meant: '0' },
    ]);
    expect(problems.every(vinBlocks)).toBe(true);
  });

  it('warns about the check digit and does not block on it (D3)', () => {
    const { problems } = checkVin('1M8GDM9A1KP042788');
    expect(problems).toEqual([{ code: 'checkDigit', found: '1', expected: 'X' }]);
    expect(problems.some(vinBlocks)).toBe(false);
  });

  it('counts characters and names foreign ones', () => {
    expect(checkVin('1M8GDM9AXKP04278').problems).toEqual([{ code: 'length', length: 16 }]);
    expect(checkVin('').problems).toEqual([{ code: 'length', length: 0 }]);
    expect(checkVin('1M8GDM9AXKP04278😂').problems).toEqual([{ code: 'character', at: 17, character: '😂' }]);
  });

  it('survives any text', () => {
    fc.assert(
      fc.property(fc.string(), (text) => {
        const { vin, problems } = checkVin(text);
        expect(normalizeVin(vin)).toBe(vin);
        if (!problems.some(vinBlocks)) expect(vinCheckDigit(vin)).not.toBeNull();
      }),
    );
  });
});

describe('vinSearchKey', () => {
  it('finds a VIN in which letters were misread', () => {
    expect(vinSearchKey('im8gdm9axkpo42788')).toBe(vinSearchKey('1M8GDM9AXKP042788'));
    expect(vinSearchKey('Q42')).toBe('042');
  });
});

it('every VIN has exactly one check character that fits (a changed one is seen)', () => {
  fc.assert(
    fc.property(fc.stringMatching(/^[A-HJ-NPR-Z0-9]{17}$/), (vin) => {
      const right = vinCheckDigit(vin) ?? '';
      const with9 = (character: string) => vin.slice(0, 8) + character + vin.slice(9);
      const fitting = Array.from('0123456789X').filter((c) => vinCheckDigit(with9(c)) === c);
      expect(fitting).toEqual([right]);
    }),
  );
});
