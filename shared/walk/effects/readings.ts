import type { Deviation, DeviationKind } from '../deviation';
import type { EventContext, ReadingElsewhere, ReadingEntry, ReadingTaken, SlotRef, StageDone } from '../events';
import { judgeReading, pullsInAll } from '../judgeReading';
import { placeReading, type Placement } from '../placement';
import { makesUsed, sameSlot, slotKey, stageOf } from '../slots';
import type { ReadingRecord, SlotOutcome, WalkState } from '../state';
import { isLapsed } from '../../crib/due';
import { withDeviation, withDeviations, withHole, withOutcome, withUse } from './change';
import { closePasses, touchPass } from './passes';
import { withoutEarlier } from './rework';

const slotOf = (entry: SlotRef): SlotRef => ({
  pass: entry.pass,
  hole: entry.hole,
  stage: entry.stage,
  round: entry.round,
});

/** The slot that was on the screen: for *a different one* that of the hole that was asked for (R5). */
export const instructedSlot = (entry: ReadingEntry): SlotRef => ({
  ...slotOf(entry),
  hole: entry.insteadOf ?? entry.hole,
});

/** What is off about a reading where it counts, or null. Turn and end torque are judged apart, the turn comes first (R1). */
export function kindOf(state: WalkState, data: ReadingTaken, placement: Placement): DeviationKind | null {
  if (placement.kind === 'earlierMissing') return 'earlierStageMissing';
  if (placement.kind === 'afterTurn') return 'torqueAfterTurn';
  if (data.click === 'twice') return 'clickedTwice';
  if (data.verdict !== 'in') return data.verdict;
  if (data.click === 'still' && !stillIsWanted(state, data)) return 'clickedStill';
  if (data.endVerdict === 'over') return 'endTorqueOver';
  if (data.endVerdict === 'under') return 'endTorqueUnder';
  return data.endVerdict === 'lookAgain' ? 'endTorqueLookAgain' : null;
}

/** W7: a click without movement is the wanted answer in a repeat round or a check. */
function stillIsWanted(state: WalkState, data: ReadingTaken): boolean {
  const found = stageOf(state, data);
  return found?.stage.kind === 'check' || (found?.pass.repeat !== undefined && data.round > 1);
}

function recordOf(state: WalkState, event: EventContext, data: ReadingTaken, placement: Placement): ReadingRecord {
  const hole = state.holes[data.hole];
  const counts = placement.kind !== 'earlierMissing' && placement.kind !== 'afterTurn';
  return {
    seq: event.seq,
    at: event.at,
    mono: event.mono,
    boot: event.boot,
    by: event.by,
    pulledBy: state.hands.pulls,
    attempt: hole?.attempt ?? 1,
    fastenerNo: hole?.fastenerNo ?? 1,
    data,
    countsFor: counts ? placement.slot : null,
    before: placement.before,
    catchUpTo: hole?.catchUpTo ?? null,
    status: 'stands',
  };
}

function outcomeOf(event: EventContext, data: ReadingTaken, placement: Placement, off: boolean): SlotOutcome {
  return {
    status: off ? 'open' : 'done',
    seq: event.seq,
    total: data.total,
    pulls: pullsInAll(data, placement),
    verdict: data.verdict,
    ...(data.moved === undefined ? {} : { moved: data.moved }),
    ...(placement.kind === 'instructed' ? {} : { outOfOrder: true }),
  };
}

/** Facts that need no decision but are never left off the record. */
function withNotes(state: WalkState, event: EventContext, data: ReadingTaken, placement: Placement): WalkState {
  const about = { hole: data.hole, slot: placement.slot, reading: event.seq, status: 'noted' as const };
  let next = state;
  if (placement.kind !== 'instructed') next = withDeviation(next, event, { ...about, kind: 'outOfOrder' });
  if (data.changedFrom !== undefined) {
    next = withDeviation(next, event, { ...about, kind: 'changedValue', note: data.changedFrom });
  }
  const wrench = data.wrench === null ? undefined : state.wrenches[data.wrench];
  const known = state.deviations.some(
    (deviation) =>
      deviation.kind === 'wrenchLapsed' && deviation.note === data.wrench && deviation.slot?.pass === data.pass,
  );
  if (wrench && !known && isLapsed(wrench.wrench, event.at)) {
    next = withDeviation(next, event, { ...about, kind: 'wrenchLapsed', note: wrench.wrench.id });
  }
  return next;
}

function withHands(state: WalkState): WalkState {
  const hands = [...new Set([...state.everHands, state.hands.pulls, state.hands.records])];
  return { ...state, everHands: hands };
}

function applyReading(state: WalkState, event: EventContext, data: ReadingTaken, placement: Placement): WalkState {
  const off = kindOf(state, data, placement);
  const record = recordOf(state, event, data, placement);
  let next: WalkState = {
    ...withHands(state),
    readings: [...state.readings, record],
    retype: null,
    begun: null,
  };
  // What was begun waits on while another hole was tightened, or an earlier figure is typed again (R5, R10, W9).
  next = { ...next, resumes: next.resumes.filter((begun) => !sameSlot(begun.slot, placement.slot)) };
  if (record.countsFor) next = withOutcome(next, record.countsFor, outcomeOf(event, data, placement, off !== null));
  if (makesUsed(state, placement.slot)) next = withUse(next, data.hole);
  next = touchPass(next, data.pass, event, slotOf(data));
  if (off) {
    next = withDeviation(next, event, { kind: off, hole: data.hole, slot: placement.slot, reading: event.seq });
  }
  return closePasses(withNotes(next, event, data, placement), event);
}

/** `reading.taken`. */
export function readingTaken(state: WalkState, event: EventContext, data: ReadingTaken): WalkState {
  const wrenchNow = data.wrench ?? state.wrenchNow;
  const received = state.received?.seq === data.received ? null : state.received;
  return applyReading({ ...state, wrenchNow, received }, event, data, placeReading(state, data, instructedSlot(data)));
}

/** `reading.elsewhere`: a physical fact of a branch that was not chosen; it adds like any other pull (W11). */
export function readingElsewhere(state: WalkState, event: EventContext, data: ReadingElsewhere): WalkState {
  const { branch: _branch, seq: _seq, ...entry } = data;
  const placement = placeReading(state, { ...entry, insteadOf: entry.insteadOf ?? '' }, instructedSlot(entry));
  const taken = { ...entry, ...judgeReading(state, entry, placement) };
  const next = applyReading(state, event, taken, placement);
  const readings = next.readings.map((record) =>
    record.seq === event.seq ? { ...record, status: 'elsewhere' as const } : record,
  );
  return { ...next, readings };
}

const isAbout = (seq: number) => (deviation: Deviation) => deviation.reading === seq || deviation.seq === seq;

/** Rounds that the voided reading had opened or ended are taken back (R10, R12). */
function withRoundsBack(state: WalkState, slot: SlotRef): WalkState {
  const rounds =
    state.rounds[slot.pass] === slot.round + 1 ? { ...state.rounds, [slot.pass]: slot.round } : state.rounds;
  const times = state.passTimes[slot.pass];
  const passTimes = times ? { ...state.passTimes, [slot.pass]: { ...times, ended: null } } : state.passTimes;
  return { ...state, rounds, passTimes, roundsEnded: state.roundsEnded.filter((id) => id !== slot.pass) };
}

/** `reading.voided`: what stood before comes back, and the figure is typed again without a pull (R10). */
export function readingVoided(state: WalkState, event: EventContext, reading: number, reason: string): WalkState {
  const record = state.readings.find((candidate) => candidate.seq === reading);
  if (!record || record.status === 'voided') return state;
  const slot = record.countsFor ?? slotOf(record.data);
  const readings = state.readings.map((candidate) =>
    candidate.seq === reading ? { ...candidate, status: 'voided' as const, voidReason: reason } : candidate,
  );
  let next: WalkState = { ...withRoundsBack(state, slot), readings };
  next = withHole(next, slot.hole, (hole) => {
    const { [slotKey(slot)]: _gone, ...slots } = hole.slots;
    return {
      ...hole,
      catchUpTo: record.catchUpTo,
      slots: record.before ? { ...slots, [slotKey(slot)]: record.before } : slots,
    };
  });
  // What was decided about a figure that was never there goes with it, and what that had swept up is open again (R2).
  for (const deviation of next.deviations.filter(isAbout(reading))) next = withoutEarlier(next, deviation);
  next = withDeviations(next, isAbout(reading), (deviation) => ({ ...deviation, status: 'withdrawn' }));
  const wasOff = kindOf(state, record.data, { kind: 'instructed', slot, before: record.before }) !== null;
  if (wasOff) {
    next = withDeviation(next, event, {
      kind: 'voidedOutOfWindow',
      hole: slot.hole,
      slot,
      reading,
      status: 'noted',
      note: reason,
    });
  }
  const retypeSlot = { ...slotOf(record.data) };
  return {
    ...next,
    retype: { slot: retypeSlot, insteadOf: record.data.insteadOf ?? null, voided: reading, before: record.before },
  };
}

/** `stage.done`: run down, loosened, looked at: no figure. A mark that moved is a deviation (R12). */
export function stageDone(state: WalkState, event: EventContext, data: StageDone): WalkState {
  const slot = slotOf(data);
  const moved = data.result === 'moved';
  const outcome: SlotOutcome = { status: moved ? 'open' : 'done', seq: event.seq, total: null, verdict: null };
  let next = withOutcome(touchPass(withHands(state), data.pass, event, slot), slot, outcome);
  if (moved) next = withDeviation(next, event, { kind: 'witnessMoved', hole: slot.hole, slot });
  return closePasses({ ...next, begun: null }, event);
}
