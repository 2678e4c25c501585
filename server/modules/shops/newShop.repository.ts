import { people } from '@db/schema/people';
import { shops } from '@db/schema/shops';
import { defaultShopSettings } from '@shared/contracts/settings.contract';
import type { Role } from '@shared/people/roles';
import type { ShopTx } from '../../tenancy/withShop';

/** Stores the shop of this transaction, with the settings that every shop begins with. */
export const insertShop = async (
  tx: ShopTx,
  shop: { name: string; prefix: string; timeZone: string },
): Promise<void> => {
  await tx.db.insert(shops).values({ id: tx.shop, ...shop, settings: defaultShopSettings });
};

/** Stores somebody who signs in at the office. */
export const insertPerson = async (
  tx: ShopTx,
  person: { id: string; name: string; email: string; passwordHash: string; roles: Role[] },
): Promise<void> => {
  await tx.db.insert(people).values({ shopId: tx.shop, ...person });
};
