// @vitest-environment node
import { describe, expect, it } from 'vitest';
import { MOST_BLOB_BYTES } from '@shared/contracts/blobs.contract';
import { challengeText, enrolmentProofText } from '@shared/contracts/tablets.contract';
import type { Answer } from '@/api/answer';
import type { TabletClient } from '@/api/tabletClient';
import { MOST_PHOTO_BYTES } from './blobs';
import { tabletSettings } from './settings';
import { enrolmentProof, enrolTablet, failureOf, tokenProof } from './tabletAuth';
import { failingIndexedDb } from './testing/failingIndexedDb';
import { handClock, SHOP, TABLET } from './testing/tabletKit';
import { webRecordCrypto } from './webCrypto';

const keyTaken = { status: 409, code: 'enrolment.keyTaken', message: '', details: {} };
const identity = {
  ...{ tablet: { id: TABLET, name: 'Stand 1' }, shop: { id: SHOP, name: 'Shop' }, signingKeys: [] },
  ...{
    sealingKey: { kty: 'EC', crv: 'P-256', x: '', y: '', kid: '' },
    token: 't',
    expiresAt: '2026-06-13T08:15:00.000Z',
  },
};

/** A server that gives these answers one after the other and keeps what it was sent. */
function scripted(answers: Answer<unknown>[]) {
  const sent: { body: { publicJwk: { x: string } } }[] = [];
  const client: TabletClient = {
    call: (call) => {
      sent.push(call as never);
      return Promise.resolve((answers.shift() ?? { kind: 'unreachable' }) as never);
    },
  };
  const settings = tabletSettings({ factory: failingIndexedDb().factory });
  return { deps: { client, settings, record: webRecordCrypto(), clock: handClock() }, sent, settings };
}

describe('enrolling', () => {
  it('signs the texts of the contract', () => {
    expect(enrolmentProof('CODE', 'kid')).toBe(enrolmentProofText('CODE', 'kid'));
    expect(tokenProof('c')).toBe(challengeText('c'));
    expect(MOST_PHOTO_BYTES).toBe(MOST_BLOB_BYTES);
  });

  it('keeps its key when nobody answers, so that the code can be tried again', async () => {
    const { deps, sent, settings } = scripted([
      { kind: 'unreachable' },
      { kind: 'done', status: 201, value: identity },
    ]);
    const first = await enrolTablet(deps, { code: 'C', name: 'Stand 1' });
    expect(first).toEqual({ ok: false, error: { code: 'server.unreachable' } });
    expect(await settings.get('tablet')).toBeUndefined();
    expect((await enrolTablet(deps, { code: 'C', name: 'Stand 1' })).ok).toBe(true);
    expect(sent[0]?.body.publicJwk.x).toBe(sent[1]?.body.publicJwk.x);
    expect((await settings.get('tablet'))?.tablet.name).toBe('Stand 1');
  });

  it('makes a new key when the server knows the old one already: the first answer got lost', async () => {
    const { deps, sent } = scripted([
      { kind: 'refused', refusal: keyTaken },
      { kind: 'done', status: 201, value: identity },
    ]);
    expect((await enrolTablet(deps, { code: 'C2', name: 'Stand 1' })).ok).toBe(true);
    expect(sent[0]?.body.publicJwk.x).not.toBe(sent[1]?.body.publicJwk.x);
  });

  it('never keeps the bearer', async () => {
    const { deps, settings } = scripted([{ kind: 'done', status: 201, value: identity }]);
    await enrolTablet(deps, { code: 'C', name: 'Stand 1' });
    expect(JSON.stringify(await settings.get('tablet'))).not.toContain('"token"');
  });

  it('names every way of getting nothing', () => {
    expect(failureOf({ kind: 'notOurs', status: 200 })).toEqual({ code: 'server.notOurs' });
    expect(failureOf({ kind: 'busy', status: 503, code: 'server.ill', retryAfterMs: null })).toEqual({
      code: 'server.ill',
    });
    expect(failureOf({ kind: 'refused', refusal: keyTaken })).toEqual({ code: 'enrolment.keyTaken', params: {} });
  });
});
