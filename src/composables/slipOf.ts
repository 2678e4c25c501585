import { compareQuantities, scaleQuantity, type Quantity } from '@shared/quantity/quantity';
import { unitKind, type Unit } from '@shared/quantity/unit';
import type { Verdict } from '@shared/judge/verdict';
import type { SlipAnswer } from '@shared/walk/events';

/** A figure that may be a slip of the finger, and what it may have been meant to be (W6). */
export interface Slip {
  kind: SlipAnswer['kind'];
  typed: Quantity;
  /** What it becomes where the person says so; null: it is typed again. */
  meant: Quantity | null;
}

/** What is known when the figure is about to be recorded. `verdict` judges any quantity as this very reading. */
export interface SlipQuestion {
  value: Quantity;
  verdict: (value: Quantity) => Verdict;
  /** What the hole before showed, by the same wrench; null where there is none. */
  before: Quantity | null;
}

const TORQUE_UNITS: readonly Unit[] = ['N.m', 'lbf.ft', 'kgf.m', 'lbf.in'];

const trimmed = ({ value, unit }: Quantity): Quantity =>
  value.includes('.') ? { value: value.replace(/\.?0+$/, ''), unit } : { value, unit };

/** Same digits: `60` after `60`, and `60.0` after `60.0`; another decimal is another look at the wrench. */
const isSameText = (a: Quantity, b: Quantity): boolean => a.unit === b.unit && a.value === b.value;

/**
 * What has to be asked about a figure before it is recorded (W6): it would fit after ×10, after ÷10 or in another unit, or
 * it has the digits of the hole before. Null where nothing is to be asked. At most one question, the likeliest first.
 */
export function slipOf({ value, verdict, before }: SlipQuestion): Slip | null {
  if (verdict(value) !== 'in') {
    const scaled = (['timesTen', 'tenth'] as const).map((kind) => ({
      kind,
      typed: value,
      meant: trimmed(scaleQuantity(value, kind === 'timesTen' ? '10' : '0.1')),
    }));
    const others = TORQUE_UNITS.filter((unit) => unitKind(value.unit) === 'torque' && unit !== value.unit).map(
      (unit) => ({ kind: 'otherUnit' as const, typed: value, meant: { value: value.value, unit } }),
    );
    const fits = [...scaled, ...others].find(({ meant }) => verdict(meant) === 'in');
    if (fits) return fits;
  }
  if (before && isSameText(value, before) && compareQuantities(value, before) === 0) {
    return { kind: 'sameAsBefore', typed: value, meant: null };
  }
  return null;
}
