import fc from 'fast-check';
import { expect, it } from 'vitest';
import { erfc, normalCdf } from './normalCdf';

it('is one half in the middle and mirrors itself', () => {
  expect(normalCdf(0)).toBe(0.5);
  fc.assert(
    fc.property(fc.double({ min: -9, max: 9, noNaN: true }), (z) => {
      expect(normalCdf(z) + normalCdf(-z)).toBeCloseTo(1, 14);
    }),
  );
});

it('rises without a step where series and fraction meet', () => {
  const join = 2.5;
  expect(Math.abs(erfc(join - 1e-12) - erfc(join))).toBeLessThan(1e-14);
  fc.assert(
    fc.property(
      fc.double({ min: -8, max: 8, noNaN: true }),
      fc.double({ min: 1e-6, max: 1, noNaN: true }),
      (z, step) => {
        expect(normalCdf(z + step)).toBeGreaterThanOrEqual(normalCdf(z));
      },
    ),
  );
});

it('ends in 0 and 1', () => {
  expect(normalCdf(-40)).toBe(0);
  expect(normalCdf(40)).toBe(1);
});
