import type { Envelope } from '../record/envelope';
import { WALK_EVENT_TYPES, type WalkEvent, type WalkEventType } from './events';

const types: ReadonlySet<string> = new Set(WALK_EVENT_TYPES);

/** Whether a name is one of the closed list (decision 3). */
export const isWalkEventType = (type: string): type is WalkEventType => types.has(type);

/**
 * The event in an envelope as the reducer of today reads it, or null for a name it does not know. Version 1 needs no
 * change; a later version adds a named upcast here and a frozen chain to the tests, and old ones stay for ever.
 */
export function eventOfEnvelope(envelope: Envelope): WalkEvent | null {
  if (!isWalkEventType(envelope.type)) return null;
  const { seq, branch, at, mono, boot, by, tablet, known, type, data } = envelope;
  return { seq, branch, at, mono, boot, by, tablet, known, type, data } as WalkEvent;
}
