import { sealEvent } from '@shared/record/chain';
import { CanonicalJsonError } from '@shared/record/canonicalJson';
import { LONGEST_EVENT, ZERO_HASH, type Envelope, type SignedEvent } from '@shared/record/envelope';
import { err, ok, type Result } from '@shared/kernel/result';
import type { WalkCommand } from '@shared/walk/commands';
import type { EventBody } from '@shared/walk/events';
import { commitEvent } from './commitEvent';
import { rowOf } from './database';
import type { HeadRow, OutboxRow } from './rows';
import { sealMeaning } from '@shared/walk/sealMeaning';
import type { StorageError } from './storageError';
import { storageErrorOf } from './storageError';
import { isoOf } from './tabletClock';
import { withSeal, type AppendRequest, type LogRefusal, type WalkAct } from './walkAct';
import { walkEventOf } from './walkChain';
import { headAfter, readStanding, UnknownWalk, type Standing } from './walkStanding';
import type { WalkLogDeps, WalkSnapshot, WalkStart } from './walkLog';
import type { Moment } from './walkRules';

interface Written<S> {
  state: S;
  head: HeadRow;
  event: SignedEvent;
}

const plain = <T>(value: T): T => JSON.parse(JSON.stringify(value)) as T;

/** The chain of one walk in memory and on disk, in step: memory moves on only after the disk has. */
export class WalkWriter<S, V> {
  readonly #deps: WalkLogDeps<S, V>;
  #start: WalkStart;
  readonly #listeners = new Set<(snapshot: WalkSnapshot<S, V>) => void>();
  #standing: Standing<S>;
  #readOnly: boolean;
  #closed = false;
  /** One append at a time within this tab; the hold keeps other tabs away. */
  #turn: Promise<unknown> = Promise.resolve();

  private constructor(deps: WalkLogDeps<S, V>, start: WalkStart, standing: Standing<S>, readOnly: boolean) {
    this.#deps = deps;
    this.#start = start;
    this.#standing = standing;
    this.#readOnly = readOnly;
  }

  static async open<S, V>(deps: WalkLogDeps<S, V>, start: WalkStart, readOnly: boolean): Promise<WalkWriter<S, V>> {
    return new WalkWriter(deps, start, await readStanding(deps, start), readOnly);
  }

  #moment(): Moment {
    const { clock } = this.#deps;
    return { at: isoOf(clock.now()), mono: clock.mono(), boot: clock.boot };
  }

  snapshot(): WalkSnapshot<S, V> {
    const { state, head, broken } = this.#standing;
    const see = (): V => this.#deps.rules.view(state, this.#moment());
    let view: { of: V } | null = null;
    return {
      state,
      // Seen only when somebody looks: a view costs more than the event it shows.
      get view() {
        view ??= { of: see() };
        return view.of;
      },
      head: head?.hash ?? ZERO_HASH,
      next: head?.next ?? 0,
      readOnly: this.#readOnly,
      broken,
    };
  }

  subscribe(listener: (snapshot: WalkSnapshot<S, V>) => void): () => void {
    this.#listeners.add(listener);
    return () => this.#listeners.delete(listener);
  }

  #tell(): void {
    const snapshot = this.snapshot();
    for (const listener of this.#listeners) listener(snapshot);
  }

  #queue<T>(work: () => Promise<T>): Promise<T> {
    const turn = this.#turn.then(work, work);
    this.#turn = turn.catch(() => undefined);
    return turn;
  }

  /** Reads again where the disk has gone on without us: another tab wrote, or events came from the server. */
  reload(): Promise<void> {
    return this.#queue(async () => {
      const { database } = this.#deps;
      const { walk } = this.#start;
      const stored = await database.read(['heads'], (transaction) => rowOf<HeadRow>(transaction, 'heads', walk));
      if (stored?.hash === this.#standing.head?.hash) return;
      this.#standing = await readStanding(this.#deps, this.#start);
      this.#tell();
    });
  }

  becomeWriter(): Promise<void> {
    return this.#queue(async () => {
      this.#standing = await readStanding(this.#deps, this.#start);
      this.#readOnly = false;
      this.#tell();
    });
  }

  close(): void {
    this.#closed = true;
    this.#listeners.clear();
  }

  append(request: AppendRequest): Promise<Result<WalkSnapshot<S, V>, LogRefusal>> {
    return this.#queue(async () => {
      const refused = this.#refusalBefore(request);
      if (refused) return err(refused);
      const moment = this.#moment();
      const sealed = await this.#seal(request);
      if (!sealed.ok) return sealed;
      const decided = this.#decide(sealed.value.act, request, moment);
      if (!decided.ok) return decided;
      const written = await this.#write(decided.value, request, moment);
      if (!written.ok) return written;
      return this.#save(written.value, request, sealed.value.seal(written.value.event.hash));
    });
  }

  #refusalBefore({ head }: AppendRequest): LogRefusal | null {
    if (this.#readOnly || this.#closed) return { code: 'log.readOnly' };
    const { broken } = this.#standing;
    if (broken) return { code: 'log.chainBroken', params: { seq: broken.seq } };
    const now = this.#standing.head?.hash ?? ZERO_HASH;
    return head !== undefined && head !== now ? { code: 'staleHead' } : null;
  }

  /** The seal names the event's place in the chain, so it can only be made here, where the place is known. */
  async #seal({ act, pin }: AppendRequest) {
    if (!pin) return ok({ act, seal: (): OutboxRow['seal'] => null });
    const { sealer } = this.#deps;
    if (!sealer) return err<LogRefusal>({ code: 'log.sealFailed' });
    const { head } = this.#standing;
    const place = { walk: this.#start.walk, seq: head?.next ?? 0, prev: head?.hash ?? ZERO_HASH };
    try {
      const { jwe, hash } = await sealer({ ...pin, ...place, meaning: sealMeaning(act) });
      return ok({ act: withSeal(act, hash), seal: (event: string): OutboxRow['seal'] => ({ hash: event, jwe }) });
    } catch {
      // Only a shop's key that is none, or a browser without Web Crypto, ends here; neither is mended by trying again.
      return err<LogRefusal>({ code: 'log.sealFailed' });
    }
  }

  #decide(act: WalkAct, { by, roles, head }: AppendRequest, moment: Moment): Result<EventBody, LogRefusal> {
    const { tablet, known } = this.#deps;
    const command = { ...plain(act), ...moment, by, roles, tablet, known: known(), head } as unknown as WalkCommand;
    const decided = this.#deps.rules.decide(this.#standing.state, command);
    // What is hashed is JSON: members left undefined must be gone before the rules fold them.
    return decided.ok ? ok(plain(decided.value)) : decided;
  }

  async #write(body: EventBody, { by }: AppendRequest, moment: Moment): Promise<Result<Written<S>, LogRefusal>> {
    const { shop, tablet, known, rules, signer, record } = this.#deps;
    const { head, state } = this.#standing;
    const envelope: Envelope = {
      v: 1,
      shop,
      walk: this.#start.walk,
      branch: head?.branch ?? 0,
      seq: head?.next ?? 0,
      prev: head?.hash ?? ZERO_HASH,
      ...moment,
      known: known(),
      by,
      tablet,
      type: body.type,
      data: body.data,
    };
    // Folded before it is saved: an event that the rules cannot fold must not get into a chain.
    const after = rules.evolve(state, walkEventOf(envelope));
    try {
      const event = await sealEvent(envelope, signer, record);
      if (event.text.length > LONGEST_EVENT) return err({ code: 'log.tooLong' });
      return ok({ state: after, event, head: headAfter(this.#standing, envelope, event.hash) });
    } catch (error) {
      // Half a character or a zero in something pasted: the chain cannot hold it, and the person can mend it.
      if (error instanceof CanonicalJsonError) return err({ code: 'log.textNotWritable' });
      throw error;
    }
  }

  async #save({ state, head, event }: Written<S>, request: AppendRequest, seal: OutboxRow['seal']) {
    const { head: before, document, procedureHash } = this.#standing;
    try {
      const { ballastUsed } = await commitEvent(this.#deps.database, {
        head,
        expected: before?.hash ?? null,
        event,
        seal,
        blobs: request.blobs ?? [],
        at: head.lastAt,
        document: before ? null : { hash: procedureHash, document },
      });
      if (ballastUsed) this.#deps.onBallastUsed?.();
    } catch (error) {
      return this.#afterFailure(storageErrorOf(error), event.hash);
    }
    this.#standing = { ...this.#standing, state, head };
    // From now on a walk that is not found was cleared away: it must never be begun a second time (fault 20).
    this.#start = { walk: this.#start.walk };
    this.#deps.announce?.(this.#start.walk);
    this.#tell();
    return ok(this.snapshot());
  }

  /** Memory may no longer match the disk: the disk is right. Whether the event got there is looked up, never assumed. */
  async #afterFailure(failure: StorageError, hash: string): Promise<Result<WalkSnapshot<S, V>, LogRefusal>> {
    try {
      this.#standing = await readStanding(this.#deps, this.#start);
    } catch (error) {
      return err({ code: error instanceof UnknownWalk ? 'storage.cleared' : storageErrorOf(error).code });
    }
    this.#tell();
    if (this.#standing.head?.hash === hash) return ok(this.snapshot());
    return err({ code: failure.code === 'storage.headMoved' ? 'staleHead' : failure.code });
  }
}
