import { effectScope } from 'vue';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { HIDDEN_MS, useHiddenPause } from './useHiddenPause';

let visibility: DocumentVisibilityState;
const host = new EventTarget() as Document;
Object.defineProperty(host, 'visibilityState', { get: () => visibility });
const turn = (to: DocumentVisibilityState): void => {
  visibility = to;
  host.dispatchEvent(new Event('visibilitychange'));
};

let mono: number;
let wall: number;
let pause: ReturnType<typeof vi.fn<() => void>>;
let scope: ReturnType<typeof effectScope>;

beforeEach(() => {
  vi.useFakeTimers();
  [visibility, mono, wall] = ['visible', 0, 0];
  pause = vi.fn<() => void>();
  scope = effectScope();
  scope.run(() => useHiddenPause(pause, { document: host, clocks: [() => mono, () => wall] }));
});
afterEach(() => {
  scope.stop();
  vi.useRealTimers();
});

describe('a walk out of sight (W9)', () => {
  it('pauses after thirty seconds, once', () => {
    turn('hidden');
    vi.advanceTimersByTime(HIDDEN_MS);
    expect(pause).toHaveBeenCalledOnce();
    [mono, wall] = [60_000, 60_000];
    turn('visible');
    expect(pause).toHaveBeenCalledOnce();
  });

  it('does not pause for a glance elsewhere', () => {
    turn('hidden');
    vi.advanceTimersByTime(HIDDEN_MS - 1);
    [mono, wall] = [HIDDEN_MS - 1, HIDDEN_MS - 1];
    turn('visible');
    vi.advanceTimersByTime(HIDDEN_MS);
    expect(pause).not.toHaveBeenCalled();
  });

  it('pauses on the return of a tablet that slept, whichever clock slept with it', () => {
    turn('hidden');
    wall = HIDDEN_MS;
    turn('visible');
    expect(pause).toHaveBeenCalledOnce();
    turn('hidden');
    mono = HIDDEN_MS;
    turn('visible');
    expect(pause).toHaveBeenCalledTimes(2);
  });

  it('stops listening with its scope', () => {
    scope.stop();
    turn('hidden');
    vi.advanceTimersByTime(HIDDEN_MS);
    expect(pause).not.toHaveBeenCalled();
  });
});
