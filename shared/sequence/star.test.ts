import fc from 'fast-check';
import { expect, it } from 'vitest';
import { reverse } from './reverse';
import { star } from './star';

const rising = (order: number[]) => [...order].sort((a, b) => a - b);

it('is a permutation for every count (A1)', () => {
  for (let count = 0; count <= 130; count += 1) {
    expect(rising(star(count))).toEqual(Array.from({ length: count }, (_, i) => i + 1));
  }
});

it('follows each bolt of an even circle by its opposite (REF-SEQ-34)', () => {
  for (let count = 2; count <= 128; count += 2) {
    const order = star(count);
    for (let i = 0; i < count; i += 2) expect((order[i + 1] ?? 0) - (order[i] ?? 0)).toBe(count / 2);
  }
});

it('follows a pair by the pair across where there is one (REF-SEQ-30)', () => {
  for (let count = 4; count <= 128; count += 4) {
    const order = star(count);
    for (let i = 0; i < count; i += 4) expect((order[i + 2] ?? 0) - (order[i] ?? 0)).toBe(count / 4);
  }
});

it('spreads an odd circle and a circle of six', () => {
  expect(star(5)).toEqual([1, 3, 5, 2, 4]);
  expect(star(6)).toEqual([1, 4, 2, 5, 3, 6]);
  expect(star(10)).toEqual([1, 6, 3, 8, 5, 10, 2, 7, 4, 9]);
});

it('refuses what is no number of bolts', () => {
  expect(() => star(-1)).toThrow('whole number');
  expect(() => star(2.5)).toThrow('whole number');
});

it('is undone by reversing twice', () => {
  fc.assert(
    fc.property(fc.array(fc.nat()), (order) => {
      expect(reverse(reverse(order))).toEqual(order);
    }),
  );
  expect(reverse([1, 2, 3])).toEqual([3, 2, 1]);
});
