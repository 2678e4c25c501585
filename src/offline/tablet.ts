import type { CataloguePerson } from '@shared/contracts/catalogue.contract';
import { err, ok, type Result } from '@shared/kernel/result';
import { keepBallast } from './ballast';
import { emptyCatalogue, type Catalogue } from './catalogue';
import { exportTablet, type TabletExport } from './exportTablet';
import { checkPinForSeal, signInByPin, type PinDeps, type PinProof, type PinRefusal } from './pin';
import type { Draft, StandSession, TabletIdentity } from './settingValues';
import { askToPersist, storageRoom, type StorageRoom } from './storage';
import { storageErrorOf } from './storageError';
import type { SyncEngine } from './syncEngine';
import { enrolDemoTablet, enrolTablet, type ServerFailure } from './tabletAuth';
import { isoOf } from './tabletClock';
import { loadCore, tabletCore, type StorageTrouble, type TabletChange, type TabletCore } from './tabletCore';
import { pruneTablet, tabletSync } from './tabletSync';
import type { TabletWorld, TabWord } from './tabletWorld';
import { fetchWalk, takeOverWalk, type TakeOverDeps, type WantedTakeOver } from './takeOver';
import { walksOnTablet, type WalkOnTablet } from './walkIndex';
import { WalkShelf } from './walkShelf';

const OFFLINE_DAYS = 14;
const POKE_AFTER_MS = 250;
const HOUSEKEEPING_AFTER_MS = 2_000;

/** This tablet: who it is, what it knows, the walks on it, and what it sends. One for the whole program. */
export class Tablet {
  readonly walks: WalkShelf;
  readonly sync: SyncEngine;
  readonly #core: TabletCore;
  #pokeTimer: unknown = null;

  constructor(world: TabletWorld) {
    this.#core = tabletCore(world);
    this.sync = tabletSync(this.#core, {
      onCatalogue: () => void this.#catalogueChanged(),
      onWalk: (walk) => void this.walks.reload(walk).catch((error: unknown) => this.#storageFailed(error)),
      lostWalks: () => this.sync.lostWalks(),
    });
    this.walks = new WalkShelf(this.#core, () => this.#pokeSoon());
    world.listen((word) => void this.#heard(word).catch((error: unknown) => this.#storageFailed(error)));
  }

  get identity(): TabletIdentity | null {
    return this.#core.identity;
  }
  get catalogue(): Catalogue {
    return this.#core.catalogue;
  }
  get session(): StandSession | null {
    return this.#core.session;
  }
  get trouble(): StorageTrouble {
    return { ...this.#core.trouble };
  }
  get world(): TabletWorld {
    return this.#core.world;
  }

  onChange(listener: (what: TabletChange) => void): () => void {
    return this.#core.onChange(listener);
  }

  /** Reads what is kept and starts sending. Storage that fails is told in `trouble`; call it again to try again. */
  async start(): Promise<void> {
    await loadCore(this.#core);
    if (this.#core.trouble.code !== null) return;
    this.sync.start();
    this.#core.world.setTimer(() => void this.#keepHouse(), HOUSEKEEPING_AFTER_MS);
  }

  /** What may wait until the first screen stands: a promise of the browser, kept space, walks that had their time. */
  async #keepHouse(): Promise<void> {
    await askToPersist(this.#core.world.storage);
    try {
      this.#core.trouble.low = !(await keepBallast(this.#core.database));
      await pruneTablet(this.#core);
    } catch (error) {
      this.#storageFailed(error);
    }
    this.#core.changed('storage');
  }

  stop(): void {
    this.sync.stop();
    if (this.#pokeTimer !== null) this.#core.world.clearTimer(this.#pokeTimer);
    this.#pokeTimer = null;
    this.#core.database.close();
    this.#core.settings.close();
  }

  /** After an event: the next instruction is painted first, and quick taps make one round of sending. */
  #pokeSoon(): void {
    if (this.#pokeTimer !== null) return;
    this.#pokeTimer = this.#core.world.setTimer(() => {
      this.#pokeTimer = null;
      void this.sync.poke();
    }, POKE_AFTER_MS);
  }

  #storageFailed(error: unknown): void {
    this.#core.trouble.code = storageErrorOf(error).code;
    this.#core.changed('storage');
  }

  async #heard(word: TabWord): Promise<void> {
    if (word.kind === 'walk') return this.walks.reload(word.walk);
    const { settings } = this.#core;
    if (word.kind === 'catalogue') this.#core.catalogue = (await settings.get('catalogue')) ?? emptyCatalogue();
    else this.#core.session = (await settings.get('session')) ?? null;
    this.#core.changed(word.kind);
  }

  /** Who left the shop is signed out at the next contact (fault 16); what they entered before stays. */
  async #catalogueChanged(): Promise<void> {
    const { session, catalogue, world } = this.#core;
    world.tell({ kind: 'catalogue' });
    this.#core.changed('catalogue');
    if (session && catalogue.people[session.person]?.state === 'left') await this.signOut();
  }

  /** Enrols by a one-time code. */
  async enrol(code: string, name: string): Promise<Result<TabletIdentity, ServerFailure>> {
    return this.#enrolled(await enrolTablet(this.#authDeps(), { code, name }));
  }

  /** Opens the demo's door. */
  async enrolDemo(): Promise<Result<TabletIdentity, ServerFailure>> {
    return this.#enrolled(await enrolDemoTablet(this.#authDeps()));
  }

  #authDeps() {
    const { world, settings, record } = this.#core;
    return { client: world.client, settings, record, clock: world.clock };
  }

  async #enrolled(done: Result<{ identity: TabletIdentity }, ServerFailure>) {
    if (!done.ok) return done;
    await loadCore(this.#core);
    await this.sync.press();
    return ok(done.value.identity);
  }

  /** A person by id, where the catalogue knows them. */
  personById(person: string): CataloguePerson | null {
    return this.#core.catalogue.people[person] ?? null;
  }

  /** Signs in by tile and PIN, offline within the shop's days (decision 10). */
  async signIn(person: string, pin: string): Promise<Result<PinProof, PinRefusal>> {
    const known = this.personById(person);
    const deps = this.#pinDeps();
    if (!known || !deps) return err({ code: 'pin.personUnknown' });
    const proof = await signInByPin(deps, known, pin);
    if (!proof.ok) return proof;
    const session = { person, since: isoOf(this.#core.world.clock.now()) };
    await this.#core.settings.set('session', session);
    this.#sessionIs(session);
    return proof;
  }

  async signOut(): Promise<void> {
    await this.#core.settings.remove('session');
    this.#sessionIs(null);
  }

  #sessionIs(session: StandSession | null): void {
    this.#core.session = session;
    this.#core.world.tell({ kind: 'session' });
    this.#core.changed('session');
  }

  /** Checks a PIN that is to be sealed into a walk; `later` where only the server can (decision 6). */
  async checkPin(person: string, pin: string): Promise<Result<PinProof, PinRefusal>> {
    const known = this.personById(person);
    const deps = this.#pinDeps();
    if (!known || !deps) return err({ code: 'pin.personUnknown' });
    return checkPinForSeal(deps, known, pin);
  }

  #pinDeps(): PinDeps | null {
    const { identity, settings, world, catalogue, sealer } = this.#core;
    if (!identity) return null;
    return {
      settings,
      client: world.client,
      clock: world.clock,
      tablet: identity.tablet.id,
      bearer: () => this.sync.bearer(),
      sealer: sealer(),
      offlineDays: catalogue.shop?.settings.offlineSignInDays ?? OFFLINE_DAYS,
    };
  }

  #takeOverDeps(): TakeOverDeps {
    const { database, record, world, sealer, catalogue, identity } = this.#core;
    return {
      database,
      record,
      client: world.client,
      clock: world.clock,
      sealer: sealer(),
      bearer: () => this.sync.bearer(),
      catalogue: () => catalogue,
      tablet: identity?.tablet.id ?? '',
    };
  }

  /** Makes this tablet the writer of a walk begun elsewhere (W11). */
  async takeOver(wanted: WantedTakeOver): Promise<Result<string, ServerFailure>> {
    return this.#fetched(await takeOverWalk(this.#takeOverDeps(), wanted));
  }

  /** Brings a walk here to be looked at. */
  async fetchWalk(walk: string): Promise<Result<string, ServerFailure>> {
    return this.#fetched(await fetchWalk(this.#takeOverDeps(), walk));
  }

  async #fetched(done: Result<{ walk: string }, ServerFailure>): Promise<Result<string, ServerFailure>> {
    if (!done.ok) return done;
    await this.walks.reload(done.value.walk);
    return ok(done.value.walk);
  }

  /** Somebody has read which walks lost events here (fault 20). */
  forgetLost(): Promise<void> {
    return this.sync.forgetLost();
  }

  walksHere(): Promise<WalkOnTablet[]> {
    return walksOnTablet(this.#core.database);
  }

  room(): Promise<StorageRoom> {
    return storageRoom(this.#core.world.storage);
  }

  /** Everything on this tablet as one file; works with whatever of the storage can still be read. */
  exportAll(): Promise<TabletExport> {
    const { database, settings, world } = this.#core;
    return exportTablet(database, settings, isoOf(world.clock.now()));
  }

  async draft(name: string): Promise<unknown> {
    return (await this.#core.settings.get(`draft:${name}`))?.value;
  }

  async saveDraft(name: string, value: unknown): Promise<void> {
    const draft: Draft = { savedAt: isoOf(this.#core.world.clock.now()), value };
    await this.#core.settings.set(`draft:${name}`, draft);
  }

  dropDraft(name: string): Promise<void> {
    return this.#core.settings.remove(`draft:${name}`);
  }
}
