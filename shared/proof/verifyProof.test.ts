import { beforeAll, describe, expect, it } from 'vitest';
import { makeProofKit, procedureOf, sketchPlan, type ProofKit } from '../../tests/support/proofKit';
import { makeTestSigner, testCrypto } from '../../tests/support/testSigner';
import { testIds } from '../../tests/support/walkBook';
import { canonicalJson } from '../record/canonicalJson';
import { hashText, sealEvent } from '../record/chain';
import type { Envelope, SignedEvent } from '../record/envelope';
import { signDetached } from '../record/signature';
import type { ProofDocument } from './proofDocument';
import { openProof, sealProof, withholdSide } from './sealProof';
import { SHOWN_OUTSIDE } from './sideSheet';
import { problemSeq } from './verify/problem';
import { verifyProof } from './verifyProof';

let kit: ProofKit;
beforeAll(async () => {
  kit = await makeProofKit(procedureOf('HEAD-D6'), { plan: sketchPlan });
}, 30_000);

const check = (sealed: string, storedHashes?: readonly string[]) =>
  verifyProof(sealed, { crypto: testCrypto, shopKeys: kit.shopKeys, storedHashes });

/** A copy of the document changed and sealed by the shop again: what a shop that cheats could do. */
const resealed = (change: (document: ProofDocument) => void): Promise<string> => {
  const copy = structuredClone(kit.document);
  change(copy);
  return sealProof(copy, openProof(kit.sealed)?.disclosures ?? [], kit.shop.signer);
};

/** The sealed proof with the text of its document changed and the signature left as it was. */
const tampered = (change: (text: string) => string): string => {
  const [jws = '', ...rest] = kit.sealed.split('~');
  const [header = '', payload = '', signature = ''] = jws.split('.');
  const text = change(Buffer.from(payload, 'base64url').toString());
  return [`${header}.${Buffer.from(text).toString('base64url')}.${signature}`, ...rest].join('~');
};

const seqOfReading = (hole: string, pass: string): number =>
  kit.log.book.events.findIndex(
    (event) => event.type === 'reading.taken' && event.data.hole === hole && event.data.pass === pass,
  );

const codes = async (sealed: string) => (await check(sealed)).problems.map(({ code }) => code);

describe('a whole proof', () => {
  it('has no problem, and every event and reading is judged again', async () => {
    const found = await check(kit.sealed);
    expect(found.problems).toEqual([]);
    expect(found).toMatchObject({
      shopSigned: true,
      eventsChecked: kit.log.signed.length,
      eventsInAll: kit.log.signed.length,
      // 56 that stand, three of the fastener that was replaced, one that was voided.
      readingsJudgedAgain: 60,
      readingsInAll: 60,
    });
    expect(found.counts?.measured).toEqual({ inside: 56, count: 56 });
  });

  it('holds with names, claim, customer and half of the VIN withheld', async () => {
    const outside = withholdSide(kit.sealed, SHOWN_OUTSIDE);
    for (const secret of ['Marchetti', 'Renquist', 'Harbour', 'WR-88120', 'ZZ9KD63X5TB']) {
      expect(Buffer.from(outside.split('.')[1] ?? '', 'base64url').toString()).not.toContain(secret);
      expect(
        outside
          .split('~')
          .slice(1)
          .map((part) => Buffer.from(part, 'base64url').toString())
          .join(),
      ).not.toContain(secret);
    }
    const found = await check(outside);
    expect(found.problems).toEqual([]);
    expect(found.side).toEqual({ names: {}, vinTail: '004417' });
  });

  it('tells how far it is, from nothing to everything', async () => {
    const shares: number[] = [];
    const progress = (_step: string, share: number): void => void shares.push(share);
    await verifyProof(kit.sealed, { crypto: testCrypto, shopKeys: kit.shopKeys, progress });
    expect(shares.length).toBeGreaterThan(8);
    expect(Math.max(...shares)).toBe(1);
  });
});

describe('one changed character of one stored event', () => {
  it('is named by its event, whichever event it is', async () => {
    for (const seq of [0, 1, seqOfReading('h5', 'p3'), kit.log.signed.length - 1]) {
      const { text = '' } = kit.log.signed[seq] ?? {};
      const escaped = JSON.stringify(text).slice(1, -1);
      const at = escaped.indexOf('at\\":\\"2026') + 14;
      const changed = `${escaped.slice(0, at)}${escaped[at] === '1' ? '2' : '1'}${escaped.slice(at + 1)}`;
      const found = await check(tampered((whole) => whole.replace(escaped, changed)));
      expect(found.problems[0], `event ${seq}`).toEqual({ code: 'chain', seq, why: 'wrongHash' });
      expect(found.problems.at(-1)?.code).toBe('shopSignature');
      expect(found.eventsChecked).toBe(seq);
    }
  });

  it('is named where the shop seals the changed document again', async () => {
    const seq = seqOfReading('h7', 'p1');
    const sealed = await resealed(({ record }) => {
      const event = record.events[seq] as SignedEvent;
      event.text = event.text.replace('"target":"30"', '"target":"31"');
    });
    expect((await check(sealed)).problems[0]).toEqual({ code: 'chain', seq, why: 'wrongHash' });
  });

  it('is named in the signature too', async () => {
    const sealed = await resealed(({ record }) => {
      const event = record.events[9] as SignedEvent;
      event.sig = event.sig.slice(0, -3) + (event.sig.endsWith('AAA') ? 'BAA' : 'AAA');
    });
    expect((await check(sealed)).problems[0]).toMatchObject({ code: 'chain', seq: 9 });
  });
});

describe('what a tablet or a shop that cheats could sign', () => {
  /** Rewrites one event and signs every one from there on again with the tablet's own key. */
  const rewritten = async (seq: number, change: (envelope: Envelope) => void): Promise<string> => {
    const events: SignedEvent[] = kit.log.signed.slice(0, seq);
    for (const { text } of kit.log.signed.slice(seq)) {
      const envelope = JSON.parse(text) as Envelope;
      envelope.prev = events.at(-1)?.hash ?? envelope.prev;
      if (envelope.seq === seq) change(envelope);
      events.push(await sealEvent(envelope, kit.tablet.signer, testCrypto));
    }
    return resealed((document) => {
      document.record.events = events;
      document.record.confirmations = [];
    });
  };

  it('a verdict that the rules do not give is named by its event', async () => {
    const seq = seqOfReading('h5', 'p3');
    const sealed = await rewritten(seq, ({ data }) => {
      (data as { verdict: string }).verdict = 'in';
    });
    expect((await check(sealed)).problems[0]).toEqual({ code: 'judgedOtherwise', seq, field: 'verdict' });
  });

  it('a window wider than the procedure has it is named', async () => {
    const seq = seqOfReading('h5', 'p3');
    const sealed = await rewritten(seq, ({ data }) => {
      (data as { window: { high: string } }).window.high = '120';
    });
    expect((await check(sealed)).problems[0]).toEqual({ code: 'judgedOtherwise', seq, field: 'window' });
  });

  it('an event that no rule allows is named with the reason', async () => {
    const seq = seqOfReading('h2', 'p1');
    const sealed = await rewritten(seq, ({ data }) => {
      (data as { hole: string }).hole = 'h9';
    });
    expect((await check(sealed)).problems[0]).toEqual({ code: 'refused', seq, why: 'notTheInstruction' });
  });

  it('a countersignature by somebody who took readings is refused (P1)', async () => {
    const seq = kit.log.book.events.findIndex(({ type }) => type === 'walk.countersigned');
    const sealed = await rewritten(seq, (envelope) => {
      envelope.by = testIds.technician;
    });
    const { problems } = await check(sealed);
    expect(problems[0]).toMatchObject({ code: 'refused', seq });
  });

  it('a sheet that says more than the events is named by its part', async () => {
    const sealed = await resealed(({ sheet }) => {
      sheet.deviations = [];
      sheet.counts.fasteners.total = 15;
    });
    expect((await check(sealed)).problems).toEqual([
      { code: 'sheet', part: 'counts' },
      { code: 'sheet', part: 'deviations' },
    ]);
  });

  it('another procedure than the one walked is named', async () => {
    const sealed = await resealed(({ procedure }) => {
      procedure.document.source.page = '213';
    });
    const { problems } = await check(sealed);
    expect(problems.map(({ code }) => code)).toContain('procedureHash');
    expect(problems.find(({ code }) => code === 'refused')).toEqual({
      code: 'refused',
      seq: 0,
      why: 'procedureMismatch',
    });
  });

  it('events signed by a key of another tablet are named', async () => {
    const other = await makeTestSigner();
    const sealed = await resealed(({ record }) => {
      const [tablet] = record.tablets;
      if (tablet)
        record.tablets = [tablet, { ...tablet, id: testIds.walk, kid: other.signer.kid, jwk: other.publicJwk }];
      for (const entry of record.tablets) entry.id = entry.id === testIds.tablet ? testIds.joint : testIds.tablet;
    });
    expect((await check(sealed)).problems[0]).toEqual({ code: 'otherTablet', seq: 0 });
  });

  it('a key that is not the one it is called by is named', async () => {
    const other = await makeTestSigner();
    const sealed = await resealed(({ record }) => {
      for (const tablet of record.tablets) tablet.jwk = other.publicJwk;
    });
    expect(await codes(sealed)).toEqual(expect.arrayContaining(['tabletKey', 'chain']));
  });
});

describe('sealed PINs', () => {
  const countersigned = () => kit.log.book.events.findIndex(({ type }) => type === 'walk.countersigned');

  it('want the word of the shop', async () => {
    const seq = countersigned();
    const sealed = await resealed(({ record }) => {
      record.confirmations = record.confirmations.filter((one) => one.seq !== seq);
    });
    expect(await codes(sealed)).toEqual(expect.arrayContaining(['confirmationMissing', 'sheet']));
  });

  it('count no longer once they were disowned', async () => {
    const seq = countersigned();
    const { jws: _jws, ...said } = kit.document.record.confirmations.find((one) => one.seq === seq) ?? { jws: '' };
    const disowned = { ...said, result: 'refused' as const, reason: 'pin.disowned' };
    const jws = await signDetached(canonicalJson(disowned), kit.shop.signer);
    const sealed = await resealed(({ record }) => {
      record.confirmations.push({ ...disowned, jws } as ProofDocument['record']['confirmations'][number]);
    });
    expect((await check(sealed)).problems).toContainEqual({ code: 'confirmationRefused', seq });
  });

  it('are not confirmed by anybody else', async () => {
    const seq = countersigned();
    const sealed = await resealed(({ record }) => {
      for (const one of record.confirmations) if (one.seq === seq) one.jws = one.jws.replace(/...$/, 'AAA');
    });
    expect((await check(sealed)).problems).toContainEqual({ code: 'confirmationForged', seq });
  });
});

describe('around the record', () => {
  it('another shop’s key does not do', async () => {
    const other = await makeTestSigner();
    const found = await verifyProof(kit.sealed, { crypto: testCrypto, shopKeys: [other.publicJwk] });
    expect(found.shopSigned).toBe(false);
    expect(found.problems).toContainEqual({ code: 'shopSignature', why: 'unknownKey' });
  });

  it('a name that was never in the side sheet is named as foreign', async () => {
    const line = Buffer.from(JSON.stringify(['salt', `name:${testIds.technician}`, 'Somebody Else'])).toString(
      'base64url',
    );
    const found = await check(`${kit.sealed}${line}~`);
    expect(found.problems).toEqual([{ code: 'sideForeign', count: 1 }]);
    expect(found.side.names[testIds.technician]).toBe('Ilse Marchetti-Vane');
  });

  it('what the shop stores today is compared where it is known', async () => {
    const hashes = kit.log.signed.map(({ hash }) => hash);
    expect((await check(kit.sealed, hashes)).problems).toEqual([]);
    hashes[12] = await hashText('something else', testCrypto);
    expect((await check(kit.sealed, hashes)).problems).toEqual([{ code: 'storedOtherwise', seq: 12 }]);
  });

  it.each(['', 'x', 'a.b.c', '..', '~', 'e30.e30.AA~', '💥'])('%j is no proof, and nothing is thrown', async (text) => {
    const found = await check(text);
    expect(found.document).toBeNull();
    expect(found.problems.length).toBeGreaterThan(0);
    expect(found.problems.map(problemSeq)).toEqual(found.problems.map(() => null));
  });

  it.each([
    ['not JSON', () => '{', 'notJson'],
    ['another format', (text: string) => text.replace('boltwalk.proof', 'boltwalk.other'), 'notAProof'],
    ['a later version', (text: string) => text.replace('"version":1}', '"version":2}'), 'unknownVersion'],
    ['spaces', (text: string) => ` ${text}`, 'notCanonical'],
    ['a missing part', (text: string) => text.replace(/"timeZone":"[^"]+",?/, ''), 'badShape'],
  ])('%s is said to be so', async (_what, change, why) => {
    const found = await check(tampered(change));
    expect(found.problems.at(-1)).toMatchObject({ code: 'document', why });
  });

  it('a document whose insides make no sense gives problems, not an exception', async () => {
    const sealed = await resealed(({ procedure }) => {
      procedure.document.passes = [];
      procedure.document.fasteners = [];
    });
    expect((await check(sealed)).problems.length).toBeGreaterThan(0);
  });
});
