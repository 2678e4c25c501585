import type { WalkEvent } from '@shared/walk/events';

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
  switch (event.type) {
    case 'walk.signed':
    case 'walk.countersigned':
      return {
        seal: event.data.seal,
        person: event.by,
        meaning: event.data.meaning,
        renews: event.data.renews ?? null,
      };
    case 'walk.sentBack':
      return { seal: event.data.seal, person: event.by, meaning: event.type, renews: null };
    case 'deviation.settled':
    case 'wait.skipped':
    case 'walk.voided': {
      const { seal } = event.data;
      const renews = 'renews' in event.data ? (event.data.renews ?? null) : null;
      return seal === undefined ? null : { seal, person: event.by, meaning: event.type, renews };
    }
    case 'wrench.taken': {
      const { override } = event.data;
      if (!override) return null;
      return { seal: override.seal, person: override.by, meaning: event.type, renews: override.renews ?? null };
    }
    default:
      return null;
  }
};
