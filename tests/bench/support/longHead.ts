import type { Hole, ProcedureDocument } from '@shared/procedure/procedure';
import { headD6 } from '../../../db/seed/procedures/headD6';

const COLUMNS = 25;
const PITCH = 104;

/** The demo's head with 50 bolts instead of 14: one walk of it fills a batch of 500 events. */
export const longHead = (): ProcedureDocument => {
  const holes: Hole[] = [0, 160].flatMap((y, row) =>
    Array.from({ length: COLUMNS }, (_, column) => {
      const number = row * COLUMNS + column + 1;
      return { id: `h${number}`, label: `${number}`, x: column * PITCH, y, group: 'A', fastener: 'headBolt' };
    }),
  );
  const order = holes.map(({ id }) => id);
  const passes = headD6.passes.map((pass) => ({ ...pass, order }));
  return { ...headD6, code: 'HEAD-LONG', title: 'Cylinder head with 50 bolts', holes, passes };
};
