import type { BlobBacklog } from './blobs';
import type { WalkBacklog } from './outbox';

/** Most events in one batch, and its size: those of the contract (a test holds them together). */
export const BATCH_EVENTS = 500;
/** Below the contract's limit: sizes are counted closely, not exactly. */
export const BATCH_BYTES = 3 * 1024 * 1024;

const RENEW_BEFORE_MS = 30_000;

/** Everything that decides what is to be done next. */
export interface SyncState {
  enrolled: boolean;
  /** The server has revoked this tablet: nothing is sent, nothing is removed. */
  revoked: boolean;
  online: boolean;
  /** The server's epoch is known: what it confirms can be taken back if it changes (decision 9). */
  epochKnown: boolean;
  /** Tablet time at which the bearer ends; null without one. */
  bearerEndsAt: number | null;
  /** Not before this time, after failures; null = now. */
  retryAt: number | null;
  walks: readonly WalkBacklog[];
  blobs: readonly BlobBacklog[];
  /** Most events in a batch; halved while a batch was too large. */
  mostEvents: number;
  /** Walks whose chain has grown at the server. */
  chains: readonly string[];
  catalogueDueAt: number;
  reportDueAt: number;
}

/** The next thing to do. */
export type SyncStep =
  | { do: 'nothing'; why: 'done' | 'notEnrolled' | 'revoked' | 'offline' }
  | { do: 'wait'; until: number }
  | { do: 'authenticate' }
  | { do: 'sendEvents'; walk: string; branch: number; from: number; to: number }
  | { do: 'sendBlob'; sha256: string }
  | { do: 'fetchCatalogue' }
  | { do: 'fetchChain'; walk: string }
  | { do: 'report' };

function eventsStep(state: SyncState): SyncStep | null {
  const chain = state.walks.find((walk) => walk.blocked === null && walk.events.length > 0);
  const first = chain?.events[0];
  if (!chain || !first) return null;
  let to = first.seq;
  let bytes = 0;
  for (const [index, { seq, size }] of chain.events.entries()) {
    // Consecutive events only: what lies behind a gap goes in a batch of its own.
    if (index >= state.mostEvents || seq !== first.seq + index) break;
    bytes += size;
    if (index > 0 && bytes > BATCH_BYTES) break;
    to = seq;
  }
  return { do: 'sendEvents', walk: chain.walk, branch: chain.branch, from: first.seq, to };
}

/** A photo follows the events that name it; those of a blocked walk wait for nothing. */
function blobStep(state: SyncState): SyncStep | null {
  const stillSending = new Set(state.walks.filter((walk) => walk.blocked === null).map((walk) => walk.walk));
  const blob = state.blobs.find(({ walk }) => !stillSending.has(walk));
  return blob ? { do: 'sendBlob', sha256: blob.sha256 } : null;
}

function workStep(state: SyncState, now: number): SyncStep | null {
  if (!state.epochKnown) return { do: 'fetchCatalogue' };
  const events = eventsStep(state) ?? blobStep(state);
  if (events) return events;
  if (now >= state.catalogueDueAt) return { do: 'fetchCatalogue' };
  const [walk] = state.chains;
  if (walk !== undefined) return { do: 'fetchChain', walk };
  return now >= state.reportDueAt ? { do: 'report' } : null;
}

/** What to do next: facts go up first, then files, then answers come down. Pure. */
export function planSync(state: SyncState, now: number): SyncStep {
  if (!state.enrolled) return { do: 'nothing', why: 'notEnrolled' };
  if (state.revoked) return { do: 'nothing', why: 'revoked' };
  const work = workStep(state, now);
  if (!work) return { do: 'nothing', why: 'done' };
  if (!state.online) return { do: 'nothing', why: 'offline' };
  if (state.retryAt !== null && now < state.retryAt) return { do: 'wait', until: state.retryAt };
  const hasBearer = state.bearerEndsAt !== null && now < state.bearerEndsAt - RENEW_BEFORE_MS;
  return hasBearer ? work : { do: 'authenticate' };
}
