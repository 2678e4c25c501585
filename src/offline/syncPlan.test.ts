// @vitest-environment node
import { describe, expect, it } from 'vitest';
import { MOST_BATCH_BYTES, MOST_EVENTS } from '@shared/contracts/sync.contract';
import { BATCH_BYTES, BATCH_EVENTS, planSync, type SyncState } from './syncPlan';

const NOW = 1_000_000;
const blocked = { code: 'event.refused', message: '', seq: 3, at: '' };
const events = (from: number, count: number, size = 1000) =>
  Array.from({ length: count }, (_, index) => ({ seq: from + index, size }));
const walk = (name: string, list = events(0, 2)) => ({ walk: name, branch: 0, events: list, blocked: null });

const state = (more: Partial<SyncState> = {}): SyncState => ({
  enrolled: true,
  revoked: false,
  online: true,
  epochKnown: true,
  bearerEndsAt: NOW + 600_000,
  retryAt: null,
  walks: [],
  blobs: [],
  mostEvents: BATCH_EVENTS,
  chains: [],
  catalogueDueAt: NOW + 1,
  reportDueAt: NOW + 1,
  ...more,
});
const plan = (more: Partial<SyncState> = {}) => planSync(state(more), NOW);

describe('the planner of sync', () => {
  it('does nothing when nothing is due', () => {
    expect(plan()).toEqual({ do: 'nothing', why: 'done' });
  });

  it('does nothing on a tablet that is not enrolled or was revoked, whatever waits', () => {
    const walks = [walk('a')];
    expect(plan({ enrolled: false, walks })).toEqual({ do: 'nothing', why: 'notEnrolled' });
    expect(plan({ revoked: true, walks })).toEqual({ do: 'nothing', why: 'revoked' });
  });

  it('sends events before files, files before it asks, and reports last', () => {
    const all = {
      walks: [walk('a')],
      blobs: [{ sha256: 'f', walk: 'b' }],
      catalogueDueAt: NOW,
      chains: ['c'],
      reportDueAt: NOW,
    };
    expect(plan(all)).toEqual({ do: 'sendEvents', walk: 'a', branch: 0, from: 0, to: 1 });
    expect(plan({ ...all, walks: [] })).toEqual({ do: 'sendBlob', sha256: 'f' });
    expect(plan({ ...all, walks: [], blobs: [] })).toEqual({ do: 'fetchCatalogue' });
    expect(plan({ chains: ['c'], reportDueAt: NOW })).toEqual({ do: 'fetchChain', walk: 'c' });
    expect(plan({ reportDueAt: NOW })).toEqual({ do: 'report' });
  });

  it('learns the server’s epoch before it sends anything (decision 9)', () => {
    expect(plan({ epochKnown: false, walks: [walk('a')] })).toEqual({ do: 'fetchCatalogue' });
  });

  it('asks for a token when there is none or it is about to end', () => {
    const walks = [walk('a')];
    expect(plan({ walks, bearerEndsAt: null })).toEqual({ do: 'authenticate' });
    expect(plan({ walks, bearerEndsAt: NOW + 29_000 })).toEqual({ do: 'authenticate' });
  });

  it('does not ask for a token when there is nothing to do with it', () => {
    expect(plan({ bearerEndsAt: null })).toEqual({ do: 'nothing', why: 'done' });
  });

  it('waits for its time after a failure, and without a network', () => {
    const walks = [walk('a')];
    expect(plan({ walks, retryAt: NOW + 5 })).toEqual({ do: 'wait', until: NOW + 5 });
    expect(plan({ walks, retryAt: NOW })).toMatchObject({ do: 'sendEvents' });
    expect(plan({ walks, online: false })).toEqual({ do: 'nothing', why: 'offline' });
  });

  it('passes over blocked walks; their files still go', () => {
    const walks = [{ ...walk('a'), blocked }, walk('b')];
    expect(plan({ walks })).toMatchObject({ do: 'sendEvents', walk: 'b' });
    expect(plan({ walks: [{ ...walk('a'), blocked }], blobs: [{ sha256: 'f', walk: 'a' }] })).toMatchObject({
      do: 'sendBlob',
    });
  });

  it('keeps a batch within 500 events, within its bytes, and consecutive', () => {
    expect(plan({ walks: [walk('a', events(4, 900))] })).toMatchObject({ from: 4, to: 503 });
    expect(plan({ walks: [walk('a', events(0, 10))], mostEvents: 3 })).toMatchObject({ from: 0, to: 2 });
    expect(plan({ walks: [walk('a', events(0, 10, BATCH_BYTES / 4))] })).toMatchObject({ from: 0, to: 3 });
    expect(plan({ walks: [walk('a', events(0, 3, BATCH_BYTES * 2))] })).toMatchObject({ from: 0, to: 0 });
    expect(plan({ walks: [walk('a', [...events(0, 2), ...events(5, 2)])] })).toMatchObject({ from: 0, to: 1 });
  });

  it('stays within the limits of the contract', () => {
    expect(BATCH_EVENTS).toBe(MOST_EVENTS);
    expect(BATCH_BYTES).toBeLessThan(MOST_BATCH_BYTES);
  });
});
