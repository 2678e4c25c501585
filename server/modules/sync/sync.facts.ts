import type { ShopSettings } from '@shared/contracts/settings.contract';
import type { WrenchSnapshot } from '@shared/crib/wrench';
import type { WalkEvent } from '@shared/walk/events';
import type { ShopTx } from '../../tenancy/withShop';
import { roleHistories, type RolesAt } from '../people/people.repository';
import { catalogueCursor, settingsAt, wasEverShopOfOne } from '../shops/shops.repository';
import { wrenchHistories } from '../wrenches/wrenches.repository';
import { ordersByIds, type OrderRecord } from '../countersign/orders.repository';
import { findJoint, findRevisionByHash, type JointFacts, type RevisionFacts } from './openedFacts.repository';

/** What the shop knew at an event's cursor and what it knows now: all that the rules cannot see in the chain. */
export interface Facts {
  cursor: number;
  /** Null: this shop has no such person. */
  rolesAt(person: string, known: number): RolesAt | null;
  hasLeft(person: string): boolean;
  /** Undefined: no such wrench. Null: it was not in the crib yet at that cursor. */
  wrenchAt(wrench: string, known: number): WrenchSnapshot | null | undefined;
  order(id: string): OrderRecord | undefined;
  /** Only where the batch opens the walk. */
  opening: Opening | null;
}

/** What `walk.opened` is held against. */
export interface Opening {
  joint: JointFacts | null;
  revision: RevisionFacts | null;
  settings: ShopSettings | null;
  everShopOfOne: boolean;
}

/** Everybody an event names. */
export const personsOf = (event: WalkEvent): string[] => {
  if (event.type === 'walk.opened' || event.type === 'hands.changed') {
    return [event.by, event.data.pulls, event.data.records];
  }
  if (event.type === 'wrench.taken' && event.data.override) return [event.by, event.data.override.by];
  return [event.by];
};

/** The order from the office that an event says it obeys. */
export const orderOf = (event: WalkEvent): string | null =>
  'order' in event.data && typeof event.data.order === 'string' ? event.data.order : null;

const atCursor = <T extends { since: number }>(history: T[] | undefined, known: number): T | null =>
  history?.findLast((line) => line.since <= known) ?? null;

const openingFacts = async (tx: ShopTx, events: readonly WalkEvent[]): Promise<Opening | null> => {
  const [first] = events;
  if (first?.type !== 'walk.opened') return null;
  const { job, joint, procedure } = first.data;
  return {
    joint: await findJoint(tx, job, joint),
    revision: await findRevisionByHash(tx, procedure),
    settings: await settingsAt(tx, first.known),
    everShopOfOne: first.data.policy.shopOfOne && (await wasEverShopOfOne(tx)),
  };
};

/** Gathers the facts about a batch in a handful of queries, whatever its length. The events must have their shape. */
export const loadFacts = async (tx: ShopTx, events: readonly WalkEvent[]): Promise<Facts> => {
  const people = await roleHistories(tx, [...new Set(events.flatMap(personsOf))]);
  const taken = events.flatMap((event) => (event.type === 'wrench.taken' ? [event.data.wrench.id] : []));
  const wrenches = await wrenchHistories(tx, [...new Set(taken)]);
  const orders = await ordersByIds(tx, [...new Set(events.map(orderOf).filter((id) => id !== null))]);
  return {
    cursor: await catalogueCursor(tx),
    // Before their first line somebody counts as they were on it: a cursor of 0 comes from a tablet never refreshed.
    rolesAt: (person, known) => atCursor(people.get(person), known) ?? people.get(person)?.[0] ?? null,
    hasLeft: (person) => people.get(person)?.at(-1)?.state === 'left',
    wrenchAt: (wrench, known) =>
      wrenches.has(wrench) ? (atCursor(wrenches.get(wrench), known)?.snapshot ?? null) : undefined,
    order: (id) => orders.get(id),
    opening: await openingFacts(tx, events),
  };
};
