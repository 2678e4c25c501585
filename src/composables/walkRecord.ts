import type { Confirmation } from '@shared/contracts/confirmation.contract';
import type { OfficeWalkWhole } from '@shared/contracts/walks.contract';
import type { ProofRecord } from '@shared/proof/proofDocument';
import type { ProofSheet } from '@shared/proof/sheet';
import { sheetOf } from '@shared/proof/sheetOf';
import { parseEnvelope } from '@shared/record/envelope';
import type { WalkEvent } from '@shared/walk/events';
import { evolve } from '@shared/walk/evolve';
import { reviewOf, type Review } from '@shared/walk/review';
import { initialWalk, type WalkState } from '@shared/walk/state';
import { eventOfEnvelope } from '@shared/walk/upcasts';
import { view, type WalkView } from '@shared/walk/view';

/** A use of a PIN in the record, and what the shop said about it (decision 6); null: not checked yet. */
export interface SealUse {
  seq: number;
  by: string;
  confirmation: Confirmation | null;
}

/** A walk as the office shows it: folded from its own events by the same rules as on the tablet. */
export interface WalkRecord {
  state: WalkState;
  events: WalkEvent[];
  view: WalkView;
  review: Review;
  /** The figures and words that its proof would print. */
  sheet: ProofSheet;
  seals: SealUse[];
  /** First event that cannot be read: all after it is left out, and nothing may be decided. Null: all are read. */
  unreadableAt: number | null;
}

function eventsOf(whole: OfficeWalkWhole): { events: WalkEvent[]; unreadableAt: number | null } {
  const events: WalkEvent[] = [];
  for (const { text, seq } of whole.events) {
    const parsed = parseEnvelope(text);
    const event = parsed.ok ? eventOfEnvelope(parsed.value) : null;
    if (!event) return { events, unreadableAt: seq };
    events.push(event);
  }
  return { events, unreadableAt: null };
}

/** The record as far as a sheet looks at it: who received what when. Keys are checked elsewhere (`verifyWalk`). */
function recordOf(whole: OfficeWalkWhole): ProofRecord {
  const noKey = { kid: '', jwk: { kty: 'EC', crv: 'P-256', x: '', y: '' } } as const;
  return {
    events: whole.events.map(({ text, hash, sig }) => ({ text, hash, sig })),
    received: whole.events.map(({ receivedAt }) => receivedAt),
    tablets: Object.entries(whole.tablets).map(([id, name]) => ({ id, name, ...noKey })),
    roles: [],
    confirmations: whole.confirmations,
  };
}

const sealIn = (event: WalkEvent): boolean =>
  event.type === 'wrench.taken' ? event.data.override !== undefined : 'seal' in event.data && Boolean(event.data.seal);

function sealsOf(whole: OfficeWalkWhole, events: readonly WalkEvent[]): SealUse[] {
  return events.filter(sealIn).map(({ seq, by }) => {
    const hash = whole.events.find((stored) => stored.seq === seq)?.hash;
    const said = whole.confirmations.filter((one) => one.seq === seq && one.hash === hash);
    // A later *not mine* overrides what was accepted first (P3).
    const last = [...said].sort((a, b) => (a.at < b.at ? -1 : 1)).at(-1);
    return { seq, by, confirmation: last ?? null };
  });
}

/** Folds a walk; null where not even its opening can be read. */
export function walkRecord(whole: OfficeWalkWhole): WalkRecord | null {
  const { events, unreadableAt } = eventsOf(whole);
  const state = events.reduce(evolve, initialWalk(whole.document, whole.walk.procedure.hash));
  if (!state.opened) return null;
  const { at, mono, boot } = state;
  return {
    state,
    events,
    view: view(state, { at, mono, boot }),
    review: reviewOf(state),
    sheet: sheetOf({ state, events, record: recordOf(whole) }),
    seals: sealsOf(whole, events),
    unreadableAt,
  };
}
