import type { CatalogueWrench } from '@shared/contracts/catalogue.contract';
import type { WrenchRow } from '@shared/contracts/wrenches.contract';
import type { ShopTx } from '../../tenancy/withShop';
import { wrenchesSince, type WrenchRecord } from './wrenches.repository';

/** A stored wrench as tablets know it. */
export const toCatalogueWrench = ({ id, snapshot, state }: WrenchRecord): CatalogueWrench => ({ id, snapshot, state });

/** Every wrench, retired ones too. */
export const listCrib = async (tx: ShopTx): Promise<WrenchRow[]> =>
  (await wrenchesSince(tx, 0)).map((row) => ({ ...toCatalogueWrench(row), changedAt: row.changedAt.toISOString() }));
