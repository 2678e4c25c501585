import { describe, expect, it } from 'vitest';
import type { Quantity } from '../quantity/quantity';
import type { Window } from '../quantity/window';
import { slipOf } from './slips';

const window: Window = { target: '60', low: '57', high: '63', unit: 'N.m' };
const turn: Window = { target: '90', low: '85', high: '95', unit: 'deg' };
const newtons = (value: string): Quantity => ({ value, unit: 'N.m' });
const degrees = (value: string): Quantity => ({ value, unit: 'deg' });

describe('a figure that looks like a slip (W6)', () => {
  it.each([
    ['6.0', 'timesTen', '60.0'],
    ['600', 'tenth', '60.0'],
    // 44 lbf·ft is 59.7 N·m (1 lbf·ft = 1.3558179483314 N·m exactly, J1).
    ['44', 'otherUnit', '44'],
    // 530 lbf·in is 59.9 N·m.
    ['530', 'otherUnit', '530'],
  ])('%s is asked about as %s', (value, kind, meant) => {
    const slip = slipOf(newtons(value), window, null);
    expect(slip?.kind).toBe(kind);
    expect(Number(slip?.meant.value)).toBe(Number(meant));
  });

  it('names the unit that the wrench would be showing', () => {
    expect(slipOf(newtons('44'), window, null)?.meant.unit).toBe('lbf.ft');
    expect(slipOf(newtons('530'), window, null)?.meant.unit).toBe('lbf.in');
  });

  it('is none where no slip would explain it: it is judged off', () => {
    expect(slipOf(newtons('70'), window, null)).toBeNull();
    expect(slipOf(degrees('104'), turn, degrees('90'))).toBeNull();
  });

  it('asks about the same three digits as at the hole before, and not about two', () => {
    expect(slipOf(newtons('60.2'), window, newtons('60.2'))).toEqual({ kind: 'sameAsBefore', meant: newtons('60.2') });
    expect(slipOf(newtons('60.2'), window, newtons('60.3'))).toBeNull();
    expect(slipOf(degrees('90'), turn, degrees('90'))).toBeNull();
    expect(slipOf(degrees('90.5'), turn, degrees('90.5'))?.kind).toBe('sameAsBefore');
  });

  it('is not looked for in a figure that is in its window, or where there is no window', () => {
    expect(slipOf(newtons('60.2'), window, null)).toBeNull();
    expect(slipOf(newtons('6.0'), null, newtons('6.0'))).toBeNull();
  });
});
