import type { Hole, ProcedureDocument } from '@shared/procedure/procedure';
import { holeSteps, inventedManual, windowOf } from './shorthand';

const PITCH = 104;

const holes: Hole[] = Array.from({ length: 6 }, (_, rod) =>
  [0, 1].map((side) => {
    const label = `${rod * 2 + side + 1}`;
    return { id: `h${label}`, label, x: rod * PITCH, y: side * 74, group: 'A', fastener: 'rodBolt' };
  }),
).flat();

/** Rod caps of the invented Ossery D6: at each bolt the torque and the turn, before the next bolt. */
export const rodD6: ProcedureDocument = {
  schema: 1,
  code: 'ROD-D6',
  title: 'Rod caps, Ossery D6 3.8',
  engine: 'Ossery D6 3.8',
  component: 'Rod caps',
  source: inventedManual('Ossery D6', '156'),
  toleranceIsShops: false,
  map: {
    sides: { top: 'cam side', left: 'front' },
    bores: Array.from({ length: 6 }, (_, rod) => ({ x: rod * PITCH, y: 37, r: 24, label: `rod ${rod + 1}` })),
    outline: 'rectangle',
  },
  groups: [{ id: 'A', name: 'rod bolts' }],
  holes,
  fasteners: [
    {
      id: 'rodBolt',
      name: 'Rod bolt OD6-RB9',
      kind: 'bolt',
      thread: 'M9 × 1',
      propertyClass: '12.9',
      hand: 'right',
      reuse: { kind: 'singleUse' },
      lubricant: { what: 'clean engine oil', where: ['thread', 'underHead'] },
    },
  ],
  parts: [],
  passes: [
    {
      id: 'p1',
      name: '20 N·m and turn 90°',
      order: holes.map(({ id }) => id),
      rework: { allows: 'oneFastener', cite: 'manualSilent' },
      stages: [
        { id: 's1', kind: 'torque', windows: { A: windowOf('20', '19', '21', 'N.m') } },
        {
          id: 's2',
          kind: 'turn',
          windows: { A: windowOf('90', '85', '95', 'deg') },
          endTorque: {
            use: 'required',
            windows: { A: windowOf('62', '48', '76', 'N.m') },
          },
          monitor: { A: { low: '48', high: '76', unit: 'N.m' } },
        },
      ],
    },
  ],
  steps: [
    {
      id: 'capsMatch',
      place: { at: 'beforeJoint' },
      kind: 'look',
      text: 'Each cap on its own rod, marks on one side',
    },
    ...holeSteps('Bolt oiled on thread and under its head'),
    {
      id: 'sidePlay',
      place: { at: 'afterJoint' },
      kind: 'measure',
      text: 'Smallest side play of the six rods',
      window: windowOf('0.25', '0.15', '0.35', 'mm'),
    },
  ],
};
