import { describe, expect, it } from 'vitest';
import type { WalkRow } from '@shared/contracts/walkRow.contract';
import { jointStanding, STANDINGS, urgencyOf } from './jointStanding';

const joint = { id: 'joint' };
const aWalk = (more: Partial<WalkRow> = {}): WalkRow => ({
  id: 'walk',
  job: 'job',
  joint: 'joint',
  purpose: 'finalAssembly',
  procedure: { code: 'TEST', revision: 1, hash: '0'.repeat(64) },
  state: 'walking',
  writer: 'tablet',
  branch: 0,
  next: 1,
  head: '0'.repeat(64),
  pulls: 'a',
  records: 'a',
  openedAt: '2026-05-01T08:00:00Z',
  changedAt: '2026-05-01T08:00:00Z',
  readingsDone: 0,
  readingsDue: 4,
  openDeviations: 0,
  forked: false,
  parallel: [],
  quarantined: 0,
  refusedSeals: 0,
  missingBlobs: 0,
  ...more,
});
const nameAfter = (...walks: Partial<WalkRow>[]) =>
  jointStanding(
    joint,
    walks.map((more, i) => aWalk({ id: `walk${i}`, openedAt: `2026-05-0${i + 1}T08:00:00Z`, ...more })),
  ).name;

describe('jointStanding', () => {
  it('is never opened where no walk was', () => {
    expect(jointStanding(joint, [])).toEqual({ name: 'neverOpened', walk: null, doNotRun: true, why: [] });
    expect(nameAfter({ joint: 'another' })).toBe('neverOpened');
  });

  it('may run only when a final assembly is finished (W12)', () => {
    for (const state of ['walking', 'review', 'signed', 'sentBack', 'stopped', 'voided'] as const) {
      expect(jointStanding(joint, [aWalk({ state })])).toMatchObject({ name: state, doNotRun: true });
    }
    expect(jointStanding(joint, [aWalk({ state: 'finished' })])).toMatchObject({ name: 'finished', doNotRun: false });
  });

  it('does not count a trial fit or a torque plate as finished (W1)', () => {
    expect(nameAfter({ purpose: 'trialFit', state: 'finished' })).toBe('notFinal');
    expect(nameAfter({ purpose: 'torquePlate', state: 'finished' })).toBe('notFinal');
  });

  it('is open again after a strip-down', () => {
    expect(nameAfter({ state: 'finished' }, { purpose: 'stripDown', state: 'finished' })).toBe('strippedDown');
  });

  it('stays finished after a recheck, and unfinished where nothing was finished before it', () => {
    expect(nameAfter({ state: 'finished' }, { purpose: 'recheck', state: 'finished' })).toBe('finished');
    expect(nameAfter({ purpose: 'recheck', state: 'finished' })).toBe('notFinal');
  });

  it('goes by the last walk that was not voided', () => {
    expect(nameAfter({ state: 'finished' }, { state: 'voided' })).toBe('finished');
    expect(nameAfter({ state: 'voided' }, { state: 'walking' })).toBe('walking');
  });

  it('asks for attention before all else, and says why', () => {
    const row = aWalk({ state: 'signed', forked: true, refusedSeals: 1 });
    expect(jointStanding(joint, [row])).toMatchObject({ name: 'attention', why: ['forked', 'refusedSeals'] });
    const two = [aWalk({ id: 'a', parallel: ['b'] }), aWalk({ id: 'b', parallel: ['a'] })];
    expect(jointStanding(joint, two).why).toEqual(['parallel']);
  });

  it('takes no notice of a finished walk beside the one under way', () => {
    expect(nameAfter({ id: 'a', state: 'finished' }, { id: 'b', parallel: ['a'] })).toBe('walking');
  });
});

it('has an urgency for every standing, finished last', () => {
  expect(new Set(STANDINGS).size).toBe(STANDINGS.length);
  expect(urgencyOf('attention')).toBe(0);
  expect(urgencyOf('finished')).toBe(STANDINGS.length - 1);
});
