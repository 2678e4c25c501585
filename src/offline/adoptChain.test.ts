// @vitest-environment node
import { describe, expect, it } from 'vitest';
import type { WalkChain } from '@shared/contracts/sync.contract';
import { sealEvent } from '@shared/record/chain';
import type { Signer } from '@shared/record/crypto';
import { ZERO_HASH, type Envelope, type SignedEvent } from '@shared/record/envelope';
import { adoptChain } from './adoptChain';
import { rowsOf } from './database';
import { makeDeviceKey, signerOf } from './deviceKey';
import type { EventRow } from './rows';
import { emptyDocument } from './testing/fakeRules';
import {
  byTechnician,
  DOCUMENT_HASH,
  note,
  opened,
  openTestWalk,
  PERSON,
  SHOP,
  testTablet,
  WALK,
} from './testing/tabletKit';
import { openWalkLog } from './walkLog';
import { webRecordCrypto } from './webCrypto';

const record = webRecordCrypto();
const OTHER = '0190f0a0-0000-7000-8000-0000000000a2';
const AT = '2026-06-13T09:00:00.000Z';

const eventOf = (signer: Signer, before: readonly SignedEvent[], act: { type: string; data: object }, branch = 0) => {
  const envelope: Envelope = {
    ...{ v: 1, shop: SHOP, walk: WALK, branch, seq: before.length, prev: before.at(-1)?.hash ?? ZERO_HASH },
    ...{ at: AT, mono: before.length, boot: 'b', known: 1, by: PERSON, tablet: OTHER, ...act },
  };
  return sealEvent(envelope, signer, record);
};

/** A chain another tablet wrote; from `fork` on its events stand on branch 1. */
async function foreignChain(notes: string[], fork = Infinity): Promise<{ chain: WalkChain; signer: Signer }> {
  const key = await makeDeviceKey(record);
  const signer = signerOf(key);
  const events: SignedEvent[] = [];
  for (const act of [opened(), ...notes.map(note)]) {
    events.push(await eventOf(signer, events, act, events.length >= fork ? 1 : 0));
  }
  return { signer, chain: chainOf(events, [{ ...key.publicJwk, kid: key.kid }], fork) };
}

const chainOf = (events: SignedEvent[], keys: WalkChain['keys'], fork = Infinity): WalkChain => ({
  walk: {
    ...{ id: WALK, job: PERSON, joint: PERSON, purpose: 'finalAssembly', state: 'walking', writer: OTHER },
    procedure: { code: 'P-TEST', revision: 1, hash: DOCUMENT_HASH },
    ...{ branch: 0, next: events.length, head: events.at(-1)?.hash ?? '', pulls: PERSON, records: PERSON },
    ...{ openedAt: AT, changedAt: AT, readingsDone: 0, readingsDue: 0, openDeviations: 0, forked: false },
    ...{ parallel: [], quarantined: 0, refusedSeals: 0, missingBlobs: 0 },
  },
  branch: 0,
  events: events.map((event, seq) => ({ ...event, branch: seq >= fork ? 1 : 0, seq, receivedAt: AT })),
  confirmations: [],
  keys,
});

const rowsHere = (tablet: Awaited<ReturnType<typeof testTablet>>) =>
  tablet.database.read(['events'], (transaction) => rowsOf<EventRow>(transaction, 'events'));

describe('a chain from the server', () => {
  it('is stored and can be walked on', async () => {
    const tablet = await testTablet();
    const { chain } = await foreignChain(['a', 'b']);
    expect((await adoptChain(tablet.deps, chain, emptyDocument, AT)).ok).toBe(true);
    const log = await openWalkLog(tablet.deps, { walk: WALK });
    expect(log.snapshot().state.notes).toEqual(['a', 'b']);
    expect((await log.append(byTechnician(note('c')))).ok).toBe(true);
    expect(log.snapshot()).toMatchObject({ next: 4, broken: null });
  });

  it('is followed over its branches, and written on where the last one stands (decision 5)', async () => {
    const tablet = await testTablet();
    const { chain } = await foreignChain(['a', 'b', 'c'], 2);
    expect(await adoptChain(tablet.deps, chain, emptyDocument, AT)).toMatchObject({ ok: true, value: { branch: 1 } });
    const log = await openWalkLog(tablet.deps, { walk: WALK });
    expect(log.snapshot().state.notes).toEqual(['a', 'b', 'c']);
    await log.append(byTechnician(note('d')));
    const rows = await rowsHere(tablet);
    expect(rows.map(({ branch, seq }) => `${branch}/${seq}`)).toEqual(['0/0', '0/1', '1/2', '1/3', '1/4']);
    log.close();
    const again = await openWalkLog(tablet.deps, { walk: WALK });
    expect(again.snapshot()).toMatchObject({ next: 5, broken: null });
  });

  it('is refused where a hash, a link or a signature does not hold, and nothing is stored', async () => {
    const tablet = await testTablet();
    const { chain } = await foreignChain(['a', 'b']);
    const [, changed] = chain.events;
    if (changed) changed.text = changed.text.replace('"a"', '"x"');
    const refused = { ok: false, error: { code: 'chain.broken', params: { seq: 1, why: 'wrongHash' } } };
    expect(await adoptChain(tablet.deps, chain, emptyDocument, AT)).toEqual(refused);
    const strange = { ...(await foreignChain(['a'])).chain, keys: [] };
    expect(await adoptChain(tablet.deps, strange, emptyDocument, AT)).toMatchObject({
      error: { code: 'chain.broken', params: { seq: 0, why: 'unknownKey' } },
    });
    expect(await rowsHere(tablet)).toEqual([]);
  });

  it('never writes over what was not sent, nor over other events (I5)', async () => {
    const tablet = await testTablet();
    const log = await openTestWalk(tablet);
    await log.append(byTechnician(opened()));
    const { chain } = await foreignChain(['a']);
    expect(await adoptChain(tablet.deps, chain, emptyDocument, AT)).toMatchObject({ error: { code: 'chain.unsent' } });
    await tablet.database.write(['outbox'], (transaction) => void transaction.objectStore('outbox').clear());
    expect(await adoptChain(tablet.deps, chain, emptyDocument, AT)).toMatchObject({
      error: { code: 'chain.conflict', params: { seq: 0 } },
    });
    expect(await rowsHere(tablet)).toHaveLength(1);
  });

  it('needs its procedure and at least one event', async () => {
    const tablet = await testTablet();
    const { chain } = await foreignChain(['a']);
    expect(await adoptChain(tablet.deps, chain, null, AT)).toMatchObject({ error: { code: 'chain.noProcedure' } });
    expect(await adoptChain(tablet.deps, chainOf([], []), emptyDocument, AT)).toMatchObject({
      error: { code: 'chain.empty' },
    });
  });

  it('gives back the end that this tablet lost (fault 20)', async () => {
    const tablet = await testTablet();
    const { chain } = await foreignChain(['a', 'b', 'c']);
    const short = chainOf(chain.events.slice(0, 2), chain.keys);
    await adoptChain(tablet.deps, short, emptyDocument, AT);
    const log = await openWalkLog(tablet.deps, { walk: WALK });
    await adoptChain(tablet.deps, chain, emptyDocument, AT);
    await log.reload();
    expect(log.snapshot().state.notes).toEqual(['a', 'b', 'c']);
  });
});
