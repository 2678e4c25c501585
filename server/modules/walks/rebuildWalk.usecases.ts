import type { Deps } from '../../deps';
import type { ShopTx } from '../../tenancy/withShop';
import { insertWalkBlobs } from '../blobs/blobs.repository';
import { branchesOf, lockWalk } from '../sync/chain.repository';
import { chainTo, eventOfRow, foldRows } from '../sync/foldChain';
import { refreshWalk } from '../sync/refreshWalk';
import { blobsOf } from '../sync/walkBlobsOf';
import { findWalk, insertHands, saveDeviations } from './walks.repository';

/**
 * Makes everything that is derived from a walk again from its stored chain (decision 14): deviations and hands of every
 * branch, the files it names, its line. Nothing remembered in memory is used.
 */
export const rebuildWalk = async (deps: Deps, tx: ShopTx, walk: string): Promise<void> => {
  await lockWalk(tx, walk);
  const row = await findWalk(tx, walk);
  if (!row) return;
  const branches = await branchesOf(tx, walk);
  for (const { branch, next, head } of branches) {
    const rows = await chainTo(tx, walk, branches, { branch, seq: next - 1 });
    const state = await foldRows(tx, rows);
    deps.folds.set(tx.shop, head, state);
    await insertHands(tx, walk, state.everHands);
    await saveDeviations(tx, walk, branch, state.deviations);
    await insertWalkBlobs(tx, walk, [...new Set(rows.flatMap((stored) => blobsOf(eventOfRow(stored))))]);
  }
  await refreshWalk(deps, tx, walk, row.changedAt);
};
