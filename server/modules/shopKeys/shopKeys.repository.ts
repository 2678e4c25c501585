import { eq } from 'drizzle-orm';
import { DEMO_SECRET, openPrivateJwk, sealPrivateJwk } from '@db/shopKeySeal';
import { shopKeys } from '@db/schema/shopKeys';
import type { PublicJwk } from '@shared/record/crypto';
import type { Config } from '../../config';
import type { ShopTx } from '../../tenancy/withShop';

/** A key of a shop; `privateJwk` is null where no secret of this server opens it. */
export interface ShopKey {
  kid: string;
  purpose: 'signing' | 'sealing';
  state: 'active' | 'retired';
  publicJwk: PublicJwk;
  privateJwk: Record<string, string> | null;
}

const secretsOf = (config: Config): string[] => (config.demo ? [config.appSecret, DEMO_SECRET] : [config.appSecret]);

/** Every key of the shop, retired ones too, with the private parts opened. */
export const loadShopKeys = async (tx: ShopTx, config: Config): Promise<ShopKey[]> => {
  const rows = await tx.db.select().from(shopKeys).where(eq(shopKeys.shopId, tx.shop)).orderBy(shopKeys.createdAt);
  return rows.map(({ kid, purpose, state, publicJwk, privateSealed }) => ({
    kid,
    purpose,
    state,
    publicJwk,
    privateJwk: openPrivateJwk(privateSealed, secretsOf(config), tx.shop, kid),
  }));
};

/** Stores a new key, its private part sealed to this server's secret. */
export const insertShopKey = async (
  tx: ShopTx,
  config: Config,
  key: { kid: string; purpose: 'signing' | 'sealing'; publicJwk: PublicJwk; privateJwk: object },
): Promise<void> => {
  const privateSealed = sealPrivateJwk(key.privateJwk, config.appSecret, tx.shop, key.kid);
  const { kid, purpose, publicJwk } = key;
  await tx.db.insert(shopKeys).values({ shopId: tx.shop, kid, purpose, publicJwk, privateSealed });
};
