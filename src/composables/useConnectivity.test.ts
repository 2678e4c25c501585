import { effectScope } from 'vue';
import { describe, expect, it } from 'vitest';
import { useConnectivity } from './useConnectivity';

describe('connectivity', () => {
  it('follows the browser for as long as its scope lives', () => {
    const host = new EventTarget() as Window;
    let online = true;
    Object.defineProperty(host, 'navigator', { get: () => ({ onLine: online }) });
    const turn = (to: boolean): void => {
      online = to;
      host.dispatchEvent(new Event(to ? 'online' : 'offline'));
    };
    const scope = effectScope();
    const seen = scope.run(() => useConnectivity({ window: host }));
    expect(seen?.online.value).toBe(true);
    turn(false);
    expect(seen?.online.value).toBe(false);
    scope.stop();
    turn(true);
    expect(seen?.online.value).toBe(false);
  });
});
