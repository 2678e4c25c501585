import { canonicalJson } from '@shared/record/canonicalJson';
import { signDetached } from '@shared/record/signature';
import { sha256Hex, type Deps } from '../../deps';
import type { ShopTx } from '../../tenancy/withShop';
import { nextCount } from '../shops/shops.repository';
import { findLine, insertLine, lastLine } from './ledger.repository';

const ZERO_HASH = '0'.repeat(64);

/**
 * Writes a finished walk into the shop's ledger, in the transaction of its last confirmation (decision 16). The counter's
 * row lock makes lines follow one another; a head already there is not written twice.
 */
export const appendLedger = async (
  deps: Deps,
  tx: ShopTx,
  walk: { id: string; branch: number; headHash: string },
): Promise<void> => {
  if (await findLine(tx, walk.id, walk.headHash)) return;
  const seq = (await nextCount(tx, 'ledger')) - 1;
  const prev = (await lastLine(tx))?.hash ?? ZERO_HASH;
  const at = deps.clock.now();
  const { id: walkId, branch, headHash } = walk;
  const line = { v: 1, shop: tx.shop, seq, prev, walk: walkId, branch, head: headHash, at: at.toISOString() };
  const text = canonicalJson(line);
  const { signer } = await deps.keyring(tx);
  const sig = await signDetached(text, signer);
  await insertLine(tx, { seq, walkId, branch, headHash, prev, text, hash: sha256Hex(text), sig, at });
};
