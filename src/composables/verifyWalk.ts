import type { OfficeWalkWhole } from '@shared/contracts/walks.contract';
import { verifyChain } from '@shared/record/chain';
import type { RecordCrypto } from '@shared/record/crypto';
import { parseEnvelope, ZERO_HASH } from '@shared/record/envelope';

/** Whether the stored record holds, checked here and not believed: `null` crypto means that this browser cannot. */
export type WalkVerdict = { kind: 'whole'; events: number } | { kind: 'broken'; seq: number } | { kind: 'unchecked' };

type Stored = OfficeWalkWhole['events'][number];

/** Events in stretches of one branch: a fork writes the branch it began on into its texts (decision 5). */
function stretches(events: readonly Stored[]): Stored[][] {
  const found: Stored[][] = [];
  let last: number | null = null;
  for (const event of events) {
    const parsed = parseEnvelope(event.text);
    const branch: number | null = parsed.ok ? parsed.value.branch : last;
    if (branch !== last || found.length === 0) found.push([]);
    found.at(-1)?.push(event);
    last = branch;
  }
  return found;
}

/** Verifies hash, link and signature of every event with the keys the server named. */
export async function verifyWalk(whole: OfficeWalkWhole, crypto: RecordCrypto | null): Promise<WalkVerdict> {
  if (!crypto) return { kind: 'unchecked' };
  const keys = new Map(whole.keys.map((key) => [key.kid, key]));
  let startPrev = ZERO_HASH;
  for (const stretch of stretches(whole.events)) {
    const startSeq = stretch[0]?.seq ?? 0;
    const verdict = await verifyChain(stretch, keys, crypto, { startSeq, startPrev, walk: whole.walk.id });
    if (!verdict.ok) return { kind: 'broken', seq: verdict.seq };
    startPrev = verdict.head;
  }
  return { kind: 'whole', events: whole.events.length };
}
