import { base64urlToBytes, utf8ToText } from '../../record/bytes';
import { verifyChain, type ChainStart } from '../../record/chain';
import type { RecordCrypto } from '../../record/crypto';
import { ZERO_HASH, type Envelope, type SignedEvent } from '../../record/envelope';
import type { ProofKeys } from './keys';
import type { ProofProblem } from './problem';

/** Told after each stretch of events; what it gives back is waited for, so that a page can paint. */
export type Progress = (done: number, total: number) => void | Promise<void>;

/** Short enough for a bar that moves, long enough not to spend the time on painting. */
const STRETCH = 25;

const branchOf = (event: SignedEvent): unknown => {
  try {
    return (JSON.parse(event.text) as { branch?: unknown } | null)?.branch;
  } catch {
    return undefined;
  }
};

/** Cuts the events into stretches of one branch: the branch that stands begins with a piece of those before it. */
function stretches(events: readonly SignedEvent[]): SignedEvent[][] {
  const found: SignedEvent[][] = [];
  let branch: unknown;
  for (const event of events) {
    const current = found.at(-1);
    const own = branchOf(event);
    if (current && current.length < STRETCH && own === branch) current.push(event);
    else found.push([event]);
    branch = own;
  }
  return found;
}

const kidOf = (sig: string): string | null => {
  const bytes = base64urlToBytes(sig.split('.')[0] ?? '');
  const text = bytes && utf8ToText(bytes);
  return text === null ? null : ((JSON.parse(text) as { kid?: string }).kid ?? null);
};

/** An event signed by a key of the record, but not by that of the tablet it says it was made on. */
function strangers(envelopes: readonly Envelope[], events: readonly SignedEvent[], keys: ProofKeys): ProofProblem[] {
  return envelopes.flatMap(({ tablet, seq }): ProofProblem[] => {
    const kid = kidOf(events[seq]?.sig ?? '');
    return kid !== null && keys.kidsOf.get(tablet)?.has(kid) ? [] : [{ code: 'otherTablet', seq }];
  });
}

/**
 * Verifies hash, link and signature of every event up to the first that does not hold, which is named. Gives the
 * envelopes that do hold.
 */
export async function chainOfProof(
  events: readonly SignedEvent[],
  keys: ProofKeys,
  crypto: RecordCrypto,
  progress: Progress,
): Promise<{ envelopes: Envelope[]; problems: ProofProblem[] }> {
  const envelopes: Envelope[] = [];
  let start: ChainStart = { startSeq: 0, startPrev: ZERO_HASH };
  for (const stretch of stretches(events)) {
    const verdict = await verifyChain(stretch, keys.all, crypto, start);
    if (!verdict.ok) {
      envelopes.push(...verdict.envelopesBefore);
      const broken: ProofProblem = { code: 'chain', seq: verdict.seq, why: verdict.code };
      if (verdict.field !== undefined) broken.field = verdict.field;
      return { envelopes, problems: [...strangers(envelopes, events, keys), broken] };
    }
    const branchBefore = envelopes.at(-1)?.branch ?? 0;
    envelopes.push(...verdict.envelopes);
    const first = verdict.envelopes[0];
    if (first && first.branch < branchBefore)
      return { envelopes, problems: [{ code: 'chain', seq: first.seq, why: 'otherBranch' }] };
    start = { startSeq: verdict.next, startPrev: verdict.head };
    if (first) start = { ...start, shop: first.shop, walk: first.walk };
    await progress(envelopes.length, events.length);
  }
  return { envelopes, problems: strangers(envelopes, events, keys) };
}
