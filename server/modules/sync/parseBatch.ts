import { parseEnvelope, type Envelope, type SignedEvent } from '@shared/record/envelope';
import { isWalkEventType, eventOfEnvelope } from '@shared/walk/upcasts';
import type { WalkEvent } from '@shared/walk/events';
import { sha256Hex } from '../../deps';
import { badBatch } from './sync.errors';

/** An event of a batch: as sent, its envelope, and as the rules read it. */
export interface BatchEvent {
  signed: SignedEvent;
  envelope: Envelope;
  event: WalkEvent;
}

const readEvent = (signed: SignedEvent, index: number): BatchEvent => {
  if (sha256Hex(signed.text) !== signed.hash) {
    throw badBatch('wrongHash', 'The hash of an event is not that of its text.', index);
  }
  const parsed = parseEnvelope(signed.text);
  if (!parsed.ok) {
    const { code } = parsed.error;
    const field = 'field' in parsed.error ? { field: parsed.error.field } : {};
    if (code === 'unknownVersion') throw badBatch('unknownVersion', 'This version of events is not known.', index);
    if (code === 'tooLarge') throw badBatch('eventTooLarge', 'An event is too large.', index);
    throw badBatch('notCanonical', 'The text of an event is not in its canonical form.', index, {
      why: code,
      ...field,
    });
  }
  const envelope = parsed.value;
  if (!isWalkEventType(envelope.type)) {
    throw badBatch('unknownType', 'This kind of event is not known.', index, { type: envelope.type });
  }
  const event = eventOfEnvelope(envelope);
  if (!event) throw badBatch('unknownType', 'This kind of event is not known.', index, { type: envelope.type });
  return { signed, envelope, event };
};

const demandPlace = (envelope: Envelope, place: { shop: string; walk: string }, index: number): void => {
  if (envelope.shop !== place.shop) throw badBatch('otherShop', 'An event belongs to another shop.', index);
  if (envelope.walk !== place.walk) throw badBatch('otherWalk', 'An event belongs to another walk.', index);
};

/**
 * Reads a batch and checks what it says about itself: hash, canonical form, version, shop, walk, and that each event
 * follows the one before. Throws 400 with the index of the first that does not. Signatures are checked later, against the
 * key of the tablet.
 */
export const parseBatch = (events: readonly SignedEvent[], place: { shop: string; walk: string }): BatchEvent[] => {
  const batch = events.map(readEvent);
  batch.forEach(({ envelope }, index) => {
    demandPlace(envelope, place, index);
    const before = batch[index - 1];
    if (!before) return;
    if (envelope.seq !== before.envelope.seq + 1 || envelope.prev !== before.signed.hash) {
      throw badBatch('notConsecutive', 'An event does not follow the one before.', index);
    }
  });
  return batch;
};
