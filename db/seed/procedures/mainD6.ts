import type { Hole, HoleId, Pass, ProcedureDocument } from '@shared/procedure/procedure';
import { holeSteps, inventedManual, oneFastener, windowOf } from './shorthand';

const PITCH = 104;
/** Caps from the middle outward; the front cap is 1. */
const CAPS_FROM_MIDDLE = [4, 3, 5, 2, 6, 1, 7];
const ROWS = [
  { group: 'A', fastener: 'inner', across: 40, first: 1, prefix: '' },
  { group: 'B', fastener: 'outer', across: 74, first: 15, prefix: '' },
  { group: 'C', fastener: 'side', across: 118, first: 1, prefix: 'S' },
] as const;

/** Two holes a cap, across from each other: numbered in the order in which they are tightened. */
const holesOf = ({ group, fastener, across, first, prefix }: (typeof ROWS)[number]): Hole[] =>
  CAPS_FROM_MIDDLE.flatMap((cap, place) =>
    [-across, across].map((y, side) => {
      const label = `${prefix}${first + place * 2 + side}`;
      return { id: `h${label}`, label, x: (cap - 1) * PITCH, y, group, fastener };
    }),
  );

const [inner, outer, side] = ROWS.map(holesOf) as [Hole[], Hole[], Hole[]];
const ids = (holes: Hole[]): HoleId[] => holes.map(({ id }) => id);
const mainOrder = [...ids(inner), ...ids(outer)];
const seating = windowOf('25', '23.5', '26.5', 'N.m');
const rework = oneFastener('148');

const passes: Pass[] = [
  {
    id: 'p1',
    name: '25 N·m',
    order: mainOrder,
    rework,
    stages: [{ id: 's1', kind: 'torque', windows: { A: seating, B: seating } }],
  },
  {
    id: 'p2',
    name: 'turn 90° and 60°',
    order: mainOrder,
    rework,
    stages: [
      {
        id: 's1',
        kind: 'turn',
        windows: { A: windowOf('90', '86', '94', 'deg'), B: windowOf('60', '56', '64', 'deg') },
        endTorque: { use: 'wanted' },
        monitor: { A: { low: '85', high: '125', unit: 'N.m' }, B: { low: '50', high: '80', unit: 'N.m' } },
      },
    ],
  },
  {
    id: 'p3',
    name: 'side bolts 22 N·m',
    order: ids(side),
    rework,
    stages: [{ id: 's1', kind: 'torque', windows: { C: windowOf('22', '20.5', '23.5', 'N.m') } }],
  },
];

const oiled = { what: 'clean engine oil', where: ['thread', 'underHead'] as ('thread' | 'underHead')[] };

/** Main caps of the invented Ossery D6: seven caps, one seating torque, other turns inside and outside, then the sides. */
export const mainD6: ProcedureDocument = {
  schema: 1,
  code: 'MAIN-D6',
  title: 'Main caps, Ossery D6 3.8',
  engine: 'Ossery D6 3.8',
  component: 'Main caps',
  source: inventedManual('Ossery D6', '148'),
  toleranceIsShops: false,
  map: {
    sides: { top: 'oil filter side', bottom: 'starter side', left: 'front' },
    bores: Array.from({ length: 7 }, (_, index) => ({ x: index * PITCH, y: 0, r: 30, label: `cap ${index + 1}` })),
    outline: 'rectangle',
  },
  groups: [
    { id: 'A', name: 'inner' },
    { id: 'B', name: 'outer' },
    { id: 'C', name: 'side' },
  ],
  holes: [...inner, ...outer, ...side],
  fasteners: [
    {
      id: 'inner',
      name: 'Cap bolt OD6-MB12',
      kind: 'bolt',
      thread: 'M12 × 1.75',
      propertyClass: '10.9',
      hand: 'right',
      reuse: { kind: 'singleUse' },
      lubricant: oiled,
    },
    {
      id: 'outer',
      name: 'Cap bolt OD6-MB10',
      kind: 'bolt',
      thread: 'M10 × 1.5',
      propertyClass: '10.9',
      hand: 'right',
      reuse: { kind: 'singleUse' },
      lubricant: oiled,
    },
    {
      id: 'side',
      name: 'Side bolt OD6-SB8',
      kind: 'bolt',
      thread: 'M8 × 1.25',
      propertyClass: '8.8',
      hand: 'right',
      reuse: { kind: 'reusable' },
      lubricant: null,
    },
  ],
  parts: [],
  passes,
  steps: [
    {
      id: 'capsInPlace',
      place: { at: 'beforeJoint' },
      kind: 'look',
      text: 'Each cap on its own seat, number and arrow towards the front, shells dry behind and oiled in front',
    },
    ...holeSteps('Bolt oiled on thread and under its head; no oil in the hole').map((step) =>
      step.id === 'oiled' ? { ...step, place: { at: 'beforeHole' as const, groups: ['A', 'B'] } } : step,
    ),
    {
      id: 'crankTurns',
      place: { at: 'afterPass', pass: 'p2' },
      kind: 'do',
      text: 'Crankshaft turns freely by hand',
    },
  ],
};
