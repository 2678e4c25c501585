import type { Quantity } from '../quantity/quantity';
import type { TorqueUnit } from '../quantity/unit';

/** Kinds of wrench in a crib (product, "Words"): setting (click), dial or beam, digital torque, digital torque-angle. */
export type WrenchKind = 'setting' | 'dial' | 'torque' | 'torqueAngle' | 'angleGauge' | 'multiplier';

/** Where a wrench stands in its life (K1). */
export type WrenchState = 'inService' | 'quarantined' | 'away' | 'retired';

/** Turning direction, seen facing the head. */
export type Direction = 'cw' | 'ccw';

/**
 * A wrench as an event holds it (decision 1: facts that change behind the tablet's back are snapshotted). Decimals are
 * strings. `accuracy` is ± % of the reading and null where that direction is not calibrated; `turnAccuracy` ± degrees and
 * null where it measures no turn; `range` is the calibrated range; `resolution` in `unit` and degrees; `scaleStep` one
 * step of a setting wrench's scale, in `unit`; `drive` as written, `1/2 in`; `adapterOk` when an adapter to another
 * drive is at hand.
 */
export interface WrenchSnapshot {
  id: string;
  tag: string;
  serial: string;
  kind: WrenchKind;
  drive: string;
  range: { low: string; high: string; unit: TorqueUnit } | null;
  scaleStep?: string;
  unit: TorqueUnit;
  resolution: { torque: string | null; angle: string | null };
  accuracy: { cw: string | null; ccw: string | null };
  turnAccuracy: string | null;
  due: { date: string | null; cycles: number | null };
  cycles: number;
  state: WrenchState;
  certificate: string | null;
  effectiveLength?: Quantity;
  adapterOk?: boolean;
}
