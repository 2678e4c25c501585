import { z } from 'zod';
import { catalogueWrench } from './catalogue.contract';
import { moment } from './common.contract';
import { defineEndpoint } from './defineEndpoint';

/** A wrench of the crib and when it was last changed. */
export const wrenchRow = catalogueWrench.extend({ changedAt: moment });
/** A wrench of the crib. */
export type WrenchRow = z.output<typeof wrenchRow>;

/** Every wrench, retired ones too. */
export const listWrenches = defineEndpoint({
  method: 'GET',
  path: '/api/wrenches',
  auth: 'office',
  right: 'see',
  responses: { 200: z.object({ wrenches: z.array(wrenchRow) }) },
});
