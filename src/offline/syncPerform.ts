import type { CatalogueAnswer } from '@shared/contracts/catalogue.contract';
import type { Receipt } from '@shared/contracts/sync.contract';
import type { RecordCrypto } from '@shared/record/crypto';
import type { Answer, ServerRefusal } from '@/api/answer';
import { adoptChain } from './adoptChain';
import { aheadAtServer } from './aheadAtServer';
import { blobBySha256, markBlobRefused, markBlobSent, markBlobsMissing } from './blobs';
import { applyCatalogue, emptyCatalogue, keepConfirmations, type Catalogue } from './catalogue';
import { rowsOf, type TabletDatabase } from './database';
import { applyReceipt, batchOf, blockWalk, resendAll, resendFrom } from './outbox';
import type { HeadRow, StandingRow } from './rows';
import type { Settings } from './settings';
import { noteAnswer, noteFailure, type SyncMemory } from './syncMemory';
import { BATCH_EVENTS, type SyncStep } from './syncPlan';
import type { SyncRequests, TabletReport } from './syncRequests';
import type { Bearer } from './tabletAuth';
import { isoOf, type TabletClock } from './tabletClock';

/** What the steps of sync work with. */
export interface SyncContext {
  database: TabletDatabase;
  settings: Settings;
  record: RecordCrypto;
  clock: TabletClock;
  requests: SyncRequests;
  /** A fresh bearer for this tablet. */
  authenticate: () => Promise<Answer<Bearer>>;
  tablet: string;
  random: () => number;
  report: () => Promise<TabletReport>;
  /** The catalogue is another now. */
  onCatalogue: (catalogue: Catalogue) => void;
  /** A walk's chain or standing is another now. */
  onWalk: (walk: string) => void;
  memory: SyncMemory;
}

/** Time between looks at the catalogue, and between reports, ms. */
export const CATALOGUE_EVERY_MS = 60_000;
export const REPORT_EVERY_MS = 10 * 60_000;

type Work = Exclude<SyncStep, { do: 'nothing' } | { do: 'wait' }>;
type Step<K extends Work['do']> = Extract<Work, { do: K }>;

const moment = ({ clock, random }: SyncContext) => ({ now: clock.now(), random: random() });

/** A refusal that no step can do anything about: tried again after a pause, and shown meanwhile. */
const giveTime = (context: SyncContext, refusal: ServerRefusal): void =>
  noteFailure(context.memory, { phase: 'waiting', code: refusal.code }, moment(context));

async function authenticate(context: SyncContext): Promise<void> {
  const answer = await context.authenticate();
  if (answer.kind === 'done') {
    // A token alone mends nothing: what failed before it goes on counting its failures.
    context.memory.bearer = answer.value;
    return;
  }
  const refusal = noteAnswer(context.memory, answer, moment(context));
  if (refusal) giveTime(context, refusal);
}

async function takeReceipt(context: SyncContext, step: Step<'sendEvents'>, receipt: Receipt): Promise<void> {
  const { database, memory, clock } = context;
  const { walk, branch, from } = step;
  const at = isoOf(clock.now());
  const fit = await applyReceipt(database, step, receipt, at);
  if (fit === 'grown') memory.chains = [...new Set([...memory.chains, walk])];
  if (fit === 'fits') {
    if (receipt.next < from) await resendFrom(database, walk, receipt.next, context.tablet);
    else if (receipt.next === from && receipt.quarantined.length === 0) {
      await blockWalk(database, walk, branch, { code: 'receipt.noProgress', message: '', seq: from, at });
    }
  }
  memory.mostEvents = Math.min(BATCH_EVENTS, memory.mostEvents * 2);
  memory.holes.delete(walk);
  if (receipt.confirmations.length > 0) {
    context.onCatalogue(await keepConfirmations(context.settings, receipt.confirmations));
  }
  await markBlobsMissing(database, receipt.missingBlobs);
}

async function refusedBatch(context: SyncContext, step: Step<'sendEvents'>, refusal: ServerRefusal): Promise<void> {
  const { memory, database, clock } = context;
  const { walk, branch, from, to } = step;
  const expected = refusal.details.expectedSeq;
  if (refusal.status === 409 && typeof expected === 'number') {
    // Asked twice for the same place: sending it again would go round for ever.
    if (memory.holes.get(walk) === expected) return giveTime(context, refusal);
    memory.holes.set(walk, expected);
    return resendFrom(database, walk, expected, context.tablet);
  }
  if (refusal.status === 413 && to > from) {
    memory.mostEvents = Math.max(1, Math.floor((to - from + 1) / 2));
    return;
  }
  const { code, message, details } = refusal;
  const index = typeof details.index === 'number' ? details.index : 0;
  await blockWalk(database, walk, branch, { code, message, seq: from + index, at: isoOf(clock.now()) });
}

async function sendEvents(context: SyncContext, token: string, step: Step<'sendEvents'>): Promise<void> {
  const batch = await batchOf(context.database, step);
  const answer = await context.requests.sendBatch(token, step.walk, batch);
  const refusal = noteAnswer(context.memory, answer, moment(context));
  if (answer.kind === 'done') await takeReceipt(context, step, answer.value);
  else if (refusal) await refusedBatch(context, step, refusal);
  else return;
  context.onWalk(step.walk);
}

async function sendBlob(context: SyncContext, token: string, { sha256 }: Step<'sendBlob'>): Promise<void> {
  const blob = await blobBySha256(context.database, sha256);
  if (!blob) return;
  const answer = await context.requests.sendBlob(token, blob);
  const refusal = noteAnswer(context.memory, answer, moment(context));
  if (answer.kind === 'done') await markBlobSent(context.database, sha256);
  else if (refusal) await markBlobRefused(context.database, sha256, refusal.code);
}

async function lookAhead({ database, settings, memory, tablet }: SyncContext, catalogue: Catalogue): Promise<void> {
  const { heads, standings } = await database.read(['heads', 'standings'], async (transaction) => ({
    heads: await rowsOf<HeadRow>(transaction, 'heads'),
    standings: await rowsOf<StandingRow>(transaction, 'standings'),
  }));
  const ahead = aheadAtServer(Object.values(catalogue.walks), heads, standings, tablet);
  memory.chains = ahead.grown;
  const news = ahead.lost.filter((walk) => !memory.lost.includes(walk));
  if (news.length === 0) return;
  // Written down before the lost end is fetched: that something was lost stays known when it has come back (fault 20).
  memory.lost = await settings.update('lostWalks', (old = []) => [...new Set([...old, ...news])]);
  memory.reportDueAt = 0;
}

async function takeCatalogue(context: SyncContext, answer: CatalogueAnswer): Promise<void> {
  const { settings, clock, database, tablet, memory } = context;
  const keptEpoch = (await settings.get('catalogue'))?.epoch;
  // Before the new epoch is saved: a tablet that dies in between must notice it again.
  if (keptEpoch !== answer.epoch) await resendAll(database, tablet);
  const catalogue = await applyCatalogue(settings, clock, answer);
  memory.epochKnown = true;
  memory.catalogueDueAt = clock.now() + CATALOGUE_EVERY_MS;
  await lookAhead(context, catalogue);
  context.onCatalogue(catalogue);
}

async function fetchCatalogue(context: SyncContext, token: string): Promise<void> {
  const { cursor, epoch } = (await context.settings.get('catalogue')) ?? emptyCatalogue();
  const answer = await context.requests.fetchCatalogue(token, cursor, epoch);
  const refusal = noteAnswer(context.memory, answer, moment(context));
  if (answer.kind === 'done') await takeCatalogue(context, answer.value);
  else if (refusal) giveTime(context, refusal);
}

/** What stands between this tablet and the server's chain for good; the others mend themselves. */
const LASTING = new Set(['chain.broken', 'chain.conflict']);

async function fetchChain(context: SyncContext, token: string, { walk }: Step<'fetchChain'>): Promise<void> {
  const { database, record, settings, clock, memory } = context;
  const answer = await context.requests.fetchChain(token, walk);
  const refusal = noteAnswer(memory, answer, moment(context));
  if (answer.kind !== 'done' && !refusal) return;
  // Whatever comes of it, it is looked at again with the next catalogue, not in a circle.
  memory.chains = memory.chains.filter((one) => one !== walk);
  if (answer.kind !== 'done') return;
  const document = (await settings.get('catalogue'))?.procedures[answer.value.walk.procedure.hash]?.document ?? null;
  const adopted = await adoptChain({ database, record }, answer.value, document, isoOf(clock.now()));
  const at = isoOf(clock.now());
  if (!adopted.ok && LASTING.has(adopted.error.code)) {
    const { branch, next } = answer.value.walk;
    await blockWalk(database, walk, branch, { code: adopted.error.code, message: '', seq: next, at });
  }
  context.onWalk(walk);
}

async function report(context: SyncContext, token: string): Promise<void> {
  const answer = await context.requests.report(token, await context.report());
  const refusal = noteAnswer(context.memory, answer, moment(context));
  if (answer.kind === 'done') context.memory.reportDueAt = context.clock.now() + REPORT_EVERY_MS;
  else if (refusal) giveTime(context, refusal);
}

/** Does one step. Whatever the server answers is written into memory and database; only storage failures are thrown. */
export async function performSync(context: SyncContext, step: Work): Promise<void> {
  if (step.do === 'authenticate') return authenticate(context);
  const token = context.memory.bearer?.token ?? '';
  const failures = context.memory.unauthorised;
  switch (step.do) {
    case 'sendEvents':
      await sendEvents(context, token, step);
      break;
    case 'sendBlob':
      await sendBlob(context, token, step);
      break;
    case 'fetchCatalogue':
      await fetchCatalogue(context, token);
      break;
    case 'fetchChain':
      await fetchChain(context, token, step);
      break;
    case 'report':
      await report(context, token);
      break;
  }
  // The token was taken: the next 401 is a first one again.
  if (context.memory.unauthorised === failures) context.memory.unauthorised = 0;
}
