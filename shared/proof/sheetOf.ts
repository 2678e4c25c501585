import type { ProofSheet } from './sheet';
import { SHEET_VERSION } from './sheet';
import { earlierReadings, lateEntries, sheetChanges } from './sheet/changes';
import { claimOf } from './sheet/claim';
import { countsOf } from './sheet/counts';
import { sheetDeviations } from './sheet/deviations';
import { sheetHeads } from './sheet/heads';
import { sheetParts, sheetPreparation } from './sheet/preparation';
import { readingTable } from './sheet/readingTable';
import { sheetPeople, sheetSignatures } from './sheet/signatures';
import type { SheetSource } from './sheet/source';
import { sheetWrenches } from './sheet/wrenches';

/** From the first reading or stage to the last; the opening and the last event where nothing was tightened. */
function walkedOf({ events }: SheetSource): ProofSheet['walked'] {
  const work = events.filter(({ type }) => type === 'reading.taken' || type === 'stage.done');
  const [first, last] = [work[0] ?? events[0], work.at(-1) ?? events.at(-1)];
  return { from: first?.at ?? '', to: last?.at ?? '' };
}

/**
 * Everything a proof prints, made from the events alone: whoever holds them can make it again and compare. Throws where
 * the walk was never opened; a proof is made of walks that are finished.
 */
export function sheetOf(source: SheetSource): ProofSheet {
  const { state, events, record } = source;
  if (!state.opened) throw new Error('a walk that was never opened has no proof');
  const table = readingTable(source);
  const counts = countsOf(state, table.columns, table.rows);
  const changes = sheetChanges(source);
  return {
    version: SHEET_VERSION,
    purpose: state.opened.purpose,
    policy: state.opened.policy,
    claim: claimOf(state, table, counts, changes),
    counts,
    walked: walkedOf(source),
    ...table,
    heads: sheetHeads(source),
    wrenches: sheetWrenches(source),
    parts: sheetParts(source),
    preparation: sheetPreparation(source),
    deviations: sheetDeviations(source),
    changes,
    earlier: earlierReadings(source),
    late: lateEntries(source),
    notes: state.notes.map(({ seq, at, by, text }) => ({ seq, at, by, text })),
    photos: state.photos.length,
    signatures: sheetSignatures(source),
    people: sheetPeople(source),
    events: events.length,
    fingerprint: record.events.at(-1)?.hash ?? '',
  };
}
