import { and, asc, desc, eq, gt, inArray, lte, sql } from 'drizzle-orm';
import type { Role } from '@shared/people/roles';
import { people, personRoles, pins } from '@db/schema/people';
import type { ShopTx } from '../../tenancy/withShop';

/** A person as stored. */
export type PersonRecord = typeof people.$inferSelect;

/** What somebody was allowed at a cursor. */
export interface RolesAt {
  roles: Role[];
  state: 'active' | 'left';
}

const mine = (tx: ShopTx, id: string) => and(eq(people.shopId, tx.shop), eq(people.id, id));

/** A person of the shop, or null. */
export const findPerson = async (tx: ShopTx, id: string): Promise<PersonRecord | null> => {
  const rows = await tx.db.select().from(people).where(mine(tx, id));
  return rows[0] ?? null;
};

/** Everybody whose row changed after a cursor (0: everybody), by name. */
export const peopleSince = (tx: ShopTx, since: number): Promise<PersonRecord[]> =>
  tx.db
    .select()
    .from(people)
    .where(and(eq(people.shopId, tx.shop), gt(people.changed, since)))
    .orderBy(asc(people.name));

/** Names by id, left people too: records name them for ever. */
export const namesOf = async (tx: ShopTx): Promise<Record<string, string>> => {
  const rows = await tx.db.select({ id: people.id, name: people.name }).from(people).where(eq(people.shopId, tx.shop));
  return Object.fromEntries(rows.map((row) => [row.id, row.name]));
};

/** Every line of the role histories of these people, oldest first. */
export const roleHistories = async (
  tx: ShopTx,
  ids: string[],
): Promise<Map<string, (RolesAt & { since: number })[]>> => {
  const rows = await tx.db
    .select()
    .from(personRoles)
    .where(and(eq(personRoles.shopId, tx.shop), inArray(personRoles.personId, ids)))
    .orderBy(asc(personRoles.since));
  const histories = new Map<string, (RolesAt & { since: number })[]>();
  for (const { personId, since, roles, state } of rows) {
    histories.set(personId, [...(histories.get(personId) ?? []), { since, roles, state }]);
  }
  return histories;
};

/** The hash of a PIN: of one version, or with none given of the one in force. */
export const findPin = async (tx: ShopTx, person: string, version?: number) => {
  const rows = await tx.db
    .select()
    .from(pins)
    .where(
      and(
        eq(pins.shopId, tx.shop),
        eq(pins.personId, person),
        version === undefined ? undefined : lte(pins.version, version),
      ),
    )
    .orderBy(desc(pins.version))
    .limit(1);
  return rows[0] ?? null;
};

/** Stores a new version of somebody's PIN and puts it in force. */
export const insertPin = async (tx: ShopTx, person: string, hash: string, at: Date): Promise<number> => {
  const rows = await tx.db
    .update(people)
    .set({ pinVersion: sql`${people.pinVersion} + 1` })
    .where(mine(tx, person))
    .returning({ version: people.pinVersion });
  const version = rows[0]?.version ?? 1;
  await tx.db.insert(pins).values({ shopId: tx.shop, personId: person, version, hash, setAt: at });
  return version;
};

/** Marks somebody as gone. */
export const markPersonLeft = async (tx: ShopTx, id: string, at: Date): Promise<void> => {
  await tx.db.update(people).set({ state: 'left', leftAt: at }).where(mine(tx, id));
};
