import type { Page } from '@playwright/test';
import type { StandBench } from './standBench';

/** Taps count once in 700 ms (W10), and a key pressed faster than a person's is taken for a wrench's. */
const GUARD_MS = 760;
const KEY_MS = 140;

const pause = (page: Page): Promise<void> => page.waitForTimeout(GUARD_MS);

/** Opens a walk on the head of a job, from the list of jobs. */
export const beginWalk = async ({ browser: { page } }: StandBench, jobNumber: string): Promise<void> => {
  await page.getByTestId(`job-${jobNumber}`).click();
  await page.locator('[data-testid^="joint-"]').first().click();
  await page.getByTestId('begin').click();
  await page.waitForURL('**/stand/walks/*');
};

/** The one wrench of the crib that measures torque and angle over all of the head's stages. */
const WRENCH = 'W-03';

/** Picks the wrench, proves it by its serial, ticks what has to be looked at. */
const takeWrench = async ({ browser: { page }, shop }: StandBench): Promise<void> => {
  const serial = shop.wrenches.find(({ tag }) => tag === WRENCH)?.serial ?? '';
  await page.getByTestId(`wrench-${WRENCH}`).click();
  await page.getByTestId('wrench-serial').fill(serial.slice(-3));
  await page.getByTestId('wrench-serial-ok').click();
  for (const tick of await page.locator('[data-testid^="tick-"]').all()) await tick.click();
  await page.getByTestId('wrench-take').click();
  const shows = page.getByTestId('choice-thisPull');
  const pull = page.getByTestId('record');
  await shows.or(pull).first().waitFor();
  if (!(await shows.isVisible())) return;
  await pause(page); // answers that have just come up take no tap yet
  await shows.click();
};

const takePart = async ({ browser: { page }, shop }: StandBench): Promise<void> => {
  await page.getByTestId('part-number').fill('OD6-1');
  await page.getByTestId('part-batch').fill('B-1');
  await page.getByTestId('part-count').fill(String(shop.procedure.document.holes.length));
  await page.getByTestId('part-take').click();
};

/** The program was started again: nothing had been begun at the bolt (W9). */
const lookAtWork = async ({ browser: { page } }: StandBench): Promise<void> => {
  await pause(page);
  await page.getByTestId('choice-notBegun').or(page.getByTestId('choice-goOn')).click();
};

/** Follows every instruction that is no pull: looking at the work, parts, steps, wrenches. Ends with a pull or the review on the screen. */
export const untilPull = async (bench: StandBench): Promise<'pull' | 'review'> => {
  const { page } = bench.browser;
  const screens = {
    record: page.getByTestId('record'),
    step: page.getByTestId('step-done'),
    part: page.getByTestId('part-take'),
    wrench: page.getByTestId('wrench-tag'),
    look: page.getByTestId('look-at-work'),
    review: page.getByTestId('sign'),
  };
  const any = Object.values(screens).reduce((all, one) => all.or(one));
  for (;;) {
    await any.first().waitFor();
    if (await screens.review.isVisible()) return 'review';
    if (await screens.record.isVisible()) return 'pull';
    if (await screens.part.isVisible()) await takePart(bench);
    else if (await screens.wrench.isVisible()) await takeWrench(bench);
    else if (await screens.look.isVisible()) await lookAtWork(bench);
    else await screens.step.click();
    await pause(page);
  }
};

/**
 * The figures to type for the n-th reading of the head: inside the window, and not the digits of the one before (W6). The
 * last turn asks for end torque and number of pulls as well (W5).
 */
const figuresFor = (count: number, holes: number): string[] => {
  const pass = Math.floor(count / holes);
  const even = count % 2 === 0;
  if (pass === 0) return [even ? '30.2' : '29.7'];
  if (pass === 1) return [even ? '60.4' : '59.3'];
  if (pass === 2) return [even ? '89' : '91'];
  return even ? ['89', '150.5', '1'] : ['91', '152.5', '1'];
};

/** Types the reading of the pull on the screen and taps the button that records it. */
export const recordReading = async (bench: StandBench, count: number): Promise<void> => {
  const { page } = bench.browser;
  const [first = '', ...others] = figuresFor(count, bench.shop.procedure.document.holes.length);
  await page.keyboard.type(first, { delay: KEY_MS });
  for (const figure of others) {
    await pause(page);
    await page.keyboard.press('Enter');
    await page.keyboard.type(figure, { delay: KEY_MS });
  }
  await pause(page);
  await page.getByTestId('record').click();
};
