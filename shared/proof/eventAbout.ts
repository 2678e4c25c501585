import { phrase, type Phrase, type Speaker } from './phrase';
import type { ProofDocument } from './proofDocument';
import { placeText } from './proofText';
import type { Noun } from './sheet';

interface Slot {
  pass: string;
  hole: string;
}

function dataOf(text: string): { type: string; slot: Slot | null } | null {
  try {
    const { type, data } = JSON.parse(text) as { type?: unknown; data?: { pass?: unknown; hole?: unknown } };
    if (typeof type !== 'string') return null;
    const { pass, hole } = data ?? {};
    return { type, slot: typeof pass === 'string' && typeof hole === 'string' ? { pass, hole } : null };
  } catch {
    return null;
  }
}

function nounOf({ procedure }: ProofDocument, hole: string): Noun {
  const type = procedure.document.holes.find(({ id }) => id === hole)?.fastener;
  return procedure.document.fasteners.find(({ id }) => id === type)?.kind ?? 'bolt';
}

/**
 * What an event is about, as far as its text still says so: for naming the one that does not hold. Null where it says
 * nothing that helps. The text may have been changed: it is shown as a hint, never relied on.
 */
export function eventAbout(document: ProofDocument, seq: number, speaker: Speaker): Phrase | null {
  const read = dataOf(document.record.events[seq]?.text ?? '');
  if (!read) return null;
  if (read.type === 'walk.signed') return phrase('event.signed');
  if (read.type === 'walk.countersigned') return phrase('event.countersigned');
  const { slot } = read;
  if (!slot) return null;
  const label = document.procedure.document.holes.find(({ id }) => id === slot.hole)?.label ?? null;
  const pass = document.procedure.document.passes.findIndex(({ id }) => id === slot.pass);
  const place = {
    hole: slot.hole,
    label,
    noun: nounOf(document, slot.hole),
    pass: pass < 0 ? null : pass + 1,
    round: null,
  };
  const where = placeText(place, speaker);
  return phrase(read.type === 'reading.taken' ? 'event.reading' : 'event.stage', { where });
}
