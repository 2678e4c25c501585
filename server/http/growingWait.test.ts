import { describe, expect, it } from 'vitest';
import { growingWait } from './growingWait';
import { FailureMemory } from './rateLimit';

describe('the wait after failures', () => {
  it('begins after three and grows to a quarter of an hour, never to a lock', () => {
    expect([0, 1, 2, 3, 4, 5, 8, 11, 12, 50].map(growingWait)).toEqual([0, 0, 0, 2, 4, 8, 64, 512, 900, 900]);
  });

  it('is counted for each key apart, and forgotten after a success', () => {
    const memory = new FailureMemory();
    for (let tries = 0; tries < 4; tries += 1) memory.fail('a', 1_000);
    expect([memory.secondsLeft('a', 1_000), memory.secondsLeft('b', 1_000)]).toEqual([4, 0]);
    expect(memory.secondsLeft('a', 5_000)).toBe(0);
    memory.clear('a');
    memory.fail('a', 6_000);
    expect(memory.secondsLeft('a', 6_000)).toBe(0);
  });
});
