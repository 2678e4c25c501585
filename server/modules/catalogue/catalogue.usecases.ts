import type { CatalogueAnswer, CatalogueProcedure, CatalogueShop } from '@shared/contracts/catalogue.contract';
import type { Deps } from '../../deps';
import { notFound } from '../../http/errors';
import type { ShopTx } from '../../tenancy/withShop';
import { ordersSince } from '../countersign/orders.repository';
import { toOrder } from '../countersign/orders.mapping';
import { toJobRow, toJointRow } from '../jobs/jobs.mapping';
import { jobsSince, jointsSince } from '../jobs/jobs.repository';
import { peopleSince } from '../people/people.repository';
import { toCataloguePerson } from '../people/people.usecases';
import { revisionsSince } from '../procedures/procedures.repository';
import { catalogueCursor, findShop, type ShopRecord } from '../shops/shops.repository';
import { toConfirmation } from '../sync/confirmSeal';
import { confirmationsSince } from '../sync/seals.repository';
import { toWalkRow } from '../walks/walks.mapping';
import { walksForTablets, walksOfJoints } from '../walks/walks.repository';
import { wrenchesSince } from '../wrenches/wrenches.repository';
import { toCatalogueWrench } from '../wrenches/wrenches.usecases';

const shopFor = async (deps: Deps, tx: ShopTx, shop: ShopRecord): Promise<CatalogueShop> => {
  const { signingKeys, sealingKey } = await deps.keyring(tx);
  const { id, name, timeZone, settings } = shop;
  return { id, name, timeZone, settings, signingKeys, sealingKey };
};

const procedureRows = async (tx: ShopTx, since: number): Promise<CatalogueProcedure[]> =>
  (await revisionsSince(tx, since)).flatMap(({ code, revision: row }) =>
    row.state === 'draft'
      ? []
      : [
          {
            code,
            revision: row.revision,
            hash: row.hash,
            state: row.state,
            approvedAt: (row.approvedAt ?? row.writtenAt).toISOString(),
            document: row.document,
          },
        ],
  );

/** Days for which a finished walk stays on tablets (decision 8). */
const WALK_DAYS = 60;

const walkRows = async (deps: Deps, tx: ShopTx, since: number) => {
  const changedAfter = new Date(deps.clock.now().getTime() - WALK_DAYS * 24 * 3_600_000);
  const rows = await walksForTablets(tx, since, changedAfter);
  const siblings = await walksOfJoints(tx, [...new Set(rows.map(({ jointId }) => jointId))]);
  return rows.map((row) => toWalkRow(row, siblings.get(row.jointId)));
};

const rowsSince = async (deps: Deps, tx: ShopTx, since: number) => ({
  people: (await peopleSince(tx, since)).map(toCataloguePerson),
  wrenches: (await wrenchesSince(tx, since)).map(toCatalogueWrench),
  procedures: await procedureRows(tx, since),
  jobs: (await jobsSince(tx, since)).map(toJobRow),
  joints: (await jointsSince(tx, since)).map((row) => ({ ...toJointRow(row), earlier: row.earlier })),
  walks: await walkRows(deps, tx, since),
  orders: (await ordersSince(tx, since)).map(toOrder),
  confirmations: (await confirmationsSince(tx, since)).map(toConfirmation),
});

/**
 * Everything that changed after a cursor. The cursor is read first: a row committed meanwhile comes twice rather than
 * never. Another epoch (a restored backup) or a cursor from the future begins anew (decision 9).
 */
export const readCatalogue = async (
  deps: Deps,
  tx: ShopTx,
  asked: { since: number; epoch: string },
): Promise<CatalogueAnswer> => {
  const cursor = await catalogueCursor(tx);
  const shop = await findShop(tx);
  if (!shop) throw notFound('shop.unknown', 'There is no such shop.');
  const full = asked.epoch !== shop.epoch || asked.since > cursor || asked.since === 0;
  const since = full ? 0 : asked.since;
  return {
    cursor,
    epoch: shop.epoch,
    full,
    now: deps.clock.now().toISOString(),
    settings: shop.changed > since ? await shopFor(deps, tx, shop) : null,
    ...(await rowsSince(deps, tx, since)),
  };
};
