import type { RecordCrypto } from '@shared/record/crypto';
import type { PublicJwk } from '@shared/record/crypto';
import type { Role } from '@shared/people/roles';
import { emptyCatalogue, type Catalogue } from './catalogue';
import { tabletDatabase, type TabletDatabase } from './database';
import { sealerFor, type Sealer } from './seal';
import { tabletSettings, type Settings } from './settings';
import type { DeviceKey, StandSession, TabletIdentity } from './settingValues';
import { storageErrorOf, type StorageErrorCode } from './storageError';
import type { TabletWorld } from './tabletWorld';
import { webRecordCrypto } from './webCrypto';

/** What became another on the tablet. */
export type TabletChange = 'identity' | 'catalogue' | 'session' | 'walks' | 'storage';

/** What a person must be told of the tablet's storage (faults 13, 15, 19). */
export interface StorageTrouble {
  /** The storage failed with this code when it was last used for the tablet's own things; null: it is well. */
  code: StorageErrorCode | null;
  /** The disk is full or nearly: the space kept for readings is used, or could not be kept. */
  low: boolean;
  /** Another tab holds an older version open: it has to be closed. */
  otherTab: boolean;
  /** A newer version opened in another tab: this one has to be closed or loaded again. */
  givenWay: boolean;
}

/** Everything the parts of the tablet share. What is in memory is on the disk too. */
export interface TabletCore {
  world: TabletWorld;
  database: TabletDatabase;
  settings: Settings;
  record: RecordCrypto;
  key: DeviceKey | null;
  identity: TabletIdentity | null;
  catalogue: Catalogue;
  session: StandSession | null;
  trouble: StorageTrouble;
  /** Seals to the shop's key of the moment; null before the tablet is enrolled. */
  sealer: () => Sealer | null;
  rolesOf: (person: string) => readonly Role[];
  shopKeys: () => ReadonlyMap<string, PublicJwk>;
  changed: (what: TabletChange) => void;
  onChange: (listener: (what: TabletChange) => void) => () => void;
}

function openStores(world: TabletWorld, trouble: StorageTrouble, told: () => void) {
  const notice = (part: Partial<StorageTrouble>) => (): void => {
    Object.assign(trouble, part);
    told();
  };
  const deps = {
    factory: world.factory,
    onBlocked: notice({ otherTab: true }),
    onGivenWay: notice({ givenWay: true }),
  };
  return { database: tabletDatabase(deps), settings: tabletSettings(deps) };
}

const named = (keys: readonly (PublicJwk & { kid: string })[]): ReadonlyMap<string, PublicJwk> =>
  new Map(keys.map(({ kid, ...jwk }) => [kid, jwk]));

/** Sets the tablet up in memory; nothing is read yet. */
export function tabletCore(world: TabletWorld): TabletCore {
  const listeners = new Set<(what: TabletChange) => void>();
  const changed = (what: TabletChange): void => {
    for (const listener of listeners) listener(what);
  };
  const record = webRecordCrypto();
  const trouble: StorageTrouble = { code: null, low: false, otherTab: false, givenWay: false };
  const core: TabletCore = {
    world,
    record,
    ...openStores(world, trouble, () => changed('storage')),
    key: null,
    identity: null,
    catalogue: emptyCatalogue(),
    session: null,
    trouble,
    sealer: () => {
      const key = core.catalogue.shop?.sealingKey ?? core.identity?.sealingKey;
      return key ? sealerFor(key, record) : null;
    },
    rolesOf: (person) => core.catalogue.people[person]?.roles ?? [],
    shopKeys: () => named(core.catalogue.shop?.signingKeys ?? core.identity?.signingKeys ?? []),
    changed,
    onChange: (listener) => {
      listeners.add(listener);
      return () => listeners.delete(listener);
    },
  };
  return core;
}

/** Reads what the tablet is and knows. A failure is written into `trouble` and shown, never worked around. */
export async function loadCore(core: TabletCore): Promise<void> {
  const { settings } = core;
  try {
    core.key = (await settings.get('deviceKey')) ?? null;
    core.identity = (await settings.get('tablet')) ?? null;
    core.catalogue = (await settings.get('catalogue')) ?? emptyCatalogue();
    core.session = (await settings.get('session')) ?? null;
    core.trouble.code = null;
  } catch (error) {
    core.trouble.code = storageErrorOf(error).code;
  }
  for (const what of ['identity', 'catalogue', 'session', 'storage'] as const) core.changed(what);
}
