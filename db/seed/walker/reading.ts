import type { Quantity } from '@shared/quantity/quantity';
import { convertQuantity, decimalsOf, subtractQuantities } from '@shared/quantity/quantity';
import { showWindow, type Window } from '@shared/quantity/window';
import type { ReadingEntry, Source } from '@shared/walk/events';
import type { PullInstruction } from '@shared/walk/instruction';
import type { TakenWrench } from '@shared/walk/state';
import type { Random } from './random';

/** A figure between the limits, near the target, as the wrench would show it. */
function near(window: Window, decimals: number, random: Random): string {
  const [target, low, high] = [window.target, window.low, window.high].map(Number) as [number, number, number];
  const spread = Math.min(target - low, high - target) || (high - low) / 2;
  const middle = target > low && target < high ? target : (low + high) / 2;
  const wished = Number((middle + random.bell() * spread * 0.22).toFixed(decimals));
  const inside = Math.max(low, Math.min(high, wished));
  return inside.toFixed(decimals);
}

const decimalsShown = (step: string | null): number => (step === null ? 0 : decimalsOf(step));

function torqueOf(window: Window, wrench: TakenWrench, random: Random): Quantity {
  if (wrench.wrench.kind === 'setting' && wrench.setting) return wrench.setting;
  const { unit, resolution } = wrench.wrench;
  const decimals = decimalsShown(resolution.torque);
  return { value: near(showWindow(window, unit, decimals), decimals, random), unit };
}

function turnOf(pull: PullInstruction, random: Random): Quantity {
  const window = pull.remaining ?? pull.window;
  if (!window) throw new Error(`a turn without a window at ${pull.slot.hole}`);
  const whole = {
    ...window,
    low: String(Math.ceil(Number(window.low))),
    high: String(Math.floor(Number(window.high))),
  };
  const value = { value: near(whole, 0, random), unit: 'deg' as const };
  if (pull.mode !== 'retype' || !pull.standing) return value;
  // Typed again is what that one pull showed; where it went past the window nothing makes it fit.
  const rest = subtractQuantities(value, pull.standing);
  return Number(rest.value) > 0 ? rest : { value: '5', unit: 'deg' };
}

/** End torques spread round a truth: the middle of what the manual lets expect. */
function endTorqueOf(pull: PullInstruction, wrench: TakenWrench, random: Random): Quantity | undefined {
  const expected = pull.endTorque.window ?? pull.monitor;
  if (pull.endTorque.use === 'unused' || !expected) return undefined;
  const low = Number(expected.low);
  const high = Number(expected.high);
  const value = (low + high) / 2 + random.bell() * (high - low) * 0.08;
  return convertQuantity({ value: value.toFixed(1), unit: expected.unit }, wrench.wrench.unit, 0);
}

/** How a reading of this wrench comes: clicked and gauged ones are typed by nobody. */
const sourceOf = (wrench: TakenWrench, wished: Source): Source => {
  if (wrench.wrench.kind === 'setting') return 'clicked';
  return wrench.wrench.kind === 'angleGauge' ? 'gauged' : wished;
};

/** In the first rounds some still turn, from the third on none does (R12). */
const movedIn = (round: number, random: Random): boolean => round < 3 && random.chance(0.5 / round);

const stripeReading = (pull: PullInstruction): ReadingEntry => ({
  ...pull.slot,
  source: 'marked',
  wrench: null,
  value: { value: pull.window?.target ?? '90', unit: 'deg' },
  shows: 'total',
  pulls: 1,
});

/** A reading as a careful technician would get it: inside the window, with what the stage asks for beside it. */
export function readingFor(
  pull: PullInstruction,
  wrench: TakenWrench | undefined,
  wished: Source,
  random: Random,
): ReadingEntry {
  if (pull.mode === 'finishByStripe' || !wrench) return stripeReading(pull);
  const isTurn = pull.stage.kind === 'turn';
  const source = sourceOf(wrench, wished);
  const window = pull.window ?? { target: '20', low: '10', high: '30', unit: wrench.wrench.unit };
  const endTorque = isTurn ? endTorqueOf(pull, wrench, random) : undefined;
  const repeated = pull.pass.repeat !== undefined;
  const moved = repeated ? movedIn(pull.slot.round, random) : undefined;
  return {
    ...pull.slot,
    source,
    wrench: wrench.wrench.id,
    value: isTurn ? turnOf(pull, random) : torqueOf(window, wrench, random),
    ...(isTurn ? { shows: pull.mode === 'finishByTotal' ? ('total' as const) : ('thisPull' as const) } : {}),
    ...(endTorque ? { endTorque } : {}),
    pulls: isTurn ? random.whole(1, 2) : 1,
    ...(source === 'clicked'
      ? { click: moved === false && pull.slot.round > 1 ? ('still' as const) : ('moving' as const) }
      : {}),
    ...(moved === undefined ? {} : { moved }),
    ...(pull.mode === 'retype' ? { retype: true } : {}),
  };
}
