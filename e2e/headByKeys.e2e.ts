import { expect, test } from '@playwright/test';
import { startServerProcess, type ServerProcess } from '../tests/support/serverProcess';
import { ACCOUNTS, signInOffice } from './support/office';
import { StandTablet } from './support/standTablet';

/** A figure near the target, another one at each bolt: the same digits twice would be asked about (W6). */
const torque = (target: string) => (bolt: string) => `${target}.${Number(bolt) % 9}`;

test.describe('the same head by keyboard alone', () => {
  let server: ServerProcess;

  test.beforeAll(async () => {
    test.setTimeout(180_000);
    server = await startServerProcess({ seeded: true, pages: true });
  });
  test.afterAll(() => server.close());

  test('is walked, corrected, replaced and signed with digits and Enter', async ({ page }) => {
    test.setTimeout(600_000);
    const hands = new StandTablet(page);
    await page.goto(server.url);
    await page.getByRole('button', { name: /open the stand/i }).click();
    await page.waitForURL(/sign-in/);
    await page.goto(`${server.url}/stand/sign-in`);
    await hands.signIn('Ilse', '481516');
    await hands.begin('24-0615', /Cylinder head/);

    const stand = new StandTablet(page, true);
    await stand.takePart('OD6-HG2', '6643-A', '1');
    await stand.takePart('OD6-HB14', '5747-R', '15');
    await stand.prepare();
    await stand.takeWrench('W-06', '061');
    for (const target of ['30', '60']) {
      await stand.recordUntil('3', torque(target));
      if (target === '30') await stand.correct('29.8');
      await stand.recordUntil('14', torque(target));
      await stand.record(`${target}.6`);
    }
    await stand.prepare();
    await stand.takeWrench('W-03', '112');
    await stand.recordUntil('5', () => '91');
    await stand.record('104');
    await stand.replaceBolt();
    for (const figure of ['30.3', '60.4']) await stand.record(figure);
    await stand.prepare();
    await stand.recordUntil('14', () => '89');
    await stand.record('90');
    for (let done = 0; done < 14; done += 1) await stand.recordTurn('91', String(150 + done));
    await stand.sign('tightenedAsRecorded', '481516');
    await stand.countersign('checkedRecord', 'Tobias', '730294');
    await expect(stand.id('tray')).toContainText(/all sent/, { timeout: 30_000 });

    const clerk = await signInOffice(server.url, ACCOUNTS.clerk);
    const states = async (): Promise<string[]> => {
      const { walks } = await clerk.call<{ walks: { state: string }[] }>('GET', '/api/walks?q=OD6-118251');
      return walks.map(({ state }) => state);
    };
    await expect.poll(states, { timeout: 30_000 }).toEqual(['finished']);
  });
});
