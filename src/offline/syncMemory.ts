import type { Answer, ServerRefusal } from '@/api/answer';
import { backoff } from './backoff';
import { BATCH_EVENTS } from './syncPlan';
import type { SyncPhase } from './syncStatus';
import type { Bearer } from './tabletAuth';

/** What sync remembers while the program runs; all that must outlive it is in the database. */
export interface SyncMemory {
  bearer: Bearer | null;
  revoked: boolean;
  /** Null until the settings were asked. */
  epochKnown: boolean | null;
  failures: number;
  retryAt: number | null;
  /** What the last failure looked like, and its code. */
  trouble: { phase: SyncPhase; code: string } | null;
  /** Answers 401 in a row: the second one after a fresh bearer is a failure. */
  unauthorised: number;
  mostEvents: number;
  /** Where the server last asked to be sent from, by walk: the same answer twice is a failure. */
  holes: Map<string, number>;
  chains: string[];
  lost: string[];
  catalogueDueAt: number;
  reportDueAt: number;
  lastHeard: number | null;
}

/** A memory that knows nothing yet: everything is due. */
export const freshMemory = (): SyncMemory => ({
  bearer: null,
  revoked: false,
  epochKnown: null,
  failures: 0,
  retryAt: null,
  trouble: null,
  unauthorised: 0,
  mostEvents: BATCH_EVENTS,
  holes: new Map(),
  chains: [],
  lost: [],
  catalogueDueAt: 0,
  reportDueAt: 0,
  lastHeard: null,
});

/** Writes down a failure; the next try comes after a pause that grows (fault 23). */
export function noteFailure(
  memory: SyncMemory,
  trouble: { phase: SyncPhase; code: string },
  { now, random, askedMs = null }: { now: number; random: number; askedMs?: number | null },
): void {
  memory.failures += 1;
  memory.retryAt = now + backoff(memory.failures, random, askedMs);
  memory.trouble = trouble;
}

const REVOKED = new Set(['tablet.revoked', 'tablet.unknown']);

/**
 * Sorts out what every request has in common. Returns the refusal where the step itself has to judge it, else null: the
 * memory then says how to go on.
 */
export function noteAnswer(
  memory: SyncMemory,
  answer: Answer<unknown>,
  moment: { now: number; random: number },
): ServerRefusal | null {
  if (answer.kind === 'unreachable') {
    noteFailure(memory, { phase: 'offline', code: 'server.unreachable' }, moment);
    return null;
  }
  if (answer.kind === 'notOurs') {
    noteFailure(memory, { phase: 'portal', code: 'server.notOurs' }, moment);
    return null;
  }
  if (answer.kind === 'busy') {
    noteFailure(memory, { phase: 'waiting', code: answer.code }, { ...moment, askedMs: answer.retryAfterMs });
    return null;
  }
  memory.lastHeard = moment.now;
  if (answer.kind === 'done') {
    Object.assign(memory, { failures: 0, retryAt: null, trouble: null });
    return null;
  }
  return commonRefusal(memory, answer.refusal, moment);
}

function commonRefusal(
  memory: SyncMemory,
  refusal: ServerRefusal,
  moment: { now: number; random: number },
): ServerRefusal | null {
  if (REVOKED.has(refusal.code)) {
    memory.revoked = true;
    memory.trouble = { phase: 'revoked', code: refusal.code };
    return null;
  }
  if (refusal.status !== 401) return refusal;
  memory.bearer = null;
  memory.unauthorised += 1;
  if (memory.unauthorised > 1) noteFailure(memory, { phase: 'waiting', code: refusal.code }, moment);
  return null;
}
