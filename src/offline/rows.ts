/*
 * Rows of the tablet's walk database. They outlive versions of the program: a change of shape needs a new database
 * version and an upgrade step in `database.ts`.
 */

/** One event of a chain: the canonical text is the truth, all else can be made from it. */
export interface EventRow {
  walk: string;
  branch: number;
  seq: number;
  text: string;
  hash: string;
  sig: string;
}

/** From which sequence number on a chain's events stand on which branch; a walk never forked has one piece. */
export interface LineagePiece {
  branch: number;
  from: number;
}

/** Where a walk's chain stands on this tablet, and what a list needs to name it. */
export interface HeadRow {
  walk: string;
  /** Branch on which the next event is written: that of the last piece of `lineage`. */
  branch: number;
  lineage: LineagePiece[];
  /** Sequence number the next event will bear. */
  next: number;
  /** Hash of the last event. */
  hash: string;
  /** Fingerprint of the procedure document in `documents`. */
  procedure: string;
  job: string;
  joint: string;
  purpose: string;
  openedAt: string;
  lastAt: string;
}

/** An event that waits for the server's receipt. The sealed PIN it names travels with it. */
export interface OutboxRow {
  walk: string;
  branch: number;
  seq: number;
  hash: string;
  size: number;
  seal: { hash: string; jwe: string } | null;
}

/** A photograph or curve, addressed by what it holds. `waiting` is 1 until the server holds it (an index needs a number). */
export interface BlobRow {
  sha256: string;
  walk: string;
  contentType: string;
  bytes: ArrayBuffer;
  waiting: 0 | 1;
  /** Code of the server's refusal; it is not sent again until somebody asks. */
  refused: string | null;
  at: string;
}

/** The server's word that a prefix of a chain is stored and verified (I2). */
export interface ReceiptRow {
  walk: string;
  branch: number;
  next: number;
  hash: string;
  receivedAt: string;
}

/** Why a walk is not sent further until somebody looks at it. Nothing is dropped. */
export interface Blocked {
  code: string;
  message: string;
  seq: number;
  at: string;
}

/** What sync knows of one walk. */
export interface StandingRow {
  walk: string;
  branch: number;
  /** First sequence number the server has not confirmed. */
  confirmed: number;
  blocked: Blocked | null;
  /** When the server last confirmed something of it. */
  sentAt: string | null;
  /** The server put our events on a branch of their own: two tablets walked this walk (decision 5). */
  forked: boolean;
}

/** A procedure document of a walk on this tablet, by fingerprint: the catalogue may drop it, the walk may not. */
export interface DocumentRow {
  hash: string;
  document: unknown;
}

/** Space kept so that a reading still fits when the disk is full (fault 13). */
export interface BallastRow {
  id: string;
  bytes: ArrayBuffer;
}
