import type { WalkEvent } from '@shared/walk/events';
import { initialWalk, type WalkState } from '@shared/walk/state';
import type { Deps } from '../../deps';
import type { ShopTx } from '../../tenancy/withShop';
import { insertWalkBlobs } from '../blobs/blobs.repository';
import { markObeyed } from '../countersign/orders.repository';
import { handsOf, insertHands, insertWalk, saveDeviations } from '../walks/walks.repository';
import { targetFor, type Target } from './branches';
import { insertBranch, insertEvents, insertQuarantined, type Branch, type Place } from './chain.repository';
import { misshapenField } from './eventShapes';
import { stateAt } from './foldChain';
import { judgeEvent, type EventRefusal } from './judgeEvent';
import type { BatchEvent } from './parseBatch';
import { loadFacts, orderOf, type Facts } from './sync.facts';
import { blobsOf } from './walkBlobsOf';
import { walkSummary } from './walkSummary';

/** An event that was decided again and may stand, with what was noticed about it. */
export type JudgedEvent = BatchEvent & { flags: string[] };

/** New events of one chain and where they go on. */
export interface NewEvents {
  walk: string;
  /** Who brings them: a tablet's id or `office`. */
  tablet: string;
  events: readonly BatchEvent[];
  branches: readonly Branch[];
  /** The event before the first of them; null where they begin a walk. */
  parent: (Place & { hash: string }) | null;
  /** Their signatures, being verified on other cores while they are decided again; nothing is written before. */
  verified?: Promise<void>;
  /** Where they go, if it is not what follows from the parent: a forced takeover begins a branch. */
  target?: Target;
}

/** What became of them. */
export interface Appended {
  branch: number;
  accepted: JudgedEvent[];
  refused: { event: BatchEvent; code: string; details: Record<string, unknown> }[];
}

interface Judged {
  before: WalkState | null;
  after: WalkState | null;
  accepted: JudgedEvent[];
  refusal: EventRefusal | null;
}

/** Facts are asked only for events that have their shape: identifiers of others might be anything. */
const shapedPrefix = (events: readonly BatchEvent[]): WalkEvent[] => {
  const bad = events.findIndex(({ event }) => misshapenField(event.type, event.data) !== null);
  return events.slice(0, bad < 0 ? events.length : bad).map(({ event }) => event);
};

const stateBefore = async (deps: Deps, tx: ShopTx, fresh: NewEvents, facts: Facts): Promise<WalkState | null> => {
  const { parent } = fresh;
  if (parent) return stateAt(deps, tx, fresh.walk, fresh.branches, parent);
  const first = fresh.events[0]?.event;
  const document = facts.opening?.revision?.document;
  return document && first?.type === 'walk.opened' ? initialWalk(document, first.data.procedure.hash) : null;
};

/** Without a revision there is no state to judge on: the event says why itself, or is no beginning of a walk. */
const refusalWithoutState = (event: BatchEvent | undefined, facts: Facts): EventRefusal => {
  if (event?.event.type !== 'walk.opened') return { code: 'notOpened' };
  const field = misshapenField(event.event.type, event.event.data);
  if (field) return { code: 'event.malformed', details: { field } };
  return { code: facts.opening?.joint ? 'event.procedureUnknown' : 'event.jointUnknown' };
};

/** P1 across branches: whoever took a reading in any branch of this walk countersigns in none. */
const ownHands = (event: WalkEvent, state: WalkState, hands: readonly string[]): EventRefusal | null =>
  event.type === 'walk.countersigned' && !state.opened?.policy.shopOfOne && hands.includes(event.by)
    ? { code: 'ownReadings' }
    : null;

const judgeAll = async (deps: Deps, tx: ShopTx, fresh: NewEvents): Promise<Judged> => {
  const facts = await loadFacts(tx, shapedPrefix(fresh.events));
  const before = await stateBefore(deps, tx, fresh, facts);
  if (!before) return { before, after: null, accepted: [], refusal: refusalWithoutState(fresh.events[0], facts) };
  const countersigns = fresh.events.some(({ event }) => event.type === 'walk.countersigned');
  const hands = countersigns ? await handsOf(tx, fresh.walk) : [];
  const now = deps.clock.now().getTime();
  const accepted: JudgedEvent[] = [];
  let after = before;
  for (const event of fresh.events) {
    const own = ownHands(event.event, after, hands);
    const verdict = own ? { ok: false as const, refusal: own } : judgeEvent(after, event.event, fresh.walk, facts, now);
    if (!verdict.ok) return { before, after, accepted, refusal: verdict.refusal };
    accepted.push({ ...event, flags: verdict.flags });
    after = verdict.state;
  }
  return { before, after, accepted, refusal: null };
};

/** Why an event behind a refused one cannot stand either: it links to it. */
const FOLLOWS = 'event.followsRefused';

const refusedFrom = (events: readonly BatchEvent[], refusal: EventRefusal): Appended['refused'] =>
  events.map((event, index) =>
    index === 0 ? { event, code: refusal.code, details: refusal.details ?? {} } : { event, code: FOLLOWS, details: {} },
  );

const beginWalk = async (tx: ShopTx, fresh: NewEvents, state: WalkState, branch: number, now: Date): Promise<void> => {
  const opened = state.opened;
  if (!opened) throw new Error('a walk without walk.opened passed its rules');
  const [first] = fresh.events;
  await insertWalk(tx, {
    ...walkSummary(state),
    id: fresh.walk,
    jobId: opened.job,
    jointId: opened.joint,
    purpose: opened.purpose,
    procedureCode: opened.procedure.code,
    revision: opened.procedure.revision,
    procedureHash: opened.procedure.hash,
    shopOfOne: opened.policy.shopOfOne,
    branch,
    nextSeq: 0,
    headHash: first?.envelope.prev ?? '',
    openedAt: new Date(opened.at),
    changedAt: now,
    ...{ forked: false, quarantined: 0, refusedSeals: 0, missingBlobs: 0 },
  });
};

const write = async (deps: Deps, tx: ShopTx, fresh: NewEvents, judged: Judged, target: Target): Promise<number> => {
  const { before, after, accepted } = judged;
  const branch = target.kind === 'append' ? target.branch : target.branch.branch;
  const now = deps.clock.now();
  if (!after) return branch;
  if (fresh.branches.length === 0) await beginWalk(tx, fresh, after, branch, now);
  if (target.kind === 'open') await insertBranch(tx, fresh.walk, target.branch, now);
  await insertHands(tx, fresh.walk, after.everHands);
  await insertEvents(tx, fresh.walk, branch, accepted, now);
  const known = new Set(before?.deviations);
  await saveDeviations(
    tx,
    fresh.walk,
    branch,
    after.deviations.filter((deviation) => !known.has(deviation)),
  );
  await insertWalkBlobs(tx, fresh.walk, [...new Set(accepted.flatMap(({ event }) => blobsOf(event)))]);
  await markObeyed(
    tx,
    accepted.map(({ event }) => orderOf(event)).filter((id) => id !== null),
  );
  const head = accepted.at(-1);
  if (head) deps.folds.set(tx.shop, head.signed.hash, after);
  return branch;
};

/**
 * Decides new events of one chain again and stores those that stand; from the first that does not, the rest is kept in
 * quarantine (decision 1, I5). The caller holds the walk's lock, and refreshes its line afterwards.
 */
export const appendEvents = async (deps: Deps, tx: ShopTx, fresh: NewEvents): Promise<Appended> => {
  const judged = await judgeAll(deps, tx, fresh);
  await fresh.verified;
  const refused = judged.refusal ? refusedFrom(fresh.events.slice(judged.accepted.length), judged.refusal) : [];
  await insertQuarantined(tx, fresh.walk, fresh.tablet, refused, deps.clock.now());
  const target = fresh.target ?? targetFor(fresh.branches, fresh.parent);
  const standing = fresh.parent?.branch ?? 0;
  if (judged.accepted.length === 0) return { branch: standing, accepted: [], refused };
  return { branch: await write(deps, tx, fresh, judged, target), accepted: judged.accepted, refused };
};

/** Keeps events that follow one refused earlier. */
export const quarantineFollowers = async (
  deps: Deps,
  tx: ShopTx,
  walk: string,
  tablet: string,
  events: readonly BatchEvent[],
): Promise<void> => {
  const refused = events.map((event) => ({ event, code: FOLLOWS, details: {} }));
  await insertQuarantined(tx, walk, tablet, refused, deps.clock.now());
};
