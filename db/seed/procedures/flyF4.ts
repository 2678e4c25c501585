import { star } from '@shared/sequence/star';
import type { Hole, ProcedureDocument } from '@shared/procedure/procedure';
import { holeSteps, inventedManual, oneFastener, windowOf } from './shorthand';

const BOLTS = 8;
const RADIUS = 42;

/** Numbered clockwise from the top, as the figure has them; tenths of a millimetre are near enough for a map. */
const holes: Hole[] = Array.from({ length: BOLTS }, (_, index) => {
  const angle = (index * 2 * Math.PI) / BOLTS;
  const round = (value: number): number => Math.round(value * 10) / 10;
  const label = `${index + 1}`;
  return {
    id: `h${label}`,
    label,
    x: round(RADIUS * Math.sin(angle)),
    y: round(-RADIUS * Math.cos(angle)),
    group: 'A',
    fastener: 'flyBolt',
  };
});

const order = star(BOLTS).map((label) => `h${label}`);
const rework = oneFastener('96');

/** Flywheel of the invented Farrow F4: eight coated bolts crosswise, used from their first tightening on. */
export const flyF4: ProcedureDocument = {
  schema: 1,
  code: 'FLY-F4',
  title: 'Flywheel, Farrow F4 2.2',
  engine: 'Farrow F4 2.2',
  component: 'Flywheel',
  source: inventedManual('Farrow F4', '96'),
  toleranceIsShops: true,
  map: { sides: { top: 'dowel' }, bores: [{ x: 0, y: 0, r: 22, label: '' }], outline: 'round' },
  groups: [{ id: 'A', name: 'flywheel bolts' }],
  holes,
  fasteners: [
    {
      id: 'flyBolt',
      name: 'Flywheel bolt FF4-FB10, coated',
      kind: 'capScrew',
      thread: 'M10 × 1',
      propertyClass: '12.9',
      hand: 'right',
      reuse: { kind: 'singleUse', usedFrom: 'p1/s1' },
      lubricant: null,
    },
  ],
  parts: [],
  passes: [
    {
      id: 'p1',
      name: '30 N·m',
      order,
      rework,
      stages: [{ id: 's1', kind: 'torque', windows: { A: windowOf('30', '28', '32', 'N.m') } }],
    },
    {
      id: 'p2',
      name: '75 N·m',
      order,
      rework,
      finishWithinMinutes: 20,
      stages: [{ id: 's1', kind: 'torque', windows: { A: windowOf('75', '71', '79', 'N.m') } }],
    },
  ],
  steps: [
    {
      id: 'faceClean',
      place: { at: 'beforeJoint' },
      kind: 'do',
      text: 'Crank flange and flywheel face free of oil, dowel in',
    },
    ...holeSteps(null),
  ],
};
