import { assertNever } from '../kernel/assertNever';
import type { EventContext, SlotRef, WalkEvent } from './events';
import {
  deviationNoted,
  deviationSettled,
  fastenerFitted,
  fastenerLoosened,
  fastenerRemoved,
  holdCleared,
  threadRepaired,
} from './effects/rework';
import {
  handsChanged,
  walkOpened,
  walkResumed,
  walkSentBack,
  walkSigned,
  walkStopped,
  walkTakenOver,
} from './effects/lifecycle';
import {
  partCorrected,
  partTaken,
  readingReceived,
  readingRejected,
  stepCorrected,
  stepDone,
  waitSkipped,
  wrenchReported,
  wrenchTaken,
} from './effects/preparation';
import { readingElsewhere, readingTaken, readingVoided, stageDone } from './effects/readings';
import { nextSlots } from './route';
import type { WalkState } from './state';

/** Office events leave the tablet's clock alone: they were not made on it. */
function withContext(state: WalkState, event: WalkEvent): WalkState {
  const { seq, at, mono, boot } = event;
  return event.tablet === 'office' ? { ...state, seq } : { ...state, seq, at, mono, boot };
}

const slotNow = (state: WalkState): SlotRef | null => nextSlots(state, 1)[0] ?? null;

function evolveLifecycle(state: WalkState, event: WalkEvent): WalkState | null {
  switch (event.type) {
    case 'walk.opened':
      return walkOpened(state, event, event.data);
    case 'walk.paused':
      return { ...state, paused: event.data.cause };
    case 'walk.resumed':
      return walkResumed(state, event, event.data);
    case 'walk.signed':
      return walkSigned(state, event, event.data, 'signer');
    case 'walk.countersigned':
      return walkSigned(state, event, event.data, 'countersigner');
    case 'walk.sentBack':
      return walkSentBack(state, event, event.data);
    case 'walk.released':
      return { ...state, writer: event.data.to };
    case 'walk.takenOver':
      return walkTakenOver(state, event, event.data);
    case 'walk.voided':
      return { ...state, voided: { reason: event.data.reason, seq: event.seq } };
    case 'walk.stopped':
      return walkStopped(state, event.data);
    case 'hands.changed':
      return handsChanged(state, event.data);
    default:
      return null;
  }
}

function evolvePreparation(state: WalkState, event: WalkEvent): WalkState | null {
  switch (event.type) {
    case 'step.done':
      return stepDone(state, event, event.data);
    case 'step.corrected':
      return stepCorrected(state, event, event.data);
    case 'part.taken':
      return partTaken(state, event, event.data);
    case 'part.corrected':
      return partCorrected(state, event, event.data);
    case 'wrench.taken':
      return wrenchTaken(state, event, event.data);
    case 'wrench.reported':
      return wrenchReported(state, event, event.data, slotNow(state));
    case 'wait.skipped':
      return waitSkipped(state, event, event.data);
    case 'note.added':
      return { ...state, notes: [...state.notes, { ...event.data, ...stamp(event) }] };
    case 'photo.added':
      return { ...state, photos: [...state.photos, { ...event.data, ...stamp(event) }] };
    default:
      return null;
  }
}

const stamp = ({ seq, by, at }: EventContext): { seq: number; by: string; at: string } => ({ seq, by, at });

function evolveReadings(state: WalkState, event: WalkEvent): WalkState | null {
  switch (event.type) {
    case 'turn.begun':
      return { ...state, begun: event.data };
    case 'stage.done':
      return stageDone(state, event, event.data);
    case 'reading.received':
      return readingReceived(state, event, event.data);
    case 'reading.rejected':
      return readingRejected(state, event, event.data.reason, slotNow(state));
    case 'reading.taken':
      return readingTaken(state, event, event.data);
    case 'reading.voided':
      return readingVoided(state, event, event.data.reading, event.data.reason);
    case 'reading.elsewhere':
      return readingElsewhere(state, event, event.data);
    default:
      return null;
  }
}

function evolveRework(state: WalkState, event: WalkEvent): WalkState | null {
  switch (event.type) {
    case 'deviation.noted':
      return deviationNoted(state, event, event.data, slotNow(state));
    case 'deviation.settled':
      return deviationSettled(state, event, event.data);
    case 'hold.set':
      return deviationSettled(state, event, {
        deviation: event.data.deviation,
        choice: 'hold',
        reason: event.data.note,
      });
    case 'hold.cleared':
      return holdCleared(state, event.data.deviation);
    case 'fastener.loosened':
      return fastenerLoosened(state, event, event.data);
    case 'fastener.removed':
      return fastenerRemoved(state, event.data.hole);
    case 'fastener.fitted':
      return fastenerFitted(state, event.data);
    case 'thread.repaired':
      return threadRepaired(state, event.data);
    default:
      return null;
  }
}

/**
 * What the walk is after one more event. Pure, holds no rule of what is allowed: `decide` does. Replaying a chain gives the
 * same state on the tablet, the server and the public page.
 */
export function evolve(state: WalkState, event: WalkEvent): WalkState {
  const next =
    evolveLifecycle(state, event) ??
    evolvePreparation(state, event) ??
    evolveReadings(state, event) ??
    evolveRework(state, event);
  return next ? withContext(next, event) : assertNever(event as never);
}

/** Replays a whole chain. */
export function replay(initial: WalkState, events: readonly WalkEvent[]): WalkState {
  return events.reduce(evolve, initial);
}
