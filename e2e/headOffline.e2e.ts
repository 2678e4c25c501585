import { expect, test } from '@playwright/test';
import { judgePdf } from '../tests/support/pdfTools';
import { startServerProcess, type ServerProcess } from '../tests/support/serverProcess';
import { ACCOUNTS, signInOffice } from './support/office';
import { StandTablet } from './support/standTablet';
import { readingForHole } from './support/walkBehind';
import { makeProfile, removeProfile, startTabletBrowser, type TabletBrowser } from './support/tabletBrowser';

const JOB = '24-0615';
const SERIAL = 'OD6-118251';

/** A figure near the target, another one at each bolt: the same digits twice would be asked about (W6). */
const torque = (target: string) => (bolt: string) => `${target}.${Number(bolt) % 9}`;

test.describe('a cylinder head, walked without the server', () => {
  let server: ServerProcess;
  let browser: TabletBrowser;
  const profile = makeProfile();

  test.beforeAll(async () => {
    test.setTimeout(180_000);
    server = await startServerProcess({ seeded: true, pages: true });
    browser = await startTabletBrowser(profile);
  });
  test.afterAll(async () => {
    await browser.close();
    removeProfile(profile);
    await server.close();
  });

  test('is recorded, replaced, interrupted, signed, sent, found and proved', async ({ browser: other }) => {
    test.setTimeout(600_000);
    const admin = await signInOffice(server.url, ACCOUNTS.admin);
    const { code } = await admin.call<{ code: string }>('POST', '/api/tablets/enrolment-codes', { note: 'stand' });
    let stand = new StandTablet(browser.page);
    await stand.page.goto(`${server.url}/stand/enrol`);
    await stand.enrol(code, 'Stand 9');
    await stand.signIn('Nadia', '592037');
    await stand.id(`job-${JOB}`).waitFor();
    await stand.page.evaluate(() => navigator.serviceWorker.ready.then(() => undefined));

    await server.stop();
    await stand.begin(JOB, /Cylinder head/);
    await stand.takePart('OD6-HG2', '6643-A', '1');
    await stand.takePart('OD6-HB14', '5747-R', '15');
    await stand.prepare();
    await stand.takeWrench('W-06', '061');

    await test.step('pass 1: a tap on another head records nothing; a different bolt is told', async () => {
      await stand.recordUntil('4', torque('30'));
      await stand.tapHead('9');
      await expect(stand.id('refusal')).toBeVisible();
      await expect(stand.page.getByText('3 bolts done')).toBeVisible();
      const attempt = await readingForHole(stand.page, 'h9');
      expect(attempt.refused).toBe('notTheInstruction');
      expect(attempt.eventsAfter).toBe(attempt.eventsBefore);
      await stand.id('different').click();
      await stand.record('29.9');
      expect(await stand.bolt()).toBe('4');
      await stand.recordUntil('14', torque('30'));
      await stand.record('29.6');
    });

    await test.step('pass 2: a typing error is voided and typed again without a pull', async () => {
      await stand.recordUntil('3', torque('60'));
      await stand.correct('59.8');
      await stand.recordUntil('14', torque('60'));
      await stand.record('59.6');
      await stand.prepare();
    });

    await test.step('pass 3: bolt 5 is over, replaced and walked again from pass 1', async () => {
      await stand.takeWrench('W-03', '112');
      await stand.recordUntil('5', () => '91');
      await stand.record('104');
      await stand.replaceBolt();
      for (const figure of ['30.3', '60.4']) await stand.record(figure);
      await stand.prepare();
      await stand.record('90');
      expect(await stand.bolt()).toBe('6');
      await stand.recordUntil('9', () => '89');
    });

    await test.step('the browser is killed and comes back on the exact instruction', async () => {
      await browser.kill9();
      browser = await startTabletBrowser(profile);
      stand = new StandTablet(browser.page);
      await stand.page.goto(server.url);
      await expect(stand.id('look-at-work')).toContainText(/pass 3 of 4.*bolt 9/i);
      await expect(stand.id('look-at-work')).toContainText(/Bolt 8/);
      await stand.choose('notBegun');
      expect(await stand.bolt()).toBe('9');
      await stand.recordUntil('14', () => '92');
      await stand.record('90');
    });

    await test.step('pass 4, then two signatures, all without the server', async () => {
      for (let done = 0; done < 14; done += 1) await stand.recordTurn('91', String(150 + done));
      await stand.sign('tightenedAsRecorded', '592037');
      await stand.countersign('checkedRecordAndJoint', 'Tobias', '730294');
      await expect(stand.id('tray')).toContainText(/waiting to send/);
    });

    await server.restart();
    await expect(stand.id('tray')).toContainText(/all sent/, { timeout: 30_000 });

    const clerk = await signInOffice(server.url, ACCOUNTS.clerk);
    const { walks } = await clerk.call<{ walks: { id: string; state: string }[] }>('GET', `/api/walks?q=${SERIAL}`);
    expect(walks.map(({ state }) => state)).toEqual(['finished']);
    const proof = await clerk.call<{ id: string; number: string; publicUrl: string }>(
      'POST',
      `/api/walks/${walks[0]?.id ?? ''}/proof`,
      {},
    );

    await test.step('the clerk finds the proof by engine serial and downloads the page', async () => {
      const context = await other.newContext({ viewport: { width: 1440, height: 900 } });
      const page = await context.newPage();
      await page.goto(`${server.url}/office/sign-in`);
      await page.getByLabel('E-mail', { exact: false }).first().fill(ACCOUNTS.clerk.email);
      await page.getByLabel('Password', { exact: false }).first().fill(ACCOUNTS.clerk.password);
      await page.keyboard.press('Enter');
      await page.waitForURL(/\/office(?!\/sign-in)/);
      await page.goto(`${server.url}/office/proofs?q=${SERIAL}`);
      await expect(page.getByText(proof.number).first()).toBeVisible();
      const pdf = await context.request.get(`${server.url}/api/proofs/${proof.id}/pdf?size=letter`);
      const judged = await judgePdf(await pdf.body());
      const text = judged.text.replace(/\s+/g, ' ');
      for (let done = 0; done < 14; done += 1) expect(text).toContain(String(150 + done));
      expect(text).toMatch(/56 of 56/);
      expect(text).toMatch(/104/);
      expect(judged.qrCodes.join(' ')).toContain(proof.publicUrl.split('/p/')[1]);
      await context.close();
    });

    await test.step('a stranger sees every reading judged again', async () => {
      const context = await other.newContext();
      const page = await context.newPage();
      await page.goto(`${server.url}/p/${proof.publicUrl.split('/p/')[1] ?? ''}`);
      await expect(page.getByTestId('proof-verdict')).toContainText('This proof holds.');
      await expect(page.getByTestId('proof-verdict')).toContainText(/56 .*judged again|judged again.*56/i);
      await context.close();
    });
  });
});
