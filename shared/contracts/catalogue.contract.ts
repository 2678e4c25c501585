import { z } from 'zod';
import type { WrenchSnapshot } from '../crib/wrench';
import type { ProcedureDocument } from '../procedure/procedure';
import { id, moment, namedJwk, role, sha256 } from './common.contract';
import { confirmation, order } from './confirmation.contract';
import { defineEndpoint } from './defineEndpoint';
import { jobRow, jointRow } from './jobRow.contract';
import { shopSettings } from './settings.contract';
import { walkRow } from './walkRow.contract';

/** A person as tablets know them: no e-mail, no hash. `left` people are told so that tiles go and PINs are dropped. */
export const cataloguePerson = z.object({
  id,
  name: z.string(),
  roles: z.array(role),
  state: z.enum(['active', 'left']),
  /** 0: no PIN set. A tablet forgets what it knows of an older version. */
  pinVersion: z.number().int(),
});
/** A person as tablets know them. */
export type CataloguePerson = z.output<typeof cataloguePerson>;

/** A wrench with its latest evaluated calibration, as frozen into `wrench.taken`. */
export const catalogueWrench = z.object({
  id,
  snapshot: z.custom<WrenchSnapshot>((value) => typeof value === 'object' && value !== null),
  state: z.enum(['inService', 'quarantined', 'away', 'retired']),
});
/** A wrench of the crib. */
export type CatalogueWrench = z.output<typeof catalogueWrench>;

/** A revision that may be walked (or was, when `state` is `superseded` or `withdrawn`). */
export const catalogueProcedure = z.object({
  code: z.string(),
  revision: z.number().int(),
  hash: sha256,
  state: z.enum(['approved', 'superseded', 'withdrawn']),
  approvedAt: moment,
  document: z.custom<ProcedureDocument>((value) => typeof value === 'object' && value !== null),
});
/** A revision that may be walked. */
export type CatalogueProcedure = z.output<typeof catalogueProcedure>;

/** What earlier walks left on a joint (W1): copied into `walk.opened.earlier`. */
export const catalogueJoint = jointRow.extend({
  earlier: z.object({ readingsTaken: z.boolean(), usedHoles: z.array(z.string()) }),
});
/** A joint with what earlier walks left on it. */
export type CatalogueJoint = z.output<typeof catalogueJoint>;

/** The shop itself: its settings and public keys. */
export const catalogueShop = z.object({
  id,
  name: z.string(),
  timeZone: z.string(),
  settings: shopSettings,
  signingKeys: z.array(namedJwk),
  sealingKey: namedJwk,
});
/** The shop itself. */
export type CatalogueShop = z.output<typeof catalogueShop>;

/**
 * Everything that changed after `since`: rows replace rows of the same id, rows are retired and never missing. Walks
 * are those not finished, and those changed since; confirmations and orders those of the tablet's shop.
 */
export const catalogueAnswer = z.object({
  cursor: z.number().int(),
  epoch: z.string(),
  /** The whole catalogue: forget what was kept (first time, other epoch, cursor from the future). */
  full: z.boolean(),
  /** The server's clock, for a warning when the tablet's differs (fault 10). */
  now: moment,
  settings: catalogueShop.nullable(),
  people: z.array(cataloguePerson),
  wrenches: z.array(catalogueWrench),
  procedures: z.array(catalogueProcedure),
  jobs: z.array(jobRow),
  joints: z.array(catalogueJoint),
  walks: z.array(walkRow),
  orders: z.array(order),
  confirmations: z.array(confirmation),
});
/** Everything that changed after a cursor. */
export type CatalogueAnswer = z.output<typeof catalogueAnswer>;

/** `since` 0 (or no epoch) asks for everything. */
export const catalogue = defineEndpoint({
  method: 'GET',
  path: '/api/tablet/catalogue',
  auth: 'tablet',
  query: z.object({ since: z.coerce.number().int().min(0).default(0), epoch: z.string().max(64).default('') }),
  responses: { 200: catalogueAnswer },
});
