import type { Page } from '@playwright/test';

/*
 * Runs in the page before any of its own scripts: notes the time, since the navigation began, at which the frame that first
 * shows `look-at-work` has been painted.
 */
const WATCH = `
  const look = () => {
    if (!document.querySelector('[data-testid="look-at-work"]')) return requestAnimationFrame(look);
    const painted = new MessageChannel();
    painted.port1.onmessage = () => (window.boltwalkStarted = performance.now());
    painted.port2.postMessage(null);
  };
  requestAnimationFrame(look);
`;

/** Opens an address and answers the milliseconds until *look at the work* is painted with the words expected. */
export const untilPainted = async (page: Page, address: string, words: RegExp): Promise<number> => {
  await page.addInitScript(WATCH);
  await page.goto(address);
  const shown = page.getByTestId('look-at-work');
  await shown.waitFor();
  const text = (await shown.innerText()).replace(/\s+/g, ' ');
  if (!words.test(text)) throw new Error(`the screen says "${text}"`);
  return page.evaluate<number>('window.boltwalkStarted');
};
