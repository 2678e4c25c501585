import { err, ok, type Result } from '../kernel/result';
import { bytesToHex, utf8 } from './bytes';
import { canonicalJson } from './canonicalJson';
import type { RecordCrypto, Signer } from './crypto';
import { parseEnvelope, ZERO_HASH, type Envelope, type RecordProblem, type SignedEvent } from './envelope';
import { signDetached, verifyDetached, type KeyByKid, type SignatureProblem } from './signature';

/** What can break a chain at one event. */
export type ChainProblemCode =
  | 'wrongHash'
  | RecordProblem['code']
  | 'otherShop'
  | 'otherWalk'
  | 'otherBranch'
  | 'wrongSeq'
  | 'wrongPrev'
  | SignatureProblem['code'];

/** A whole chain, or the first event that breaks it: its place (`index`), the seq it should have, and what stood before. */
export type ChainVerdict =
  | { ok: true; envelopes: Envelope[]; head: string; next: number }
  | { ok: false; seq: number; index: number; code: ChainProblemCode; field?: string; envelopesBefore: Envelope[] };

/**
 * Where a chain begins. A later branch, or the tail of a chain, starts at `startSeq` on its parent's hash `startPrev`;
 * `shop`, `walk` and `branch`, where given, must be those of every event, else those of the first event count.
 */
export interface ChainStart {
  startSeq?: number;
  startPrev?: string;
  shop?: string;
  walk?: string;
  branch?: number;
}

/** The hex SHA-256 of a text's UTF-8. */
export async function hashText(text: string, crypto: Pick<RecordCrypto, 'sha256'>): Promise<string> {
  return bytesToHex(await crypto.sha256(utf8(text)));
}

/** Writes an event in its canonical form, hashes and signs it. Throws where the envelope has no canonical form. */
export async function sealEvent(envelope: Envelope, signer: Signer, crypto: RecordCrypto): Promise<SignedEvent> {
  const text = canonicalJson(envelope);
  const [hash, sig] = await Promise.all([hashText(text, crypto), signDetached(text, signer)]);
  return { text, hash, sig };
}

interface Expected {
  seq: number;
  prev: string;
  shop: string | undefined;
  walk: string | undefined;
  branch: number | undefined;
}

interface Broken {
  code: ChainProblemCode;
  field?: string;
}

function placeProblem(envelope: Envelope, expected: Expected): ChainProblemCode | null {
  if (expected.shop !== undefined && envelope.shop !== expected.shop) return 'otherShop';
  if (expected.walk !== undefined && envelope.walk !== expected.walk) return 'otherWalk';
  if (expected.branch !== undefined && envelope.branch !== expected.branch) return 'otherBranch';
  if (envelope.seq !== expected.seq) return 'wrongSeq';
  return envelope.prev === expected.prev ? null : 'wrongPrev';
}

async function verifyEvent(
  event: SignedEvent,
  expected: Expected,
  keyByKid: KeyByKid,
  crypto: RecordCrypto,
): Promise<Result<Envelope, Broken>> {
  // The hash first: whatever else a changed character breaks, that it was changed is the news.
  if ((await hashText(event.text, crypto)) !== event.hash) return err({ code: 'wrongHash' });
  const parsed = parseEnvelope(event.text);
  if (!parsed.ok) return parsed;
  const misplaced = placeProblem(parsed.value, expected);
  if (misplaced) return err({ code: misplaced });
  const signed = await verifyDetached(event.text, event.sig, keyByKid, crypto);
  return signed.ok ? ok(parsed.value) : err({ code: signed.error.code });
}

/**
 * Verifies a chain from its first event on: hash, canonical form, shop, walk and branch, seq without a gap, link to the
 * event before, signature by one of the known keys (several tablets and the office may have signed). Names the first
 * event that breaks it. An empty chain is whole.
 */
export async function verifyChain(
  events: readonly SignedEvent[],
  keyByKid: KeyByKid,
  crypto: RecordCrypto,
  start: ChainStart = {},
): Promise<ChainVerdict> {
  const envelopes: Envelope[] = [];
  let { shop, walk, branch } = start;
  let seq = start.startSeq ?? 0;
  let prev = start.startPrev ?? ZERO_HASH;
  for (const [index, event] of events.entries()) {
    const checked = await verifyEvent(event, { seq, prev, shop, walk, branch }, keyByKid, crypto);
    if (!checked.ok) return { ok: false, seq, index, ...checked.error, envelopesBefore: envelopes };
    ({ shop, walk, branch } = checked.value);
    envelopes.push(checked.value);
    seq += 1;
    prev = event.hash;
  }
  return { ok: true, envelopes, head: prev, next: seq };
}
