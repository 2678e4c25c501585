import { AxeBuilder } from '@axe-core/playwright';
import { expect, test, type Page } from '@playwright/test';
import { startServerProcess, type ServerProcess } from '../tests/support/serverProcess';
import { StandTablet } from './support/standTablet';

/** What axe has against the screen as it stands, in both themes. */
async function complaints(page: Page): Promise<string[]> {
  const found: string[] = [];
  for (const colorScheme of ['light', 'dark'] as const) {
    await page.emulateMedia({ colorScheme });
    await page.waitForTimeout(150);
    const { violations } = await new AxeBuilder({ page }).analyze();
    found.push(...violations.map(({ id, nodes }) => `${colorScheme} ${id}: ${nodes[0]?.html ?? ''}`));
  }
  await page.emulateMedia({ colorScheme: 'light' });
  return found;
}

test.describe('the screens of the stand', () => {
  let server: ServerProcess;

  test.beforeAll(async () => {
    test.setTimeout(180_000);
    server = await startServerProcess({ seeded: true, pages: true });
  });
  test.afterAll(() => server.close());

  test('leave nothing for axe to find, in light and dim', async ({ page }) => {
    test.setTimeout(240_000);
    const stand = new StandTablet(page);
    const clean = (screen: string): Promise<void> =>
      test.step(screen, async () => expect(await complaints(page), screen).toEqual([]));
    await page.goto(server.url);
    await page.getByRole('button', { name: /open the stand/i }).waitFor();
    await clean('the two doors');
    await page.goto(`${server.url}/stand/enrol`);
    await stand.id('enrol-code').waitFor();
    await clean('enrolment');
    await page.goto(server.url);
    await page.getByRole('button', { name: /open the stand/i }).click();
    await page.waitForURL(/sign-in/);
    await clean('name tiles');
    await stand.signIn('Ilse', '481516');
    await stand.id('go-on').waitFor();
    await clean('a paused walk');
    await stand.id('go-on').click();
    await stand.id('look-at-work').waitFor();
    await clean('look at the work');
    await stand.choose('notBegun');
    await stand.id('record').waitFor();
    await clean('a turn');
    await stand.id('wrong').click();
    await page.waitForTimeout(300);
    await clean('something is wrong');
    await page.getByRole('button', { name: /nothing/i }).click();
    await stand.record('104');
    await page.getByRole('button', { name: /put in a new bolt/i }).waitFor();
    await clean('past its window');
    await stand.id('settle-later').click();
    await stand.id('leave').waitFor();
    await stand.id('leave').click();
    await stand.id('job-24-0615').waitFor();
    await clean('jobs');
    await stand.id('job-24-0615').click();
    await page.getByRole('button', { name: /Cylinder head/ }).waitFor();
    await clean('a job');
    await page.getByRole('button', { name: /Cylinder head/ }).click();
    await stand.id('begin').waitFor();
    await clean('a joint');
    await stand.id('begin').click();
    await stand.id('part-number').waitFor();
    await clean('new parts');
    await stand.id('tray').click();
    await page.waitForURL(/stand\/tablet/);
    await clean('what is on this tablet');
    await page.goto(`${server.url}/stand/settings`);
    await page.waitForTimeout(500);
    await clean('settings');
  });
});
