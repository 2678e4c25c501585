import { describe, expect, it } from 'vitest';
import type { WalkRow } from '@shared/contracts/walkRow.contract';
import type { KnownCatalogue } from '@/stores/useTabletStore';
import { isUnderWay, walksKnown } from './standJobs';
import type { WalkOnTablet } from './useTabletContents';

const row = (id: string, more: Partial<WalkRow>): WalkRow =>
  ({ id, job: 'job', joint: 'joint', purpose: 'finalAssembly', state: 'walking', writer: 'other', ...more }) as WalkRow;
const local = (walk: string, more: Partial<WalkOnTablet> = {}): WalkOnTablet =>
  ({
    walk,
    job: 'job',
    joint: 'joint',
    purpose: 'finalAssembly',
    lastAt: '2026-01-01',
    waiting: 0,
    ...more,
  }) as WalkOnTablet;
const catalogue = (...walks: WalkRow[]): KnownCatalogue =>
  ({ walks: Object.fromEntries(walks.map((walk) => [walk.id, walk])) }) as unknown as KnownCatalogue;

describe('walksKnown', () => {
  it('counts a walk that the server has not heard of as ours', () => {
    expect(walksKnown(catalogue(), [local('a')], 'me')).toMatchObject([
      { id: 'a', here: true, ours: true, readings: null },
    ]);
  });
  it('tells a walk of another tablet from ours', () => {
    const known = walksKnown(catalogue(row('a', { writer: 'me' }), row('b', { writer: 'other' })), [local('a')], 'me');
    expect(known.find(({ id }) => id === 'a')).toMatchObject({ ours: true, here: true });
    expect(known.find(({ id }) => id === 'b')).toMatchObject({ ours: false, here: false });
  });
  it('keeps a walk ours while something of it waits, whatever the server says', () => {
    expect(walksKnown(catalogue(row('a', { writer: 'other' })), [local('a', { waiting: 3 })], 'me')).toMatchObject([
      { ours: true },
    ]);
  });
  it('is under way until it is finished or voided (W12)', () => {
    const states = ['walking', 'review', 'signed', 'sentBack', 'stopped', 'finished', 'voided'] as const;
    const known = states.map((state) => walksKnown(catalogue(row('a', { state })), [], 'me')[0]!);
    expect(known.map(isUnderWay)).toEqual([true, true, true, true, true, false, false]);
  });
});
