import type { ProcedureDocument } from '@shared/procedure/procedure';
import type { WrenchSnapshot } from '@shared/crib/wrench';
import type { MemoryWalk } from './memoryWalk';

/** A joint for tests of screens: three bolts, one torque, one turn. Invented values. */
export const testJoint: ProcedureDocument = {
  schema: 1,
  code: 'TEST-3',
  title: 'Test joint',
  engine: 'Ossery D6 3.8',
  component: 'Test joint',
  source: { title: 'Invented for tests', page: '7', date: '2026-03-03' },
  toleranceIsShops: false,
  map: { sides: {}, bores: [] },
  groups: [{ id: 'A', name: 'all' }],
  holes: ['1', '2', '3'].map((label, x) => ({ id: `h${label}`, label, x: x * 60, y: 0, group: 'A', fastener: 'bolt' })),
  fasteners: [
    {
      id: 'bolt',
      name: 'Bolt TB-10',
      kind: 'bolt',
      thread: 'M10 × 1.5',
      hand: 'right',
      reuse: { kind: 'reusable' },
      lubricant: null,
    },
  ],
  parts: [],
  passes: [
    {
      id: 'p1',
      name: '30 N·m',
      order: ['h1', 'h2', 'h3'],
      rework: { allows: 'oneFastener', cite: { page: '7' } },
      stages: [{ id: 's1', kind: 'torque', windows: { A: { target: '30', low: '28', high: '32', unit: 'N.m' } } }],
    },
    {
      id: 'p2',
      name: 'turn 90°',
      order: ['h1', 'h2', 'h3'],
      rework: { allows: 'oneFastener', cite: { page: '7' } },
      stages: [
        {
          id: 's1',
          kind: 'turn',
          windows: { A: { target: '90', low: '85', high: '95', unit: 'deg' } },
          endTorque: { use: 'unused' },
        },
      ],
    },
  ],
  steps: [],
};

/** A digital torque-angle wrench that suits every stage of the test joint. */
export const testWrench: WrenchSnapshot = {
  id: 'w3',
  tag: 'W-03',
  serial: 'T20-112',
  kind: 'torqueAngle',
  drive: '1/2 in',
  range: { low: '10', high: '200', unit: 'N.m' },
  unit: 'N.m',
  resolution: { torque: '0.1', angle: '1' },
  accuracy: { cw: '3', ccw: '4' },
  turnAccuracy: '2',
  due: { date: '2099-01-01', cycles: null },
  cycles: 1,
  state: 'inService',
  certificate: 'K-1',
};

/** Opens the walk and takes the wrench: the first instruction is bolt 1. */
export function openTestWalk(walk: MemoryWalk): void {
  walk.write({
    type: 'walk.opened',
    data: {
      job: 'job',
      joint: 'joint',
      purpose: 'finalAssembly',
      procedure: { code: testJoint.code, revision: 1, hash: '00'.repeat(32) },
      pulls: 'ilse',
      records: 'ilse',
      policy: { judgement: 'simple', countersign: 'required', shopOfOne: false },
      rules: 1,
      earlier: { readingsTaken: false, usedHoles: [] },
    },
  });
  walk.write({
    type: 'wrench.taken',
    data: {
      wrench: testWrench,
      how: 'scanned',
      confirmed: { unit: true, peakHold: true, direction: true, zero: true, dueDate: true },
      turnShows: 'thisPull',
    },
  });
}
