import { err, ok, type Result } from '../kernel/result';

/** An exact fraction: `d` > 0 and both reduced, so that equal values have equal fields (J1). */
export interface Rational {
  n: bigint;
  d: bigint;
}

/** Why a text is no decimal: `malformed` (anything but digits, one point, a leading minus), `tooLong` (over 40 characters). */
export interface DecimalProblem {
  code: 'malformed' | 'tooLong';
}

/** How a decimal is cut: to the nearest (half away from zero), towards minus infinity, towards plus infinity. */
export type Rounding = 'nearest' | 'down' | 'up';

const DECIMAL = /^-?\d+(\.\d+)?$/;
const LONGEST = 40;

const magnitude = (n: bigint): bigint => (n < 0n ? -n : n);

function greatestDivisor(a: bigint, b: bigint): bigint {
  let [x, y] = [a, b];
  while (y !== 0n) [x, y] = [y, x % y];
  return x;
}

/** The reduced fraction n/d. Throws on d = 0. */
export function rational(n: bigint, d: bigint = 1n): Rational {
  if (d === 0n) throw new Error('A fraction cannot have the denominator 0');
  const divisor = greatestDivisor(magnitude(n), magnitude(d));
  const sign = d < 0n ? -1n : 1n;
  return { n: (sign * n) / divisor, d: magnitude(d) / divisor };
}

/** Reads `"30.0"` or `"-4.25"` exactly. No exponent, no plus sign, no bare point. */
export function parseDecimal(text: string): Result<Rational, DecimalProblem> {
  if (text.length > LONGEST) return err({ code: 'tooLong' });
  if (!DECIMAL.test(text)) return err({ code: 'malformed' });
  const [whole = '', fraction = ''] = text.split('.');
  return ok(rational(BigInt(whole + fraction), 10n ** BigInt(fraction.length)));
}

/** {@link parseDecimal} for a decimal already checked; throws on a malformed one, which is a broken invariant. */
export function decimalToRational(text: string): Rational {
  const parsed = parseDecimal(text);
  if (!parsed.ok) throw new Error(`Not a decimal (${parsed.error.code}): ${text.slice(0, LONGEST)}`);
  return parsed.value;
}

/** a + b, exactly. */
export function add(a: Rational, b: Rational): Rational {
  return rational(a.n * b.d + b.n * a.d, a.d * b.d);
}

/** a − b, exactly. */
export function subtract(a: Rational, b: Rational): Rational {
  return rational(a.n * b.d - b.n * a.d, a.d * b.d);
}

/** a × b, exactly. */
export function multiply(a: Rational, b: Rational): Rational {
  return rational(a.n * b.n, a.d * b.d);
}

/** a ÷ b, exactly. Throws when b is 0. */
export function divide(a: Rational, b: Rational): Rational {
  return rational(a.n * b.d, a.d * b.n);
}

/** −1, 0 or 1 as a is smaller than, equal to or greater than b: no epsilon (J1). */
export function compare(a: Rational, b: Rational): -1 | 0 | 1 {
  const difference = a.n * b.d - b.n * a.d;
  if (difference === 0n) return 0;
  return difference < 0n ? -1 : 1;
}

/** True for 0. */
export function isZero(a: Rational): boolean {
  return a.n === 0n;
}

/** −a. */
export function negate(a: Rational): Rational {
  return { n: -a.n, d: a.d };
}

/** |a|. */
export function abs(a: Rational): Rational {
  return { n: magnitude(a.n), d: a.d };
}

/** The nearest floating-point number, but for a last bit or so: for estimates and drawing, never for a comparison. */
export function toNumber(a: Rational): number {
  return Number(a.n) / Number(a.d);
}

function roundedQuotient(n: bigint, d: bigint, rounding: Rounding): bigint {
  const cut = n / d;
  const rest = n % d;
  if (rest === 0n) return cut;
  const away = n < 0n ? cut - 1n : cut + 1n;
  if (rounding === 'down') return n < 0n ? away : cut;
  if (rounding === 'up') return n < 0n ? cut : away;
  return magnitude(rest) * 2n >= d ? away : cut;
}

/** Writes a fraction with exactly `decimals` decimals, rounded once from the full value (REF-UNIT-24). Zero has no sign. */
export function rationalToDecimal(a: Rational, decimals: number, rounding: Rounding = 'nearest'): string {
  const scaled = roundedQuotient(a.n * 10n ** BigInt(decimals), a.d, rounding);
  const digits = magnitude(scaled)
    .toString()
    .padStart(decimals + 1, '0');
  const split = digits.length - decimals;
  const text = decimals === 0 ? digits : `${digits.slice(0, split)}.${digits.slice(split)}`;
  return scaled < 0n ? `-${text}` : text;
}
