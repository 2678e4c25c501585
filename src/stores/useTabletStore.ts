import { defineStore } from 'pinia';
import { computed, shallowRef } from 'vue';
import type {
  CatalogueJoint,
  CataloguePerson,
  CatalogueProcedure,
  CatalogueShop,
  CatalogueWrench,
} from '@shared/contracts/catalogue.contract';
import type { Confirmation, Order } from '@shared/contracts/confirmation.contract';
import type { JobRow } from '@shared/contracts/jobRow.contract';
import type { WalkRow } from '@shared/contracts/walkRow.contract';

/** What the office has told this tablet, as it is kept on it. */
export interface KnownCatalogue {
  cursor: number;
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

/** Name and id. */
export interface Named {
  id: string;
  name: string;
}

/** What a person must be told of this tablet's storage. */
export interface TabletTrouble {
  code: string | null;
  low: boolean;
  otherTab: boolean;
  givenWay: boolean;
}

const nothingKnown = (): KnownCatalogue => ({
  cursor: 0,
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

/** This tablet on the screen: who it is and what it knows. The truth is in its storage; here is its picture. */
export const useTabletStore = defineStore('tablet', () => {
  /** False until the storage was read once. */
  const ready = shallowRef(false);
  const tablet = shallowRef<Named | null>(null);
  const shop = shallowRef<Named | null>(null);
  const catalogue = shallowRef<KnownCatalogue>(nothingKnown());
  const trouble = shallowRef<TabletTrouble>({ code: null, low: false, otherTab: false, givenWay: false });
  const enrolled = computed(() => tablet.value !== null);
  return { ready, tablet, shop, catalogue, trouble, enrolled };
});
