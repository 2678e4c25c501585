import { parseEnvelope } from '@shared/record/envelope';
import { evolve } from '@shared/walk/evolve';
import { initialWalk, type WalkState } from '@shared/walk/state';
import { eventOfEnvelope } from '@shared/walk/upcasts';
import type { WalkEvent } from '@shared/walk/events';
import type { Deps } from '../../deps';
import { AppError } from '../../http/errors';
import type { ShopTx } from '../../tenancy/withShop';
import { pathTo } from './branches';
import { eventsOfBranch, type Branch, type Place, type StoredRow } from './chain.repository';
import { findRevisionByHash } from './openedFacts.repository';

const broken = (seq: number): AppError =>
  new AppError(409, 'walk.broken', 'The stored record does not verify: it is broken.', { seq });

/** The event of a stored row. Throws 409 `walk.broken` where the bytes do not read any more (fault 21). */
export const eventOfRow = (row: StoredRow): WalkEvent => {
  const parsed = parseEnvelope(row.text);
  const event = parsed.ok ? eventOfEnvelope(parsed.value) : null;
  if (!event) throw broken(row.seq);
  return event;
};

/** The chain that leads to a place, from seq 0, through its parent branches. */
export const chainTo = async (
  tx: ShopTx,
  walk: string,
  branches: readonly Branch[],
  place: Place,
): Promise<StoredRow[]> => {
  const rows: StoredRow[] = [];
  for (const stretch of pathTo(branches, place)) {
    const piece = await eventsOfBranch(tx, walk, stretch.branch, stretch.upTo);
    rows.push(...piece);
  }
  return rows;
};

const beginning = async (tx: ShopTx, event: WalkEvent): Promise<WalkState> => {
  if (event.type !== 'walk.opened') throw broken(event.seq);
  const revision = await findRevisionByHash(tx, event.data.procedure);
  if (!revision) throw broken(event.seq);
  return initialWalk(revision.document, event.data.procedure.hash);
};

/** Replays rows that begin at seq 0. */
export const foldRows = async (tx: ShopTx, rows: readonly StoredRow[]): Promise<WalkState> => {
  const events = rows.map(eventOfRow);
  const [first] = events;
  if (!first) throw broken(0);
  return events.reduce(evolve, await beginning(tx, first));
};

/** The state after the event at a place: from memory, else replayed from the stored chain. */
export const stateAt = async (
  deps: Pick<Deps, 'folds'>,
  tx: ShopTx,
  walk: string,
  branches: readonly Branch[],
  place: Place & { hash: string },
): Promise<WalkState> => {
  const known = deps.folds.get(tx.shop, place.hash);
  if (known) return known;
  const state = await foldRows(tx, await chainTo(tx, walk, branches, place));
  deps.folds.set(tx.shop, place.hash, state);
  return state;
};
