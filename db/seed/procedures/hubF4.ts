import type { ProcedureDocument } from '@shared/procedure/procedure';
import { inventedManual, oneFastener, windowOf } from './shorthand';

/** Crank hub of the invented Farrow F4: one lock nut with a left-hand thread, tightened counter-clockwise. */
export const hubF4: ProcedureDocument = {
  schema: 1,
  code: 'HUB-F4',
  title: 'Crank hub nut, Farrow F4 2.2',
  engine: 'Farrow F4 2.2',
  component: 'Crank hub',
  source: inventedManual('Farrow F4', '44'),
  toleranceIsShops: true,
  map: { sides: { top: 'timing mark' }, bores: [], outline: 'round' },
  groups: [{ id: 'A', name: 'hub nut' }],
  holes: [{ id: 'h1', label: '1', x: 0, y: 0, group: 'A', fastener: 'hubNut' }],
  fasteners: [
    {
      id: 'hubNut',
      name: 'Hub lock nut FF4-HN24, left-hand',
      kind: 'nut',
      thread: 'M24 × 1.5 LH',
      hand: 'left',
      reuse: { kind: 'singleUse', usedFrom: 'p1/s1' },
      lubricant: { what: 'clean engine oil', where: ['thread'] },
      drive: '1/2 in',
    },
  ],
  parts: [{ id: 'seal', name: 'Hub seal FF4-HS1', count: 1, renewedOnRestart: true }],
  passes: [
    {
      id: 'p1',
      name: '60 N·m and turn 45°',
      order: ['h1'],
      rework: oneFastener('44'),
      stages: [
        { id: 's1', kind: 'torque', windows: { A: windowOf('60', '57', '63', 'N.m') } },
        {
          id: 's2',
          kind: 'turn',
          windows: { A: windowOf('45', '40', '50', 'deg') },
          endTorque: { use: 'required' },
          monitor: { A: { low: '150', high: '220', unit: 'N.m' } },
        },
      ],
    },
  ],
  steps: [
    {
      id: 'crankHeld',
      place: { at: 'beforePass', pass: 'p1' },
      kind: 'do',
      text: 'Crankshaft held with the locking tool, stand locked',
    },
    { id: 'oiled', place: { at: 'beforeHole' }, kind: 'do', text: 'Thread oiled, face of the nut dry' },
    { id: 'runsIn', place: { at: 'beforeHole' }, kind: 'do', text: 'Runs on by hand, counter-clockwise' },
    { id: 'lockBent', place: { at: 'afterJoint' }, kind: 'look', text: 'Collar of the nut staked into the keyway' },
  ],
};
