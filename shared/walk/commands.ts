import type { Role } from '../people/roles';
import type {
  EventContext,
  ReadingElsewhere,
  ReadingEntry,
  StepCorrected,
  StepDone,
  WalkEvent,
  WalkEventData,
  WalkEventType,
} from './events';

/** Data a person gives: an event's data without what the rules compute from it. */
export interface WalkCommandData extends Omit<WalkEventData, 'reading.taken' | 'step.done' | 'step.corrected'> {
  'reading.taken': ReadingEntry;
  'step.done': Omit<StepDone, 'inLimits'>;
  'step.corrected': Omit<StepCorrected, 'inLimits'>;
  'reading.elsewhere': ReadingElsewhere;
}

/** What somebody wants to happen. One command makes exactly one event or one refusal (decision 1). */
export type WalkCommand = {
  [T in WalkEventType]: {
    type: T;
    data: WalkCommandData[T];
  } & Pick<EventContext, 'at' | 'mono' | 'boot' | 'by' | 'tablet' | 'known'> & {
      /** Roles of `by` as the writer knows them at `known` (P1, rights). */
      roles: readonly Role[];
      /** Hash of the chain head this command was made against; absent = not checked (decision 11). */
      head?: string;
    };
}[WalkEventType];

const withoutComputed = (event: WalkEvent): unknown => {
  if (event.type === 'reading.taken') {
    const { window: _w, total: _t, verdict: _v, endVerdict: _e, ...entry } = event.data;
    return entry;
  }
  if (event.type === 'step.done' || event.type === 'step.corrected') {
    const { inLimits: _l, ...entry } = event.data;
    return entry;
  }
  return event.data;
};

/**
 * The command that would make this event: what the server decides again before it stores it (decision 1).
 * `roles` are those of the event's person at the event's catalogue cursor.
 */
export function commandOf(event: WalkEvent, roles: readonly Role[]): WalkCommand {
  const { at, mono, boot, by, tablet, known, type } = event;
  return { type, data: withoutComputed(event), at, mono, boot, by, tablet, known, roles } as WalkCommand;
}
