import { hashText } from '@shared/record/chain';
import type { RecordCrypto } from '@shared/record/crypto';
import { ZERO_HASH, type Envelope } from '@shared/record/envelope';
import type { ProcedureDocument } from '@shared/procedure/procedure';
import type { WalkEvent } from '@shared/walk/events';
import { rowOf, rowsOf, type TabletDatabase } from './database';
import type { DocumentRow, EventRow, HeadRow } from './rows';

/** The first event at which a stored chain does not hold (fault 21). */
export interface ChainBreak {
  seq: number;
  code: 'missing' | 'wrongHash' | 'wrongSeq' | 'wrongPrev' | 'notJson' | 'wrongHead';
}

/** A chain as read from the tablet: what holds of it, and where it breaks if it does. */
export interface LoadedChain {
  head: HeadRow;
  document: ProcedureDocument | null;
  rows: EventRow[];
  events: WalkEvent[];
  broken: ChainBreak | null;
}

/** The event the rules see: the envelope without the links of the chain. */
export function walkEventOf(envelope: Envelope): WalkEvent {
  const { seq, branch, at, mono, boot, by, tablet, known, type, data } = envelope;
  return { seq, branch, at, mono, boot, by, tablet, known, type, data } as WalkEvent;
}

function parse(text: string): Envelope | null {
  try {
    return JSON.parse(text) as Envelope;
  } catch {
    return null;
  }
}

async function breakOf(
  row: EventRow | undefined,
  seq: number,
  prev: string,
  record: Pick<RecordCrypto, 'sha256'>,
): Promise<ChainBreak | Envelope> {
  if (!row) return { seq, code: 'missing' };
  if ((await hashText(row.text, record)) !== row.hash) return { seq, code: 'wrongHash' };
  const envelope = parse(row.text);
  if (!envelope) return { seq, code: 'notJson' };
  if (envelope.seq !== seq) return { seq, code: 'wrongSeq' };
  return envelope.prev === prev ? envelope : { seq, code: 'wrongPrev' };
}

const isBreak = (value: ChainBreak | Envelope): value is ChainBreak => 'code' in value;

/** The rows of a chain in order; a place whose row is missing stays empty. */
async function chainRows(transaction: IDBTransaction, head: HeadRow): Promise<(EventRow | undefined)[]> {
  const rows: (EventRow | undefined)[] = Array.from({ length: head.next });
  for (const [index, { branch, from }] of head.lineage.entries()) {
    const to = head.lineage[index + 1]?.from ?? head.next;
    if (to <= from) continue;
    const range = IDBKeyRange.bound([head.walk, branch, from], [head.walk, branch, to - 1]);
    for (const row of await rowsOf<EventRow>(transaction, 'events', range)) rows[row.seq] = row;
  }
  return rows;
}

async function readRows(database: TabletDatabase, walk: string) {
  return database.read(['heads', 'events', 'documents'], async (transaction) => {
    const head = await rowOf<HeadRow>(transaction, 'heads', walk);
    if (!head) return null;
    const rows = await chainRows(transaction, head);
    const document = await rowOf<DocumentRow>(transaction, 'documents', head.procedure);
    return { head, rows, document: (document?.document as ProcedureDocument | undefined) ?? null };
  });
}

/**
 * Reads a walk's chain and checks hash, place and link of every event; signatures are left to the server and to the
 * proof. Null where this tablet holds no such walk.
 */
export async function loadChain(
  database: TabletDatabase,
  walk: string,
  record: Pick<RecordCrypto, 'sha256'>,
): Promise<LoadedChain | null> {
  const stored = await readRows(database, walk);
  if (!stored) return null;
  const { head, document } = stored;
  const loaded: LoadedChain = { head, document, rows: [], events: [], broken: null };
  let prev = ZERO_HASH;
  for (const [seq, row] of stored.rows.entries()) {
    const checked = await breakOf(row, seq, prev, record);
    if (isBreak(checked)) return { ...loaded, broken: checked };
    if (row) loaded.rows.push(row);
    loaded.events.push(walkEventOf(checked));
    prev = row?.hash ?? prev;
  }
  return { ...loaded, broken: prev === head.hash ? null : { seq: head.next, code: 'wrongHead' } };
}
