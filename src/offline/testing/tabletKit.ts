import { tabletDatabase, type TabletDatabase } from '../database';
import { makeDeviceKey, signerOf } from '../deviceKey';
import type { DeviceKey } from '../settingValues';
import type { TabletClock } from '../tabletClock';
import type { WalkAct } from '../walkAct';
import { openWalkLog, type WalkLogDeps } from '../walkLog';
import { webRecordCrypto } from '../webCrypto';
import { failingIndexedDb, type FailingIndexedDb } from './failingIndexedDb';
import { emptyDocument, noteRules, type NoteWalk } from './fakeRules';
import { memoryHolds } from './memoryHolds';

/** Ids of the tests: any UUIDs do. */
export const SHOP = '0190f0a0-0000-7000-8000-000000000001';
export const TABLET = '0190f0a0-0000-7000-8000-0000000000a1';
export const PERSON = '0190f0a0-0000-7000-8000-0000000000b1';
export const WALK = '0190f0a0-0000-7000-8000-0000000000c1';
export const DOCUMENT_HASH = 'd'.repeat(64);

/** A clock that a test moves. */
export function handClock(start = Date.parse('2026-06-13T08:00:00.000Z')): TabletClock & { pass(ms: number): void } {
  let passed = 0;
  return {
    boot: 'boot-1',
    now: () => start + passed,
    mono: () => passed,
    pass: (ms) => void (passed += ms),
  };
}

type NoteView = ReturnType<typeof noteRules.view>;

/** A tablet with a disk that survives its program. */
export interface TestTablet {
  disk: FailingIndexedDb;
  database: TabletDatabase;
  key: DeviceKey;
  deps: WalkLogDeps<NoteWalk, NoteView>;
}

/** Makes a tablet; with `from`, the same tablet after its program was started again. */
export async function testTablet(
  from?: TestTablet,
  more: Partial<WalkLogDeps<NoteWalk, NoteView>> = {},
): Promise<TestTablet> {
  const record = webRecordCrypto();
  const disk = from?.disk ?? failingIndexedDb();
  if (from) disk.restart();
  const key = from?.key ?? (await makeDeviceKey(record));
  const database = tabletDatabase({ factory: disk.factory });
  const deps: WalkLogDeps<NoteWalk, NoteView> = {
    database,
    rules: noteRules,
    holds: memoryHolds(),
    record,
    signer: signerOf(key),
    sealer: null,
    clock: handClock(),
    shop: SHOP,
    tablet: TABLET,
    known: () => 7,
    ...more,
  };
  return { disk, database, key, deps };
}

/** Opens the test's walk, which begins if it is not there. */
export const openTestWalk = (tablet: TestTablet, walk = WALK) =>
  openWalkLog(tablet.deps, { walk, begin: { document: emptyDocument, hash: DOCUMENT_HASH } });

/** The act that opens a walk. */
export const opened = (): WalkAct => ({
  type: 'walk.opened',
  data: {
    job: PERSON,
    joint: PERSON,
    purpose: 'finalAssembly',
    procedure: { code: 'P-TEST', revision: 1, hash: DOCUMENT_HASH },
    pulls: PERSON,
    records: PERSON,
    policy: { judgement: 'simple', countersign: 'required', shopOfOne: false },
    rules: 1,
    earlier: { readingsTaken: false, usedHoles: [] },
  },
});

/** A note: the smallest event there is. */
export const note = (text: string): WalkAct => ({ type: 'note.added', data: { text, hole: null } });

/** Wraps an act as the technician's request. */
export const byTechnician = (act: WalkAct, head?: string) => ({
  act,
  by: PERSON,
  roles: ['technician'] as const,
  head,
});
