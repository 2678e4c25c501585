import { spiral } from '@shared/sequence/spiral';
import type { Hole, Pass, ProcedureDocument } from '@shared/procedure/procedure';
import { holeSteps, inventedManual, windowOf } from './shorthand';

const PITCH = 62;
const COLUMNS = 5;

const places = Array.from({ length: COLUMNS }, (_, column) => [0, 1].map((row) => ({ x: column * PITCH, y: row * 58 })))
  .flat()
  .map((place, index) => ({ ...place, id: `at${index}` }));

/** Labelled in the order of tightening: from the middle outward. */
const holes: Hole[] = spiral(places).map((id, index) => {
  const place = places.find((candidate) => candidate.id === id) ?? { x: 0, y: 0 };
  const label = `${index + 1}`;
  return { id: `h${label}`, label, x: place.x, y: place.y, group: 'A', fastener: 'manifoldNut' };
});

const order = holes.map(({ id }) => id);
const rework: Pass['rework'] = { allows: 'oneFastener', cite: 'manualSilent' };
const full = { A: windowOf('26', '24.5', '27.5', 'lbf.ft') };

/** Exhaust manifold of the invented Farrow F4: nuts on studs, pound-feet, the last torque again until none turns. */
export const manF4: ProcedureDocument = {
  schema: 1,
  code: 'MAN-F4',
  title: 'Exhaust manifold, Farrow F4 2.2',
  engine: 'Farrow F4 2.2',
  component: 'Exhaust manifold',
  source: inventedManual('Farrow F4', '61'),
  toleranceIsShops: true,
  map: {
    sides: { bottom: 'sump side', left: 'front' },
    bores: Array.from({ length: 4 }, (_, port) => ({
      x: PITCH / 2 + port * PITCH,
      y: 29,
      r: 18,
      label: `port ${port + 1}`,
    })),
    outline: 'rectangle',
  },
  groups: [{ id: 'A', name: 'manifold nuts' }],
  holes,
  fasteners: [
    {
      id: 'manifoldNut',
      name: 'Manifold nut FF4-EN8, copper-plated',
      kind: 'nut',
      thread: 'M8 × 1.25',
      hand: 'right',
      reuse: { kind: 'reusable' },
      lubricant: { what: 'nickel anti-seize', where: ['thread'] },
    },
  ],
  parts: [{ id: 'gasket', name: 'Manifold gasket FF4-EG1', count: 1, renewedOnRestart: true }],
  passes: [
    {
      id: 'p1',
      name: '15 lbf·ft',
      order,
      rework,
      stages: [{ id: 's1', kind: 'torque', windows: { A: windowOf('15', '14', '16', 'lbf.ft') } }],
    },
    {
      id: 'p2',
      name: '26 lbf·ft',
      order,
      rework,
      waitMinutes: 10,
      stages: [{ id: 's1', kind: 'torque', windows: full }],
    },
    {
      id: 'p3',
      name: '26 lbf·ft until none turns',
      order,
      rework,
      repeat: { mostRounds: 5 },
      stages: [{ id: 's1', kind: 'torque', windows: full }],
    },
  ],
  steps: [
    { id: 'studsSeated', place: { at: 'beforeJoint' }, kind: 'look', text: 'Studs seated, flange faces clean' },
    ...holeSteps('Anti-seize on the stud, thinly, none under the nut'),
  ],
};
