import type { ProcedureDocument } from '@shared/procedure/procedure';
import type { RecordCrypto } from '@shared/record/crypto';
import type { Envelope } from '@shared/record/envelope';
import type { TabletDatabase } from './database';
import type { HeadRow } from './rows';
import { StorageError } from './storageError';
import { loadChain, type ChainBreak } from './walkChain';
import type { WalkStart } from './walkLog';
import type { WalkRules } from './walkRules';

/** Asked for a walk that is not on this tablet. */
export class UnknownWalk extends Error {
  constructor(readonly walk: string) {
    super(`walk ${walk} is not on this tablet`);
    this.name = 'UnknownWalk';
  }
}

/** A walk as the disk has it, folded. */
export interface Standing<S> {
  state: S;
  /** Null before the first event. */
  head: HeadRow | null;
  document: ProcedureDocument;
  procedureHash: string;
  broken: ChainBreak | null;
}

interface StandingDeps<S, V> {
  database: TabletDatabase;
  record: RecordCrypto;
  rules: WalkRules<S, V>;
}

/** Reads and folds a walk. Throws `UnknownWalk` where it is not here and not to be begun, else `StorageError`. */
export async function readStanding<S, V>(
  { database, record, rules }: StandingDeps<S, V>,
  { walk, begin }: WalkStart,
): Promise<Standing<S>> {
  const chain = await loadChain(database, walk, record);
  if (!chain) {
    if (!begin) throw new UnknownWalk(walk);
    const state = rules.initial(begin.document, begin.hash);
    return { state, head: null, document: begin.document, procedureHash: begin.hash, broken: null };
  }
  const { head, events, broken } = chain;
  if (!chain.document) throw new StorageError('storage.broken', new Error(`no document ${head.procedure}`));
  const initial = rules.initial(chain.document, head.procedure);
  const state = events.reduce((before, event) => rules.evolve(before, event), initial);
  return { state, head, document: chain.document, procedureHash: head.procedure, broken };
}

/** The head after one more event. */
export function headAfter<S>(
  { head, procedureHash }: Pick<Standing<S>, 'head' | 'procedureHash'>,
  envelope: Envelope,
  hash: string,
): HeadRow {
  const opened = envelope.data as Partial<Record<'job' | 'joint' | 'purpose', string>>;
  const first = {
    walk: envelope.walk,
    branch: 0,
    lineage: [{ branch: 0, from: 0 }],
    procedure: procedureHash,
    job: opened.job ?? '',
    joint: opened.joint ?? '',
    purpose: opened.purpose ?? '',
    openedAt: envelope.at,
  };
  return { ...(head ?? first), next: envelope.seq + 1, hash, lastAt: envelope.at };
}
