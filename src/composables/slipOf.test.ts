import { describe, expect, it } from 'vitest';
import { judge, type Verdict } from '@shared/judge/verdict';
import type { Quantity } from '@shared/quantity/quantity';
import type { Window } from '@shared/quantity/window';
import { slipOf } from './slipOf';

const sixty: Window = { target: '60', low: '57', high: '63', unit: 'N.m' };
const ninety: Window = { target: '90', low: '85', high: '95', unit: 'deg' };
const by =
  (window: Window) =>
  (value: Quantity): Verdict =>
    judge({ value, window, policy: 'simple' });
const torque = (value: string, before: Quantity | null = null) =>
  slipOf({ value: { value, unit: 'N.m' }, verdict: by(sixty), before });

describe('slipOf (W6)', () => {
  it('asks whether a figure ten times too small or too large lost its point', () => {
    expect(torque('6')).toMatchObject({ kind: 'timesTen', meant: { value: '60', unit: 'N.m' } });
    expect(torque('602')).toMatchObject({ kind: 'tenth', meant: { value: '60.2', unit: 'N.m' } });
    expect(torque('600')).toMatchObject({ kind: 'tenth', meant: { value: '60', unit: 'N.m' } });
  });
  it('asks whether the wrench shows another unit: 44 lbf·ft is 59.7 N·m', () => {
    expect(torque('44')).toMatchObject({ kind: 'otherUnit', meant: { value: '44', unit: 'lbf.ft' } });
    expect(torque('6.1')).toMatchObject({ kind: 'timesTen' });
  });
  it('asks whether the wrench was reset where the digits are those of the hole before', () => {
    expect(torque('60.2', { value: '60.2', unit: 'N.m' })).toMatchObject({ kind: 'sameAsBefore', meant: null });
    expect(torque('60.20', { value: '60.2', unit: 'N.m' })).toBeNull();
    expect(torque('60.2', { value: '60.2', unit: 'lbf.ft' })).toBeNull();
  });
  it('asks nothing where nothing fits better', () => {
    expect(torque('60')).toBeNull();
    expect(torque('71')).toBeNull();
  });
  it('knows no other unit of a turn', () => {
    const turn = (value: string) => slipOf({ value: { value, unit: 'deg' }, verdict: by(ninety), before: null });
    expect(turn('910')).toMatchObject({ kind: 'tenth', meant: { value: '91', unit: 'deg' } });
    expect(turn('104')).toBeNull();
  });
});
