import type { takeOver } from '@shared/contracts/sync.contract';
import { err, type Result } from '@shared/kernel/result';
import type { RecordCrypto } from '@shared/record/crypto';
import type { TabletClient } from '@/api/tabletClient';
import { adoptChain } from './adoptChain';
import type { Catalogue } from './catalogue';
import type { TabletDatabase } from './database';
import type { HeadRow } from './rows';
import type { Sealer } from './seal';
import { syncRequests } from './syncRequests';
import { failureOf, type ServerFailure } from './tabletAuth';
import { isoOf, type TabletClock } from './tabletClock';

/** What bringing a walk to this tablet needs. */
export interface TakeOverDeps {
  database: TabletDatabase;
  record: RecordCrypto;
  client: TabletClient;
  clock: TabletClock;
  sealer: Sealer | null;
  bearer: () => Promise<string | null>;
  catalogue: () => Catalogue;
  tablet: string;
}

/** Who brings a walk here. Forced (a lost tablet) needs a supervisor's PIN; then W9 asks at every hole in doubt (W11). */
export interface WantedTakeOver {
  walk: string;
  person: string;
  forced: { pin: string; pinVersion: number } | null;
}

async function sealFor(deps: TakeOverDeps, { walk, person, forced }: WantedTakeOver): Promise<string | undefined> {
  if (!forced || !deps.sealer) return undefined;
  const { next: seq, head: prev } = deps.catalogue().walks[walk] ?? { next: 0, head: '' };
  const { jwe } = await deps.sealer({ ...forced, person, walk, seq, prev, meaning: 'takeOver' });
  return jwe;
}

/** Fetches a walk's chain and stores it here. What is here and not sent yet is never written over. */
export async function fetchWalk(deps: TakeOverDeps, walk: string): Promise<Result<HeadRow, ServerFailure>> {
  const token = await deps.bearer();
  if (token === null) return err({ code: 'server.unreachable' });
  const answer = await syncRequests(deps.client).fetchChain(token, walk);
  if (answer.kind !== 'done') return err(failureOf(answer));
  const document = deps.catalogue().procedures[answer.value.walk.procedure.hash]?.document ?? null;
  return adoptChain(deps, answer.value, document, isoOf(deps.clock.now()));
}

/**
 * Makes this tablet the writer of a walk: the server writes `walk.takenOver`, and the chain with it comes here. A reply
 * that gets lost does no harm: the walk is then this tablet's already and asking again only fetches it.
 */
export async function takeOverWalk(
  deps: TakeOverDeps,
  wanted: WantedTakeOver,
): Promise<Result<HeadRow, ServerFailure>> {
  if (deps.catalogue().walks[wanted.walk]?.writer === deps.tablet) return fetchWalk(deps, wanted.walk);
  const token = await deps.bearer();
  if (token === null) return err({ code: 'server.unreachable' });
  const jwe = await sealFor(deps, wanted);
  const answer = await deps.client.call<typeof takeOver>({
    method: 'POST',
    path: '/api/tablet/walks/:walk/take-over',
    token,
    params: { walk: wanted.walk },
    body: { forced: wanted.forced !== null, person: wanted.person, ...(jwe === undefined ? {} : { jwe }) },
  });
  const isHereAlready = answer.kind === 'refused' && answer.refusal.details.writer === deps.tablet;
  if (answer.kind !== 'done' && !isHereAlready) return err(failureOf(answer));
  return fetchWalk(deps, wanted.walk);
}
