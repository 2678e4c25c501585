import { MOST_EVENTS, type QuarantinedEvent, type Receipt } from '@shared/contracts/sync.contract';
import { ZERO_HASH, type SignedEvent } from '@shared/record/envelope';
import { verifyDetached } from '@shared/record/signature';
import type { Deps } from '../../deps';
import type { TabletCaller } from '../../http/callers';
import type { ShopTx } from '../../tenancy/withShop';
import { missingBlobsOf } from '../blobs/blobs.repository';
import { findWalk } from '../walks/walks.repository';
import { appendEvents, quarantineFollowers, type Appended } from './appendEvents';
import {
  branchesOf,
  lockWalk,
  placesOf,
  quarantinedOf,
  type Branch,
  type Place,
  type QuarantinedRow,
} from './chain.repository';
import { confirmSeal, judgeSeal, toConfirmation } from './confirmSeal';
import { misshapenField } from './eventShapes';
import { leaveWork } from '../outbox/outbox.repository';
import { parseBatch, type BatchEvent } from './parseBatch';
import { refreshWalk } from './refreshWalk';
import { sealOf, type EventSeal } from './sealOf';
import { confirmationsOfHashes } from './seals.repository';
import { badBatch, hole } from './sync.errors';
import { blobsOf } from './walkBlobsOf';

/** A batch as a tablet sends it. */
export interface Batch {
  walk: string;
  branch: number;
  events: SignedEvent[];
  seals: { hash: string; jwe: string }[];
}

/** New events must be this tablet's own and signed with its key; what is stored already was checked when it came. */
const demandOwn = async (
  deps: Deps,
  tablet: TabletCaller,
  events: readonly BatchEvent[],
  offset: number,
): Promise<void> => {
  const keys = new Map([[tablet.kid, tablet.publicJwk]]);
  const checks = events.map(async ({ signed, envelope }, index) => {
    if (envelope.tablet !== tablet.id) {
      throw badBatch('otherTablet', 'An event was written by another tablet.', offset + index);
    }
    const verified = await verifyDetached(signed.text, signed.sig, keys, deps.crypto);
    if (!verified.ok) {
      const { code: why } = verified.error;
      throw badBatch('badSignature', 'An event is not signed by this tablet.', offset + index, { why });
    }
  });
  await Promise.all(checks);
};

interface Known {
  places: Map<string, Place>;
  quarantined: Map<string, QuarantinedRow>;
  branches: Branch[];
}

const lookUp = async (tx: ShopTx, walk: string, batch: readonly BatchEvent[]): Promise<Known> => {
  const hashes = [...batch.map(({ signed }) => signed.hash), batch[0]?.envelope.prev ?? ZERO_HASH];
  return {
    places: await placesOf(tx, walk, hashes),
    quarantined: await quarantinedOf(tx, hashes),
    branches: await branchesOf(tx, walk),
  };
};

/** How far back to ask when what stands before a batch is unknown although the server has as many events. */
const STEP_BACK = MOST_EVENTS / 5;

const holeBefore = (known: Known, believed: number, seq: number) => {
  const branch = known.branches.find((one) => one.branch === believed) ?? known.branches[0];
  const next = branch?.next ?? 0;
  return hole(branch?.branch ?? 0, seq > next ? next : Math.max(0, seq - STEP_BACK));
};

const store = async (
  deps: Deps,
  tx: ShopTx,
  tablet: TabletCaller,
  batch: Batch,
  events: readonly BatchEvent[],
  known: Known,
): Promise<Appended | null> => {
  const stored = events.findIndex(
    ({ signed }) => !known.places.has(signed.hash) && !known.quarantined.has(signed.hash),
  );
  if (stored < 0) return null;
  const fresh = events.slice(stored);
  const first = fresh[0]?.envelope;
  if (!first) return null;
  const verified = demandOwn(deps, tablet, fresh, stored);
  // Whoever fails first is the answer: a refusal on the way must not leave the other one unheard.
  verified.catch(() => undefined);
  if (known.quarantined.has(first.prev)) {
    await verified;
    await quarantineFollowers(deps, tx, batch.walk, tablet.id, fresh);
    return { branch: batch.branch, accepted: [], refused: [] };
  }
  const place = known.places.get(first.prev);
  if (!place && (first.seq !== 0 || first.prev !== ZERO_HASH)) throw holeBefore(known, batch.branch, first.seq);
  const parent = place ? { ...place, hash: first.prev } : null;
  if (parent && parent.seq + 1 !== first.seq) throw badBatch('notConsecutive', 'An event skips a number.', stored);
  return appendEvents(deps, tx, {
    walk: batch.walk,
    tablet: tablet.id,
    events: fresh,
    branches: known.branches,
    parent,
    verified,
  });
};

/** An event with its seal and the sealed PIN that travelled beside it. */
interface SealedEvent {
  event: BatchEvent;
  carried: EventSeal;
  jwe: string;
}

/** The sealed PINs of a batch that no confirmation answers yet; a seal sent again changes nothing. */
const unansweredSeals = async (tx: ShopTx, batch: Batch, events: readonly BatchEvent[]): Promise<SealedEvent[]> => {
  const jwes = new Map(batch.seals.map(({ hash, jwe }) => [hash, jwe]));
  const sealed = events.flatMap((event): SealedEvent[] => {
    const jwe = jwes.get(event.signed.hash);
    const hasShape = jwe !== undefined && misshapenField(event.event.type, event.event.data) === null;
    const carried = hasShape ? sealOf(event.event) : null;
    return jwe !== undefined && carried ? [{ event, carried, jwe }] : [];
  });
  const hashes = sealed.map(({ event }) => event.signed.hash);
  const answered = new Set((await confirmationsOfHashes(tx, batch.walk, hashes)).map((row) => row.hash));
  return sealed.filter(({ event }) => !answered.has(event.signed.hash));
};

/**
 * Compares the PINs before anything is written. Their counts are locked person by person in one order, and the shop's
 * catalogue counter only afterwards: two tablets that bring signatures of the same people must not wait for each other.
 */
const judgeSeals = async (
  deps: Deps,
  tx: ShopTx,
  sealed: readonly SealedEvent[],
): Promise<(SealedEvent & { reason: string | null })[]> => {
  const inOrder = [...sealed].sort((a, b) => a.carried.person.localeCompare(b.carried.person));
  const judged: (SealedEvent & { reason: string | null })[] = [];
  for (const one of inOrder) {
    judged.push({ ...one, reason: await judgeSeal(deps, tx, one.event, one.carried, one.jwe) });
  }
  return judged.sort((a, b) => a.event.envelope.seq - b.event.envelope.seq);
};

/** Confirms those whose events are stored now; answers whether there was any. */
const confirmSeals = async (
  deps: Deps,
  tx: ShopTx,
  walk: string,
  judged: Awaited<ReturnType<typeof judgeSeals>>,
): Promise<boolean> => {
  if (judged.length === 0) return false;
  const hashes = judged.map(({ event }) => event.signed.hash);
  const places = await placesOf(tx, walk, hashes);
  for (const { event, carried, reason } of judged) {
    const place = places.get(event.signed.hash);
    if (place) await confirmSeal(deps, tx, event, place, carried, reason);
  }
  return places.size > 0;
};

const toQuarantined = (row: QuarantinedRow): QuarantinedEvent => ({
  hash: row.hash,
  seq: row.seq,
  code: row.code,
  message: 'The rules of the walk refuse this event.',
  details: row.details,
});

const receiptFor = async (
  tx: ShopTx,
  batch: Batch,
  events: readonly BatchEvent[],
  accepted: number,
): Promise<Receipt> => {
  const hashes = events.map(({ signed }) => signed.hash);
  const after = await lookUp(tx, batch.walk, events);
  const last = events.findLast(({ signed }) => after.places.has(signed.hash));
  const before = events[0]?.envelope;
  const branch = after.places.get(last?.signed.hash ?? before?.prev ?? '')?.branch ?? batch.branch;
  const standing = after.branches.find((one) => one.branch === branch);
  const missing = new Set(await missingBlobsOf(tx, batch.walk));
  return {
    walk: batch.walk,
    branch,
    forked: (await findWalk(tx, batch.walk))?.forked ?? false,
    next: standing?.next ?? 0,
    hash: standing?.head ?? ZERO_HASH,
    accepted,
    quarantined: [...after.quarantined.values()]
      .filter((row) => hashes.includes(row.hash))
      .sort((a, b) => a.seq - b.seq)
      .map(toQuarantined),
    confirmations: (await confirmationsOfHashes(tx, batch.walk, hashes)).map(toConfirmation),
    missingBlobs: [...new Set(events.flatMap(({ event }) => safeBlobs(event)))].filter((hash) => missing.has(hash)),
  };
};

/** A refused event may have any shape; what it names as a blob is then no text. */
const safeBlobs = (event: BatchEvent['event']): string[] => blobsOf(event).filter((hash) => typeof hash === 'string');

/**
 * Stores a batch of one walk. Idempotent by hash: what is stored already is passed over, a hole is refused with the number
 * expected, another event at a stored number opens a branch, and what the rules refuse is kept in quarantine. All of it,
 * or nothing, is committed before the receipt is sent (I2, I4).
 */
export const syncBatch = async (deps: Deps, tx: ShopTx, tablet: TabletCaller, batch: Batch): Promise<Receipt> => {
  const events = parseBatch(batch.events, { shop: tx.shop, walk: batch.walk });
  await lockWalk(tx, batch.walk);
  const known = await lookUp(tx, batch.walk, events);
  const judged = await judgeSeals(deps, tx, await unansweredSeals(tx, batch, events));
  const appended = await store(deps, tx, tablet, batch, events, known);
  const confirmed = await confirmSeals(deps, tx, batch.walk, judged);
  const accepted = appended?.accepted.length ?? 0;
  if (accepted > 0) await leaveWork(deps, tx, 'walk.stored', { walk: batch.walk, branch: appended?.branch });
  const changed = appended !== null || confirmed;
  if (changed) await refreshWalk(deps, tx, batch.walk, deps.clock.now());
  return receiptFor(tx, batch, events, accepted);
};
