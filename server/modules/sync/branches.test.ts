import { describe, expect, it } from 'vitest';
import { headsOf, isForked, pathTo, targetFor } from './branches';
import type { Branch } from './chain.repository';

const branch = (number: number, next: number, from: { branch: number; seq: number } | null = null): Branch => ({
  branch: number,
  fromBranch: from?.branch ?? null,
  fromSeq: from?.seq ?? -1,
  fromHash: from ? `hash of ${from.branch}/${from.seq}` : '0'.repeat(64),
  how: number === 0 ? 'first' : 'fork',
  next,
  head: `hash of ${number}/${next - 1}`,
});

const first = branch(0, 40);
const fork = branch(1, 25, { branch: 0, seq: 19 });
const forkOfFork = branch(2, 30, { branch: 1, seq: 22 });

describe('the way to an event', () => {
  it('leads through the parents of its branch', () => {
    expect(pathTo([first, fork, forkOfFork], { branch: 2, seq: 27 })).toEqual([
      { branch: 0, upTo: 19 },
      { branch: 1, upTo: 22 },
      { branch: 2, upTo: 27 },
    ]);
  });
});

describe('where an event goes', () => {
  it('begins the first branch of a walk', () => {
    expect(targetFor([], null)).toMatchObject({ kind: 'open', branch: { branch: 0, how: 'first', fromBranch: null } });
  });

  it('goes on at the head it follows', () => {
    expect(targetFor([first, fork], { branch: 1, seq: 24, hash: 'x' })).toEqual({ kind: 'append', branch: 1 });
  });

  it('opens the next branch where its place is taken, or a second first event comes', () => {
    expect(targetFor([first, fork], { branch: 0, seq: 10, hash: 'x' })).toEqual({
      kind: 'open',
      branch: { branch: 2, fromBranch: 0, fromSeq: 10, fromHash: 'x', how: 'fork' },
    });
    expect(targetFor([first], null)).toMatchObject({
      kind: 'open',
      branch: { branch: 1, how: 'fork', fromBranch: null },
    });
  });
});

describe('a fork', () => {
  it('is open while a branch goes on beside the one that stands, until somebody chose, and again when it grows', () => {
    expect(isForked([first], 0, {})).toBe(false);
    expect(isForked([first, fork], 0, {})).toBe(true);
    expect(isForked([first, fork], 1, {})).toBe(true);
    const seen = headsOf([first, fork]);
    expect(isForked([first, fork], 1, seen)).toBe(false);
    expect(isForked([first, branch(1, 26, { branch: 0, seq: 19 })], 1, seen)).toBe(false);
    expect(isForked([branch(0, 41), fork], 1, seen)).toBe(true);
  });

  it('is none where the parent ended at the beginning of the next branch: a takeover', () => {
    expect(isForked([branch(0, 20), fork], 1, {})).toBe(false);
  });
});
