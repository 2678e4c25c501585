import fc from 'fast-check';
import { beforeAll, describe, expect, it } from 'vitest';
import { makeTestSigner, testCrypto, type TestSigner } from '../../tests/support/testSigner';
import { hashText, sealEvent, verifyChain } from './chain';
import type { PublicJwk } from './crypto';
import { ZERO_HASH, type Envelope, type SignedEvent } from './envelope';

const ID = '017f22e2-79b0-7cc3-98c4-dc0c0c07398f';
const OTHER = '017f22e2-79b0-7cc3-98c4-dc0c0c073990';
let tablet: TestSigner;
let shop: TestSigner;
let stranger: TestSigner;
let keys: Map<string, PublicJwk>;

interface Making {
  startSeq?: number;
  startPrev?: string;
  change?: (envelope: Envelope, index: number) => Envelope;
  signerAt?: (index: number) => TestSigner;
}

async function makeChain(length: number, making: Making = {}): Promise<SignedEvent[]> {
  const events: SignedEvent[] = [];
  for (let index = 0; index < length; index += 1) {
    const envelope: Envelope = {
      ...{ v: 1, shop: ID, walk: ID, branch: 0, seq: (making.startSeq ?? 0) + index },
      ...{ prev: events.at(-1)?.hash ?? making.startPrev ?? ZERO_HASH, at: '2026-03-05T14:03:22Z', mono: index * 10 },
      ...{ boot: 'b1', known: 3, by: ID, tablet: ID, type: 'note.added', data: { text: `note ${index} é😂` } },
    };
    const signer = making.signerAt?.(index) ?? tablet;
    events.push(await sealEvent(making.change?.(envelope, index) ?? envelope, signer.signer, testCrypto));
  }
  return events;
}

const verify = (events: SignedEvent[], start = {}) => verifyChain(events, keys, testCrypto, start);

beforeAll(async () => {
  [tablet, shop, stranger] = await Promise.all([makeTestSigner(), makeTestSigner(), makeTestSigner()]);
  keys = new Map([tablet, shop].map(({ signer, publicJwk }) => [signer.kid, publicJwk]));
});

describe('verifyChain', () => {
  it('accepts a whole chain by several keys and tells its head', async () => {
    const events = await makeChain(4, { signerAt: (index) => (index === 3 ? shop : tablet) });
    const verdict = await verify(events);
    expect(verdict).toMatchObject({ ok: true, head: events[3]?.hash, next: 4 });
    expect(verdict.ok && verdict.envelopes.map((envelope) => envelope.seq)).toEqual([0, 1, 2, 3]);
  });

  it('accepts an empty chain, a tail and a later branch on its parent', async () => {
    expect(await verify([])).toEqual({ ok: true, envelopes: [], head: ZERO_HASH, next: 0 });
    const events = await makeChain(5);
    expect(await verify(events.slice(2), { startSeq: 2, startPrev: events[1]?.hash })).toMatchObject({
      ok: true,
      next: 5,
    });
    const branch = await makeChain(2, {
      startSeq: 3,
      startPrev: events[2]?.hash ?? '',
      change: (envelope) => ({ ...envelope, branch: 1 }),
    });
    expect(await verify(branch, { startSeq: 3, startPrev: events[2]?.hash, branch: 1 })).toMatchObject({ ok: true });
    expect(await verify(branch)).toMatchObject({ ok: false, seq: 0, code: 'wrongSeq' });
    expect(await verify(branch, { startSeq: 3, startPrev: events[2]?.hash, branch: 0 })).toMatchObject({
      code: 'otherBranch',
    });
  });

  it.each<[string, Making, object]>([
    ['another walk', { change: (e, i) => (i === 2 ? { ...e, walk: OTHER } : e) }, { code: 'otherWalk', seq: 2 }],
    ['another shop', { change: (e, i) => (i === 2 ? { ...e, shop: OTHER } : e) }, { code: 'otherShop', seq: 2 }],
    ['a branch in between', { change: (e, i) => (i === 2 ? { ...e, branch: 1 } : e) }, { code: 'otherBranch' }],
    ['a gap in seq', { change: (e, i) => (i >= 2 ? { ...e, seq: e.seq + 1 } : e) }, { code: 'wrongSeq', seq: 2 }],
    ['a wrong link', { change: (e, i) => (i === 1 ? { ...e, prev: ZERO_HASH } : e) }, { code: 'wrongPrev', seq: 1 }],
    ['a stranger', { signerAt: (i) => (i === 1 ? stranger : tablet) }, { code: 'unknownKey', seq: 1 }],
    ['a bad field', { change: (e, i) => (i === 1 ? { ...e, by: 'x' } : e) }, { code: 'badShape', field: 'by', seq: 1 }],
  ])('names the event of %s', async (_what, making, expected) => {
    expect(await verify(await makeChain(4, making))).toMatchObject({ ok: false, ...expected });
  });

  it('gives what stood before the break', async () => {
    const events = await makeChain(3);
    const verdict = await verify([events[0], events[2]].flatMap((event) => event ?? []));
    expect(verdict).toMatchObject({ ok: false, index: 1, seq: 1, code: 'wrongSeq' });
    expect(!verdict.ok && verdict.envelopesBefore).toHaveLength(1);
  });

  it('sees one changed character of text, hash or signature wherever it is, and names the event (fault 21)', async () => {
    const events = await makeChain(4);
    await fc.assert(
      fc.asyncProperty(
        fc.nat({ max: 3 }),
        fc.constantFrom<keyof SignedEvent>('text', 'hash', 'sig'),
        fc.nat(),
        fc.constantFrom('0', 'A', '"', 'é'),
        async (index, part, place, character) => {
          const event = events[index];
          if (!event) throw new Error('no such event');
          const at = place % event[part].length;
          fc.pre(event[part][at] !== character);
          const changed = { ...event, [part]: event[part].slice(0, at) + character + event[part].slice(at + 1) };
          expect(await verify(events.with(index, changed))).toMatchObject({ ok: false, index, seq: index });
        },
      ),
      { numRuns: 200 },
    );
  });

  it('sees a signature moved from one event to another', async () => {
    const events = await makeChain(2);
    const [first, second] = events;
    if (!first || !second) throw new Error('no chain');
    expect(await verify([first, { ...second, sig: first.sig }])).toMatchObject({ code: 'wrongSignature', seq: 1 });
  });

  it('sees a text rewritten together with its hash', async () => {
    const [event] = await makeChain(1);
    if (!event) throw new Error('no chain');
    const text = event.text.replace('note 0', 'note 1');
    const forged = { ...event, text, hash: await hashText(text, testCrypto) };
    expect(await verify([forged])).toMatchObject({ code: 'wrongSignature', seq: 0 });
  });
});
