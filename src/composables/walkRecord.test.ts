import { beforeAll, describe, expect, it } from 'vitest';
import type { OfficeWalkWhole } from '@shared/contracts/walks.contract';
import { sealEvent } from '@shared/record/chain';
import { ZERO_HASH, type Envelope } from '@shared/record/envelope';
import { aWalk, type Walk } from '../../tests/support/aWalk';
import { makeTestSigner, testCrypto, type TestSigner } from '../../tests/support/testSigner';
import { eventLines } from './eventLine';
import { verifyWalk } from './verifyWalk';
import { walkChoices } from './walkChoices';
import { walkRecord } from './walkRecord';

const TECH = '00000000-0000-7000-8000-000000000001';
const BOSS = '00000000-0000-7000-8000-000000000002';
const TABLET = '00000000-0000-7000-8000-000000000003';
const WALK = '00000000-0000-7000-8000-000000000004';
const SHOP = '00000000-0000-7000-8000-000000000005';
const boss = { id: BOSS, roles: ['supervisor' as const] };

const named = (value: unknown): unknown =>
  JSON.parse(
    JSON.stringify(value)
      .replaceAll('"tech"', `"${TECH}"`)
      .replaceAll('"boss"', `"${BOSS}"`)
      .replaceAll('"tablet-1"', `"${TABLET}"`),
  );

let tablet: TestSigner;
beforeAll(async () => {
  tablet = await makeTestSigner();
});

/** The walk as the server would hand it to the office. */
async function wholeOf(walk: Walk, more: Partial<OfficeWalkWhole['walk']> = {}): Promise<OfficeWalkWhole> {
  let prev = ZERO_HASH;
  const events: OfficeWalkWhole['events'] = [];
  for (const { branch: _branch, ...event } of walk.events) {
    const envelope = named({ v: 1, shop: SHOP, walk: WALK, branch: 0, prev, ...event }) as Envelope;
    const signed = await sealEvent(envelope, tablet.signer, testCrypto);
    prev = signed.hash;
    events.push({ ...signed, branch: 0, seq: event.seq, receivedAt: event.at });
  }
  const row = {
    id: WALK,
    state: 'walking',
    writer: TABLET,
    procedure: { code: 'TEST-4', revision: 1, hash: 'hash' },
    forked: false,
  };
  return {
    walk: { ...row, ...more },
    branch: 0,
    events,
    confirmations: [],
    keys: [{ ...tablet.publicJwk, kid: tablet.signer.kid }],
    document: walk.procedure,
    names: { [TECH]: 'Ilse', [BOSS]: 'Tobias' },
    tablets: { [TABLET]: 'Stand 2' },
    branches: [],
    quarantined: [],
    orders: [],
    issueBlocks: [],
  } as unknown as OfficeWalkWhole;
}

const signedWalk = (): Walk =>
  aWalk()
    .until(({ kind }) => kind === 'sign')
    .does('walk.signed', { meaning: 'tightenedAsRecorded', seal: 'a'.repeat(64) })
    .does('walk.released', { to: 'shop' });

describe('walkRecord', () => {
  it('folds the events to what the stand showed', async () => {
    const record = walkRecord(await wholeOf(signedWalk()));
    expect(record?.review.final).toMatchObject({ total: 12, in: 12 });
    expect(record?.sheet.signatures).toMatchObject([{ by: TECH, tablet: 'Stand 2', confirmed: null }]);
    expect(record?.unreadableAt).toBeNull();
  });

  it('puts the shop’s last word beside each use of a PIN, for that very event only', async () => {
    const whole = await wholeOf(signedWalk());
    const seq = whole.events.length - 2;
    const hash = whole.events[seq]?.hash ?? '';
    const say = (at: string, result: 'accepted' | 'refused', of = hash) =>
      ({ seq, hash: of, at, result, reason: null }) as OfficeWalkWhole['confirmations'][number];
    expect(walkRecord(whole)?.seals).toEqual([{ seq, by: TECH, confirmation: null }]);
    const said = [say('2026-05-02T08:00:00Z', 'refused'), say('2026-05-01T08:00:00Z', 'accepted')];
    expect(walkRecord({ ...whole, confirmations: said })?.seals[0]?.confirmation?.result).toBe('refused');
    const other = [say('2026-05-02T08:00:00Z', 'accepted', 'f'.repeat(64))];
    expect(walkRecord({ ...whole, confirmations: other })?.seals[0]?.confirmation).toBeNull();
  });

  it('stops at an event it cannot read and says which', async () => {
    const whole = await wholeOf(signedWalk());
    const cut = whole.events.map((event) => (event.seq === 6 ? { ...event, text: event.text.slice(0, -1) } : event));
    expect(walkRecord({ ...whole, events: cut })).toMatchObject({ unreadableAt: 6 });
    expect(walkRecord({ ...whole, events: cut.slice(6) })).toBeNull();
  });
});

describe('verifyWalk', () => {
  it('finds a whole chain whole, and names the event of one changed character', async () => {
    const whole = await wholeOf(signedWalk());
    expect(await verifyWalk(whole, testCrypto)).toEqual({ kind: 'whole', events: whole.events.length });
    const changed = whole.events.map((event) =>
      event.seq === 9 ? { ...event, text: event.text.replace('"typed"', '"keyed"').replace('"yes"', '"no"') } : event,
    );
    expect(await verifyWalk({ ...whole, events: changed }, testCrypto)).toEqual({ kind: 'broken', seq: 9 });
  });

  it('says so where the browser cannot check', async () => {
    expect(await verifyWalk(await wholeOf(signedWalk()), null)).toEqual({ kind: 'unchecked' });
  });
});

describe('walkChoices', () => {
  const choose = async (
    walk: Walk,
    row: Partial<OfficeWalkWhole['walk']>,
    person: Parameters<typeof walkChoices>[2] = boss,
  ) => {
    const whole = await wholeOf(walk, row);
    const record = walkRecord(whole);
    if (!record) throw new Error('unreadable');
    const { choices, why } = walkChoices(whole, record, person);
    return { kinds: choices.map(({ kind }) => kind), why };
  };

  it('lets another supervisor countersign, send back and void what the shop holds', async () => {
    expect(await choose(signedWalk(), { state: 'signed', writer: 'office' })).toEqual({
      kinds: ['countersign', 'sendBack', 'voidWalk'],
      why: null,
    });
  });

  it('asks for a countersignature anew whose PIN was refused (decision 6)', async () => {
    const walk = signedWalk().as('boss', 'supervisor');
    walk.does('walk.countersigned', { meaning: 'checkedRecord', seal: 'b'.repeat(64) }, 'office');
    const whole = await wholeOf(walk, { state: 'finished', writer: 'office' });
    const seq = whole.events.length - 1;
    const kinds = (result: 'accepted' | 'refused') => {
      const said = { seq, hash: whole.events[seq]?.hash, at: '2026-05-02T08:00:00Z', result };
      const now = { ...whole, confirmations: [said as OfficeWalkWhole['confirmations'][number]] };
      const record = walkRecord(now);
      return record && walkChoices(now, record, boss).choices.map(({ kind }) => kind);
    };
    expect(kinds('refused')).toEqual(['countersign', 'sendBack', 'voidWalk']);
    expect(kinds('accepted')).toEqual(['sendBack', 'voidWalk']);
  });

  it('offers no judgement to whoever took readings (P1)', async () => {
    const own = { id: TECH, roles: ['supervisor' as const] };
    const found = await choose(signedWalk(), { state: 'signed', writer: 'office' }, own);
    expect(found).toEqual({ kinds: ['voidWalk'], why: 'ownReadings' });
  });

  it('offers nothing to a clerk, on a voided walk, and on one written by two tablets', async () => {
    const clerk = { id: BOSS, roles: ['clerk' as const] };
    const row = { state: 'signed', writer: 'office' } as const;
    expect(await choose(signedWalk(), row, clerk)).toEqual({ kinds: [], why: 'right' });
    expect(await choose(signedWalk(), { ...row, state: 'voided' })).toEqual({ kinds: [], why: 'voided' });
    expect(await choose(signedWalk(), { ...row, forked: true })).toEqual({ kinds: [], why: 'forked' });
  });

  it('offers orders while a tablet writes: a held deviation, stop and void (decision 4)', async () => {
    const walk = aWalk().to('p3', 'h2').pulls('104');
    walk.does('hold.set', { deviation: walk.state.deviations[0]?.id ?? '', note: 'nobody here' });
    expect((await choose(walk, {})).kinds).toEqual(['decide', 'stop', 'orderVoid']);
  });
});

describe('eventLines', () => {
  it('says hole, pass and figure of a reading', async () => {
    const record = walkRecord(await wholeOf(aWalk().to('p3', 'h2').pulls('104')));
    const lines = record ? eventLines(record.events, record.state) : [];
    expect(lines.at(-1)).toMatchObject({
      type: 'reading.taken',
      label: '2',
      pass: 3,
      value: { value: '104', unit: 'deg' },
      verdict: 'over',
      by: TECH,
    });
  });
});
