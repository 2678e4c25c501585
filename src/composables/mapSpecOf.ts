import type { MapSpec } from '@shared/geometry/layout';
import type { ProcedureDocument } from '@shared/procedure/procedure';

/** The joint as its map is drawn. */
export const mapSpecOf = ({ map, holes }: ProcedureDocument): MapSpec => ({
  holes: holes.map(({ id, label, group, x, y }) => ({ id, label, group, x, y })),
  bores: map.bores,
  sides: map.sides,
  ...(map.outline ? { outline: map.outline } : {}),
});
