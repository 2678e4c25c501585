import { describe, expect, it } from 'vitest';
import { suits } from '@shared/crib/suitability';
import { parseWalkEventData } from '@shared/contracts/walkEvents';
import { parseProcedure } from '@shared/procedure/procedureSchema';
import { verifyChain } from '@shared/record/chain';
import { instructionOf, needOf } from '@shared/walk/instruction';
import { initialWalk } from '@shared/walk/state';
import { view } from '@shared/walk/view';
import { makeTestSigner, testCrypto } from '../../../tests/support/testSigner';
import { testBook, testIds, testSetting } from '../../../tests/support/walkBook';
import { demoProcedures } from '../procedures';
import { headD6 } from '../procedures/headD6';
import { manF4 } from '../procedures/manF4';
import { seededRandom } from './random';
import type { WalkBook } from './walkBook';
import { openLog, walkOn } from './walkLog';
import { atKind, isAt, walkPlain } from './walkOn';

const codes = demoProcedures.map((document) => [document.code, document] as const);
const shown = (book: WalkBook) => view(book.state, book.now());

describe.each(codes)('%s', (_code, document) => {
  it('passes the schema', () => expect(parseProcedure(document)).toEqual({ ok: true, value: document }));

  it('says that its values are invented', () => expect(document.source.title).toContain('invented'));

  it('has a wrench in the crib for every stage (K2)', () => {
    const { wrenches, startMs, hash } = testSetting(document);
    const at = new Date(startMs).toISOString();
    for (const pass of document.passes) {
      for (const stage of pass.stages) {
        for (const hole of pass.order) {
          const need = needOf(initialWalk(document, hash), { pass: pass.id, hole, stage: stage.id, round: 1 }, stage);
          const found = wrenches.filter((wrench) => suits(wrench, need, at).suits);
          expect(found.length, `${pass.id}/${stage.id} at ${hole}`).toBeGreaterThan(0);
        }
      }
    }
  });

  it.each(['finalAssembly', 'trialFit', 'recheck', 'stripDown'] as const)('is walked to the end: %s', (purpose) => {
    const book = testBook(document, { purpose });
    walkPlain(book);
    expect(shown(book).instruction).toEqual({ kind: 'withShop', complete: true });
    expect(book.state.deviations).toEqual([]);
    for (const { type, data } of book.events) expect(parseWalkEventData(type, data)).toEqual({ ok: true, value: data });
    if (purpose !== 'finalAssembly') return;
    const final = document.passes
      .filter((pass) => !pass.repeat)
      .flatMap((pass) =>
        pass.order.flatMap(() => pass.stages.filter(({ kind }) => kind === 'torque' || kind === 'turn')),
      );
    const once = book.state.readings.filter(({ data }) => !document.passes.find(({ id }) => id === data.pass)?.repeat);
    expect(once).toHaveLength(final.length);
    expect(once.every(({ data }) => data.verdict === 'in')).toBe(true);
  });
});

describe('the ideal technician', () => {
  it('takes 56 final readings of the head, all in window', () => {
    const book = testBook(headD6);
    walkPlain(book, { random: seededRandom(5) });
    expect(book.state.readings).toHaveLength(56);
    expect(new Set(book.state.readings.map(({ data }) => data.wrench)).size).toBe(2);
  });

  it('does the same again with the same seed, and other figures with another', () => {
    const walked = (seed: number) => {
      const book = testBook(headD6);
      walkPlain(book, { random: seededRandom(seed) });
      return book.events;
    };
    expect(walked(3)).toEqual(walked(3));
    expect(walked(3)).not.toEqual(walked(4));
  });

  it('replaces bolt 5 that went over in pass 3, from pass 1 on', () => {
    const book = testBook(headD6);
    const settle = () => 'replace' as const;
    walkPlain(book, { slips: [{ kind: 'value', at: { pass: 'p3', hole: 'h5' }, value: '104' }], settle });
    const bolt = book.state.readings.filter(({ data }) => data.hole === 'h5');
    expect(bolt.map(({ data }) => data.pass)).toEqual(['p1', 'p2', 'p3', 'p1', 'p2', 'p3', 'p4']);
    expect(bolt.map(({ data }) => data.verdict)).toEqual(['in', 'in', 'over', 'in', 'in', 'in', 'in']);
    expect(book.state.holes['h5']?.fastenerNo).toBe(2);
    expect(book.state.readings).toHaveLength(59);
  });

  it('voids a typing error, and tells that a different bolt was tightened', () => {
    const book = testBook(headD6);
    walkPlain(book, {
      slips: [
        { kind: 'typedWrong', at: { pass: 'p1', hole: 'h2' }, value: '300', reason: 'a nought too many' },
        { kind: 'differentHole', at: { pass: 'p2', hole: 'h3' }, hole: 'h4' },
      ],
    });
    const kinds = book.state.deviations.map(({ kind, status }) => [kind, status]);
    expect(kinds).toContainEqual(['voidedOutOfWindow', 'noted']);
    expect(kinds).toContainEqual(['outOfOrder', 'noted']);
    expect(book.state.readings.filter(({ status }) => status === 'stands')).toHaveLength(56);
  });

  it('stops where the plan says', () => {
    const book = testBook(headD6);
    walkPlain(book, { until: isAt({ pass: 'p3', hole: 'h7' }) });
    expect(instructionOf(book.state, book.now())).toMatchObject({ kind: 'pull', slot: { pass: 'p3', hole: 'h7' } });
    expect(shown(book).progress).toEqual({ done: 6, toGo: 8 });
    walkPlain(book, { until: atKind('sign') });
    expect(shown(book)).toMatchObject({ instruction: { kind: 'sign' }, signed: false });
  });

  it('waits, and goes round until none turns (W8, R12)', () => {
    const book = testBook(manF4);
    walkPlain(book, { random: seededRandom(2) });
    const rounds = book.state.readings.filter(({ data }) => data.pass === 'p3');
    const last = Math.max(...rounds.map(({ data }) => data.round));
    expect(last).toBeGreaterThan(1);
    expect(rounds.filter(({ data }) => data.round === last).every(({ data }) => data.moved === false)).toBe(true);
    const [before, after] = ['p2', 'p3'].map((id) => book.state.passTimes[id]);
    expect((after?.begun?.mono ?? 0) - (before?.ended?.mono ?? 0)).toBeGreaterThanOrEqual(600_000);
  });

  it('throws with the code of a refusal', () => {
    const book = testBook(headD6);
    const by = testIds.technician;
    expect(() => book.issue({ type: 'walk.released', by, data: { to: 'shop' } })).toThrow('notOpened');
  });
});

describe('a log', () => {
  it('signs a chain that verifies, with seals where a PIN is asked for', async () => {
    const { signer, publicJwk } = await makeTestSigner();
    const asked: string[] = [];
    const log = openLog(testSetting(headD6), {
      shop: testIds.shop,
      walk: testIds.walk,
      tablet: signer,
      crypto: testCrypto,
      seal: ({ meaning, seq, prev }) => {
        asked.push(`${meaning} ${seq} ${prev === log.signed.at(-1)?.hash}`);
        return Promise.resolve('d4'.repeat(32));
      },
    });
    await walkOn(log);
    const verdict = await verifyChain(log.signed, new Map([[signer.kid, publicJwk]]), testCrypto);
    expect(verdict).toMatchObject({ ok: true, next: log.book.events.length });
    const last = log.book.state.seq;
    expect(asked).toEqual([`tightenedAsRecorded ${last - 2} true`, `checkedRecordAndJoint ${last - 1} true`]);
  });
});
