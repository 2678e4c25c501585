import { err, ok, type Result } from '../kernel/result';
import type { RecordCrypto } from '../record/crypto';
import { parseEnvelope, type SignedEvent } from '../record/envelope';
import { canonicalJson } from '../record/canonicalJson';
import { hashText } from '../record/chain';
import { evolve } from '../walk/evolve';
import type { WalkEvent } from '../walk/events';
import { instructionOf, signersLeft } from '../walk/instruction';
import { initialWalk, type WalkState } from '../walk/state';
import { eventOfEnvelope } from '../walk/upcasts';
import type { ProofDocument, ProofRecord } from './proofDocument';
import { sheetOf } from './sheetOf';
import { concealSide, type SideFacts } from './sideSheet';

/** All that a proof is made of: what the shop holds about one finished walk. Events are those of the branch that stands. */
export interface ProofFacts extends Omit<ProofDocument, 'format' | 'version' | 'side' | 'sheet' | 'procedure'> {
  procedure: Omit<ProofDocument['procedure'], 'hash'>;
  side: SideFacts;
}

/** Why no proof is made: the same names as the blocks of an issue, and `unreadable` with the event's number. */
export type ProofBlock =
  | { code: 'notIssuable' | 'voided' | 'notSigned' | 'notCountersigned' | 'workOpen' | 'procedureMismatch' }
  | { code: 'unreadable'; seq: number };

/** A document ready to be sealed, and the lines of its side sheet. */
export interface BuiltProof {
  document: ProofDocument;
  disclosures: string[];
}

function eventsOf(signed: readonly SignedEvent[]): Result<WalkEvent[], ProofBlock> {
  const events: WalkEvent[] = [];
  for (const [seq, { text }] of signed.entries()) {
    const parsed = parseEnvelope(text);
    const event = parsed.ok ? eventOfEnvelope(parsed.value) : null;
    if (!event) return err({ code: 'unreadable', seq });
    events.push(event);
  }
  return ok(events);
}

/** W1, W12, W13: only a finished and signed final assembly or recheck is issued. */
function blockOf(state: WalkState): ProofBlock | null {
  const { opened } = state;
  if (!opened || (opened.purpose !== 'finalAssembly' && opened.purpose !== 'recheck')) return { code: 'notIssuable' };
  if (state.voided) return { code: 'voided' };
  if (state.everHands.length === 0 || signersLeft(state).length > 0) return { code: 'notSigned' };
  const countersigned = state.signatures.some((sign) => sign.stands && sign.role === 'countersigner');
  if (!countersigned && opened.policy.countersign === 'required') return { code: 'notCountersigned' };
  if (opened.procedure.hash !== state.procedureHash) return { code: 'procedureMismatch' };
  const { kind } = instructionOf(state, { at: state.at, mono: state.mono, boot: state.boot });
  return kind === 'withShop' || kind === 'release' ? null : { code: 'workOpen' };
}

/** Only who and what the events name: nobody else of the shop gets into the document. */
function recordFor(record: ProofRecord, events: readonly WalkEvent[]): ProofRecord {
  const people = new Set(events.map(({ by }) => by));
  const tablets = new Set(events.map(({ tablet }) => tablet));
  return {
    events: record.events.map(({ text, hash, sig }) => ({ text, hash, sig })),
    received: record.received,
    tablets: record.tablets.filter(({ id }) => tablets.has(id)),
    roles: record.roles.filter(({ person }) => people.has(person)),
    confirmations: record.confirmations,
  };
}

/**
 * Makes the document of a finished walk. Pure but for the hashing and the salts that are handed in; it looks at no
 * signature: whoever issues has verified the chain when it came in, and {@link verifyProof} does so again.
 */
export async function buildProof(
  facts: ProofFacts,
  tools: { crypto: Pick<RecordCrypto, 'sha256'>; salt: () => string },
): Promise<Result<BuiltProof, ProofBlock>> {
  const events = eventsOf(facts.record.events);
  if (!events.ok) return events;
  const hash = await hashText(canonicalJson(facts.procedure.document), tools.crypto);
  const state = events.value.reduce(evolve, initialWalk(facts.procedure.document, hash));
  const block = blockOf(state);
  if (block) return err(block);
  const record = recordFor(facts.record, events.value);
  const sheet = sheetOf({ state, events: events.value, record });
  const people = new Set(sheet.people.map(({ person }) => person));
  const names = Object.fromEntries(Object.entries(facts.side.names).filter(([person]) => people.has(person)));
  const { digests, disclosures } = await concealSide({ ...facts.side, names }, tools.salt, tools.crypto);
  const { side: _side, procedure, ...rest } = facts;
  const document: ProofDocument = {
    ...rest,
    format: 'boltwalk.proof',
    version: 1,
    procedure: { ...procedure, hash },
    record,
    side: digests,
    sheet,
  };
  return ok({ document, disclosures });
}
