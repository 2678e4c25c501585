import { blobBacklog } from './blobs';
import { readBacklog, unblockAll } from './outbox';
import { storageErrorOf } from './storageError';
import { freshMemory, noteFailure } from './syncMemory';
import { performSync, type SyncContext } from './syncPerform';
import { planSync, type SyncState } from './syncPlan';
import type { SyncStatus } from './syncStatus';
import { isoOf } from './tabletClock';

/** What the engine needs besides what its steps work with. */
export interface SyncEngineDeps extends Omit<SyncContext, 'memory' | 'tablet'> {
  /** Id of this tablet; null before it is enrolled. */
  tablet: () => string | null;
  isOnline: () => boolean;
  setTimer: (work: () => void, ms: number) => unknown;
  clearTimer: (timer: unknown) => void;
}

/** How long the engine sleeps when nothing is due, ms: the longest a trigger that got lost can cost. */
const SLEEP_MS = 30_000;

/** Sends what waits and fetches what is new, one thing at a time, for as long as the program runs. */
export class SyncEngine {
  readonly #deps: SyncEngineDeps;
  readonly #memory = freshMemory();
  readonly #listeners = new Set<(status: SyncStatus) => void>();
  #status: SyncStatus = {
    phase: 'idle',
    waiting: 0,
    blocked: 0,
    lastSent: null,
    retryAt: null,
    code: null,
  };
  #running: Promise<void> | null = null;
  #again = false;
  #stopped = true;
  #timer: unknown = null;

  constructor(deps: SyncEngineDeps) {
    this.#deps = deps;
  }

  status(): SyncStatus {
    return this.#status;
  }

  /** Walks of which the server holds what this tablet lost (fault 20). */
  lostWalks(): readonly string[] {
    return this.#memory.lost;
  }

  /** They were read: they are no longer told. */
  async forgetLost(): Promise<void> {
    await this.#deps.settings.remove('lostWalks');
    this.#memory.lost = [];
  }

  subscribe(listener: (status: SyncStatus) => void): () => void {
    this.#listeners.add(listener);
    return () => this.#listeners.delete(listener);
  }

  start(): void {
    this.#stopped = false;
    void this.poke();
  }

  stop(): void {
    this.#stopped = true;
    this.#deps.clearTimer(this.#timer);
  }

  /** A bearer for a call of one's own (PIN check, take over), or null when there is none to be had now. */
  async bearer(): Promise<string | null> {
    const { bearer } = this.#memory;
    if (bearer && this.#deps.clock.now() < bearer.endsAt - 5_000) return bearer.token;
    if (this.#memory.revoked || this.#deps.tablet() === null) return null;
    const answer = await this.#deps.authenticate();
    if (answer.kind !== 'done') return null;
    this.#memory.bearer = answer.value;
    return answer.value.token;
  }

  /** Something may be to do: appended, online again, visible again, time passed. Waits that are due stay due. */
  poke(): Promise<void> {
    if (this.#stopped) return Promise.resolve();
    if (this.#running) {
      this.#again = true;
      return this.#running;
    }
    this.#deps.clearTimer(this.#timer);
    this.#running = this.#run().finally(() => {
      this.#running = null;
    });
    return this.#running;
  }

  /** A person asks: no more waiting, parked walks are tried once more, and everything is fetched anew. */
  async press(): Promise<void> {
    Object.assign(this.#memory, {
      failures: 0,
      retryAt: null,
      revoked: false,
      trouble: null,
      catalogueDueAt: 0,
      reportDueAt: 0,
    });
    this.#memory.holes.clear();
    await unblockAll(this.#deps.database);
    await this.poke();
  }

  async #run(): Promise<void> {
    do {
      this.#again = false;
      await this.#untilNothingIsLeft();
    } while (this.#again && !this.#stopped);
    if (!this.#stopped) this.#sleep();
  }

  async #untilNothingIsLeft(): Promise<void> {
    try {
      while (!this.#stopped) {
        const state = await this.#state();
        const step = planSync(state, this.#deps.clock.now());
        this.#show(state, step.do !== 'nothing' && step.do !== 'wait');
        if (step.do === 'nothing' || step.do === 'wait') return;
        const tablet = this.#deps.tablet();
        if (tablet === null) return;
        await performSync({ ...this.#deps, tablet, memory: this.#memory }, step);
      }
    } catch (error) {
      const { code } = storageErrorOf(error);
      noteFailure(
        this.#memory,
        { phase: 'storage', code },
        { now: this.#deps.clock.now(), random: this.#deps.random() },
      );
      this.#set({ ...this.#status, phase: 'storage', code, retryAt: this.#memory.retryAt });
    }
  }

  #sleep(): void {
    const { retryAt } = this.#memory;
    const until = retryAt === null ? SLEEP_MS : Math.max(0, retryAt - this.#deps.clock.now());
    this.#timer = this.#deps.setTimer(() => void this.poke(), Math.min(until + 1, SLEEP_MS));
  }

  /** What must outlive the program is asked of the settings once. */
  async #recall(): Promise<void> {
    const { settings } = this.#deps;
    this.#memory.lost = (await settings.get('lostWalks')) ?? [];
    this.#memory.epochKnown = (await settings.get('catalogue')) !== undefined;
  }

  async #state(): Promise<SyncState> {
    const { database, isOnline, tablet } = this.#deps;
    if (this.#memory.epochKnown === null) await this.#recall();
    const { bearer, revoked, retryAt, mostEvents, chains, catalogueDueAt, reportDueAt } = this.#memory;
    return {
      enrolled: tablet() !== null,
      revoked,
      online: isOnline(),
      epochKnown: this.#memory.epochKnown === true,
      bearerEndsAt: bearer?.endsAt ?? null,
      retryAt,
      walks: await readBacklog(database),
      blobs: await blobBacklog(database),
      mostEvents,
      chains,
      catalogueDueAt,
      reportDueAt,
    };
  }

  #show(state: SyncState, busy: boolean): void {
    const { trouble, retryAt, lastHeard } = this.#memory;
    const waiting = state.walks.reduce((sum, walk) => sum + walk.events.length, 0) + state.blobs.length;
    const blocked = state.walks.filter((walk) => walk.blocked !== null);
    this.#set({
      phase: this.#phase(state, busy, blocked.length > 0),
      waiting,
      blocked: blocked.length,
      lastSent: lastHeard === null ? null : isoOf(lastHeard),
      retryAt,
      code: trouble?.code ?? blocked[0]?.blocked?.code ?? null,
    });
  }

  #phase(state: SyncState, busy: boolean, blocked: boolean): SyncStatus['phase'] {
    if (!state.enrolled) return 'notEnrolled';
    if (state.revoked) return 'revoked';
    if (busy) return 'sending';
    if (!state.online) return 'offline';
    return this.#memory.trouble?.phase ?? (blocked ? 'blocked' : 'idle');
  }

  #set(status: SyncStatus): void {
    this.#status = status;
    for (const listener of this.#listeners) listener(status);
  }
}
