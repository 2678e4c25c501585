import { describe, expect, it } from 'vitest';
import { memoryWalk } from './testing/memoryWalk';
import { openTestWalk, testJoint } from './testing/testJoint';
import type { WalkAct } from './walkAccess';
import { headStates, marginText } from './headStates';

const words = { fresh: 'new', ordinal: (n: number) => `${n}th` };

function reading(pass: string, hole: string, value: string, unit: 'N.m' | 'deg', more: object = {}): WalkAct {
  const shows = unit === 'deg' ? { shows: 'thisPull' as const } : {};
  const data = {
    pass,
    hole,
    stage: 's1',
    round: 1,
    source: 'typed' as const,
    wrench: 'w3',
    pulls: 1,
    ...shows,
    ...more,
  };
  return { type: 'reading.taken', data: { ...data, value: { value, unit } } };
}

function walked(...acts: WalkAct[]) {
  const walk = memoryWalk(testJoint);
  openTestWalk(walk);
  for (const act of acts) walk.write(act);
  return walk;
}
const seated = ['h1', 'h2', 'h3'].map((hole) => reading('p1', hole, '30', 'N.m'));

describe('headStates', () => {
  it('is bare before the seating torque, with a stripe and filled after it', () => {
    const { state, view } = walked(reading('p1', 'h1', '30', 'N.m'));
    const heads = headStates(state, view, { hole: 'h2', words });
    expect(heads.h1).toMatchObject({ fill: 'in', stripeDeg: 0, passDeg: null, now: false });
    expect(heads.h2).toMatchObject({ fill: 'bare', stripeDeg: null, now: true });
  });

  it('draws the turn of this pass, the pegs of the stage, and what is typed and not saved', () => {
    const { state, view } = walked(...seated, reading('p2', 'h1', '91', 'deg'));
    const stage = testJoint.passes[1]?.stages[0] ?? null;
    const heads = headStates(state, view, { hole: 'h2', stage, pendingDeg: 88, words });
    expect(heads.h1).toMatchObject({ fill: 'in', stripeDeg: 91, passDeg: 91, earlierDeg: 0, pegs: null });
    expect(heads.h2).toMatchObject({ fill: 'todo', pendingDeg: 88, pegs: { lowDeg: 85, highDeg: 95 } });
  });

  it('flags what is off by how much, and what was taken out of order by its place', () => {
    const over = walked(...seated, reading('p2', 'h1', '104', 'deg'));
    const deviation = over.view.deviations.at(-1)!;
    expect(marginText(over.state, deviation)).toBe('+9°');
    expect(headStates(over.state, over.view, { hole: 'h1', words }).h1).toMatchObject({
      fill: 'over',
      flag: { kind: 'over', text: '+9°' },
    });
    const different = walked(reading('p1', 'h3', '30', 'N.m', { insteadOf: 'h1' }));
    expect(headStates(different.state, different.view, { hole: 'h1', words }).h3).toMatchObject({
      fill: 'in',
      tag: '1th',
    });
  });
});
