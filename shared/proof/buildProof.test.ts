import { describe, expect, it } from 'vitest';
import { makeProofKit, procedureOf } from '../../tests/support/proofKit';
import { testCrypto } from '../../tests/support/testSigner';
import { atKind } from '../../tests/support/walker';
import { buildProof, type ProofFacts } from './buildProof';
import { readSavedProof, writeSavedProof } from './savedProof';
import { openProof, withholdSide } from './sealProof';

const tools = { crypto: testCrypto, salt: () => 'c2FsdHNhbHRzYWx0c2FsdA' };
const build = (facts: ProofFacts) => buildProof(facts, tools);
const kit = await makeProofKit(procedureOf('HEAD-D6'));
const cut = (count: number): ProofFacts => ({
  ...kit.facts,
  record: { ...kit.facts.record, events: kit.facts.record.events.slice(0, count) },
});
const typeAt = (type: string): number => kit.log.book.events.findIndex((event) => event.type === type);

describe('what may be issued (W1, W12)', () => {
  it('is refused before somebody signed, and before the countersignature', async () => {
    expect(await build(cut(0))).toMatchObject({ error: { code: 'notIssuable' } });
    expect(await build(cut(1))).toMatchObject({ error: { code: 'notSigned' } });
    expect(await build(cut(typeAt('walk.signed')))).toMatchObject({ error: { code: 'notSigned' } });
    expect(await build(cut(typeAt('walk.countersigned')))).toMatchObject({ error: { code: 'notCountersigned' } });
    expect(await build(kit.facts)).toMatchObject({ ok: true });
  });

  it('is no trial fit', async () => {
    await expect(makeProofKit(procedureOf('HEAD-D6'), { setting: { purpose: 'trialFit' } })).rejects.toThrow(
      'notIssuable',
    );
  });

  it('is refused on another procedure and on an event that cannot be read', async () => {
    const document = { ...procedureOf('HEAD-D6'), title: 'Another head' };
    expect(await build({ ...kit.facts, procedure: { ...kit.facts.procedure, document } })).toMatchObject({
      error: { code: 'procedureMismatch' },
    });
    const events = kit.facts.record.events.map((event, index) => (index === 3 ? { ...event, text: '{' } : event));
    expect(await build({ ...kit.facts, record: { ...kit.facts.record, events } })).toEqual({
      ok: false,
      error: { code: 'unreadable', seq: 3 },
    });
  });

  it('is refused once the walk was voided', async () => {
    const voided = makeProofKit(procedureOf('HEAD-D6'), {
      plan: { until: atKind('countersign') },
      after: async (log) => {
        const by = log.book.setting.supervisor;
        await log.issue({ type: 'walk.voided', by, data: { reason: 'wrong engine' } });
      },
    });
    await expect(voided).rejects.toThrow('voided');
  });

  it('names nobody who is not in the events', () => {
    expect(kit.document.record.roles).toHaveLength(2);
    expect(openProof(kit.sealed)?.disclosures).toHaveLength(6);
  });
});

describe('a saved proof', () => {
  it('comes back from its file, the public answer and the bare text', () => {
    const saved = { sealed: kit.sealed, keys: kit.shopKeys };
    expect(readSavedProof(writeSavedProof(saved))).toEqual(saved);
    expect(readSavedProof(JSON.stringify({ jws: kit.sealed, keys: kit.shopKeys, number: 'x' }))).toEqual(saved);
    expect(readSavedProof(`${kit.sealed}\n`)).toEqual({ sealed: kit.sealed, keys: [] });
  });

  it.each(['', '{', '[]', 'null', '{"sealed":7}', '{"jws":"x"}'])('%j is none', (text) => {
    expect(readSavedProof(text)).toBeNull();
  });

  it('withholds what it was asked to, and leaves what is no proof as it is', () => {
    expect(openProof(withholdSide(kit.sealed, ['names']))?.disclosures).toHaveLength(2);
    expect(openProof(withholdSide(kit.sealed, []))?.disclosures).toHaveLength(0);
    expect(withholdSide('x', [])).toBe('x~');
  });
});
