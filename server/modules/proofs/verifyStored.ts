import { verifyChain } from '@shared/record/chain';
import { ZERO_HASH } from '@shared/record/envelope';
import type { Deps } from '../../deps';
import type { ShopTx } from '../../tenancy/withShop';
import type { StoredRow } from '../sync/chain.repository';
import { keysOfShop } from '../walks/walks.usecases';

/** The first stored event that does not verify any more, or null: every hash, link and signature is looked at (fault 21). */
export const brokenEvent = async (
  deps: Deps,
  tx: ShopTx,
  walk: string,
  rows: readonly StoredRow[],
): Promise<{ seq: number; code: string } | null> => {
  const keys = new Map((await keysOfShop(deps, tx)).map(({ kid, ...jwk }) => [kid, jwk]));
  let startPrev = ZERO_HASH;
  for (let from = 0; from < rows.length;) {
    const branch = rows[from]?.branch;
    const end = rows.findIndex((row, index) => index > from && row.branch !== branch);
    const stretch = rows.slice(from, end < 0 ? rows.length : end);
    const verdict = await verifyChain(stretch, keys, deps.crypto, { startSeq: from, startPrev, shop: tx.shop, walk });
    if (!verdict.ok) return { seq: verdict.seq, code: verdict.code };
    startPrev = verdict.head;
    from += stretch.length;
  }
  return null;
};
