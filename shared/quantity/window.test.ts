import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { TorqueUnit } from './unit';
import { marginTo, place, showWindow, windowProblem, type Window } from './window';

const turn: Window = { target: '90', low: '85', high: '95', unit: 'deg' };
const torque: Window = { target: '75', low: '70', high: '80', unit: 'N.m' };
const torqueUnit = fc.constantFrom<TorqueUnit>('N.m', 'lbf.ft', 'lbf.in', 'kgf.m');
const torqueWindow = fc
  .tuple(
    fc.integer({ min: 1, max: 5_000 }),
    fc.integer({ min: 1, max: 400 }),
    fc.integer({ min: 1, max: 400 }),
    torqueUnit,
  )
  .map(([low, first, second, unit]): Window => {
    const tenth = (n: number) => (n / 10).toFixed(1);
    return { low: tenth(low), target: tenth(low + first), high: tenth(low + first + second), unit };
  });

describe('place', () => {
  it('counts a reading equal to a limit as in (J1)', () => {
    expect(['84.9', '85', '85.0', '95', '95.1'].map((value) => place({ value, unit: 'deg' }, turn))).toEqual([
      'under',
      'in',
      'in',
      'in',
      'over',
    ]);
  });

  it('throws on another kind', () => expect(() => place({ value: '90', unit: 'N.m' }, turn)).toThrow('Cannot compare'));
});

describe('showWindow', () => {
  it('rounds limits inward (REF-UNIT-25)', () => {
    expect(showWindow(torque, 'lbf.ft', 1)).toEqual({ target: '55.3', low: '51.7', high: '59.0', unit: 'lbf.ft' });
  });

  it('stays as written in its own unit', () => expect(showWindow(torque, 'N.m', 0)).toBe(torque));

  it('takes more decimals where the limits would meet', () => {
    const narrow: Window = { target: '1.02', low: '1.01', high: '1.03', unit: 'kgf.m' };
    expect(showWindow(narrow, 'N.m', 0)).toEqual({ target: '10.0', low: '10.0', high: '10.1', unit: 'N.m' });
  });

  it('never shows a limit at which a reading would be out (J1)', () => {
    fc.assert(
      fc.property(torqueWindow, torqueUnit, fc.integer({ min: 0, max: 3 }), (window, unit, decimals) => {
        const shown = showWindow(window, unit, decimals);
        expect(place({ value: shown.low, unit }, window)).toBe('in');
        expect(place({ value: shown.high, unit }, window)).toBe('in');
      }),
    );
  });
});

describe('windowProblem', () => {
  it.each([
    [{ ...turn, low: '85,0' }, 'malformed'],
    [{ ...turn, target: '' }, 'malformed'],
    [{ ...turn, low: '0' }, 'notPositive'],
    [{ ...turn, low: '-5' }, 'notPositive'],
    [{ ...turn, low: '96' }, 'limitsCross'],
    [{ ...turn, low: '95', target: '95' }, 'noWidth'],
    [{ ...turn, target: '95.1' }, 'targetOutside'],
    [{ ...turn, target: '84' }, 'targetOutside'],
    [turn, null],
    [{ ...turn, target: '85.0' }, null],
  ])('%j: %s', (window, problem) => expect(windowProblem(window)).toBe(problem));
});

describe('marginTo', () => {
  it('says how far past which limit', () => {
    const margin = (value: string) => marginTo({ value, unit: 'deg' }, turn).value;
    expect(['104', '79', '79.5', '85', '90', '95'].map(margin)).toEqual(['9', '-6', '-5.5', '0', '0', '0']);
  });

  it('never shows something outside as nothing', () => {
    expect(marginTo({ value: '60', unit: 'lbf.ft' }, torque)).toEqual({ value: '2', unit: 'N.m' });
    expect(marginTo({ value: '59.01', unit: 'lbf.ft' }, torque)).toEqual({ value: '0.01', unit: 'N.m' });
    expect(marginTo({ value: '51', unit: 'lbf.ft' }, torque)).toEqual({ value: '-1', unit: 'N.m' });
  });

  it('is 0 exactly when the reading is in', () => {
    fc.assert(
      fc.property(torqueWindow, torqueUnit, fc.integer({ min: 1, max: 9_000 }), (window, unit, tenths) => {
        const value = { value: (tenths / 10).toFixed(1), unit };
        const margin = Number(marginTo(value, window).value);
        expect(Math.sign(margin)).toBe({ under: -1, in: 0, over: 1 }[place(value, window)]);
      }),
    );
  });
});
