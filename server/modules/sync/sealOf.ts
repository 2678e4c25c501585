import type { WalkEvent } from '@shared/walk/events';
import { sealMeaning } from '@shared/walk/sealMeaning';

/** A seal that an event carries: its hash, whose PIN it should hold, what for, and which earlier one it renews. */
export interface EventSeal {
  seal: string;
  person: string;
  meaning: string;
  renews: number | null;
}

/**
 * The seal of an event, or null. The meaning is that of the signature, else the event's name: a seal made for one thing
 * counts for no other.
 */
export const sealOf = (event: WalkEvent): EventSeal | null => {
  const carried = carrierOf(event);
  if (!carried?.seal) return null;
  return {
    seal: carried.seal,
    person: carried.by ?? event.by,
    meaning: sealMeaning(event),
    renews: carried.renews ?? null,
  };
};

const carrierOf = (event: WalkEvent): { seal?: string; renews?: number; by?: string } | null => {
  switch (event.type) {
    case 'walk.signed':
    case 'walk.countersigned':
    case 'walk.sentBack':
    case 'walk.voided':
    case 'deviation.settled':
    case 'wait.skipped':
    case 'reading.voided':
      return event.data;
    case 'wrench.taken':
      return event.data.override ?? null;
    default:
      return null;
  }
};
