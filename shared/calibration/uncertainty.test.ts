import { describe, expect, it } from 'vitest';
import { calibratedAt, type CalibrationPoint } from './calibrationPoints';
import { correctedValue } from './correctedValue';
import { tooManyPulls, turnUncertainty } from './turnUncertainty';
import { lastDigitOf, torqueUncertainty } from './uncertainty';

const point = (
  torque: number,
  deviationPercent: number,
  expandedPercent: number,
  more: Partial<CalibrationPoint> = {},
) =>
  ({
    torque,
    deviationPercent,
    expandedPercent,
    direction: 'cw',
    holdsResolution: false,
    ...more,
  }) satisfies CalibrationPoint;

describe('torqueUncertainty (J2)', () => {
  it('takes the whole class where nothing else is known', () => {
    const u = torqueUncertainty({ torque: 60, classLimitPercent: 4, resolution: 0.1, lastDigit: 1 });
    expect(u).toBeCloseTo(Math.sqrt((4 * 0.6) ** 2 / 3 + 1 / 12), 12);
  });

  it('takes W and half the class, or the known drift, where there are points', () => {
    const input = { torque: 100, classLimitPercent: 4, resolution: 0.1, lastDigit: 0.1 };
    const held = { expandedPercent: 1, holdsResolution: true };
    expect(torqueUncertainty({ ...input, point: held })).toBeCloseTo(Math.sqrt(0.25 + 4 / 3), 12);
    expect(torqueUncertainty({ ...input, point: held, driftPercent: 0.6 })).toBeCloseTo(Math.sqrt(0.25 + 0.12), 12);
    expect(torqueUncertainty({ ...input, point: { ...held, holdsResolution: false }, driftPercent: 0 })).toBeCloseTo(
      Math.sqrt(0.25 + 0.01 / 12),
      12,
    );
  });
});

describe('calibratedAt (J2)', () => {
  const points = [point(100, 2, 1), point(20, -2, 1.6), point(60, 0, 1.2), point(20, 9, 9, { direction: 'ccw' })];

  it('interpolates the bias and takes the larger uncertainty', () => {
    expect(calibratedAt(80, 'cw', points)).toEqual({ biasPercent: 1, expandedPercent: 1.2, holdsResolution: false });
    expect(calibratedAt(60, 'cw', points)).toEqual({ biasPercent: 0, expandedPercent: 1.2, holdsResolution: false });
    expect(calibratedAt(30, 'cw', points)?.biasPercent).toBe(-1.5);
  });

  it('judges nothing outside the points, nor in a direction that has too few', () => {
    expect(calibratedAt(19.9, 'cw', points)).toBeNull();
    expect(calibratedAt(100.1, 'cw', points)).toBeNull();
    expect(calibratedAt(30, 'ccw', points)).toBeNull();
    expect(calibratedAt(20, 'ccw', points)?.biasPercent).toBe(9);
  });

  it('holds the resolution only where both points do', () => {
    const both = [point(20, 0, 1, { holdsResolution: true }), point(40, 0, 1)];
    expect(calibratedAt(30, 'cw', both)?.holdsResolution).toBe(false);
    expect(calibratedAt(20, 'cw', both)?.holdsResolution).toBe(true);
  });
});

describe('correctedValue (J2)', () => {
  it('divides by 1 + b/100', () => {
    expect(correctedValue({ value: '106', unit: 'N.m' }, '6')).toEqual({ value: '100.00', unit: 'N.m' });
    expect(correctedValue({ value: '60.0', unit: 'N.m' }, '-4')).toEqual({ value: '62.500', unit: 'N.m' });
    expect(() => correctedValue({ value: '60', unit: 'N.m' }, '-100')).toThrow('cannot be corrected');
  });
});

describe('turns (J3)', () => {
  it('adds pulls straight and their resolution in squares', () => {
    const u = turnUncertainty({ pulls: 2, accuracyDeg: 1, resolutionDeg: 1 });
    expect(u).toBeCloseTo(Math.sqrt(4 / 3 + 2 / 12), 12);
  });

  it('warns when the pulls pass half of the half-window', () => {
    expect(tooManyPulls(2, 1, 85, 95)).toBe(false);
    expect(tooManyPulls(3, 1, 85, 95)).toBe(true);
  });
});

it('knows the size of the last digit', () => {
  expect(['30', '30.0', '0.25'].map(lastDigitOf)).toEqual([1, 0.1, 0.01]);
});
