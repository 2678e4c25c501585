import type { Pass } from '../../procedure/procedure';
import type { EventContext } from '../events';
import { passDone } from '../route';
import { slotKey, walkPasses } from '../slots';
import type { PassTimes, WalkState } from '../state';
import { elapsedMs, withDeviation } from './change';

const noTimes: PassTimes = { begun: null, ended: null };

const instantOf = (event: EventContext) => ({ at: event.at, mono: event.mono, boot: event.boot });

/** Notes that a pass began, and finds a *finish within* that has passed (W8, R7), once per pass. */
export function touchPass(
  state: WalkState,
  passId: string,
  event: EventContext,
  slot: { hole: string; stage: string; round: number },
): WalkState {
  const times = state.passTimes[passId] ?? noTimes;
  const begun = times.begun ?? instantOf(event);
  const touched = { ...state, passTimes: { ...state.passTimes, [passId]: { ...times, begun } } };
  const limit = walkPasses(state).find((pass) => pass.id === passId)?.finishWithinMinutes;
  const late = limit !== undefined && elapsedMs(begun, event) > limit * 60_000;
  const known = state.deviations.some(
    (deviation) =>
      deviation.kind === 'finishWithinPassed' &&
      deviation.slot?.pass === passId &&
      deviation.seq >= (state.loosened.at(-1)?.seq ?? 0),
  );
  if (!late || known) return touched;
  return withDeviation(touched, event, { kind: 'finishWithinPassed', slot: { pass: passId, ...slot } });
}

function roundMoved(state: WalkState, pass: Pass, round: number): boolean {
  return pass.order.some((hole) =>
    pass.stages.some(
      (stage) => state.holes[hole]?.slots[slotKey({ pass: pass.id, stage: stage.id, round })]?.moved === true,
    ),
  );
}

/** R12: the first round in which none moved ends it; after the largest number of rounds the joint is looked at. */
function closeRound(state: WalkState, pass: Pass, event: EventContext): WalkState {
  const round = state.rounds[pass.id] ?? 1;
  if (!pass.repeat || state.roundsEnded.includes(pass.id)) return state;
  if (!roundMoved(state, pass, round)) return { ...state, roundsEnded: [...state.roundsEnded, pass.id] };
  if (round < pass.repeat.mostRounds) return { ...state, rounds: { ...state.rounds, [pass.id]: round + 1 } };
  const ended = { ...state, roundsEnded: [...state.roundsEnded, pass.id] };
  const slot = { pass: pass.id, hole: pass.order[0] ?? '', stage: pass.stages[0]?.id ?? '', round };
  return withDeviation(ended, event, { kind: 'stillMoving', slot });
}

function slotsDone(state: WalkState, pass: Pass): boolean {
  return passDone({ ...state, roundsEnded: [...state.roundsEnded, pass.id] }, pass);
}

/** Ends rounds and passes whose last hole was just done. Called after every event that can finish a slot. */
export function closePasses(state: WalkState, event: EventContext): WalkState {
  let next = state;
  for (const pass of walkPasses(state)) {
    if (!next.passTimes[pass.id]?.begun || !slotsDone(next, pass)) continue;
    next = closeRound(next, pass, event);
    const times = next.passTimes[pass.id] ?? noTimes;
    if (times.ended === null && passDone(next, pass)) {
      next = { ...next, passTimes: { ...next.passTimes, [pass.id]: { ...times, ended: instantOf(event) } } };
    }
  }
  return next;
}

/** A replaced fastener opens a repeated pass again from its second round on: the others may have relaxed (R12). */
export function reopenRounds(state: WalkState, hole: string): WalkState {
  let next = state;
  for (const pass of walkPasses(state)) {
    if (!pass.repeat || !pass.order.includes(hole) || !next.passTimes[pass.id]?.begun) continue;
    const holes = Object.fromEntries(
      Object.entries(next.holes).map(([id, value]) => [
        id,
        {
          ...value,
          slots: Object.fromEntries(Object.entries(value.slots).filter(([key]) => !laterRound(key, pass.id))),
        },
      ]),
    );
    const rounds = { ...next.rounds, [pass.id]: 1 };
    next = { ...next, holes, rounds, roundsEnded: next.roundsEnded.filter((id) => id !== pass.id) };
  }
  return next;
}

const laterRound = (key: string, passId: string): boolean => {
  const [pass, , round] = key.split('/');
  return pass === passId && Number(round) > 1;
};
