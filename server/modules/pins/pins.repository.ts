import { and, eq } from 'drizzle-orm';
import { pinFailures } from '@db/schema/failures';
import type { ShopTx } from '../../tenancy/withShop';

/** Wrong PINs in a row. */
export interface PinFailures {
  count: number;
  waitUntil: Date;
}

const mine = (tx: ShopTx, person: string, place: string) =>
  and(eq(pinFailures.shopId, tx.shop), eq(pinFailures.personId, person), eq(pinFailures.place, place));

/** Wrong PINs in a row of one person at one place, locked so that parallel guesses count one after the other. */
export const lockPinFailures = async (tx: ShopTx, person: string, place: string): Promise<PinFailures> => {
  await tx.db
    .insert(pinFailures)
    .values({ shopId: tx.shop, personId: person, place, count: 0, waitUntil: new Date(0) })
    .onConflictDoNothing();
  const rows = await tx.db
    .select()
    .from(pinFailures)
    .where(mine(tx, person, place))
    .for('update');
  return rows[0] ?? { count: 0, waitUntil: new Date(0) };
};

/** Sets the wrong PINs in a row and the moment until which to wait. */
export const savePinFailures = async (tx: ShopTx, person: string, place: string, next: PinFailures): Promise<void> => {
  await tx.db
    .update(pinFailures)
    .set(next)
    .where(mine(tx, person, place));
};
