import { spawnSync } from 'node:child_process';
import { describe, expect, it } from 'vitest';
import { convertQuantity } from '@shared/quantity/quantity';
import { compare, decimalToRational, divide, rational, rationalToDecimal, toNumber } from '@shared/quantity/rational';
import { isUnit, unitFactor, type Unit } from '@shared/quantity/unit';
import { showWindow } from '@shared/quantity/window';
import { provenance, referenceFile, type ReferenceRow } from './reference';

interface UnitsFile {
  rows: (ReferenceRow & { unit: string; to: string; factor_exact: string; sp811: string | null })[];
  inverse_check: { of: string; per_Nm: string }[];
}
const { rows, inverse_check } = referenceFile<UnitsFile>('units');
const torqueRows = rows.filter((row) => row.to === 'N.m' && isUnit(row.unit));

const significant = (text: string) => text.replace(/^0\.0*|\./g, '').length;

describe('units of torque (J1)', () => {
  it('finds all four of ours in the reference sheet', () => {
    expect(torqueRows.map((row) => row.unit).sort()).toEqual(['N.m', 'kgf.m', 'lbf.ft', 'lbf.in']);
  });

  it.each(torqueRows.map((row) => [provenance(row), row] as const))('%s', (_source, row) => {
    const factor = unitFactor(row.unit as Unit);
    expect(compare(factor, decimalToRational(row.factor_exact))).toBe(0);
    if (row.sp811 === null) return;
    // NIST SP 811 prints the exact factor rounded to its own number of digits.
    expect(Number(toNumber(factor).toPrecision(significant(row.sp811)))).toBe(Number(row.sp811));
  });

  /** 1 over the sheet's exact factors, by Python's decimal module with 25 digits; status: derived. */
  const INVERSES: Record<string, string> = {
    'lbf.ft': '0.73756214927726536388',
    'lbf.in': '8.8507457913271843665',
    'kgf.m': '0.10197162129779282426',
  };

  it.each(Object.entries(INVERSES))('1 N.m in %s is %s', (unit, inverse) => {
    const exact = divide(rational(1n), unitFactor(unit as Unit));
    expect(rationalToDecimal(exact, inverse.split('.')[1]?.length ?? 0)).toBe(inverse);
  });

  // The sheet's own inverses carry 20 digits but agree with 1 over its exact factors in the first 15 only.
  it.each(inverse_check.filter((row) => isUnit(row.of)))('1 N.m in $of, reference sheet, to 15 digits', (row) => {
    const exact = divide(rational(1n), unitFactor(row.of as Unit));
    expect(Math.abs(toNumber(exact) - Number(row.per_Nm))).toBeLessThan(Number(row.per_Nm) * 1e-15);
  });
});

describe('GNU units as an independent judge (Debian package units; run here)', () => {
  const THEIRS: Record<Unit, string> = {
    ...{ 'N.m': 'N m', 'lbf.ft': 'lbf ft', 'lbf.in': 'lbf in', 'kgf.m': 'kgf m' },
    ...{ deg: 'degree', mm: 'mm', in: 'in' },
  };
  const ask = (from: string, to: string): number => {
    const { error, stdout, stderr } = spawnSync('units', ['-t', '-d', '15', from, to], { encoding: 'utf8' });
    if (error) throw new Error(`GNU units cannot be run (${error.message}): install the package "units"`);
    if (stderr) throw new Error(`GNU units: ${stderr}`);
    return Number(stdout.trim());
  };

  it.each<[string, Unit, Unit]>([
    ...(['N.m', 'lbf.ft', 'lbf.in', 'kgf.m'] as const).flatMap((from) =>
      (['N.m', 'lbf.ft', 'lbf.in', 'kgf.m'] as const).map((to): [string, Unit, Unit] => ['73.25', from, to]),
    ),
    ['0.375', 'in', 'mm'],
    ['90', 'mm', 'in'],
  ])('%s %s in %s', (value, from, to) => {
    const ours = Number(convertQuantity({ value, unit: from }, to, 18).value);
    const theirs = ask(`${value} ${THEIRS[from]}`, THEIRS[to]);
    expect(Math.abs(ours - theirs)).toBeLessThan(Math.abs(theirs) * 1e-14);
  });
});

describe('rounding and limits', () => {
  it('REF-UNIT-21 (memory, confidence 0.9): ISO 80000-1 Annex B rule B, a tie goes away from zero', () => {
    const round = (text: string) => rationalToDecimal(decimalToRational(text), 1);
    expect([round('12.25'), round('12.35')]).toEqual(['12.3', '12.4']);
  });

  it('REF-UNIT-24 (memory, confidence 0.9): ISO 80000-1 Annex B, round once from the full value', () => {
    expect(rationalToDecimal(decimalToRational('12.251'), 1)).toBe('12.3');
    expect(rationalToDecimal(decimalToRational('12.249'), 1)).toBe('12.2');
  });

  it('REF-UNIT-25 (memory, confidence 0.7): SP 811 B.7.1, converted limits are rounded inward', () => {
    const window = { target: '75', low: '70', high: '80', unit: 'N.m' } as const;
    expect(showWindow(window, 'lbf.ft', 1)).toMatchObject({ low: '51.7', high: '59.0' });
  });

  it('REF-UNIT-23 (memory, confidence 0.8): 36 ft is 11.0 m', () => {
    expect(convertQuantity({ value: '432', unit: 'in' }, 'mm', 1)).toEqual({ value: '10972.8', unit: 'mm' });
    expect(rationalToDecimal(decimalToRational('10.9728'), 1)).toBe('11.0');
  });
});
