import type { WalkChain } from '@shared/contracts/sync.contract';
import { err, ok, type Result } from '@shared/kernel/result';
import type { ProcedureDocument } from '@shared/procedure/procedure';
import { verifyChain } from '@shared/record/chain';
import type { PublicJwk, RecordCrypto } from '@shared/record/crypto';
import { ZERO_HASH, type Envelope, type SignedEvent } from '@shared/record/envelope';
import { rowOf, rowsOf, type TabletDatabase } from './database';
import type { DocumentRow, EventRow, HeadRow, LineagePiece, OutboxRow, StandingRow } from './rows';

/** Why a chain from the server was not taken over; nothing here was changed. */
export interface AdoptRefusal {
  code: 'chain.broken' | 'chain.empty' | 'chain.conflict' | 'chain.unsent' | 'chain.noProcedure';
  params?: Record<string, unknown>;
}

interface Piece {
  branch: number;
  from: number;
  events: SignedEvent[];
}

const piecesOf = (chain: WalkChain): Piece[] => {
  const pieces: Piece[] = [];
  for (const { branch, seq, text, hash, sig } of chain.events) {
    const last = pieces.at(-1);
    if (last?.branch === branch) last.events.push({ text, hash, sig });
    else pieces.push({ branch, from: seq, events: [{ text, hash, sig }] });
  }
  return pieces;
};

/** A branch may hold events whose text names the branch they were meant for (decision 5): runs of one name are checked. */
function runsOf(events: readonly SignedEvent[]): SignedEvent[][] {
  const runs: SignedEvent[][] = [];
  let named: unknown;
  for (const event of events) {
    const { branch } = JSON.parse(event.text) as { branch?: unknown };
    const last = runs.at(-1);
    if (last && branch === named) last.push(event);
    else runs.push([event]);
    named = branch;
  }
  return runs;
}

async function verified(chain: WalkChain, record: RecordCrypto): Promise<Result<Envelope[], AdoptRefusal>> {
  const keys = new Map<string, PublicJwk>(chain.keys.map(({ kid, ...jwk }) => [kid, jwk]));
  const envelopes: Envelope[] = [];
  let startSeq = 0;
  let startPrev = ZERO_HASH;
  for (const run of runsOf(chain.events)) {
    const verdict = await verifyChain(run, keys, record, { startSeq, startPrev, walk: chain.walk.id });
    if (!verdict.ok) return err({ code: 'chain.broken', params: { seq: verdict.seq, why: verdict.code } });
    envelopes.push(...verdict.envelopes);
    startSeq = verdict.next;
    startPrev = verdict.head;
  }
  return envelopes.length > 0 ? ok(envelopes) : err({ code: 'chain.empty' });
}

function headOf(chain: WalkChain, envelopes: readonly Envelope[], pieces: readonly Piece[]): HeadRow {
  const { walk } = chain;
  const lineage: LineagePiece[] = pieces.map(({ branch, from }) => ({ branch, from }));
  return {
    walk: walk.id,
    branch: lineage.at(-1)?.branch ?? 0,
    lineage,
    next: envelopes.length,
    hash: chain.events.at(-1)?.hash ?? ZERO_HASH,
    procedure: walk.procedure.hash,
    job: walk.job,
    joint: walk.joint,
    purpose: walk.purpose,
    openedAt: envelopes[0]?.at ?? walk.openedAt,
    lastAt: envelopes.at(-1)?.at ?? walk.changedAt,
  };
}

async function putChain(
  transaction: IDBTransaction,
  { head, pieces, document, at }: { head: HeadRow; pieces: readonly Piece[]; document: DocumentRow | null; at: string },
): Promise<AdoptRefusal | null> {
  const { walk } = head;
  const unsent = await rowsOf<OutboxRow>(transaction, 'outbox', IDBKeyRange.bound([walk], [walk, []]), 1);
  if (unsent.length > 0) return { code: 'chain.unsent' };
  if (!document && !(await rowOf(transaction, 'documents', head.procedure))) return { code: 'chain.noProcedure' };
  for (const { branch, from, events } of pieces) {
    for (const [index, event] of events.entries()) {
      const row: EventRow = { walk, branch, seq: from + index, ...event };
      const held = await rowOf<EventRow>(transaction, 'events', [walk, branch, row.seq]);
      if (held && held.hash !== row.hash) return { code: 'chain.conflict', params: { seq: row.seq } };
      if (!held) transaction.objectStore('events').add(row);
    }
  }
  const standing = await rowOf<StandingRow>(transaction, 'standings', walk);
  const after: StandingRow = {
    walk,
    branch: head.branch,
    confirmed: head.next,
    blocked: null,
    sentAt: standing?.sentAt ?? at,
    forked: standing?.forked ?? false,
  };
  transaction.objectStore('heads').put(head);
  transaction.objectStore('standings').put(after);
  if (document) transaction.objectStore('documents').put(document);
  return null;
}

/** Thrown inside the transaction to undo it. */
class Refused extends Error {
  constructor(readonly refusal: AdoptRefusal) {
    super(refusal.code);
  }
}

/**
 * Takes a chain from the server onto this tablet: to go on with a walk begun elsewhere, to see what the office added, or
 * to get back what this tablet lost. Every hash, link and signature is checked first. Nothing of our own is ever written
 * over: where something here was not sent yet, or differs, the chain is refused.
 */
export async function adoptChain(
  { database, record }: { database: TabletDatabase; record: RecordCrypto },
  chain: WalkChain,
  document: ProcedureDocument | null,
  at: string,
): Promise<Result<HeadRow, AdoptRefusal>> {
  const envelopes = await verified(chain, record);
  if (!envelopes.ok) return envelopes;
  const pieces = piecesOf(chain);
  const head = headOf(chain, envelopes.value, pieces);
  const row = document ? { hash: chain.walk.procedure.hash, document } : null;
  const stores = ['events', 'heads', 'outbox', 'standings', 'documents'] as const;
  try {
    await database.write(stores, async (transaction) => {
      const refused = await putChain(transaction, { head, pieces, document: row, at });
      if (refused) throw new Refused(refused);
    });
  } catch (error) {
    const cause = error instanceof Error ? error.cause : null;
    if (cause instanceof Refused) return err(cause.refusal);
    throw error;
  }
  return ok(head);
}
