import { expect, it } from 'vitest';
import { modifiedZ } from './modifiedZ';

it('falls back to the mean absolute deviation where more than half are equal (J6)', () => {
  const scores = modifiedZ([90, 90, 90, 90, 90, 90, 90, 104]);
  expect(scores?.[0]).toBe(0);
  expect(scores?.[7]).toBeCloseTo(14 / (1.253314 * (14 / 8)), 12);
});

it('says nothing where all are equal', () => expect(modifiedZ([90, 90, 90])).toBeNull());

it('gives each value its own sign', () => {
  expect(modifiedZ([1, 2, 3, 4, 5])?.map(Math.sign)).toEqual([-1, -1, 0, 1, 1]);
});
