import { and, eq, isNull, sql } from 'drizzle-orm';
import { signInFailures } from '@db/schema/failures';
import { people } from '@db/schema/people';
import { sessions } from '@db/schema/sessions';
import type { DatabaseClient } from '../../tenancy/client';
import type { ShopTx } from '../../tenancy/withShop';

/** The people of every shop that sign in with this address: the one question asked before a shop is known. */
export const shopsForEmail = async (
  client: DatabaseClient,
  email: string,
): Promise<{ shop: string; person: string }[]> => {
  const result = await client.db.execute<{ shop_id: string; person_id: string }>(
    sql`select shop_id, person_id from shops_for_email(${email})`,
  );
  return result.rows.map((row) => ({ shop: row.shop_id, person: row.person_id }));
};

/** A session by its token's hash with the person it belongs to, unless it was ended. */
export const findSession = async (tx: ShopTx, tokenHash: string) => {
  const rows = await tx.db
    .select({ session: sessions, person: people })
    .from(sessions)
    .innerJoin(people, and(eq(people.shopId, sessions.shopId), eq(people.id, sessions.personId)))
    .where(and(eq(sessions.shopId, tx.shop), eq(sessions.tokenHash, tokenHash), isNull(sessions.endedAt)));
  return rows[0] ?? null;
};

/** Stores a new session. */
export const insertSession = async (
  tx: ShopTx,
  session: { id: string; tokenHash: string; personId: string; csrf: string; createdAt: Date; expiresAt: Date },
): Promise<void> => {
  await tx.db.insert(sessions).values({ shopId: tx.shop, ...session });
};

/** Ends one session. */
export const endSession = async (tx: ShopTx, id: string, at: Date): Promise<void> => {
  await tx.db
    .update(sessions)
    .set({ endedAt: at })
    .where(and(eq(sessions.shopId, tx.shop), eq(sessions.id, id)));
};

/** Ends every session of somebody who left. */
export const endSessionsOf = async (tx: ShopTx, person: string, at: Date): Promise<void> => {
  await tx.db
    .update(sessions)
    .set({ endedAt: at })
    .where(and(eq(sessions.shopId, tx.shop), eq(sessions.personId, person), isNull(sessions.endedAt)));
};

/** Failed sign-ins in a row, locked so that parallel guesses count one after the other. */
export const lockSignInFailures = async (tx: ShopTx, person: string): Promise<{ count: number; waitUntil: Date }> => {
  await tx.db
    .insert(signInFailures)
    .values({ shopId: tx.shop, personId: person, count: 0, waitUntil: new Date(0) })
    .onConflictDoNothing();
  const rows = await tx.db
    .select()
    .from(signInFailures)
    .where(and(eq(signInFailures.shopId, tx.shop), eq(signInFailures.personId, person)))
    .for('update');
  return rows[0] ?? { count: 0, waitUntil: new Date(0) };
};

/** Sets the failures in a row and the moment until which to wait. */
export const saveSignInFailures = async (tx: ShopTx, person: string, count: number, waitUntil: Date): Promise<void> => {
  await tx.db
    .update(signInFailures)
    .set({ count, waitUntil })
    .where(and(eq(signInFailures.shopId, tx.shop), eq(signInFailures.personId, person)));
};
