import type { Deps } from '../../deps';
import type { ShopTx } from '../../tenancy/withShop';
import { writeAudit } from '../audit/audit.repository';
import { brokenEvent } from '../proofs/verifyStored';
import { branchesOf } from '../sync/chain.repository';
import { chainTo } from '../sync/foldChain';

/**
 * Verifies a branch as it now stands in the database, after the commit: what was checked on its way in is checked where
 * it is kept (fault 21). A broken one is written into the audit trail; a proof of it is refused anyway.
 */
export const verifyStoredWalk = async (deps: Deps, tx: ShopTx, payload: Record<string, unknown>): Promise<void> => {
  const { walk, branch } = payload;
  if (typeof walk !== 'string' || typeof branch !== 'number') throw new Error('the work names no walk');
  const branches = await branchesOf(tx, walk);
  const head = branches.find((one) => one.branch === branch);
  if (!head) throw new Error(`walk ${walk} has no branch ${branch}`);
  const rows = await chainTo(tx, walk, branches, { branch, seq: head.next - 1 });
  const broken = await brokenEvent(deps, tx, walk, rows);
  if (!broken) return;
  deps.log.error({ walk, branch, ...broken }, 'a stored record does not verify');
  await writeAudit(deps, tx, { person: null, action: 'walk.broken', subject: walk, details: { branch, ...broken } });
};
