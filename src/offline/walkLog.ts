import type { RecordCrypto, Signer } from '@shared/record/crypto';
import type { Result } from '@shared/kernel/result';
import type { ProcedureDocument } from '@shared/procedure/procedure';
import type { TabletDatabase } from './database';
import type { Hold, Holds } from './locks';
import type { Sealer } from './seal';
import type { TabletClock } from './tabletClock';
import type { AppendRequest, LogRefusal } from './walkAct';
import type { ChainBreak } from './walkChain';
import type { WalkRules } from './walkRules';
import { WalkWriter } from './walkWriter';

/** What a log needs. One set serves every walk of the tablet. */
export interface WalkLogDeps<S, V> {
  database: TabletDatabase;
  rules: WalkRules<S, V>;
  holds: Holds;
  record: RecordCrypto;
  signer: Signer;
  /** Absent on a tablet that has no shop's key yet. */
  sealer: Sealer | null;
  clock: TabletClock;
  shop: string;
  tablet: string;
  /** Catalogue cursor known now. */
  known: () => number;
  /** Another tab shows this walk: tell it that something was written. */
  announce?: (walk: string) => void;
  /** Kept space was given up: the person is told that the disk is full (fault 13). */
  onBallastUsed?: () => void;
}

/** Where a walk begins: a new one needs its document, one on the tablet brings it along. */
export interface WalkStart {
  walk: string;
  /** For a walk that is to be opened now: the revision and the fingerprint it is bound to. */
  begin?: { document: ProcedureDocument; hash: string };
}

/** What is known of a walk at one moment. */
export interface WalkSnapshot<S, V> {
  state: S;
  /** Worked out when it is first looked at. */
  readonly view: V;
  /** Hash of the last event; 64 zeros before the first. Commands carry it (decision 11). */
  head: string;
  next: number;
  /** Another tab writes this walk: look, do not touch (fault 12). */
  readOnly: boolean;
  /** The stored chain does not hold from here on (fault 21): nothing more is written to it. */
  broken: ChainBreak | null;
}

/** A walk on this tablet. */
export interface WalkLog<S, V> {
  readonly walk: string;
  snapshot(): WalkSnapshot<S, V>;
  /** Writes one event, or says why not. Resolves with a value only when it is saved for good (I1). */
  append(request: AppendRequest): Promise<Result<WalkSnapshot<S, V>, LogRefusal>>;
  /** Reads the chain again: after another tab wrote, or events came from the server. */
  reload(): Promise<void>;
  subscribe(listener: (snapshot: WalkSnapshot<S, V>) => void): () => void;
  close(): void;
}

/** Name under which the writer of a walk is held. */
export const holdName = (walk: string): string => `boltwalk-walk:${walk}`;

/**
 * Opens a walk: reads and folds its chain, and takes the hold of its one writer. Where another tab holds it, the log is
 * read-only and takes over by itself when that tab lets go. Throws `StorageError`, and `UnknownWalk` where this tablet
 * has no such walk and none is to be begun.
 */
export async function openWalkLog<S, V>(deps: WalkLogDeps<S, V>, start: WalkStart): Promise<WalkLog<S, V>> {
  const name = holdName(start.walk);
  const leaving = new AbortController();
  let hold: Hold | null = await deps.holds.tryHold(name);
  let writer: WalkWriter<S, V>;
  try {
    writer = await WalkWriter.open(deps, start, hold === null);
  } catch (error) {
    hold?.release();
    throw error;
  }
  if (!hold) {
    deps.holds.waitForHold(name, leaving.signal).then(
      async (late) => {
        if (leaving.signal.aborted) return late.release();
        hold = late;
        await writer.becomeWriter();
      },
      // Only closing ends the waiting; until then another tab writes.
      () => undefined,
    );
  }
  return {
    walk: start.walk,
    snapshot: () => writer.snapshot(),
    append: (request) => writer.append(request),
    reload: () => writer.reload(),
    subscribe: (listener) => writer.subscribe(listener),
    close: () => {
      leaving.abort();
      writer.close();
      hold?.release();
    },
  };
}
