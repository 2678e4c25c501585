import fc from 'fast-check';
import { expect, it } from 'vitest';
import { conformanceProbability } from './conformance';

const number = (min: number, max: number) => fc.double({ min, max, noNaN: true });

it('is greatest in the middle for a given uncertainty (J4), and a probability', () => {
  fc.assert(
    fc.property(number(-10, 10), number(0.01, 20), (off, uncertainty) => {
      const at = (value: number) => conformanceProbability({ value, low: 76, high: 84, uncertainty }) ?? Number.NaN;
      expect(at(80 + off)).toBeLessThanOrEqual(at(80) + 1e-15);
      expect(at(80 + off)).toBeCloseTo(at(80 - off), 14);
      expect(at(80 + off)).toBeGreaterThanOrEqual(0);
      expect(at(80 + off)).toBeLessThanOrEqual(1);
    }),
  );
});

it('keeps its small digits far outside', () => {
  const far = conformanceProbability({ value: 90, low: 76, high: 84, uncertainty: 1 }) ?? 0;
  expect(far).toBeGreaterThan(9e-10);
  expect(far).toBeLessThan(1e-9);
});

it('is not told without an uncertainty', () => {
  expect(conformanceProbability({ value: 80, low: 76, high: 84, uncertainty: 0 })).toBeNull();
  expect(conformanceProbability({ value: 80, low: 76, high: 84, uncertainty: Number.NaN })).toBeNull();
});
