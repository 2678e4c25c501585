import type {
  EventContext,
  PartCorrected,
  PartTaken,
  ReadingReceived,
  StepCorrected,
  StepDone,
  WaitSkipped,
  WrenchReported,
  WrenchTaken,
} from '../events';
import { stepKey, stockOf } from '../route';
import { slotKey, stageOf, windowOf } from '../slots';
import { unitKind } from '../../quantity/unit';
import { place } from '../../quantity/window';
import type { WalkState } from '../state';
import type { SlotRef } from '../events';
import { withDeviation, withDeviations } from './change';

function stepFound(state: WalkState, event: EventContext, data: StepDone): WalkState {
  const about = { hole: data.hole, step: data.step };
  let next = state;
  if (data.answer === 'no') next = withDeviation(next, event, { ...about, kind: 'stepNo' });
  else if (data.inLimits === false) next = withDeviation(next, event, { ...about, kind: 'stepOutside' });
  if (data.otherLubricant !== undefined) {
    next = withDeviation(next, event, { ...about, kind: 'otherLubricant', status: 'noted', note: data.otherLubricant });
  }
  return next;
}

/** `step.done`. */
export function stepDone(state: WalkState, event: EventContext, data: StepDone): WalkState {
  const step = state.procedure.steps.find((candidate) => candidate.id === data.step);
  const steps = { ...state.steps, [stepKey(data.step, data.hole)]: { ...data, seq: event.seq } };
  const painted = step?.paintsStripes === true && data.answer === 'yes';
  const attempts = Object.fromEntries(Object.entries(state.holes).map(([id, hole]) => [id, hole.attempt]));
  return stepFound({ ...state, steps, striped: painted ? attempts : state.striped }, event, data);
}

/** `step.corrected`: the new answer stands, both are in the chain (R10). */
export function stepCorrected(state: WalkState, event: EventContext, data: StepCorrected): WalkState {
  const entry = Object.entries(state.steps).find(([, record]) => record.seq === data.corrects);
  if (!entry) return state;
  const [key, before] = entry;
  const { corrects: _corrects, reason: _reason, ...answer } = data;
  const corrected: StepDone = { ...before, ...answer };
  if (data.inLimits === undefined) delete corrected.inLimits;
  const open = withDeviations(
    state,
    (deviation) => deviation.seq === data.corrects && deviation.status === 'open',
    (deviation) => ({
      ...deviation,
      status: 'withdrawn',
    }),
  );
  return stepFound({ ...open, steps: { ...open.steps, [key]: { ...corrected, seq: event.seq } } }, event, corrected);
}

/** `part.taken`: ends the pause for want of one (R7). */
export function partTaken(state: WalkState, event: EventContext, data: PartTaken): WalkState {
  const next: WalkState = { ...state, parts: [...state.parts, { ...data, seq: event.seq }] };
  return state.paused === 'noPartLeft' && stockOf(next, data.part) > 0 ? { ...next, paused: null } : next;
}

/** `part.corrected`. */
export function partCorrected(state: WalkState, event: EventContext, data: PartCorrected): WalkState {
  const { corrects, partNumber, batch, count } = data;
  const parts = state.parts.map((part) =>
    part.seq === corrects ? { ...part, partNumber, batch, count, seq: event.seq } : part,
  );
  return { ...state, parts };
}

/** `wrench.taken`. */
export function wrenchTaken(state: WalkState, event: EventContext, data: WrenchTaken): WalkState {
  const before = state.wrenches[data.wrench.id];
  const taken = { ...data, seq: event.seq, out: before?.out ?? null, limitAt: before?.limitAt ?? [] };
  const next: WalkState = {
    ...state,
    wrenches: { ...state.wrenches, [data.wrench.id]: taken },
    wrenchNow: data.wrench.id,
  };
  if (!data.override) return next;
  return withDeviation(next, event, { kind: 'wrenchOverride', status: 'noted', note: data.override.reason });
}

/** `wrench.reported`: dropped or overloaded is out at once; at its limit another takes what is left (K4, W9). */
export function wrenchReported(
  state: WalkState,
  event: EventContext,
  data: WrenchReported,
  slot: SlotRef | null,
): WalkState {
  const taken = state.wrenches[data.wrench];
  if (!taken) return state;
  const limitAt =
    data.what === 'reachedLimit' && slot ? [...taken.limitAt, `${slotKey(slot)}@${slot.hole}`] : taken.limitAt;
  const out = data.what === 'reachedLimit' ? taken.out : data.what;
  const next = { ...state, wrenches: { ...state.wrenches, [data.wrench]: { ...taken, out, limitAt } } };
  return withDeviation(next, event, { kind: 'wrenchDropped', status: 'noted', note: `${data.what} ${data.wrench}` });
}

/** `reading.received`: waits to be taken or rejected. */
export const readingReceived = (state: WalkState, event: EventContext, data: ReadingReceived): WalkState => ({
  ...state,
  received: { ...data, seq: event.seq },
});

/** `reading.rejected`: one that was not in its window is shown first (R10); any other stays in the chain alone. */
export function readingRejected(
  state: WalkState,
  event: EventContext,
  reason: string,
  slot: SlotRef | null,
): WalkState {
  const sent = state.received?.value;
  const stage = slot && stageOf(state, slot)?.stage;
  const window = slot && stage ? windowOf(state.procedure, stage, slot.hole) : null;
  const next: WalkState = { ...state, received: null };
  const inside = sent && window && unitKind(sent.unit) === unitKind(window.unit) && place(sent, window) === 'in';
  if (inside) return next;
  const about = { slot, hole: slot?.hole ?? null, status: 'noted' as const, note: reason };
  return withDeviation(next, event, { ...about, kind: 'rejectedOutOfWindow' });
}

/** `wait.skipped` (W8). */
export function waitSkipped(state: WalkState, event: EventContext, data: WaitSkipped): WalkState {
  const next = { ...state, waitsSkipped: [...state.waitsSkipped, data.pass] };
  return data.renews === undefined
    ? withDeviation(next, event, { kind: 'waitSkipped', status: 'noted', note: data.reason })
    : next;
}
