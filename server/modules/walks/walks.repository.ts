import { and, asc, desc, eq, gt, inArray, ne, or, sql } from 'drizzle-orm';
import { jobJoints } from '@db/schema/jobs';
import { branchChoices, quarantinedEvents, quarantineSettlings } from '@db/schema/walkEvents';
import { deviations, walkHands, walks } from '@db/schema/walks';
import type { Deviation } from '@shared/walk/deviation';
import type { ShopTx } from '../../tenancy/withShop';

/** A walk's line as stored. */
export type WalkRecord = typeof walks.$inferSelect;
/** What is written of a walk's line; triggers and defaults do the rest. */
export type WalkChange = Partial<Omit<WalkRecord, 'shopId' | 'id' | 'changed'>>;

const mine = (tx: ShopTx, id: string) => and(eq(walks.shopId, tx.shop), eq(walks.id, id));

/** A walk's line, or null. */
export const findWalk = async (tx: ShopTx, id: string): Promise<WalkRecord | null> => {
  const rows = await tx.db.select().from(walks).where(mine(tx, id));
  return rows[0] ?? null;
};

/** Stores a new walk's line. */
export const insertWalk = async (tx: ShopTx, row: Omit<WalkRecord, 'shopId' | 'changed'>): Promise<void> => {
  await tx.db.insert(walks).values({ shopId: tx.shop, ...row });
};

/** Changes a walk's line. */
export const updateWalk = async (tx: ShopTx, id: string, change: WalkChange): Promise<void> => {
  await tx.db.update(walks).set(change).where(mine(tx, id));
};

/** Walks whose line changed after a cursor; from 0, those not at their end and those changed since a moment. */
export const walksForTablets = (tx: ShopTx, since: number, changedAfter: Date): Promise<WalkRecord[]> =>
  tx.db
    .select()
    .from(walks)
    .where(
      and(
        eq(walks.shopId, tx.shop),
        since === 0 ? or(ne(walks.state, 'finished'), gt(walks.changedAt, changedAfter)) : undefined,
        gt(walks.changed, since),
      ),
    )
    .orderBy(asc(walks.openedAt));

/** Walks of these joints: parallel ones show side by side (decision 5). */
export const walksOfJoints = async (
  tx: ShopTx,
  joints: string[],
): Promise<Map<string, { id: string; state: string }[]>> => {
  const found = new Map<string, { id: string; state: string }[]>();
  if (joints.length === 0) return found;
  const rows = await tx.db
    .select({ id: walks.id, joint: walks.jointId, state: walks.state })
    .from(walks)
    .where(and(eq(walks.shopId, tx.shop), inArray(walks.jointId, joints)))
    .orderBy(asc(walks.openedAt));
  for (const { joint, id, state } of rows) found.set(joint, [...(found.get(joint) ?? []), { id, state }]);
  return found;
};

/** Everybody who pulled or recorded while a reading was taken. */
export const insertHands = async (tx: ShopTx, walk: string, people: readonly string[]): Promise<void> => {
  if (people.length === 0) return;
  const rows = people.map((personId) => ({ shopId: tx.shop, walkId: walk, personId }));
  await tx.db.insert(walkHands).values(rows).onConflictDoNothing();
};

/** Who pulled or recorded in any branch of the walk. */
export const handsOf = async (tx: ShopTx, walk: string): Promise<string[]> => {
  const rows = await tx.db
    .select({ person: walkHands.personId })
    .from(walkHands)
    .where(and(eq(walkHands.shopId, tx.shop), eq(walkHands.walkId, walk)));
  return rows.map(({ person }) => person);
};

/** Writes deviations as they are now. */
export const saveDeviations = async (
  tx: ShopTx,
  walk: string,
  branch: number,
  changed: readonly Deviation[],
): Promise<void> => {
  if (changed.length === 0) return;
  const rows = changed.map(({ id, seq, at, kind, hole, slot, reading, status, settlings }) => ({
    ...{ shopId: tx.shop, walkId: walk, branch, deviation: id, seq, at: new Date(at), kind, hole },
    ...{ slot, reading, status, settlings },
  }));
  await tx.db
    .insert(deviations)
    .values(rows)
    .onConflictDoUpdate({
      target: [deviations.shopId, deviations.walkId, deviations.branch, deviations.deviation],
      set: { status: sql`excluded.status`, settlings: sql`excluded.settlings`, slot: sql`excluded.slot` },
    });
};

/** Sets what earlier walks left on a joint; without a change nothing is written and no tablet hears of it. */
export const saveEarlier = async (
  tx: ShopTx,
  joint: string,
  earlier: { readingsTaken: boolean; usedHoles: string[] },
): Promise<void> => {
  await tx.db
    .update(jobJoints)
    .set({ earlier })
    .where(
      and(
        eq(jobJoints.shopId, tx.shop),
        eq(jobJoints.id, joint),
        sql`${jobJoints.earlier} is distinct from ${JSON.stringify(earlier)}::jsonb`,
      ),
    );
};

/** The walks of a joint in the order of their opening, as far as the next one inherits from them (W1). */
export const inheritanceOf = (tx: ShopTx, joint: string) =>
  tx.db
    .select({
      purpose: walks.purpose,
      state: walks.state,
      readingsTaken: walks.readingsTaken,
      usedHoles: walks.usedHoles,
    })
    .from(walks)
    .where(and(eq(walks.shopId, tx.shop), eq(walks.jointId, joint)))
    .orderBy(asc(walks.openedAt));

/** The latest choice of a branch, or null. */
export const latestChoice = async (tx: ShopTx, walk: string) => {
  const rows = await tx.db
    .select()
    .from(branchChoices)
    .where(and(eq(branchChoices.shopId, tx.shop), eq(branchChoices.walkId, walk)))
    .orderBy(desc(branchChoices.nth))
    .limit(1);
  return rows[0] ?? null;
};

/** Stores which branch stands from now on. */
export const insertChoice = async (
  tx: ShopTx,
  choice: Omit<typeof branchChoices.$inferSelect, 'shopId'>,
): Promise<void> => {
  await tx.db.insert(branchChoices).values({ shopId: tx.shop, ...choice });
};

/** Refused events of a walk, with what was said about them. */
export const quarantineOfWalk = (tx: ShopTx, walk: string) =>
  tx.db
    .select({ event: quarantinedEvents, settling: quarantineSettlings })
    .from(quarantinedEvents)
    .leftJoin(
      quarantineSettlings,
      and(
        eq(quarantineSettlings.shopId, quarantinedEvents.shopId),
        eq(quarantineSettlings.hash, quarantinedEvents.hash),
      ),
    )
    .where(and(eq(quarantinedEvents.shopId, tx.shop), eq(quarantinedEvents.walkId, walk)))
    .orderBy(asc(quarantinedEvents.seq));

/** Notes that somebody looked at a refused event. */
export const insertSettling = async (
  tx: ShopTx,
  settling: { hash: string; byPerson: string; reason: string; at: Date },
): Promise<void> => {
  await tx.db
    .insert(quarantineSettlings)
    .values({ shopId: tx.shop, ...settling })
    .onConflictDoNothing();
};

/** The ids of every walk of the shop. */
export const walkIds = async (tx: ShopTx): Promise<string[]> => {
  const rows = await tx.db
    .select({ id: walks.id })
    .from(walks)
    .where(eq(walks.shopId, tx.shop))
    .orderBy(asc(walks.openedAt));
  return rows.map(({ id }) => id);
};
