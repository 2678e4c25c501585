import fc from 'fast-check';
import { expect, it } from 'vitest';
import { mad, mean, median, stddev } from './spread';

it('reckons mean, deviation and medians', () => {
  expect(mean([1, 2, 6])).toBe(3);
  expect(stddev([2, 4, 4, 4, 5, 5, 7, 9])).toBeCloseTo(Math.sqrt(32 / 7), 12);
  expect(median([3, 1, 2])).toBe(2);
  expect(median([4, 1, 3, 2])).toBe(2.5);
  expect(mad([1, 1, 2, 2, 4, 6, 9])).toBe(1);
});

it('throws without enough values', () => {
  expect(() => mean([])).toThrow('at least 1');
  expect(() => median([])).toThrow('at least 1');
  expect(() => stddev([1])).toThrow('at least 2');
});

it('does not reorder what it is given, and follows a shift', () => {
  fc.assert(
    fc.property(
      fc.array(fc.integer({ min: -1000, max: 1000 }), { minLength: 1 }),
      fc.integer({ min: -99, max: 99 }),
      (values, by) => {
        const before = [...values];
        expect(median(values.map((value) => value + by))).toBe(median(values) + by);
        expect(mad(values.map((value) => value + by))).toBe(mad(values));
        expect(values).toEqual(before);
      },
    ),
  );
});
