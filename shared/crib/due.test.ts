import { describe, expect, it } from 'vitest';
import { cyclesLeft, daysLeft, isLapsed, lapsedBy } from './due';

const due = (date: string | null, cycles: number | null = null, used = 0) => ({ due: { date, cycles }, cycles: used });

describe('due (K2, K3)', () => {
  it('is in date through the whole of its last day', () => {
    expect(isLapsed(due('2026-03-05'), '2026-03-05T23:59:59.999Z')).toBe(false);
    expect(lapsedBy(due('2026-03-05'), '2026-03-06T00:00:00Z')).toBe('date');
  });

  it('takes a full instant as the shop meant it', () => {
    expect(isLapsed(due('2026-03-06T06:00:00Z'), '2026-03-06T05:59:59Z')).toBe(false);
    expect(isLapsed(due('2026-03-06T06:00:00Z'), '2026-03-06T06:00:00Z')).toBe(true);
  });

  it('lapses by date or by cycles, whichever is first', () => {
    expect(lapsedBy(due('2027-01-01', 5_000, 5_000), '2026-03-05T00:00:00Z')).toBe('cycles');
    expect(lapsedBy(due('2027-01-01', 5_000, 4_999), '2026-03-05T00:00:00Z')).toBeNull();
    expect(lapsedBy(due(null), '2026-03-05T00:00:00Z')).toBeNull();
  });

  it('counts days and cycles left', () => {
    expect(daysLeft(due('2026-04-15'), '2026-03-05T14:03:22Z')).toBe(41);
    expect(daysLeft(due('2026-03-05'), '2026-03-05T14:03:22Z')).toBe(0);
    expect(daysLeft(due('2026-03-04'), '2026-03-05T14:03:22Z')).toBe(-1);
    expect(daysLeft(due(null), '2026-03-05T14:03:22Z')).toBeNull();
    expect(cyclesLeft(due(null, 5_000, 5_200))).toBe(0);
    expect(cyclesLeft(due(null, 5_000, 1_200))).toBe(3_800);
    expect(cyclesLeft(due(null))).toBeNull();
  });
});
