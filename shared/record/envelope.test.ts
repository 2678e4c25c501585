import { describe, expect, it } from 'vitest';
import { canonicalJson } from './canonicalJson';
import { LONGEST_EVENT, parseEnvelope, ZERO_HASH, type Envelope } from './envelope';

const ID = '017f22e2-79b0-7cc3-98c4-dc0c0c07398f';
const envelope: Envelope = {
  v: 1,
  shop: ID,
  walk: ID,
  branch: 0,
  seq: 0,
  prev: ZERO_HASH,
  at: '2026-03-05T14:03:22.123Z',
  mono: 12.5,
  boot: 'b1',
  known: 7,
  by: ID,
  tablet: 'office',
  type: 'walk.opened',
  data: { purpose: 'finalAssembly' },
};

describe('parseEnvelope', () => {
  it('reads a canonical event', () => {
    expect(parseEnvelope(canonicalJson(envelope))).toEqual({ ok: true, value: envelope });
  });

  it.each([
    ['', 'notJson'],
    ['{"v":1', 'notJson'],
    ['[1, 2]', 'badShape'],
    ['null', 'badShape'],
    [JSON.stringify(envelope), 'notCanonical'],
    [`${canonicalJson(envelope)} `, 'notCanonical'],
    [canonicalJson(envelope).replace('"seq":0', '"seq":0,"seq":0'), 'notCanonical'],
    [canonicalJson(envelope).replace('"mono":12.5', '"mono":12.50'), 'notCanonical'],
    [`{"a":"\\ud800"}`, 'notCanonical'],
    [`{"a":${'['.repeat(5_000)}${']'.repeat(5_000)}}`, 'notCanonical'],
    [canonicalJson({ ...envelope, v: 2 }), 'unknownVersion'],
    [canonicalJson({ a: 1 }), 'badShape'],
    ['x'.repeat(LONGEST_EVENT + 1), 'tooLarge'],
  ])('%#: refuses with its own code', (text, code) => {
    expect(parseEnvelope(text)).toMatchObject({ ok: false, error: { code } });
  });

  it.each([
    ['shop', 'shop 1'],
    ['walk', ID.toUpperCase()],
    ['branch', -1],
    ['seq', 1.5],
    ['seq', 2 ** 53],
    ['seq', '0'],
    ['prev', 'A'.repeat(64)],
    ['prev', '0'.repeat(63)],
    ['at', '2026-02-30T00:00:00Z'],
    ['mono', -1],
    ['boot', ''],
    ['known', null],
    ['by', ''],
    ['tablet', 'laptop'],
    ['type', 'reading'],
    ['type', 'Reading.taken'],
    ['data', null],
    ['data', []],
  ])('names the bad field %s', (field, value) => {
    expect(parseEnvelope(canonicalJson({ ...envelope, [field]: value }))).toEqual({
      ok: false,
      error: { code: 'badShape', field },
    });
  });

  it('names a missing and an unknown field', () => {
    const { known: _known, ...without } = envelope;
    expect(parseEnvelope(canonicalJson(without))).toMatchObject({ error: { code: 'badShape', field: 'known' } });
    expect(parseEnvelope(canonicalJson({ ...envelope, more: 1 }))).toMatchObject({ error: { field: 'more' } });
  });
});
