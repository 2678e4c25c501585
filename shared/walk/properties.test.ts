import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { anyDraft } from '../../tests/support/anyDraft';
import { deepFreeze, type WalkOracle } from '../../tests/support/walkOracle';
import { randomDraft } from '../../tests/support/randomWalker';
import { randomBook } from '../../tests/support/randomBook';
import {
  parseWalkEventData,
  seededRandom,
  walkDrafts,
  withSeal,
  type Draft,
  type Random,
  type WalkBook,
} from '../../tests/support/walker';
import { makeTestSigner, testCrypto } from '../../tests/support/testSigner';
import { testIds } from '../../tests/support/walkBook';
import { sealEvent, verifyChain } from '../record/chain';
import type { Signer } from '../record/crypto';
import { OFFICE, ZERO_HASH, type SignedEvent } from '../record/envelope';
import { commandOf } from './commands';
import { decide } from './decide';
import type { WalkEvent } from './events';
import { evolve, replay } from './evolve';
import { initialWalk } from './state';
import { eventOfEnvelope } from './upcasts';
import { view } from './view';

/** Hashes, links and signs what was decided. */
async function sealAll(events: readonly WalkEvent[], signerOf: (event: WalkEvent) => Signer): Promise<SignedEvent[]> {
  const signed: SignedEvent[] = [];
  for (const event of events) {
    const prev = signed.at(-1)?.hash ?? ZERO_HASH;
    const envelope = { v: 1 as const, shop: testIds.shop, walk: testIds.walk, prev, ...event };
    signed.push(await sealEvent(envelope, signerOf(event), testCrypto));
  }
  return signed;
}

const SEAL = 'c3'.repeat(32);

/** Tries one draft; a refusal changes nothing, an event is watched. */
function tryDraft(book: WalkBook, oracle: WalkOracle, draft: Draft): void {
  const before = deepFreeze(book.state);
  const issued = book.attempt(withSeal(draft, SEAL));
  if (issued.ok) oracle.watch(before, issued.value, deepFreeze(book.state));
  else expect(book.state).toBe(before);
}

const RUNS = Number(process.env.PROPERTY_RUNS ?? 60);

/** Walks to the very end as an ideal technician does, watched all the way. */
function finish(book: WalkBook, oracle: WalkOracle, random: Random): void {
  for (const draft of walkDrafts(book, { random, most: 800 })) {
    const before = book.state;
    const event = book.issue(draft);
    oracle.watch(before, event, deepFreeze(book.state));
  }
}

/** The shop sends the walk back with a few wishes, and a tablet takes it over again (R11). */
function sendBack(book: WalkBook, oracle: WalkOracle, random: Random): void {
  const { holes } = book.setting.procedure;
  const items = Array.from({ length: random.whole(1, 3) }, () => ({
    hole: random.pick(holes).id,
    action: random.pick(['answer', 'look', 'restart', 'replace', 'restartJoint'] as const),
    note: 'look at this one',
  }));
  const by = book.setting.supervisor;
  const office = true;
  const tablet = book.setting.tablet;
  tryDraft(book, oracle, { type: 'walk.sentBack', by, office, data: { items, seal: '' } });
  tryDraft(book, oracle, { type: 'walk.takenOver', by, office, data: { tablet, forced: false } });
}

describe('a technician on a bad day', () => {
  it('leaves a sound record, and the walk still comes to its end', () => {
    fc.assert(
      fc.property(fc.integer(), fc.nat({ max: 120 }), fc.nat({ max: 2 }), (seed, actions, sentBack) => {
        const random = seededRandom(seed);
        const { book, oracle } = randomBook(random);
        for (let round = 0; round <= sentBack; round += 1) {
          for (let count = 0; count < actions; count += 1) {
            const draft = randomDraft(book, random);
            if (draft) tryDraft(book, oracle, draft);
            view(book.state, book.now());
          }
          finish(book, oracle, random);
          if (round < sentBack) sendBack(book, oracle, random);
        }
        expect(view(book.state, book.now()).instruction).toEqual({ kind: 'withShop', complete: true });
        oracle.finished(book.state);
      }),
      { numRuns: RUNS },
    );
  }, 600_000);
});

describe('commands without regard to the instruction', () => {
  it('are refused without a trace, or leave a sound record', () => {
    fc.assert(
      fc.property(fc.integer(), fc.nat({ max: 250 }), (seed, actions) => {
        const random = seededRandom(seed);
        const { book, oracle } = randomBook(random);
        for (let count = 0; count < actions; count += 1) {
          const draft = random.chance(0.3) ? randomDraft(book, random) : anyDraft(book, random);
          if (draft) tryDraft(book, oracle, draft);
        }
        view(book.state, book.now());
      }),
      { numRuns: RUNS },
    );
  }, 600_000);
});

describe('the chain of a bad day', () => {
  it('verifies, replays to the same state, and is decided alike by whoever reads it', async () => {
    const [tablet, shop] = await Promise.all([makeTestSigner(), makeTestSigner()]);
    const keys = new Map([tablet, shop].map(({ signer, publicJwk }) => [signer.kid, publicJwk]));
    const signerOf = (event: WalkEvent) => (event.tablet === OFFICE ? shop : tablet).signer;
    await fc.assert(
      fc.asyncProperty(fc.integer(), fc.nat({ max: 80 }), async (seed, actions) => {
        const random = seededRandom(seed);
        const { book, oracle } = randomBook(random);
        for (let count = 0; count < actions; count += 1) {
          const draft = random.chance(0.7) ? randomDraft(book, random) : anyDraft(book, random);
          if (draft) tryDraft(book, oracle, draft);
        }
        const verdict = await verifyChain(await sealAll(book.events, signerOf), keys, testCrypto);
        expect(verdict).toMatchObject({ ok: true, next: book.events.length });
        const { procedure, hash, people } = book.setting;
        let state = initialWalk(procedure, hash);
        for (const envelope of verdict.ok ? verdict.envelopes : []) {
          const event = eventOfEnvelope(envelope);
          if (!event) throw new Error(`no event ${envelope.type}`);
          expect(parseWalkEventData(event.type, event.data)).toEqual({ ok: true, value: event.data });
          const again = decide(state, commandOf(event, people[event.by] ?? []));
          expect(again).toEqual({ ok: true, value: { type: event.type, data: event.data } });
          state = evolve(state, event);
        }
        expect(state).toEqual(book.state);
        expect(replay(initialWalk(procedure, hash), book.events)).toEqual(book.state);
      }),
      { numRuns: Math.ceil(RUNS / 3) },
    );
  }, 600_000);
});
