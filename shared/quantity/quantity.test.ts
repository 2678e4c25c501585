import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  addQuantities,
  compareQuantities,
  convertQuantity,
  decimalsOf,
  scaleQuantity,
  subtractQuantities,
} from './quantity';
import type { Quantity } from './quantity';
import type { Unit } from './unit';
import { isUnit, unitKind, unitSymbol } from './unit';

const q = (value: string, unit: Unit = 'deg'): Quantity => ({ value, unit });
const decimal = fc.tuple(fc.integer({ min: -100_000, max: 100_000 }), fc.integer({ min: 0, max: 4 }));
const decimalText = decimal.map(([n, places]) => {
  const digits = String(Math.abs(n)).padStart(places + 1, '0');
  const split = digits.length - places;
  const text = places ? `${digits.slice(0, split)}.${digits.slice(split)}` : digits;
  return n < 0 ? `-${text}` : text;
});

describe('adding and scaling', () => {
  it('adds turns and keeps the finer decimals', () => {
    expect(addQuantities(q('90'), q('90'))).toEqual(q('180'));
    expect(addQuantities(q('89.5'), q('1'))).toEqual(q('90.5'));
    expect(addQuantities(q('0.1'), q('0.2'))).toEqual(q('0.3'));
    expect(subtractQuantities(q('90'), q('79.5'))).toEqual(q('10.5'));
    expect(() => addQuantities(q('1', 'N.m'), q('1', 'lbf.ft'))).toThrow('convert first');
  });

  it('scales without losing a digit', () => {
    expect(scaleQuantity(q('44', 'N.m'), '0.1')).toEqual(q('4.4', 'N.m'));
    expect(scaleQuantity(q('30.0', 'N.m'), '10')).toEqual(q('300.0', 'N.m'));
    expect(scaleQuantity(q('200', 'N.m'), '0.95')).toEqual(q('190.00', 'N.m'));
  });

  it('takes off what it added', () => {
    fc.assert(
      fc.property(decimalText, decimalText, (a, b) => {
        const back = subtractQuantities(addQuantities(q(a), q(b)), q(b));
        expect(compareQuantities(back, q(a))).toBe(0);
        expect(decimalsOf(back.value)).toBe(Math.max(decimalsOf(a), decimalsOf(b)));
      }),
    );
  });
});

describe('comparing and converting', () => {
  it('has no epsilon', () => {
    expect(compareQuantities(q('0.3', 'N.m'), q('0.30', 'N.m'))).toBe(0);
    expect(compareQuantities(q('95.0000000001'), q('95'))).toBe(1);
    expect(compareQuantities(q('1', 'lbf.ft'), q('12', 'lbf.in'))).toBe(0);
    expect(compareQuantities(q('1', 'lbf.ft'), q('1.3558179483314004', 'N.m'))).toBe(0);
    expect(compareQuantities(q('1', 'lbf.ft'), q('1.3558179483314005', 'N.m'))).toBe(-1);
    expect(compareQuantities(q('1', 'in'), q('25.4', 'mm'))).toBe(0);
  });

  it('never compares across kinds', () => {
    expect(() => compareQuantities(q('90'), q('90', 'N.m'))).toThrow('Cannot compare deg with N.m');
    expect(() => convertQuantity(q('90'), 'N.m', 1)).toThrow('Cannot compare');
  });

  it('comes back from another unit when enough decimals were kept', () => {
    fc.assert(
      fc.property(decimalText, fc.constantFrom<Unit>('lbf.ft', 'lbf.in', 'kgf.m'), (value, unit) => {
        const there = convertQuantity(q(value, 'N.m'), unit, 9);
        expect(convertQuantity(there, 'N.m', 4)).toEqual(convertQuantity(q(value, 'N.m'), 'N.m', 4));
      }),
    );
  });
});

describe('units', () => {
  it('are known by code', () => {
    expect(['N.m', 'deg', 'in', 'Nm', 'toString'].map(isUnit)).toEqual([true, true, true, false, false]);
    expect(unitKind('kgf.m')).toBe('torque');
    expect(unitSymbol('lbf.ft')).toBe('lbf·ft');
  });
});
