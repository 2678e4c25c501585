import type { WalkStateName } from '@shared/contracts/walkRow.contract';
import { signersLeft, workInstruction } from '@shared/walk/instruction';
import { slotDone } from '@shared/walk/route';
import { takesReading, walkPasses } from '@shared/walk/slots';
import type { WalkState } from '@shared/walk/state';

/** What a list shows of a walk, from its state alone. */
export interface WalkSummary {
  state: WalkStateName;
  writer: string;
  pulls: string;
  records: string;
  readingsDone: number;
  readingsDue: number;
  openDeviations: number;
  readingsTaken: boolean;
  usedHoles: string[];
}

const isSigned = (state: WalkState): boolean =>
  state.everHands.length > 0 && signersLeft(state).length === 0 && state.signatures.some((sign) => sign.stands);

const isCountersigned = (state: WalkState): boolean =>
  state.signatures.some((sign) => sign.stands && sign.role === 'countersigner');

/** Signed by all who took readings, countersigned where the shop asks, and no tablet writes it any more (W12). */
export const isFinished = (state: WalkState): boolean => {
  const enough = isCountersigned(state) || state.opened?.policy.countersign === 'notRequired';
  return state.writer === 'shop' && isSigned(state) && enough;
};

const nameOf = (state: WalkState): WalkStateName => {
  if (state.voided) return 'voided';
  if (state.stopped) return 'stopped';
  if (isFinished(state)) return 'finished';
  if (isSigned(state)) return 'signed';
  const sentBack = state.deviations.some(({ kind, status }) => kind === 'sentBack' && status === 'open');
  if (sentBack) return 'sentBack';
  const now = { at: state.at, mono: state.mono, boot: state.boot };
  return state.opened && workInstruction(state, now).kind === 'sign' ? 'review' : 'walking';
};

const readingSlots = (state: WalkState) =>
  walkPasses(state).flatMap((pass) =>
    pass.order.flatMap((hole) =>
      pass.stages
        .filter(takesReading)
        .map((stage) => ({ pass: pass.id, hole, stage: stage.id, round: state.rounds[pass.id] ?? 1 })),
    ),
  );

/** Sums a walk up for lists: a projection that can be made again from the chain at any time (decision 14). */
export const walkSummary = (state: WalkState): WalkSummary => {
  const slots = readingSlots(state);
  return {
    state: nameOf(state),
    writer: state.writer === 'shop' ? 'office' : state.tablet,
    pulls: state.hands.pulls,
    records: state.hands.records,
    readingsDone: slots.filter((slot) => slotDone(state, slot)).length,
    readingsDue: slots.length,
    openDeviations: state.deviations.filter(({ status }) => status === 'open' || status === 'held').length,
    readingsTaken: state.readings.length > 0,
    usedHoles: Object.entries(state.holes)
      .filter(([, hole]) => hole.used)
      .map(([hole]) => hole),
  };
};
