import { describe, expect, it } from 'vitest';
import { suits, type WrenchNeed } from './suitability';
import type { WrenchSnapshot } from './wrench';

const AT = '2026-03-05T14:03:22Z';

/** A digital torque-angle wrench, 10 – 200 N·m, ±2 %, ±1°, in date: each test changes one thing about it. */
const wrench: WrenchSnapshot = {
  id: '017f22e2-79b0-7cc3-98c4-dc0c0c07398f',
  tag: 'W-03',
  serial: '2231187',
  kind: 'torqueAngle',
  drive: '1/2 in',
  range: { low: '10', high: '200', unit: 'N.m' },
  unit: 'N.m',
  resolution: { torque: '0.1', angle: '1' },
  accuracy: { cw: '2', ccw: '2' },
  turnAccuracy: '1',
  due: { date: '2026-04-15', cycles: 5_000 },
  cycles: 1_200,
  state: 'inService',
  certificate: 'C-1107',
};
const torque: WrenchNeed = {
  kind: 'torque',
  window: { target: '60', low: '55', high: '65', unit: 'N.m' },
  direction: 'cw',
};
const turn: WrenchNeed = {
  kind: 'turn',
  window: { target: '90', low: '85', high: '95', unit: 'deg' },
  direction: 'cw',
};

const codes = (more: Partial<WrenchSnapshot>, need: WrenchNeed) =>
  suits({ ...wrench, ...more }, need, AT).reasons.map((reason) => reason.code);
const warnings = (more: Partial<WrenchSnapshot>, need: WrenchNeed) =>
  suits({ ...wrench, ...more }, need, AT).warnings.map((warning) => warning.code);

describe('suits (K2)', () => {
  it('says yes, with nothing to add, where all fits', () => {
    expect(suits(wrench, torque, AT)).toEqual({ suits: true, reasons: [], warnings: [] });
    expect(suits(wrench, { ...turn, endTorqueHigh: { value: '190', unit: 'N.m' } }, AT)).toEqual({
      suits: true,
      reasons: [],
      warnings: [],
    });
  });

  it.each<[string, Partial<WrenchSnapshot>, WrenchNeed, string[]]>([
    ['quarantined', { state: 'quarantined' }, torque, ['notInService']],
    ['lapsed by date', { due: { date: '2026-03-04', cycles: null } }, torque, ['lapsed']],
    ['lapsed by cycles', { cycles: 5_000 }, torque, ['lapsed']],
    ['a click wrench for a turn', { kind: 'setting' }, turn, ['turnNotMeasured']],
    ['a torque-angle wrench without turn accuracy', { turnAccuracy: null }, turn, ['turnNotMeasured']],
    ['an angle gauge for a torque', { kind: 'angleGauge', range: null }, torque, ['wrongKind']],
    ['a click wrench to break loose', { kind: 'setting' }, { ...torque, kind: 'loosen', window: null }, ['wrongKind']],
    ['no calibrated range', { range: null }, torque, ['noRange']],
    ['window below the range', { range: { low: '55.1', high: '200', unit: 'N.m' } }, torque, ['outOfRange']],
    ['window above the range', { range: { low: '10', high: '64.9', unit: 'N.m' } }, torque, ['outOfRange']],
    ['range in another unit', { range: { low: '7', high: '47.9', unit: 'lbf.ft' } }, torque, ['outOfRange']],
    ['direction', { accuracy: { cw: '2', ccw: null } }, { ...torque, direction: 'ccw' }, ['directionNotCalibrated']],
    ['drive', {}, { ...torque, drive: '3/8 in' }, ['driveMismatch']],
    ['too coarse', { accuracy: { cw: '8.4', ccw: null } }, torque, ['tooCoarse']],
    ['too coarse for the turn', { turnAccuracy: '5.1' }, turn, ['tooCoarse']],
    ['several at once', { state: 'away', range: null }, torque, ['notInService', 'noRange']],
  ])('says why not: %s', (_what, more, need, expected) => expect(codes(more, need)).toEqual(expected));

  it('takes the limits of range and end torque as inside', () => {
    expect(codes({ range: { low: '55', high: '65', unit: 'N.m' } }, torque)).toEqual([]);
    const need = { ...turn, endTorqueHigh: { value: '190.1', unit: 'N.m' as const } };
    expect(codes({}, need)).toEqual(['endTorqueTooHigh']);
    expect(suits(wrench, need, AT).reasons[0]?.params).toMatchObject({ endTorque: '190.1', most: '190.00' });
    expect(codes({ kind: 'angleGauge', range: null, accuracy: { cw: null, ccw: null } }, need)).toEqual([]);
  });

  it('asks half-window over accuracy to be at least 1, and warns below 3', () => {
    expect(warnings({ accuracy: { cw: '2.7', ccw: null } }, torque)).toEqual([]);
    expect(warnings({ accuracy: { cw: '2.8', ccw: null } }, torque)).toEqual(['coarse']);
    expect(codes({ accuracy: { cw: '8.3', ccw: null } }, torque)).toEqual([]);
    const coarse = suits({ ...wrench, accuracy: { cw: '8.4', ccw: null } }, torque, AT);
    expect(coarse.reasons[0]?.params).toEqual({ ratio: '0.9' });
  });

  it('refuses a wrench whose guards leave under half of the window, where the shop guards (J5)', () => {
    const narrow: WrenchNeed = { ...torque, window: { target: '60', low: '57', high: '63', unit: 'N.m' } };
    expect(codes({ accuracy: { cw: '4', ccw: null } }, narrow)).toEqual([]);
    expect(codes({ accuracy: { cw: '4', ccw: null } }, { ...narrow, policy: 'guarded' })).toEqual([
      'guardsLeaveTooLittle',
    ]);
    expect(codes({ accuracy: { cw: '2', ccw: null } }, { ...narrow, policy: 'guarded' })).toEqual([]);
    expect(codes({ turnAccuracy: '3' }, { ...turn, policy: 'guarded' })).toEqual(['guardsLeaveTooLittle']);
    expect(codes({}, { ...turn, policy: 'guarded' })).toEqual([]);
  });

  it('warns of an adapted drive and of a missing due date or certificate', () => {
    expect(warnings({ adapterOk: true }, { ...torque, drive: '3/8 in' })).toEqual(['driveAdapted']);
    expect(warnings({ due: { date: null, cycles: null }, certificate: null }, torque)).toEqual([
      'noDue',
      'noCertificate',
    ]);
  });
});
