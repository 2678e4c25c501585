import type { Hole, Pass, ProcedureDocument, Step } from '@shared/procedure/procedure';
import type { Window } from '@shared/quantity/window';

/*
 * Small joints for tests of rules: every kind of stage, few holes, invented values.
 */

const torque = (target: string, low: string, high: string): Window => ({ target, low, high, unit: 'N.m' });
const degrees = (target: string, low: string, high: string): Window => ({ target, low, high, unit: 'deg' });

const holes = (count: number): Hole[] =>
  Array.from({ length: count }, (_, index) => ({
    id: `h${index + 1}`,
    label: `${index + 1}`,
    x: index * 50,
    y: 0,
    group: index % 2 === 0 ? 'A' : 'B',
    fastener: 'bolt',
  }));

const both = (window: Window): Record<string, Window> => ({ A: window, B: window });

const oneFastener: Pass['rework'] = { allows: 'oneFastener', cite: { page: '7' } };
const runsIn: Step = { id: 'runsIn', place: { at: 'beforeHole' }, kind: 'do', text: 'Runs in by hand' };

const base = (code: string, count: number): ProcedureDocument => ({
  schema: 1,
  code,
  title: `Small joint ${code}`,
  engine: 'Ossery D6 3.8',
  component: 'Small joint',
  source: { title: 'Invented for tests', page: '7', date: '2026-03-03' },
  toleranceIsShops: false,
  map: { sides: {}, bores: [] },
  groups: [
    { id: 'A', name: 'inner' },
    { id: 'B', name: 'outer' },
  ],
  holes: holes(count),
  fasteners: [
    {
      id: 'bolt',
      name: 'Bolt TB-10',
      kind: 'bolt',
      thread: 'M10 × 1.5',
      hand: 'right',
      reuse: { kind: 'singleUse' },
      lubricant: null,
    },
  ],
  parts: [],
  passes: [],
  steps: [],
});

const order = (document: ProcedureDocument): string[] => document.holes.map(({ id }) => id);

/** Two torques and a turn with end torque; single-use bolts, stripes, a gasket; one bolt may be taken again. */
export const stretchHead = (): ProcedureDocument => {
  const document = base('STRETCH', 4);
  const turned = ['h2', 'h3', 'h1', 'h4'];
  return {
    ...document,
    parts: [{ id: 'gasket', name: 'Gasket TG-1', count: 1, renewedOnRestart: true }],
    passes: [
      {
        id: 'p1',
        name: '30 N·m',
        order: turned,
        rework: oneFastener,
        stages: [{ id: 's1', kind: 'torque', windows: both(torque('30', '28', '32')) }],
      },
      {
        id: 'p2',
        name: '60 N·m',
        order: turned,
        rework: oneFastener,
        stages: [{ id: 's1', kind: 'torque', windows: both(torque('60', '56', '64')) }],
      },
      {
        id: 'p3',
        name: 'turns',
        order: turned,
        rework: oneFastener,
        stages: [
          {
            id: 's1',
            kind: 'turn',
            windows: { A: degrees('90', '85', '95'), B: degrees('60', '55', '65') },
            endTorque: { use: 'wanted', windows: both(torque('110', '95', '125')) },
          },
        ],
      },
    ],
    steps: [
      { id: 'clean', place: { at: 'beforeJoint' }, kind: 'do', text: 'Faces clean' },
      runsIn,
      {
        id: 'stripes',
        place: { at: 'afterPass', pass: 'p2' },
        kind: 'do',
        text: 'Stripes painted',
        paintsStripes: true,
      },
    ],
  };
};

/** As `stretchHead`, but the turn may only be put right with the whole joint. */
export const sealedHead = (): ProcedureDocument => {
  const document = stretchHead();
  const passes = document.passes.map((pass) =>
    pass.id === 'p3' ? { ...pass, rework: { allows: 'joint', cite: 'manualSilent' } satisfies Pass['rework'] } : pass,
  );
  return { ...document, code: 'SEALED', passes };
};

/** Reusable nuts, a wait, and a torque again until none turns. */
export const untilNoneTurns = (): ProcedureDocument => {
  const document = base('ROUNDS', 3);
  const windows = both(torque('35', '33', '37'));
  const shared = { order: order(document), rework: oneFastener };
  return {
    ...document,
    fasteners: document.fasteners.map((type) => ({ ...type, kind: 'nut', reuse: { kind: 'reusable' } })),
    passes: [
      {
        id: 'p1',
        name: '20 N·m',
        ...shared,
        waitMinutes: 5,
        stages: [{ id: 's1', kind: 'torque', windows: both(torque('20', '18', '22')) }],
      },
      {
        id: 'p2',
        name: '35 N·m until none turns',
        ...shared,
        repeat: { mostRounds: 3 },
        stages: [{ id: 's1', kind: 'torque', windows }],
      },
    ],
  };
};

/** A left-hand thread, torque and turn bolt by bolt, end torque required. */
export const boltByBolt = (): ProcedureDocument => {
  const document = base('BYBOLT', 3);
  return {
    ...document,
    fasteners: document.fasteners.map((type) => ({ ...type, hand: 'left' })),
    passes: [
      {
        id: 'p1',
        name: '25 N·m and 60°',
        order: order(document),
        rework: { allows: 'oneFastener', cite: 'manualSilent' },
        stages: [
          { id: 's1', kind: 'torque', windows: both(torque('25', '23', '27')) },
          {
            id: 's2',
            kind: 'turn',
            windows: both(degrees('60', '55', '65')),
            endTorque: { use: 'required', windows: both(torque('70', '60', '80')) },
          },
        ],
      },
    ],
    steps: [runsIn],
  };
};

/** Run down, torque in two passes, loosen, torque again, a turn, the mark by eye: limited reuse, a time limit. */
export const everyStage = (): ProcedureDocument => {
  const document = base('EVERY', 3);
  const shared = { order: order(document), rework: oneFastener };
  return {
    ...document,
    fasteners: document.fasteners.map((type) => ({ ...type, reuse: { kind: 'limited', most: 3 } })),
    passes: [
      { id: 'p1', name: 'run down', ...shared, stages: [{ id: 's1', kind: 'runDown' }] },
      {
        id: 'p2',
        name: '20 N·m, loosen, 25 N·m',
        ...shared,
        finishWithinMinutes: 30,
        stages: [
          { id: 's1', kind: 'torque', windows: both(torque('20', '18', '22')) },
          { id: 's2', kind: 'loosen', turn: 'quarter' },
          { id: 's3', kind: 'torque', windows: both(torque('25', '23', '27')), strict: true },
        ],
      },
      {
        id: 'p3',
        name: 'turn 45°',
        ...shared,
        stages: [{ id: 's1', kind: 'turn', windows: both(degrees('45', '40', '50')), endTorque: { use: 'unused' } }],
      },
      { id: 'p4', name: 'marks', ...shared, stages: [{ id: 's1', kind: 'check', check: 'witnessMark' }] },
    ],
    steps: [
      runsIn,
      {
        id: 'play',
        place: { at: 'afterJoint' },
        kind: 'measure',
        text: 'Play',
        window: { target: '0.2', low: '0.1', high: '0.3', unit: 'mm' },
      },
      { id: 'photo', place: { at: 'beforePass', pass: 'p3' }, kind: 'photograph', text: 'The joint before the turn' },
    ],
  };
};

/** All small joints. */
export const smallProcedures = (): ProcedureDocument[] => [
  stretchHead(),
  sealedHead(),
  untilNoneTurns(),
  boltByBolt(),
  everyStage(),
];
