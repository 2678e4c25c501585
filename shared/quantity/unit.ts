import { multiply, rational, type Rational } from './rational';

/** Torque units by code. */
export type TorqueUnit = 'N.m' | 'lbf.ft' | 'lbf.in' | 'kgf.m';
/** Angle unit by code: degrees only. */
export type AngleUnit = 'deg';
/** Length units by code. */
export type LengthUnit = 'mm' | 'in';
/** Every unit that a quantity may carry. */
export type Unit = TorqueUnit | AngleUnit | LengthUnit;
/** What a unit measures: quantities compare only within one kind. */
export type UnitKind = 'torque' | 'angle' | 'length';

// 1 lbf = 0.45359237 kg × 9.80665 m/s² = 4.4482216152605 N; 1 ft = 0.3048 m; 1 in = 0.0254 m: exact by definition (J1).
const POUND_FORCE = rational(44_482_216_152_605n, 10n ** 13n);
const FOOT = rational(3_048n, 10_000n);
const INCH = rational(254n, 10_000n);
const KILOGRAM_FORCE = rational(980_665n, 100_000n);

const UNITS: Record<Unit, { kind: UnitKind; factor: Rational; symbol: string }> = {
  'N.m': { kind: 'torque', factor: rational(1n), symbol: 'N·m' },
  'lbf.ft': { kind: 'torque', factor: multiply(POUND_FORCE, FOOT), symbol: 'lbf·ft' },
  'lbf.in': { kind: 'torque', factor: multiply(POUND_FORCE, INCH), symbol: 'lbf·in' },
  'kgf.m': { kind: 'torque', factor: KILOGRAM_FORCE, symbol: 'kgf·m' },
  deg: { kind: 'angle', factor: rational(1n), symbol: '°' },
  mm: { kind: 'length', factor: rational(1n), symbol: 'mm' },
  in: { kind: 'length', factor: rational(254n, 10n), symbol: 'in' },
};

/** True for the code of a known unit. */
export function isUnit(text: string): text is Unit {
  return Object.hasOwn(UNITS, text);
}

/** The exact factor from a unit to the base of its kind: N·m, degree or mm (J1; REF-UNIT-01 to 04). */
export function unitFactor(unit: Unit): Rational {
  return UNITS[unit].factor;
}

/** What the unit measures. */
export function unitKind(unit: Unit): UnitKind {
  return UNITS[unit].kind;
}

/** The unit as shown: `N·m`, `lbf·ft`, `lbf·in`, `kgf·m`, `°`, `mm`, `in`. */
export function unitSymbol(unit: Unit): string {
  return UNITS[unit].symbol;
}
