import type { ProcedureDocument } from '@shared/procedure/procedure';
import { headD6 } from '../../db/seed/procedures/headD6';

const COUNT = 64;
const TORQUES = [20, 40, 60, 80, 80];

/** Sixty-four bolts on a circle in five torque passes: more readings than one page holds. Invented values. */
export function flange64(): ProcedureDocument {
  const order = Array.from({ length: COUNT }, (_, index) => `h${((index * 29) % COUNT) + 1}`);
  const window = (target: number) => ({
    target: `${target}`,
    low: `${target * 0.95}`,
    high: `${target * 1.05}`,
    unit: 'N.m' as const,
  });
  return {
    ...headD6,
    code: 'FLANGE-64',
    title: 'Flange of sixty-four bolts',
    component: 'Flange',
    parts: [],
    steps: headD6.steps.filter(({ id }) => id === 'blown'),
    map: { sides: { top: 'inlet' }, bores: [], outline: 'round' },
    fasteners: headD6.fasteners.map((type) => ({ ...type, reuse: { kind: 'reusable' } })),
    holes: Array.from({ length: COUNT }, (_, index) => ({
      id: `h${index + 1}`,
      label: `${index + 1}`,
      group: 'A',
      fastener: 'headBolt',
      x: Math.round(500 * Math.sin((index * 2 * Math.PI) / COUNT)),
      y: Math.round(-500 * Math.cos((index * 2 * Math.PI) / COUNT)),
    })),
    passes: TORQUES.map((target, index) => ({
      id: `p${index + 1}`,
      name: `${target} N·m`,
      order,
      rework: { allows: 'oneFastener', cite: 'manualSilent' },
      stages: [{ id: 's1', kind: 'torque', windows: { A: window(target) } }],
    })),
  };
}
