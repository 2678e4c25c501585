import { describe, expect, it } from 'vitest';
import { addMinutes, isIsoTime, isoToMs, minutesBetween, msBetween } from './time';

describe('isIsoTime', () => {
  it.each(['2026-03-05T14:03:22Z', '2026-03-05T14:03:22.123Z', '2024-02-29T00:00:00.000Z', '1970-01-01T00:00:00Z'])(
    'accepts %s',
    (text) => expect(isIsoTime(text)).toBe(true),
  );

  it.each([
    '',
    '2026-03-05',
    '2026-03-05T14:03:22',
    '2026-03-05T14:03:22+01:00',
    '2026-02-30T00:00:00Z',
    '2026-03-05T25:00:00Z',
    '2026-03-05T24:00:00Z',
    '2026-13-05T14:03:22Z',
    ' 2026-03-05T14:03:22Z',
  ])('refuses %j', (text) => expect(isIsoTime(text)).toBe(false));
});

describe('reckoning with instants', () => {
  it('adds minutes over midnight and takes them off again', () => {
    expect(addMinutes('2026-12-31T23:59:30Z', 1)).toBe('2027-01-01T00:00:30.000Z');
    expect(addMinutes('2027-01-01T00:00:30.000Z', -1)).toBe('2026-12-31T23:59:30.000Z');
  });

  it('tells the time between, signed', () => {
    expect(msBetween('2026-03-05T14:00:00Z', '2026-03-05T14:00:00.250Z')).toBe(250);
    expect(minutesBetween('2026-03-05T14:01:30Z', '2026-03-05T14:00:00Z')).toBe(-1.5);
  });

  it('throws on what is no instant', () => expect(() => isoToMs('yesterday')).toThrow('yesterday'));
});
