import { describe, expect, it } from 'vitest';
import { aHead, pass } from '../../tests/support/aWalk';
import { bareHeads, endWindowsOf, orderOf, stepsAt, windowsOfStage } from './procedureReading';

const wide = { target: '20', low: '19', high: '21', unit: 'N.m' } as const;
const narrow = { ...wide, low: '19.5' };

describe('a procedure to read', () => {
  it('names groups that share a window together', () => {
    expect(windowsOfStage({ id: 's', kind: 'torque', windows: { A: wide, B: narrow, C: wide } })).toEqual([
      { groups: ['A', 'C'], window: wide },
      { groups: ['B'], window: narrow },
    ]);
    expect(windowsOfStage({ id: 's', kind: 'runDown' })).toEqual([]);
  });

  it('shows the end torque only where it has limits', () => {
    const turn = aHead().passes[2]?.stages[0];
    expect(turn && endWindowsOf(turn)).toHaveLength(1);
    expect(endWindowsOf({ id: 's', kind: 'torque', windows: { A: wide } })).toEqual([]);
  });

  it('writes the order by labels, and finds steps by their place', () => {
    const procedure = aHead({ passes: [{ ...pass('p1'), order: ['h3', 'h1'] }] });
    expect(procedure.passes[0] && orderOf(procedure, procedure.passes[0])).toEqual(['3', '1']);
    expect(stepsAt(procedure, 'beforeHole').map(({ id }) => id)).toEqual(['hole']);
    expect(stepsAt(procedure, 'afterPass', 'p1')).toEqual([]);
  });

  it('draws every hole bare', () => {
    expect(Object.values(bareHeads(aHead())).map(({ fill }) => fill)).toEqual(['bare', 'bare', 'bare', 'bare']);
  });
});
