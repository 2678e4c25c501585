import type { Page } from '@playwright/test';

/** What came of a command that no control of the screen would send. */
export interface Attempt {
  /** Code of the refusal; null when something was written. */
  refused: string | null;
  eventsBefore: number;
  eventsAfter: number;
}

/**
 * Sends the tablet's own write path a reading for another hole than the one on the screen (W4): no control offers that, so
 * the walk is reached behind the screen, through the mounted components.
 */
export function readingForHole(page: Page, hole: string): Promise<Attempt> {
  return page.evaluate(async (wanted) => {
    interface Node {
      component?: { provides: Record<symbol, unknown>; subTree: Node };
      children?: unknown;
    }
    interface Walk {
      state: { seq: number };
      view: { instruction: { slot: object; wrench: string } };
      act(act: { type: string; data: object }): Promise<{ code: string } | null>;
    }
    const isWalk = (value: unknown): value is Walk =>
      typeof value === 'object' && value !== null && 'act' in value && 'view' in value && 'state' in value;
    const left: unknown[] = [document.querySelector<Element & { _vnode?: Node }>('#app')?._vnode];
    while (left.length > 0) {
      const node = left.pop() as Node | null | undefined;
      if (typeof node !== 'object' || node === null) continue;
      if (Array.isArray(node.children)) left.push(...(node.children as unknown[]));
      if (!node.component) continue;
      left.push(node.component.subTree);
      const { provides } = node.component;
      const walk = Object.getOwnPropertySymbols(provides)
        .map((key) => provides[key])
        .find(isWalk);
      if (!walk) continue;
      const eventsBefore = walk.state.seq;
      const { slot, wrench } = walk.view.instruction;
      const value = { value: '30.2', unit: 'N.m' };
      const data = { ...slot, hole: wanted, source: 'typed', wrench, value, pulls: 1 };
      const refusal = await walk.act({ type: 'reading.taken', data });
      return { refused: refusal?.code ?? null, eventsBefore, eventsAfter: walk.state.seq };
    }
    throw new Error('no walk is on the screen');
  }, hole);
}
