import type { Page } from '@playwright/test';

/*
 * Runs in the page: from the tap on Record to the moment at which the frame with the next instruction has been painted.
 * The instruction is compared at the beginning of every frame; a message posted from there arrives after its painting.
 */
const WATCH = `
  window.boltwalkTaps = [];
  const instruction = () => {
    const shown = document.querySelector('[data-testid="instruction"]');
    return shown ? shown.textContent : '';
  };
  document.addEventListener('click', (event) => {
    if (!event.target.closest('[data-testid="record"]')) return;
    const before = instruction();
    const began = event.timeStamp;
    const look = () => {
      const now = instruction();
      if (now === before || now === '') return requestAnimationFrame(look);
      const painted = new MessageChannel();
      painted.port1.onmessage = () => window.boltwalkTaps.push(performance.now() - began);
      painted.port2.postMessage(null);
    };
    requestAnimationFrame(look);
  }, { capture: true });
`;

const MOST_SECONDS = 20;

/** Taps on Record since they are watched. */
export interface WatchedTaps {
  /** Waits until so many were answered, and gives the milliseconds from tap to painted next instruction of each. */
  taken(count: number): Promise<number[]>;
}

/** Watches the taps on Record of a page, once, for as long as it is not loaded again. */
export const watchTaps = async (page: Page): Promise<WatchedTaps> => {
  await page.evaluate(WATCH);
  return {
    // Asked from here again and again: the page's own policy forbids what would wait inside it.
    taken: async (count) => {
      for (const end = Date.now() + MOST_SECONDS * 1000; Date.now() < end; await page.waitForTimeout(50)) {
        const taps = await page.evaluate<number[]>('window.boltwalkTaps');
        if (taps.length >= count) return taps;
      }
      throw new Error(`the instruction after tap ${count} was not painted`);
    },
  };
};
