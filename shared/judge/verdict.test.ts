import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { place, type Window } from '../quantity/window';
import { guardBand, judge, judgeSetting, shareLeft } from './verdict';

const window: Window = { target: '60', low: '57', high: '63', unit: 'N.m' };
const at = (value: string) => ({ value: { value, unit: 'N.m' as const }, window });

describe('judge (J5)', () => {
  it('by the limits alone', () => {
    const verdict = (value: string) => judge({ ...at(value), policy: 'simple', uncertainty: 9 });
    expect(['56.9', '57', '60', '63.0', '63.1'].map(verdict)).toEqual(['under', 'in', 'in', 'in', 'over']);
  });

  it('keeps a distance of 1.65 u from both limits when guarded', () => {
    const verdict = (value: string) => judge({ ...at(value), policy: 'guarded', uncertainty: 1 });
    expect(['56.9', '57', '58.6', '58.7', '61.3', '61.4', '63', '63.1'].map(verdict)).toEqual([
      ...['under', 'lookAgain', 'lookAgain', 'in'],
      ...['in', 'lookAgain', 'lookAgain', 'over'],
    ]);
  });

  it('adds an uncorrected bias to the guard, whatever its sign', () => {
    const verdict = (bias: number) => judge({ ...at('59'), policy: 'guarded', uncertainty: 1, bias });
    expect([0, 0.3, 0.4, -0.4].map(verdict)).toEqual(['in', 'in', 'lookAgain', 'lookAgain']);
    expect(guardBand(2, -0.5)).toBeCloseTo(3.8, 12);
  });

  it('reckons the guard in the unit that was read', () => {
    const value = { value: '43.5', unit: 'lbf.ft' as const };
    expect(judge({ value, window, policy: 'guarded', uncertainty: 0.8 })).toBe('in');
    expect(judge({ value, window, policy: 'guarded', uncertainty: 1 })).toBe('lookAgain');
  });

  it('never makes an outside value in, and never looks again where the policy is simple', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 400, max: 800 }),
        fc.double({ min: 0, max: 5, noNaN: true }),
        fc.double({ min: -3, max: 3, noNaN: true }),
        (tenths, uncertainty, bias) => {
          const input = { ...at((tenths / 10).toFixed(1)), uncertainty, bias };
          const where = place(input.value, window);
          expect(judge({ ...input, policy: 'simple' })).toBe(where);
          const guarded = judge({ ...input, policy: 'guarded' });
          if (where === 'in') expect(['in', 'lookAgain']).toContain(guarded);
          else expect(guarded).toBe(where);
        },
      ),
    );
  });
});

it('tells what the guards leave of a window', () => {
  expect(shareLeft(window, 1.5, 'N.m')).toBe(0.5);
  expect(shareLeft(window, 4, 'N.m')).toBe(0);
  expect(shareLeft(window, 0, 'lbf.ft')).toBe(1);
});

describe('judgeSetting (W7)', () => {
  it('is in within one scale step of the target', () => {
    const setting = (value: string) => judgeSetting({ value, unit: 'N.m' }, { value: '60', unit: 'N.m' }, '0.5');
    expect(['59.4', '59.5', '60', '60.5', '60.6'].map(setting)).toEqual(['under', 'in', 'in', 'in', 'over']);
  });

  it('compares across units', () => {
    const target = { value: '60', unit: 'N.m' as const };
    expect(judgeSetting({ value: '44', unit: 'lbf.ft' }, target, '1')).toBe('in');
    expect(judgeSetting({ value: '60', unit: 'lbf.ft' }, target, '1')).toBe('over');
  });
});
