import { compareQuantities } from '../quantity/quantity';
import type { HoleId, Pass, Stage } from '../procedure/procedure';
import type { Deviation } from './deviation';
import { standingSettling } from './deviation';
import type { Choice, SlotRef } from './events';
import { isSpent, slotKey, slotsOfHole, stageOf, windowOf } from './slots';
import type { ReadingRecord, WalkState } from './state';

/** Why a choice is not offered: shown under the choices, because "no" wants a reason. */
export interface NotOffered {
  choice: Choice;
  why:
    | 'pastWindow'
    | 'endTorqueOver'
    | 'laterStageTaken'
    | 'singleUseUsed'
    | 'jointRule'
    | 'stripped'
    | 'noReading'
    | 'outsideRange'
    | 'secondPullTightens'
    | 'beforeTurnOnly';
}

/** What may be decided about one deviation now. */
export interface Offers {
  offered: Choice[];
  notOffered: NotOffered[];
  /** *The figure was typed wrong*: a typed reading, before the next one (R10). */
  mayVoid: boolean;
}

interface Case {
  state: WalkState;
  deviation: Deviation;
  reading: ReadingRecord | null;
  slot: SlotRef | null;
  stage: Stage | null;
  pass: Pass | null;
}

const none: Offers = { offered: [], notOffered: [], mayVoid: false };

/** Whether any later stage was taken at this hole (R1). */
export function laterStageTaken(state: WalkState, slot: SlotRef): boolean {
  const slots = slotsOfHole(state, slot.hole);
  const here = slots.findIndex((candidate) => slotKey(candidate) === slotKey(slot));
  return slots.slice(here + 1).some((later) => state.holes[slot.hole]?.slots[slotKey(later)] !== undefined);
}

const anyTurnTaken = (state: WalkState, hole: HoleId): boolean =>
  slotsOfHole(state, hole).some(
    (slot) => stageOf(state, slot)?.stage.kind === 'turn' && state.holes[hole]?.slots[slotKey(slot)] !== undefined,
  );

/** The stage that follows at this hole, or null. */
function followingStage(state: WalkState, slot: SlotRef): Stage | null {
  const slots = slotsOfHole(state, slot.hole);
  const here = slots.findIndex((candidate) => slotKey(candidate) === slotKey(slot));
  const next = slots.slice(here + 1).find((later) => later.pass !== slot.pass || later.stage !== slot.stage);
  return next ? (stageOf(state, next)?.stage ?? null) : null;
}

/** R4: over, yet below the next torque target at that hole; never before a turn, never where the procedure is strict. */
export function mayGoOn(state: WalkState, slot: SlotRef, reading: ReadingRecord): boolean {
  const stage = stageOf(state, slot)?.stage;
  const next = followingStage(state, slot);
  if (stage?.kind !== 'torque' || stage.strict || next?.kind !== 'torque') return false;
  const window = windowOf(state.procedure, next, slot.hole);
  return window !== null && compareQuantities(reading.data.total, { value: window.target, unit: window.unit }) < 0;
}

/** Restart, replace or restart joint, as the rework rule and R3 allow. */
function renewal({ state, deviation, pass }: Case): Offers {
  const hole = deviation.hole;
  if (hole === null) return { ...none, offered: ['restartJoint'] };
  if (pass?.rework.allows === 'joint') {
    return {
      ...none,
      offered: ['restartJoint'],
      notOffered: [
        { choice: 'restart', why: 'jointRule' },
        { choice: 'replace', why: 'jointRule' },
      ],
    };
  }
  if (isSpent(state, hole))
    return { ...none, offered: ['replace'], notOffered: [{ choice: 'restart', why: 'singleUseUsed' }] };
  return { ...none, offered: ['restart', 'replace'] };
}

function outsideRange({ state, reading }: Case): boolean {
  const wrench = reading?.data.wrench ? state.wrenches[reading.data.wrench]?.wrench : undefined;
  if (!reading || !wrench?.range || reading.data.total.unit === 'deg') return false;
  const { low, high, unit } = wrench.range;
  const { total } = reading.data;
  return compareQuantities(total, { value: low, unit }) < 0 || compareQuantities(total, { value: high, unit }) > 0;
}

/** R9: accept, or hold where no supervisor is there; never for what nobody could answer for. */
function acceptance(found: Case): Offers {
  if (!found.reading) return { ...none, notOffered: [{ choice: 'accept', why: 'noReading' }] };
  if (outsideRange(found)) return { ...none, notOffered: [{ choice: 'accept', why: 'outsideRange' }] };
  return { ...none, offered: ['accept', 'hold'] };
}

function join(...parts: Offers[]): Offers {
  return {
    offered: [...new Set(parts.flatMap((part) => part.offered))],
    notOffered: parts.flatMap((part) => part.notOffered),
    mayVoid: parts.some((part) => part.mayVoid),
  };
}

const offer = (...offered: Choice[]): Offers => ({ ...none, offered });
const deny = (choice: Choice, why: NotOffered['why']): Offers => ({ ...none, notOffered: [{ choice, why }] });

function underOffers(found: Case): Offers {
  const { state, slot, reading } = found;
  if (slot && laterStageTaken(state, slot))
    return join(deny('pullAgain', 'laterStageTaken'), renewal(found), acceptance(found));
  if (reading?.data.endVerdict === 'over') {
    return join(deny('pullAgain', 'endTorqueOver'), renewal(found), offer('restartJoint'), acceptance(found));
  }
  return join(offer('pullAgain'), renewal(found), acceptance(found));
}

function overOffers(found: Case): Offers {
  const { state, slot, reading, stage } = found;
  const past = deny('pullAgain', 'pastWindow');
  const goesOn = stage?.kind === 'torque' && slot !== null && reading !== null && mayGoOn(state, slot, reading);
  return join(goesOn ? offer('goOn') : none, renewal(found), acceptance(found), past);
}

function clickedOffers(found: Case): Offers {
  const { state, deviation, slot, reading } = found;
  if (deviation.kind === 'clickedTwice') {
    const goesOn = slot !== null && reading !== null && mayGoOn(state, slot, reading);
    return join(goesOn ? offer('goOn') : offer('asItIs'), renewal(found));
  }
  const turned = deviation.hole !== null && anyTurnTaken(state, deviation.hole);
  const back = turned ? deny('quarterTurnBack', 'beforeTurnOnly') : offer('quarterTurnBack');
  return join(back, renewal(found), offer('accept', 'hold'));
}

function sentBackOffers({ deviation }: Case): Offers {
  switch (deviation.action) {
    case 'restart':
    case 'replace':
    case 'restartJoint':
      return offer(deviation.action);
    case 'look':
      return offer('looked');
    default:
      return offer('answered');
  }
}

const endTorqueOffers = (found: Case): Offers =>
  join(renewal(found), offer('restartJoint'), acceptance(found), deny('pullAgain', 'pastWindow'));

/** R8: look; never pull again, never check by pulling: a second pull tightens. */
const lookOffers = (found: Case): Offers =>
  join(offer('asItIs'), renewal(found), deny('pullAgain', 'secondPullTightens'));

/** R7: nothing lets a stripped thread go on. */
const strippedOffers = (): Offers =>
  join(offer('restartJoint'), deny('accept', 'stripped'), deny('pullAgain', 'stripped'), deny('goOn', 'stripped'));

function brokenOffers(found: Case): Offers {
  const replaces = renewal(found).offered.includes('replace') ? offer('replace') : none;
  return join(replaces, offer('restartJoint'), deny('accept', 'stripped'));
}

/** R7: put right and repeat the step, another fastener, or pause. */
const stepOffers = ({ deviation }: Case): Offers =>
  deviation.hole === null ? offer('repeatStep') : offer('repeatStep', 'otherFastener');

const jointLook = (): Offers => offer('asItIs', 'restartJoint');

const byKind: Partial<Record<Deviation['kind'], (found: Case) => Offers>> = {
  over: overOffers,
  under: underOffers,
  endTorqueOver: endTorqueOffers,
  endTorqueUnder: endTorqueOffers,
  lookAgain: lookOffers,
  endTorqueLookAgain: lookOffers,
  torqueAfterTurn: lookOffers,
  clickedStill: clickedOffers,
  clickedTwice: clickedOffers,
  earlierStageMissing: renewal,
  differentUnknown: renewal,
  strippedThread: strippedOffers,
  brokenFastener: brokenOffers,
  noPartLeft: () => offer('awaitPart'),
  stepNo: stepOffers,
  stepOutside: stepOffers,
  doesNotRunIn: stepOffers,
  finishWithinPassed: () => offer('restartJoint', 'accept', 'hold'),
  stillMoving: jointLook,
  witnessMoved: jointLook,
  sentBack: sentBackOffers,
};

const offersOf = (found: Case): Offers => byKind[found.deviation.kind]?.(found) ?? none;

/** R10: typed, and no reading at whatever hole since. */
export function mayVoid(state: WalkState, reading: ReadingRecord): boolean {
  const signed = state.signatures.some((signature) => signature.stands);
  const last = state.readings.filter((candidate) => candidate.status !== 'elsewhere').at(-1);
  const moved = state.loosened.some((loosened) => loosened.seq > reading.seq);
  return reading.status === 'stands' && last?.seq === reading.seq && !signed && !moved;
}

/** Everything that may be decided about this deviation, and why the rest may not (R1–R9, R11). */
export function offersFor(state: WalkState, deviation: Deviation): Offers {
  const reading = state.readings.find((record) => record.seq === deviation.reading) ?? null;
  const at = deviation.slot ? stageOf(state, deviation.slot) : null;
  const found: Case = {
    state,
    deviation,
    reading,
    slot: deviation.slot,
    stage: at?.stage ?? null,
    pass: at?.pass ?? null,
  };
  const offers = offersOf(found);
  const typed = reading?.data.source === 'typed' || reading?.data.source === 'paper';
  return { ...offers, mayVoid: reading !== null && typed && mayVoid(state, reading) };
}

/** R2: a settling may still be changed while nothing was loosened or pulled for it; held ones wait for a supervisor. */
export function settlingOpen(state: WalkState, deviation: Deviation): boolean {
  if (deviation.status === 'open' || deviation.status === 'held') return true;
  const last = standingSettling(deviation);
  if (deviation.status !== 'settled' || !last) return false;
  const { slot } = deviation;
  if (last.choice === 'pullAgain')
    return slot !== null && state.holes[slot.hole]?.slots[slotKey(slot)]?.status === 'partial';
  const rework = state.reworks.find((candidate) => candidate.deviation === deviation.id);
  return rework?.phase === 'loosen' && !state.loosened.some((loosened) => loosened.seq > last.seq);
}
