import { sha256Hex } from '../../deps';
import type { ShopTx } from '../../tenancy/withShop';
import { branchesOf } from '../sync/chain.repository';
import { chainTo } from '../sync/foldChain';
import type { ProofRecord } from './proofs.repository';

const LAST_SEQ = 2 ** 31 - 1;

/**
 * The hash of every event of a proof's walk, made now from the stored bytes: whoever checks the proof can compare them
 * with those it was issued on, and name the event that somebody changed (fault 21). Events written after the issue are
 * left out, as long as the head the proof stands on is still there.
 */
export const storedHashes = async (
  tx: ShopTx,
  { walkId, branch, headHash }: Pick<ProofRecord, 'walkId' | 'branch' | 'headHash'>,
): Promise<string[]> => {
  const rows = await chainTo(tx, walkId, await branchesOf(tx, walkId), { branch, seq: LAST_SEQ });
  const hashes = rows.map(({ text }) => sha256Hex(text));
  const head = hashes.lastIndexOf(headHash);
  return head < 0 ? hashes : hashes.slice(0, head + 1);
};
