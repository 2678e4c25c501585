import type { WalkEvent } from '@shared/walk/events';

/** The photos and files that an event names by SHA-256. */
export const blobsOf = (event: WalkEvent): string[] => {
  switch (event.type) {
    case 'photo.added':
      return [event.data.blob];
    case 'thread.repaired':
      return [event.data.photo];
    case 'step.done':
      return event.data.photo === undefined ? [] : [event.data.photo];
    case 'reading.received':
      return event.data.curve === undefined ? [] : [event.data.curve];
    default:
      return [];
  }
};
