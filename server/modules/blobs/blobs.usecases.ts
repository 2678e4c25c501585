import { sha256Hex, type Deps } from '../../deps';
import type { TabletCaller } from '../../http/callers';
import { badRequest, notFound } from '../../http/errors';
import type { ShopTx } from '../../tenancy/withShop';
import { lockWalk } from '../sync/chain.repository';
import { refreshWalk } from '../sync/refreshWalk';
import { hasBlob, insertBlob, walksNaming } from './blobs.repository';

/** Keeps a photo or file under its own hash (fault 18): other bytes for the same address are refused. */
export const keepBlob = async (
  deps: Deps,
  tx: ShopTx,
  tablet: TabletCaller,
  sha256: string,
  bytes: Uint8Array,
): Promise<{ sha256: string; bytes: number }> => {
  if (bytes.length === 0) throw badRequest('blob.empty', 'The file is empty.');
  const actual = sha256Hex(bytes);
  if (actual !== sha256) throw badRequest('blob.wrongHash', 'The bytes do not match the address.', { actual });
  const kept = { sha256, bytes: bytes.length };
  if (await hasBlob(tx, sha256)) return kept;
  // The bytes first: a row must never promise what is not there. Bytes without a row are only sent again.
  await deps.blobs.put(tx.shop, sha256, bytes);
  const now = deps.clock.now();
  await insertBlob(tx, { ...kept, tablet: tablet.id, receivedAt: now });
  // All locks first and in one order, then the writing: whoever else holds one of them must not wait for us in turn.
  const walks = await walksNaming(tx, sha256);
  for (const walk of walks) await lockWalk(tx, walk);
  for (const walk of walks) await refreshWalk(deps, tx, walk, now);
  return kept;
};

/** The bytes of a blob of this shop. Throws 404 `blob.unknown`. */
export const readBlob = async (deps: Deps, tx: ShopTx, sha256: string): Promise<Uint8Array> => {
  const bytes = (await hasBlob(tx, sha256)) ? await deps.blobs.get(tx.shop, sha256) : null;
  if (!bytes) throw notFound('blob.unknown', 'There is no such file.');
  return bytes;
};
