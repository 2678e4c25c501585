import { and, eq, isNull } from 'drizzle-orm';
import { blobs, walkBlobs } from '@db/schema/blobs';
import type { ShopTx } from '../../tenancy/withShop';

/** Notes that a blob is held; noting it again changes nothing. */
export const insertBlob = async (
  tx: ShopTx,
  blob: { sha256: string; bytes: number; tablet: string; receivedAt: Date },
): Promise<void> => {
  await tx.db
    .insert(blobs)
    .values({ shopId: tx.shop, ...blob })
    .onConflictDoNothing();
};

/** Whether a blob is held. */
export const hasBlob = async (tx: ShopTx, sha256: string): Promise<boolean> => {
  const rows = await tx.db
    .select({ bytes: blobs.bytes })
    .from(blobs)
    .where(and(eq(blobs.shopId, tx.shop), eq(blobs.sha256, sha256)));
  return rows.length > 0;
};

/** Notes the blobs that events of a walk name. */
export const insertWalkBlobs = async (tx: ShopTx, walk: string, hashes: readonly string[]): Promise<void> => {
  if (hashes.length === 0) return;
  const rows = hashes.map((sha256) => ({ shopId: tx.shop, walkId: walk, sha256 }));
  await tx.db.insert(walkBlobs).values(rows).onConflictDoNothing();
};

/** The blobs a walk names that are not held yet (fault 18). */
export const missingBlobsOf = async (tx: ShopTx, walk: string): Promise<string[]> => {
  const rows = await tx.db
    .select({ sha256: walkBlobs.sha256 })
    .from(walkBlobs)
    .leftJoin(blobs, and(eq(blobs.shopId, walkBlobs.shopId), eq(blobs.sha256, walkBlobs.sha256)))
    .where(and(eq(walkBlobs.shopId, tx.shop), eq(walkBlobs.walkId, walk), isNull(blobs.sha256)));
  return rows.map((row) => row.sha256);
};

/** The walks that name a blob, in the order of their ids. */
export const walksNaming = async (tx: ShopTx, sha256: string): Promise<string[]> => {
  const rows = await tx.db
    .select({ walk: walkBlobs.walkId })
    .from(walkBlobs)
    .where(and(eq(walkBlobs.shopId, tx.shop), eq(walkBlobs.sha256, sha256)))
    .orderBy(walkBlobs.walkId);
  return rows.map((row) => row.walk);
};
