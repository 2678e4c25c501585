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
import { jointLeft } from '../jointRework';
import { closePasses, reopenRounds } from './passes';

const isRework = (choice: Choice): choice is 'restart' | 'replace' | 'restartJoint' =>
  choice === 'restart' || choice === 'replace' || choice === 'restartJoint';

/** Whether anything was pulled at this fastener since it was last let go; a voided figure was pulled all the same. */
function isTightened(state: WalkState, hole: HoleId): boolean {
  const found = state.holes[hole];
  const pulled = state.readings.some(({ data, attempt }) => data.hole === hole && attempt === found?.attempt);
  return pulled || Object.keys(found?.slots ?? {}).length > 0 || state.resumes.some(({ slot }) => slot.hole === hole);
}

/** The rework that a decision begins; null where it begins none. A hole that is empty already is only filled. */
function reworkOf(state: WalkState, deviation: Deviation, choice: Choice): Rework | null {
  const { id, hole } = deviation;
  if (choice === 'restartJoint') return { kind: 'joint', deviation: id, phase: 'loosen', round: 1, done: [] };
  if (hole === null) return null;
  const present = state.holes[hole]?.present !== false;
  const from = (untouched: 'loosen' | 'remove') => (!present ? 'fit' : isTightened(state, hole) ? 'loosen' : untouched);
  const facts = { kind: 'hole', hole, deviation: id } as const;
  if (choice === 'restart' || choice === 'replace') return { ...facts, way: choice, phase: from('loosen') };
  if (choice === 'otherFastener') return { ...facts, way: 'replace', phase: from('remove') };
  return choice === 'quarterTurnBack' ? { ...facts, way: 'quarter', phase: 'loosen' } : null;
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
export function withoutEarlier(state: WalkState, deviation: Deviation): WalkState {
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
  const rework = reworkOf(next, deviation, choice);
  if (rework) next = withNewRework(next, rework);
  if (choice === 'awaitPart') next = { ...next, paused: 'noPartLeft' };
  return closePasses(next, event);
}

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
 * any other hole than the one on the screen, and for a second click, the last stage it took.
 */
function placeOfReport(
  state: WalkState,
  hole: HoleId,
  kind: DeviationNoted['kind'],
  now: Deviation['slot'],
): Deviation['slot'] {
  if (now?.hole === hole && kind !== 'clickedTwice') return now;
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
  const resumes = state.resumes.filter(({ slot }) => slot.hole !== hole);
  return { ...withoutSteps(cleared, hole), retype, resumes };
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
    // Whatever else was decided is carried out by this; that a hole gets another fastener still holds.
    reworks: state.reworks.filter(
      (rework, index) => index === 0 || (rework.kind === 'hole' && rework.way === 'replace'),
    ),
  };
}

function withRework(state: WalkState, change: Rework | null): WalkState {
  return { ...state, reworks: change ? [change, ...state.reworks.slice(1)] : state.reworks.slice(1) };
}

/** Opens the joint's next phase once nothing is left in this one. */
function advanceJoint(state: WalkState): WalkState {
  const rework = state.reworks[0];
  if (rework?.kind !== 'joint' || jointLeft(state, rework).length > 0) return state;
  if (rework.phase === 'fit') return withRework(state, null);
  if (rework.phase === 'remove') return advanceJoint(withRework(state, { ...rework, phase: 'fit', done: [] }));
  if (rework.round === 1) return advanceJoint(withRework(state, { ...rework, round: 2, done: [] }));
  return advanceJoint(withRework(jointLetGo(state), { ...rework, phase: 'remove', done: [] }));
}

/**
 * Puts a rework in its place. Earlier ones wait behind it until a fastener is really let go, so that they come back when
 * the later decision is changed (R2). A hole's comes before a joint's that was let go, else after it.
 */
export function withNewRework(state: WalkState, rework: Rework): WalkState {
  const { reworks } = state;
  if (rework.kind === 'joint') return advanceJoint({ ...state, reworks: [rework, ...reworks] });
  const same = reworks.findIndex((other) => other.kind === 'hole' && other.hole === rework.hole);
  const joint = reworks.findIndex((other) => other.kind === 'joint' && other.phase !== 'loosen');
  const at = same >= 0 ? same : joint >= 0 ? joint : reworks.length;
  return { ...state, reworks: [...reworks.slice(0, at), rework, ...reworks.slice(at)] };
}

/** `fastener.loosened`. */
export function fastenerLoosened(state: WalkState, event: EventContext, data: FastenerLoosened): WalkState {
  const loosened = [...state.loosened, { ...data, seq: event.seq, at: event.at }];
  const next = { ...state, loosened };
  const rework = state.reworks[0];
  if (!rework) return next;
  if (rework.kind === 'joint') return advanceJoint(withRework(next, { ...rework, done: [...rework.done, data.hole] }));
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
  if (rework?.kind === 'joint') return advanceJoint(out);
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
  // The hole is filled: every decision about what was in it is carried out.
  const reworks = next.reworks.filter((rework) => rework.kind === 'joint' || rework.hole !== data.hole);
  return advanceJoint({ ...next, reworks });
}

/** `thread.repaired`. */
export function threadRepaired(state: WalkState, data: ThreadRepaired): WalkState {
  return { ...state, toRepair: state.toRepair.filter((hole) => hole !== data.hole) };
}
