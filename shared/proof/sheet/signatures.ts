import { OFFICE } from '../../record/envelope';
import type { ProofSheet, ProofSignature } from '../sheet';
import { eventAt, type SheetSource } from './source';

/** Signatures that stand, with where they were made, and when the shop had them and confirmed their PIN (D2). */
export function sheetSignatures(source: SheetSource): ProofSignature[] {
  const { state, record } = source;
  return state.signatures
    .filter(({ stands }) => stands)
    .map(({ by, role, meaning, at, seq }) => {
      const event = eventAt(source, seq);
      const tablet = record.tablets.find(({ id }) => id === event?.tablet);
      const confirmed = record.confirmations.findLast((one) => one.seq === seq && one.result === 'accepted');
      return {
        by,
        role,
        meaning,
        at,
        seq,
        tablet: event?.tablet === OFFICE ? null : (tablet?.name ?? event?.tablet ?? ''),
        received: record.received[seq] ?? null,
        confirmed: confirmed?.at ?? null,
      };
    });
}

/** Everybody whose id stands in an event, numbered by appearance: who decided or countersigned is a supervisor here. */
export function sheetPeople({ events, state }: SheetSource): ProofSheet['people'] {
  const deciders = new Set([
    ...state.signatures.filter(({ role }) => role === 'countersigner').map(({ by }) => by),
    ...state.deviations.flatMap(({ settlings }) =>
      settlings.filter(({ choice }) => choice === 'accept').map(({ by }) => by),
    ),
  ]);
  const people = new Set<string>();
  for (const event of events) {
    people.add(event.by);
    if (event.type === 'walk.opened' || event.type === 'hands.changed') {
      people.add(event.data.pulls);
      people.add(event.data.records);
    }
  }
  return [...people].map((person) => ({
    person,
    role: deciders.has(person) && !state.everHands.includes(person) ? 'supervisor' : 'technician',
  }));
}
