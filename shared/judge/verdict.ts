import { divide, rational, subtract, toNumber, type Rational } from '../quantity/rational';
import { quantityToRational, type Quantity } from '../quantity/quantity';
import { unitFactor } from '../quantity/unit';
import { highLimit, lowLimit, place, type Window } from '../quantity/window';

/** What a reading is worth against its window; `lookAgain` is inside, but nearer to a limit than the guard allows. */
export type Verdict = 'in' | 'lookAgain' | 'under' | 'over';

/** `simple` judges by the limits alone; `guarded` keeps a distance from them (J5). */
export type JudgePolicy = 'simple' | 'guarded';

/**
 * All that a verdict hangs on; stored with the reading, so that it can be judged again for ever (J7). `uncertainty` and
 * `bias` are in the unit of `value`; `bias` is what was not corrected. Where the shop judges corrected values, `value` is
 * the corrected one and `bias` is left out.
 */
export interface JudgeInput {
  value: Quantity;
  window: Window;
  policy: JudgePolicy;
  uncertainty?: number;
  bias?: number;
}

/** Guard of one-sided 95 % against a false "in" (REF-DEC-21; J5). */
const GUARD_FACTOR = 1.65;

/** The distance kept from each limit: 1.65 u and the uncorrected bias (J5), in the unit of both. */
export function guardBand(uncertainty: number, bias = 0): number {
  return GUARD_FACTOR * uncertainty + Math.abs(bias);
}

/**
 * The verdict (J5). Limits decide exactly; a guard turns `in` into `lookAgain` and never makes an outside value `in`.
 * Only + − × ÷ and comparison are used, so that browser, worker and server agree to the last bit.
 */
export function judge({ value, window, policy, uncertainty = 0, bias = 0 }: JudgeInput): Verdict {
  const where = place(value, window);
  if (where !== 'in') return where;
  if (policy === 'simple') return 'in';
  const factor = unitFactor(value.unit);
  const inUnit = (difference: Rational): number => toNumber(divide(difference, factor));
  const at = quantityToRational(value);
  const aboveLow = inUnit(subtract(at, quantityToRational(lowLimit(window))));
  const belowHigh = inUnit(subtract(quantityToRational(highLimit(window)), at));
  const guard = guardBand(uncertainty, bias);
  return aboveLow < guard || belowHigh < guard ? 'lookAgain' : 'in';
}

/** The window's width in a unit of its kind. */
function widthIn(window: Window, unit: Window['unit']): number {
  const width = subtract(quantityToRational(highLimit(window)), quantityToRational(lowLimit(window)));
  return toNumber(divide(width, unitFactor(unit)));
}

/**
 * The share of a window, 0 to 1, that both guards leave. Under one half the wrench does not suit (J5); `guard` is in
 * `unit`, of the window's kind.
 */
export function shareLeft(window: Window, guard: number, unit: Window['unit']): number {
  const width = widthIn(window, unit);
  return Math.max(0, (width - 2 * guard) / width);
}

/**
 * The verdict on a setting (click) wrench: `in` when what it was set to is within one scale step of the target (W7), else
 * `under` or `over`. `scaleStep` is in the unit of `setting`.
 */
export function judgeSetting(setting: Quantity, target: Quantity, scaleStep: string): Exclude<Verdict, 'lookAgain'> {
  const off = subtract(quantityToRational(setting), quantityToRational(target));
  const step = quantityToRational({ value: scaleStep, unit: setting.unit });
  const past = subtract(rational(off.n < 0n ? -off.n : off.n, off.d), step);
  if (past.n <= 0n) return 'in';
  return off.n < 0n ? 'under' : 'over';
}
