import { scaleQuantity, type Quantity } from '../quantity/quantity';
import { unitKind, type TorqueUnit } from '../quantity/unit';
import { place, type Window } from '../quantity/window';
import type { SlipAnswer } from './events';

/** A slip that a typed figure looks like, and the figure it would then have been (W6). */
export interface Slip {
  kind: SlipAnswer['kind'];
  /** What would fit; for `sameAsBefore` the figure itself. */
  meant: Quantity;
}

const TORQUE_UNITS: readonly TorqueUnit[] = ['N.m', 'lbf.ft', 'lbf.in', 'kgf.m'];
const digitsOf = (value: string): number => value.replace(/^-?0*|\./g, '').length;

function inOtherUnit(value: Quantity, window: Window): Slip | null {
  if (unitKind(value.unit) !== 'torque') return null;
  for (const unit of TORQUE_UNITS) {
    if (unit === value.unit) continue;
    const other: Quantity = { value: value.value, unit };
    if (place(other, window) === 'in') return { kind: 'otherUnit', meant: other };
  }
  return null;
}

const scaled = (value: Quantity, factor: string, kind: SlipAnswer['kind'], window: Window): Slip | null => {
  const meant = scaleQuantity(value, factor);
  return place(meant, window) === 'in' ? { kind, meant } : null;
};

/**
 * The slip to ask about before a typed figure is judged off, or null (W6): ×10, ÷10, another unit, or the same three or more
 * digits as at the hole before (two digits of a turn repeat by themselves). Asks only; the technician answers.
 */
export function slipOf(value: Quantity, window: Window | null, before: Quantity | null): Slip | null {
  if (!window || unitKind(value.unit) !== unitKind(window.unit)) return null;
  if (place(value, window) === 'in') {
    const same = before !== null && before.unit === value.unit && before.value === value.value;
    return same && digitsOf(value.value) >= 3 ? { kind: 'sameAsBefore', meant: value } : null;
  }
  return scaled(value, '10', 'timesTen', window) ?? scaled(value, '0.1', 'tenth', window) ?? inOtherUnit(value, window);
}
