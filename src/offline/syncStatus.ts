/** How sending stands, in terms a person can be told (I6). */
export type SyncPhase =
  /** Everything is sent, or nothing is to be sent now. */
  | 'idle'
  | 'sending'
  /** The server cannot be reached: normal for a tablet at a stand. */
  | 'offline'
  /** Something else answers in the server's place, such as the log-in page of a network (fault 23). */
  | 'portal'
  /** The server asked for a pause, or failed; the next try comes by itself. */
  | 'waiting'
  /** Some walk was refused and waits for a person; the others go on. */
  | 'blocked'
  /** The shop has revoked this tablet (fault 17): what is on it stays on it and can be exported. */
  | 'revoked'
  | 'notEnrolled'
  /** The tablet's own storage failed (fault 19). */
  | 'storage';

/** How sending stands. */
export interface SyncStatus {
  phase: SyncPhase;
  /** Events and files not yet confirmed. */
  waiting: number;
  /** Walks that were refused. */
  blocked: number;
  /** When the server last confirmed something or answered, ISO; null before the first time. */
  lastSent: string | null;
  /** When it is tried again by itself, ms; null when nothing is planned. */
  retryAt: number | null;
  /** Code of the last failure, for `errors.<code>`; null when there is none. */
  code: string | null;
}
