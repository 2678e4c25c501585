import type { Hole, Pass, ProcedureDocument } from '@shared/procedure/procedure';
import { holeSteps, inventedManual, oneFastener, windowOf } from './shorthand';

const PITCH = 104;
const ROWS = [
  { y: 0, labels: ['12', '8', '4', '1', '5', '9', '13'] },
  { y: 160, labels: ['11', '7', '3', '2', '6', '10', '14'] },
];

const holes: Hole[] = ROWS.flatMap(({ y, labels }) =>
  labels.map((label, column) => ({
    id: `h${label}`,
    label,
    x: column * PITCH,
    y,
    group: 'A',
    fastener: 'headBolt',
  })),
);

const order = Array.from({ length: 14 }, (_, index) => `h${index + 1}`);
const rework = oneFastener('212');
const quarterTurn = { A: windowOf('90', '85', '95', 'deg') };

const passes: Pass[] = [
  {
    id: 'p1',
    name: '30 N·m',
    order,
    rework,
    stages: [{ id: 's1', kind: 'torque', windows: { A: windowOf('30', '28.5', '31.5', 'N.m') } }],
  },
  {
    id: 'p2',
    name: '60 N·m',
    order,
    rework,
    stages: [{ id: 's1', kind: 'torque', windows: { A: windowOf('60', '57', '63', 'N.m') } }],
  },
  {
    id: 'p3',
    name: 'turn 90°',
    order,
    rework,
    stages: [
      {
        id: 's1',
        kind: 'turn',
        windows: quarterTurn,
        endTorque: { use: 'unused' },
        monitor: { A: { low: '105', high: '140', unit: 'N.m' } },
      },
    ],
  },
  {
    id: 'p4',
    name: 'turn 90°',
    order,
    rework,
    stages: [
      {
        id: 's1',
        kind: 'turn',
        windows: quarterTurn,
        endTorque: { use: 'wanted' },
        monitor: { A: { low: '135', high: '175', unit: 'N.m' } },
      },
    ],
  },
];

/** Cylinder head of the invented Ossery D6, an inline six: 14 stretch bolts, two torques, two quarter turns. */
export const headD6: ProcedureDocument = {
  schema: 1,
  code: 'HEAD-D6',
  title: 'Cylinder head, Ossery D6 3.8',
  engine: 'Ossery D6 3.8',
  component: 'Cylinder head',
  source: inventedManual('Ossery D6', '212'),
  toleranceIsShops: true,
  map: {
    sides: { top: 'intake side', bottom: 'exhaust side', left: 'front' },
    bores: Array.from({ length: 6 }, (_, index) => ({
      x: PITCH / 2 + index * PITCH,
      y: 80,
      r: 47,
      label: `cyl ${index + 1}`,
    })),
    outline: 'rectangle',
  },
  groups: [{ id: 'A', name: 'head bolts' }],
  holes,
  fasteners: [
    {
      id: 'headBolt',
      name: 'Head bolt OD6-HB14',
      kind: 'bolt',
      thread: 'M11 × 1.5',
      propertyClass: '10.9',
      hand: 'right',
      reuse: { kind: 'singleUse', usedFrom: 'p3/s1' },
      lubricant: { what: 'clean engine oil', where: ['thread', 'underHead'] },
    },
  ],
  parts: [{ id: 'gasket', name: 'Head gasket OD6-HG2', count: 1, renewedOnRestart: true }],
  passes,
  steps: [
    { id: 'deckClean', place: { at: 'beforeJoint' }, kind: 'do', text: 'Block deck and head face clean, flat and dry' },
    {
      id: 'gasketWay',
      place: { at: 'beforeJoint' },
      kind: 'look',
      text: 'Gasket the right way up: part number towards the head, hole over the oil gallery at the front',
    },
    ...holeSteps('Bolt oiled on thread and under its head; no oil in the hole'),
    {
      id: 'stripes',
      place: { at: 'afterPass', pass: 'p2' },
      kind: 'do',
      text: 'Paint a stripe from each head to the casting',
      paintsStripes: true,
    },
  ],
};
