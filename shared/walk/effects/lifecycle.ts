import type {
  EventContext,
  HandsChanged,
  WalkOpened,
  WalkResumed,
  WalkSentBack,
  WalkSigned,
  WalkStopped,
  WalkTakenOver,
} from '../events';
import { makesUsed, stageOf, walkPasses } from '../slots';
import { slotDone } from '../route';
import type { Rework, WalkState } from '../state';
import { withDeviation, withUse } from './change';
import { withNewRework } from './rework';

/** `walk.opened`. After earlier readings a final assembly begins with a joint restart, used fasteners counted (W1, R6). */
export function walkOpened(state: WalkState, event: EventContext, data: WalkOpened): WalkState {
  const restart = data.purpose === 'finalAssembly' && data.earlier.readingsTaken;
  const rework: Rework = { kind: 'joint', deviation: null, phase: 'loosen', round: 1, done: [] };
  let next: WalkState = {
    ...state,
    opened: { ...data, at: event.at, by: event.by },
    tablet: event.tablet,
    hands: { pulls: data.pulls, records: data.records },
    reworks: restart ? [rework] : [],
  };
  for (const hole of data.earlier.usedHoles) next = withUse(next, hole);
  return next;
}

function interruptedRework(id: string, data: WalkResumed): Rework | null {
  const hole = data.at?.hole;
  if (data.way === 'restartJoint') return { kind: 'joint', deviation: id, phase: 'loosen', round: 1, done: [] };
  if (hole === undefined || (data.way !== 'restart' && data.way !== 'replace')) return null;
  return { kind: 'hole', way: data.way, hole, deviation: id, phase: 'loosen' };
}

/** `walk.resumed`: what was found is part of the record; a turn that may have begun makes the fastener used (W9, R3). */
export function walkResumed(state: WalkState, event: EventContext, data: WalkResumed): WalkState {
  const base: WalkState = { ...state, paused: null, mustLook: state.mustLook.slice(1) };
  if (data.begun === 'notBegun' || !data.at) return base;
  const slot = { ...data.at, round: state.rounds[data.at.pass] ?? 1 };
  const turn = stageOf(state, slot)?.stage.kind === 'turn';
  const rework = interruptedRework(`${event.seq}`, data);
  const settling = { reason: '', by: event.by, at: event.at, seq: event.seq };
  let next = withDeviation(base, event, {
    kind: 'interrupted',
    hole: slot.hole,
    slot,
    note: data.begun,
    status: rework ? 'settled' : 'noted',
    settlings: rework
      ? [
          {
            ...settling,
            choice: rework.kind === 'joint' ? 'restartJoint' : rework.way === 'replace' ? 'replace' : 'restart',
          },
        ]
      : [],
  });
  if (turn && makesUsed(state, slot)) next = withUse(next, slot.hole);
  const others = next.resumes.filter((begun) => begun.slot.hole !== slot.hole);
  if (rework) return withNewRework({ ...next, resumes: others }, rework);
  return data.way === 'asInstructed' ? next : { ...next, resumes: [...others, { slot, way: data.way }] };
}

/** `walk.signed`, `walk.countersigned`. */
export function walkSigned(
  state: WalkState,
  event: EventContext,
  data: WalkSigned,
  role: 'signer' | 'countersigner',
): WalkState {
  const earlier = state.signatures.map((sign) => (sign.seq === data.renews ? { ...sign, stands: false } : sign));
  const { meaning, seal } = data;
  const renews = data.renews === undefined ? {} : { renews: data.renews };
  const signature = { by: event.by, at: event.at, seq: event.seq, meaning, seal, role, stands: true, ...renews };
  return { ...state, signatures: [...earlier, signature] };
}

/** `walk.sentBack`: signatures no longer stand; each item waits for its answer (R11). */
export function walkSentBack(state: WalkState, event: EventContext, data: WalkSentBack): WalkState {
  let next: WalkState = { ...state, signatures: state.signatures.map((sign) => ({ ...sign, stands: false })) };
  for (const { hole, action, note } of data.items)
    next = withDeviation(next, event, { kind: 'sentBack', hole, action, note });
  return next;
}

/** Holes whose state nobody can vouch for after a forced takeover: from the last instruction on, in this pass (W11). */
function unseenHoles(state: WalkState): string[] {
  const round = (pass: string): number => state.rounds[pass] ?? 1;
  const pass = walkPasses(state).find((candidate) =>
    candidate.order.some((hole) =>
      candidate.stages.some(
        (stage) => !slotDone(state, { pass: candidate.id, hole, stage: stage.id, round: round(candidate.id) }),
      ),
    ),
  );
  if (!pass) return [];
  const open = (hole: string): boolean =>
    pass.stages.some((stage) => !slotDone(state, { pass: pass.id, hole, stage: stage.id, round: round(pass.id) }));
  return pass.order.filter(open);
}

/** `walk.takenOver`. */
export function walkTakenOver(state: WalkState, event: EventContext, data: WalkTakenOver): WalkState {
  const next: WalkState = { ...state, writer: 'tablet', tablet: data.tablet, boot: '' };
  if (!data.forced) return next;
  const noted = withDeviation(next, event, { kind: 'takenOver', status: 'noted', note: data.tablet });
  return { ...noted, mustLook: unseenHoles(state) };
}

/** `walk.stopped`: by order; `goOn` lets it walk again (A3). */
export function walkStopped(state: WalkState, data: WalkStopped): WalkState {
  return { ...state, stopped: data.why === 'goOn' ? null : { order: data.order, reason: data.reason } };
}

/** `hands.changed`. */
export const handsChanged = (state: WalkState, data: HandsChanged): WalkState => ({
  ...state,
  hands: { pulls: data.pulls, records: data.records },
});
