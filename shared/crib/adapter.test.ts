import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { adapterRatio, torqueAtFastener, torqueAtWrench } from './adapter';

const adapter = (length: string, extension: string, angleDeg: number) => ({
  length: { value: length, unit: 'mm' as const },
  extension: { value: extension, unit: 'mm' as const },
  angleDeg,
});

describe('adapter (K1)', () => {
  it('changes nothing when set across', () => {
    expect(adapterRatio(adapter('400', '60', 90))).toBe('1.000000000');
    expect(adapterRatio(adapter('400', '60', 270))).toBe('1.000000000');
    expect(adapterRatio(adapter('400', '60', -90))).toBe('1.000000000');
  });

  it('mixes units of length', () => {
    const inches = { length: { value: '10', unit: 'in' as const }, extension: { value: '101.6', unit: 'mm' as const } };
    expect(adapterRatio({ ...inches, angleDeg: 0 })).toBe('1.400000000');
  });

  it('refuses one that reaches back to the hand', () => {
    expect(() => adapterRatio(adapter('60', '60', 180))).toThrow('no lever');
    expect(() => adapterRatio(adapter('0', '60', 0))).toThrow('no lever');
  });

  it('goes there and back', () => {
    const millimetres = fc.integer({ min: 200, max: 900 }).map(String);
    fc.assert(
      fc.property(
        millimetres,
        fc.integer({ min: 0, max: 150 }).map(String),
        fc.nat({ max: 359 }),
        (length, extension, angle) => {
          const ratio = adapterRatio(adapter(length, extension, angle));
          const set = torqueAtWrench({ value: '100', unit: 'N.m' }, ratio, 8);
          expect(torqueAtFastener(set, ratio, 4)).toEqual({ value: '100.0000', unit: 'N.m' });
        },
      ),
    );
  });
});
