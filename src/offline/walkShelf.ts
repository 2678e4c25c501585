import { uuidV7 } from '@shared/kernel/ids';
import { err, ok, type Result } from '@shared/kernel/result';
import type { WalkState } from '@shared/walk/state';
import { rowsOf } from './database';
import { signerOf } from './deviceKey';
import { openingOf, type OpeningRefusal, type WantedWalk } from './openingOf';
import { obeyOrders, type PendingOrder } from './orders';
import type { EventRow, HeadRow } from './rows';
import { shopRules, type ShopWalkLog } from './shopRules';
import type { TabletCore } from './tabletCore';
import type { LogRefusal } from './walkAct';
import { loadChain } from './walkChain';
import { openWalkLog, type WalkStart } from './walkLog';

/** A tablet that is not enrolled has neither name nor key to write with. */
export class NotEnrolled extends Error {
  constructor() {
    super('this tablet is not enrolled');
    this.name = 'NotEnrolled';
  }
}

/** The walks that are open on this tablet. One log serves every screen of a walk. */
export class WalkShelf {
  readonly #core: TabletCore;
  readonly #poke: () => void;
  readonly #open = new Map<string, { log: Promise<ShopWalkLog>; users: number }>();

  constructor(core: TabletCore, poke: () => void) {
    this.#core = core;
    this.#poke = poke;
  }

  /** How many walks are open: a new version waits until there are none (fault 14). */
  get openWalks(): number {
    return this.#open.size;
  }

  #start(start: WalkStart): Promise<ShopWalkLog> {
    const core = this.#core;
    const { identity, key, world } = core;
    if (!identity || !key) throw new NotEnrolled();
    return openWalkLog(
      {
        database: core.database,
        rules: shopRules,
        holds: world.holds,
        record: core.record,
        signer: signerOf(key),
        sealer: (payload) => {
          const sealer = core.sealer();
          if (!sealer) throw new NotEnrolled();
          return sealer(payload);
        },
        clock: world.clock,
        shop: identity.shop.id,
        tablet: identity.tablet.id,
        known: () => core.catalogue.cursor,
        announce: (walk) => {
          world.tell({ kind: 'walk', walk });
          core.changed('walks');
          this.#poke();
        },
        onBallastUsed: () => {
          core.trouble.low = true;
          core.changed('storage');
        },
      },
      start,
    );
  }

  /** Opens a walk of this tablet; every opening needs its `close`. Throws `UnknownWalk`, `StorageError`, `NotEnrolled`. */
  async open(walk: string, begin?: WalkStart['begin']): Promise<ShopWalkLog> {
    const held = this.#open.get(walk);
    if (held) {
      held.users += 1;
      return held.log;
    }
    const log = Promise.resolve().then(() => this.#start(begin ? { walk, begin } : { walk }));
    this.#open.set(walk, { log, users: 1 });
    try {
      return await log;
    } catch (error) {
      this.#open.delete(walk);
      throw error;
    } finally {
      this.#core.changed('walks');
    }
  }

  async close(walk: string): Promise<void> {
    const held = this.#open.get(walk);
    if (!held) return;
    held.users -= 1;
    if (held.users > 0) return;
    this.#open.delete(walk);
    (await held.log).close();
    this.#core.changed('walks');
  }

  /** The chain on the disk may have grown: an open log reads it again. */
  async reload(walk: string): Promise<void> {
    const held = this.#open.get(walk);
    if (held) await (await held.log).reload();
    this.#core.changed('walks');
  }

  /** Begins a walk on a joint (W1). Resolves with its id once `walk.opened` is saved. */
  async begin(wanted: WantedWalk, by: string): Promise<Result<string, OpeningRefusal | LogRefusal>> {
    const core = this.#core;
    const opening = openingOf(core.catalogue, wanted, await this.#statesOf(wanted.joint));
    if (!opening.ok) return opening;
    const walk = uuidV7(core.world.clock.now(), crypto.getRandomValues(new Uint8Array(16)));
    const log = await this.open(walk, opening.value.begin);
    try {
      const saved = await log.append({ act: opening.value.act, by, roles: core.rolesOf(by) });
      return saved.ok ? ok(walk) : err(saved.error);
    } finally {
      await this.close(walk);
    }
  }

  /** Walks of a joint on this tablet, folded, in the order in which they were opened. */
  async #statesOf(joint: string): Promise<WalkState[]> {
    const { database, record } = this.#core;
    const heads = await database.read(['heads'], (transaction) => rowsOf<HeadRow>(transaction, 'heads'));
    const states: WalkState[] = [];
    const ofJoint = heads.filter((head) => head.joint === joint).sort((a, b) => (a.openedAt < b.openedAt ? -1 : 1));
    for (const { walk } of ofJoint) {
      const chain = await loadChain(database, walk, record);
      if (!chain?.document) continue;
      const first = shopRules.initial(chain.document, chain.head.procedure);
      states.push(chain.events.reduce((state, event) => shopRules.evolve(state, event), first));
    }
    return states;
  }

  /** Obeys what the office has ordered for an open walk; what cannot be obeyed now comes back with its reason. */
  async obey(walk: string): Promise<PendingOrder[]> {
    const core = this.#core;
    const held = this.#open.get(walk);
    const orders = Object.values(core.catalogue.orders).filter((one) => one.walk === walk && one.state === 'open');
    if (!held || orders.length === 0) return [];
    const log = await held.log;
    if (log.snapshot().readOnly) return [];
    const range = IDBKeyRange.bound([walk], [walk, []]);
    const rows = await core.database.read(['events'], (transaction) => rowsOf<EventRow>(transaction, 'events', range));
    const obeyed = new Set(
      rows.flatMap(({ text }) => (JSON.parse(text) as { data: { order?: string } }).data.order ?? []),
    );
    return obeyOrders(log, orders, { keys: core.shopKeys(), record: core.record, rolesOf: core.rolesOf, obeyed });
  }
}
