import type {
  CatalogueAnswer,
  CatalogueJoint,
  CataloguePerson,
  CatalogueProcedure,
  CatalogueShop,
  CatalogueWrench,
} from '@shared/contracts/catalogue.contract';
import type { Confirmation, Order } from '@shared/contracts/confirmation.contract';
import type { JobRow } from '@shared/contracts/jobRow.contract';
import type { WalkRow } from '@shared/contracts/walkRow.contract';
import type { Settings } from './settings';
import type { TabletClock } from './tabletClock';

/** What the office has told this tablet, whole. Rows by id; procedures by fingerprint; confirmations by walk. */
export interface Catalogue {
  cursor: number;
  epoch: string;
  shop: CatalogueShop | null;
  people: Record<string, CataloguePerson>;
  wrenches: Record<string, CatalogueWrench>;
  procedures: Record<string, CatalogueProcedure>;
  jobs: Record<string, JobRow>;
  joints: Record<string, CatalogueJoint>;
  walks: Record<string, WalkRow>;
  orders: Record<string, Order>;
  confirmations: Record<string, Confirmation[]>;
}

/** A tablet that has heard nothing yet. */
export const emptyCatalogue = (): Catalogue => ({
  cursor: 0,
  epoch: '',
  shop: null,
  people: {},
  wrenches: {},
  procedures: {},
  jobs: {},
  joints: {},
  walks: {},
  orders: {},
  confirmations: {},
});

const over = <T>(rows: Record<string, T>, changed: readonly T[], key: (row: T) => string): Record<string, T> => ({
  ...rows,
  ...Object.fromEntries(changed.map((row) => [key(row), row])),
});

const byId = (row: { id: string }): string => row.id;

/** Adds confirmations; one that is there already (its signature is the same) stays once, the latest stand last. */
export function withConfirmations(
  kept: Record<string, Confirmation[]>,
  news: readonly Confirmation[],
): Record<string, Confirmation[]> {
  const after = { ...kept };
  for (const one of news) {
    const others = (after[one.walk] ?? []).filter((old) => old.jws !== one.jws);
    after[one.walk] = [...others, one].sort((a, b) => (a.at < b.at ? -1 : a.at > b.at ? 1 : 0));
  }
  return after;
}

/** What is known after an answer: a full one replaces everything, another adds to what is there. Pure. */
export function mergeCatalogue(kept: Catalogue, answer: CatalogueAnswer): Catalogue {
  const base = answer.full ? emptyCatalogue() : kept;
  return {
    cursor: answer.cursor,
    epoch: answer.epoch,
    shop: answer.settings ?? base.shop,
    people: over(base.people, answer.people, byId),
    wrenches: over(base.wrenches, answer.wrenches, byId),
    procedures: over(base.procedures, answer.procedures, (row) => row.hash),
    jobs: over(base.jobs, answer.jobs, byId),
    joints: over(base.joints, answer.joints, byId),
    walks: over(base.walks, answer.walks, byId),
    orders: over(base.orders, answer.orders, byId),
    confirmations: withConfirmations(base.confirmations, answer.confirmations),
  };
}

/**
 * Saves an answer whole, in one transaction. An answer that is older than what is kept (two requests crossed) changes
 * nothing, unless it is a full one.
 */
export async function applyCatalogue(
  settings: Settings,
  clock: TabletClock,
  answer: CatalogueAnswer,
): Promise<Catalogue> {
  const catalogue = await settings.update('catalogue', (kept = emptyCatalogue()) => {
    const otherEpoch = kept.epoch !== '' && kept.epoch !== answer.epoch;
    const isOlder = !answer.full && (otherEpoch || answer.cursor < kept.cursor);
    return isOlder ? kept : mergeCatalogue(kept, answer);
  });
  await noteContact(settings, clock, Date.parse(answer.now));
  return catalogue;
}

/** Writes down that the server was heard and what its clock said (decision 10, fault 10). */
export async function noteContact(settings: Settings, clock: TabletClock, serverNow: number): Promise<void> {
  const now = clock.now();
  await settings.update('clock', () => ({
    lastContact: now,
    // A contact sets the record straight: a clock that ran ahead and was put right must not lock people out.
    latestSeen: now,
    serverOffset: Number.isFinite(serverNow) ? serverNow - now : 0,
  }));
}

/** Saves confirmations that came with a receipt. */
export const keepConfirmations = (settings: Settings, news: readonly Confirmation[]): Promise<Catalogue> =>
  settings.update('catalogue', (kept = emptyCatalogue()) => ({
    ...kept,
    confirmations: withConfirmations(kept.confirmations, news),
  }));
