import type { HoleId } from '../../procedure/procedure';
import { standingSettling, type Deviation } from '../deviation';
import type {
  Choice,
  DeviationNoted,
  DeviationSettled,
  EventContext,
  FastenerFitted,
  FastenerLoosened,
  ThreadRepaired,
} from '../events';
import { stepKey, stepsOfHole } from '../route';
import { fastenerOf, looseningOrder, makesUsed, slotKey, slotsOfHole } from '../slots';
import type { Rework, WalkState } from '../state';
import { withDeviation, withDeviations, withHole, withOutcome, withUse } from './change';
import { closePasses, reopenRounds } from './passes';

const isRework = (choice: Choice): choice is 'restart' | 'replace' | 'restartJoint' =>
  choice === 'restart' || choice === 'replace' || choice === 'restartJoint';

/** The rework that a decision begins; null where it begins none. */
function reworkOf(deviation: Deviation, choice: Choice): Rework | null {
  const { id, hole } = deviation;
  if (choice === 'restartJoint') return { kind: 'joint', deviation: id, phase: 'loosen', round: 1, done: [] };
  if (hole === null) return null;
  if (choice === 'restart' || choice === 'replace')
    return { kind: 'hole', way: choice, hole, deviation: id, phase: 'loosen' };
  if (choice === 'otherFastener') return { kind: 'hole', way: 'replace', hole, deviation: id, phase: 'remove' };
  if (choice === 'quarterTurnBack') return { kind: 'hole', way: 'quarter', hole, deviation: id, phase: 'loosen' };
  return null;
}

const statusAfter = (choice: Choice): Deviation['status'] =>
  choice === 'asItIs' || choice === 'hold' ? 'held' : 'settled';

function slotAfter(state: WalkState, deviation: Deviation, choice: Choice): WalkState {
  const slot = deviation.slot;
  const outcome = slot && state.holes[slot.hole]?.slots[slotKey(slot)];
  if (!slot || !outcome || deviation.hole === null) return state;
  const status = (
    { accept: 'accepted', goOn: 'done', pullAgain: 'partial', asItIs: 'held', hold: 'held', looked: 'done' } as const
  )[choice as 'accept'] as 'accepted' | 'done' | 'partial' | 'held' | undefined;
  return status ? withOutcome(state, slot, { ...outcome, status }) : state;
}

/** Takes back an earlier decision that had not begun: its rework goes, and what it had swept up is open again (R2). */
function withoutEarlier(state: WalkState, deviation: Deviation): WalkState {
  const last = standingSettling(deviation);
  if (!last) return state;
  const reworks = state.reworks.filter((rework) => rework.deviation !== deviation.id);
  return withDeviations(
    { ...state, reworks },
    (other) => other.id !== deviation.id && standingSettling(other)?.seq === last.seq,
    (other) => ({
      ...other,
      status: 'open',
    }),
  );
}

/** A restart or replacement answers everything else that is open about the same fastener, a joint restart everything. */
function sweep(state: WalkState, event: EventContext, deviation: Deviation, data: DeviationSettled): WalkState {
  if (!isRework(data.choice)) return state;
  const settling = { choice: data.choice, reason: data.reason, by: event.by, at: event.at, seq: event.seq };
  const covered = (other: Deviation): boolean =>
    other.id !== deviation.id &&
    (other.status === 'open' || other.status === 'held') &&
    other.kind !== 'sentBack' &&
    (data.choice === 'restartJoint' || other.hole === deviation.hole);
  return withDeviations(state, covered, (other) => ({
    ...other,
    status: 'settled',
    settlings: [...other.settlings, settling],
  }));
}

/** Steps that were answered *no* or outside limits come again; other decisions leave them. */
function stepsAfter(state: WalkState, deviation: Deviation, choice: Choice): WalkState {
  if (choice !== 'repeatStep' || deviation.step === undefined) return state;
  const { [stepKey(deviation.step, deviation.hole)]: _again, ...steps } = state.steps;
  return { ...state, steps };
}

/** `deviation.settled`. */
export function deviationSettled(state: WalkState, event: EventContext, data: DeviationSettled): WalkState {
  const deviation = state.deviations.find((candidate) => candidate.id === data.deviation);
  if (!deviation) return state;
  const { choice, reason, order } = data;
  const settling = {
    choice,
    reason,
    by: event.by,
    at: event.at,
    seq: event.seq,
    ...(order === undefined ? {} : { order }),
  };
  let next = data.renews === undefined ? withoutEarlier(state, deviation) : state;
  next = withDeviations(
    next,
    (other) => other.id === deviation.id,
    (other) => ({
      ...other,
      status: statusAfter(choice),
      settlings: [...other.settlings, settling],
    }),
  );
  if (data.renews !== undefined) return next;
  next = stepsAfter(slotAfter(sweep(next, event, deviation, data), deviation, choice), deviation, choice);
  const rework = reworkOf(deviation, choice);
  if (rework?.kind === 'joint') next = { ...next, reworks: [rework] };
  else if (rework)
    next = { ...next, reworks: [...next.reworks.filter((other) => !isOfHole(other, rework.hole)), rework] };
  if (choice === 'awaitPart') next = { ...next, paused: 'noPartLeft' };
  return closePasses(next, event);
}

const isOfHole = (rework: Rework, hole: HoleId): boolean => rework.kind === 'hole' && rework.hole === hole;

/** `hold.cleared`: the deviation waits for a decision again. */
export function holdCleared(state: WalkState, id: string): WalkState {
  const deviation = state.deviations.find((candidate) => candidate.id === id);
  const slot = deviation?.slot;
  const outcome = slot && state.holes[slot.hole]?.slots[slotKey(slot)];
  const next = slot && outcome && deviation.hole ? withOutcome(state, slot, { ...outcome, status: 'open' }) : state;
  return withDeviations(
    next,
    (other) => other.id === id,
    (other) => ({ ...other, status: 'open' }),
  );
}

const noted = new Set(['wrenchDropped', 'other']);

/**
 * The place a report is about: what is tightened now, at the hole that is named where a different one was tightened; for
 * any other hole than the one on the screen the last stage it took.
 */
function placeOfReport(
  state: WalkState,
  hole: HoleId,
  kind: DeviationNoted['kind'],
  now: Deviation['slot'],
): Deviation['slot'] {
  if (now?.hole === hole) return now;
  const own = slotsOfHole(state, hole);
  const same = now && own.find((slot) => slotKey(slot) === slotKey(now));
  if (kind === 'differentUnknown' && same) return same;
  const taken = own.filter((slot) => state.holes[hole]?.slots[slotKey(slot)] !== undefined);
  return taken.at(-1) ?? own[0] ?? null;
}

/** `deviation.noted`: what a person reports. */
export function deviationNoted(
  state: WalkState,
  event: EventContext,
  data: DeviationNoted,
  slot: Deviation['slot'],
): WalkState {
  const status = noted.has(data.kind) ? 'noted' : 'open';
  const about = data.hole === null ? slot : placeOfReport(state, data.hole, data.kind, slot);
  let next = withDeviation(state, event, { kind: data.kind, hole: data.hole, slot: about, status, note: data.note });
  if (data.kind === 'differentUnknown') {
    // Only of this hole: another whose figure was voided is still to be typed again, because it was pulled.
    if (state.retype?.slot.hole === data.hole) next = { ...next, retype: null };
    if (about && data.hole && makesUsed(state, about)) next = withUse(next, data.hole);
  }
  if (data.kind === 'strippedThread' && data.hole) next = { ...next, toRepair: [...next.toRepair, data.hole] };
  return next;
}

/** The furthest slot the hole had reached: a single hole catches up to there (R2, R5). */
function reached(state: WalkState, hole: HoleId): string | null {
  const taken = slotsOfHole(state, hole).filter((slot) => state.holes[hole]?.slots[slotKey(slot)] !== undefined);
  const last = taken.at(-1);
  return last ? slotKey({ ...last, round: 1 }) : null;
}

function withoutSteps(state: WalkState, hole: HoleId): WalkState {
  const keys = new Set(stepsOfHole(state, hole).map((step) => stepKey(step.id, hole)));
  return { ...state, steps: Object.fromEntries(Object.entries(state.steps).filter(([key]) => !keys.has(key))) };
}

/** A fastener that was let go begins again: nothing of its tension is left (R2). */
function letGo(state: WalkState, hole: HoleId, catchUpTo: string | null): WalkState {
  const cleared = withHole(state, hole, (value) => ({
    ...value,
    attempt: value.attempt + 1,
    counted: false,
    slots: {},
    catchUpTo,
  }));
  const retype = state.retype?.slot.hole === hole ? null : state.retype;
  return { ...withoutSteps(cleared, hole), retype, resume: null };
}

/** Everything the joint had is gone: rounds, times, steps, and the gasket counts again (R6). */
function jointLetGo(state: WalkState): WalkState {
  let next = state;
  for (const hole of looseningOrder(state.procedure)) next = letGo(next, hole, null);
  return {
    ...next,
    steps: {},
    rounds: {},
    roundsEnded: [],
    passTimes: {},
    waitsSkipped: [],
    restarts: state.restarts + 1,
  };
}

type JointRework = Extract<Rework, { kind: 'joint' }>;

function withRework(state: WalkState, change: Rework | null): WalkState {
  return { ...state, reworks: change ? [change, ...state.reworks.slice(1)] : state.reworks.slice(1) };
}

/** Adds a hole to the joint's phase; the last one opens the next phase. */
function jointStep(state: WalkState, rework: JointRework, hole: HoleId): WalkState {
  const done = [...rework.done, hole];
  if (done.length < looseningOrder(state.procedure).length) return withRework(state, { ...rework, done });
  if (rework.phase === 'loosen' && rework.round === 1) return withRework(state, { ...rework, round: 2, done: [] });
  if (rework.phase === 'loosen') return withRework(jointLetGo(state), { ...rework, phase: 'remove', done: [] });
  return withRework(state, rework.phase === 'remove' ? { ...rework, phase: 'fit', done: [] } : null);
}

/** `fastener.loosened`. */
export function fastenerLoosened(state: WalkState, event: EventContext, data: FastenerLoosened): WalkState {
  const loosened = [...state.loosened, { ...data, seq: event.seq, at: event.at }];
  const next = { ...state, loosened };
  const rework = state.reworks[0];
  if (!rework) return next;
  if (rework.kind === 'joint') return jointStep(next, rework, data.hole);
  if (rework.way === 'quarter') return withRework(quarterBack(next, rework.deviation), null);
  const free = letGo(reopenRounds(next, data.hole), data.hole, reached(state, data.hole));
  return withRework(free, { ...rework, phase: 'remove' });
}

/** W7: a quarter turn back, and the same stage is pulled again. */
function quarterBack(state: WalkState, deviationId: string): WalkState {
  const slot = state.deviations.find((deviation) => deviation.id === deviationId)?.slot;
  if (!slot) return state;
  return withHole(state, slot.hole, (hole) => {
    const { [slotKey(slot)]: _again, ...slots } = hole.slots;
    return { ...hole, slots };
  });
}

/** `fastener.removed`. */
export function fastenerRemoved(state: WalkState, hole: HoleId): WalkState {
  const out = withHole(state, hole, (value) => ({ ...value, present: false }));
  const rework = state.reworks[0];
  if (rework?.kind === 'joint') return jointStep(out, rework, hole);
  const cleared = withoutSteps(out, hole);
  return rework ? withRework(cleared, { ...rework, phase: 'fit' }) : cleared;
}

/** `fastener.fitted`. */
export function fastenerFitted(state: WalkState, data: FastenerFitted): WalkState {
  const isNew = data.part === 'new';
  let next = withHole(state, data.hole, (hole) => ({
    ...hole,
    present: true,
    used: isNew ? false : hole.used,
    uses: isNew ? 0 : hole.uses,
    fastenerNo: hole.fastenerNo + (isNew ? 1 : 0),
  }));
  if (isNew) {
    const type = fastenerOf(state.procedure, data.hole).id;
    next = { ...next, drawn: { ...next.drawn, [type]: (next.drawn[type] ?? 0) + 1 } };
  }
  const rework = state.reworks[0];
  if (rework?.kind === 'joint') return jointStep(next, rework, data.hole);
  return rework ? withRework(next, null) : next;
}

/** `thread.repaired`. */
export function threadRepaired(state: WalkState, data: ThreadRepaired): WalkState {
  return { ...state, toRepair: state.toRepair.filter((hole) => hole !== data.hole) };
}
