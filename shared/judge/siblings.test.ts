import { describe, expect, it } from 'vitest';
import { siblingLimit } from './siblingLimits';
import { siblingNotes } from './siblings';

const group = (values: number[], uncertainty = 0.5) =>
  values.map((value, i) => ({ hole: String(i + 1), value, uncertainty }));
const fourteen = [118, 121, 119, 122, 120, 117, 121, 119, 120, 123, 118, 120, 121];

describe('siblingNotes (J6)', () => {
  it('notes what stands apart, with its side', () => {
    expect(siblingNotes(group([...fourteen, 92]))).toMatchObject([{ hole: '14', value: 92, median: 120, side: 'low' }]);
    expect(siblingNotes(group([...fourteen, 150]))).toMatchObject([{ hole: '14', side: 'high' }]);
  });

  it('leaves a healthy group alone, one that the plain limit of 3.5 would flag too', () => {
    expect(siblingNotes(group([...fourteen, 128]))).toEqual([]);
  });

  it('says nothing of what the uncertainty explains', () => {
    expect(siblingNotes(group([...fourteen, 92], 14))).toEqual([]);
    expect(siblingNotes(group([...fourteen, 92], 13.9))).toHaveLength(1);
  });

  it('says nothing of fewer than eight, nor where all are equal', () => {
    expect(siblingNotes(group([90, 90, 91, 90, 89, 90, 150]))).toEqual([]);
    expect(siblingNotes(group(Array.from({ length: 14 }, () => 90)))).toEqual([]);
    expect(siblingNotes([])).toEqual([]);
  });

  it('does not flag the one that differs where all others are the same: the fallback is milder than its limit', () => {
    expect(siblingNotes(group([90, 90, 90, 90, 90, 90, 90, 104]))).toEqual([]);
  });
});

describe('siblingLimit', () => {
  it('starts at eight, interpolates, and stays at its last', () => {
    expect(siblingLimit(7)).toBeNull();
    const [at64, at72, at80] = [64, 72, 80].map((size) => siblingLimit(size) ?? Number.NaN);
    expect(at72).toBeCloseTo(((at64 ?? 0) + (at80 ?? 0)) / 2, 12);
    expect(siblingLimit(5_000)).toBe(siblingLimit(128));
  });
});
