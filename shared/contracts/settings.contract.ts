import { z } from 'zod';

/** What a shop has decided for itself; stored whole with the shop and frozen into walks where it binds them. */
export const shopSettings = z.object({
  /** Unit in which limits and readings are also shown; a window keeps its author's unit. */
  units: z.object({
    torque: z.enum(['N.m', 'lbf.ft', 'lbf.in', 'kgf.m']),
    length: z.enum(['mm', 'in']),
    distance: z.enum(['km', 'mi']),
  }),
  /** J5: verdict by the limits, or with a guard band. */
  judgement: z.enum(['simple', 'guarded']),
  /** J5: verdict on the value as read, or on the corrected one. */
  judgedValue: z.enum(['asRead', 'corrected']),
  countersign: z.enum(['required', 'notRequired']),
  /** P2: may issue without countersignature; the proof's first sentence says so. */
  shopOfOne: z.boolean(),
  /** Days for which a tablet lets a person sign in without the server. */
  offlineSignInDays: z.number().int().min(1).max(60),
  paper: z.enum(['letter', 'a4']),
});
/** What a shop has decided for itself. */
export type ShopSettings = z.output<typeof shopSettings>;

/** Settings a new shop begins with. */
export const defaultShopSettings: ShopSettings = {
  units: { torque: 'N.m', length: 'mm', distance: 'km' },
  judgement: 'simple',
  judgedValue: 'asRead',
  countersign: 'required',
  shopOfOne: false,
  offlineSignInDays: 14,
  paper: 'a4',
};
