import { execFileSync } from 'node:child_process';
import { expect, test, type Page } from '@playwright/test';
import { startServerProcess, type ServerProcess } from '../tests/support/serverProcess';
import { ACCOUNTS } from './support/office';

const SUPERVISOR_PIN = '730294';

async function signIn(page: Page, { email, password }: { email: string; password: string }): Promise<void> {
  await page.getByLabel('E-mail').fill(email);
  await page.getByLabel('Password').fill(password);
  await page.getByRole('button', { name: 'Sign in' }).click();
}

async function enterAsSupervisor(page: Page, url: string): Promise<void> {
  await page.goto(`${url}/office/sign-in`);
  await signIn(page, ACCOUNTS.supervisor);
  await page.waitForURL(/\/office\/countersign/);
}

test.describe('the office', () => {
  let server: ServerProcess;

  test.beforeAll(async () => {
    test.setTimeout(180_000);
    server = await startServerProcess({ seeded: true, pages: true });
  });
  test.afterAll(() => server.close());

  test('asks who comes, says how long to wait, and leads back to where one wanted', async ({ page }) => {
    await page.goto(`${server.url}/office/jobs?q=OD6-118090`);
    await page.waitForURL(/sign-in/);
    await signIn(page, { email: 'perrin@brindle-lane', password: 'x' });
    await expect(page.getByText('This is no e-mail address.')).toBeVisible();
    const wait = page.getByText(/Too many wrong passwords in a row\. Wait \d+ seconds?/);
    await expect(async () => {
      await signIn(page, { email: 'oda@brindle-lane.example', password: 'wrong' });
      await expect(wait.or(page.getByText('E-mail address or password is not right.'))).toBeVisible();
      await expect(wait).toBeVisible({ timeout: 400 });
    }).toPass();
    await expect(page.getByRole('button', { name: 'Sign in' })).toBeDisabled();
    await page.getByRole('button', { name: /Tobias Renquist/ }).click();
    await page.waitForURL(/\/office\/jobs\?q=OD6-118090/);
    await expect(page.getByText('24-0609')).toBeVisible();
    await page.getByRole('button', { name: 'Sign out' }).click();
    await expect(page).toHaveURL(`${server.url}/office/sign-in`);
    await page.getByRole('button', { name: /Perrin Halloway/ }).click();
    await page.waitForURL(/\/office\/proofs/);
  });

  test('finds jobs by keyboard and opens one; two of one number are refused and nothing typed is lost', async ({
    page,
  }) => {
    await enterAsSupervisor(page, server.url);
    await page.getByRole('link', { name: 'Jobs' }).click();
    await expect(page.getByRole('heading', { level: 1 })).toHaveText('Jobs');
    await expect(page.getByText('24-0609')).toBeVisible();
    await page.keyboard.press('/');
    await page.keyboard.type('118090');
    await page.waitForURL(/q=118090/);
    await expect(page.getByRole('row')).toHaveCount(2);
    await page.keyboard.press('Escape');
    await page.waitForURL((url) => !url.search.includes('q='));
    await page.getByRole('heading', { level: 1 }).click();
    await page.keyboard.press('ArrowDown');
    await page.keyboard.press('ArrowDown');
    const second = (await page.locator('[data-row]').nth(1).innerText()).trim();
    await page.keyboard.press('Enter');
    await expect(page.getByRole('heading', { level: 1 })).toHaveText(`Job ${second}`);

    await page.goto(`${server.url}/office/jobs/new`);
    await page.getByLabel('Job number').fill('24-0609');
    await page.getByLabel(/^VIN/).fill('1M8GDM9AXKPO42788');
    await expect(page.getByText('No VIN holds the letter O (place 12): 0 is meant.')).toBeVisible();
    await page.getByLabel(/^VIN/).fill('1M8GDM9A1KP042788');
    await expect(page.getByText(/The check digit does not fit: place 9 is 1/)).toBeVisible();
    await page.getByRole('combobox', { name: 'Procedure' }).click();
    await page.getByRole('option', { name: /ROD-D6/ }).click();
    await page.getByLabel(/^Bank/).fill('left');
    await page.reload();
    await expect(page.getByLabel(/^Bank/)).toHaveValue('left');
    await page.getByRole('button', { name: 'Open the job' }).click();
    await expect(page.getByText(/Another job has this number already/)).toBeVisible();
    await expect(page.getByRole('link', { name: 'That job' })).toBeVisible();
    await page.getByLabel('Job number').fill('24-0700');
    await page.getByRole('button', { name: 'Open the job' }).click();
    await expect(page.getByRole('heading', { level: 1 })).toHaveText('Job 24-0700');
    await expect(page.getByText('never opened')).toBeVisible();
    await expect(page.getByText('do not run')).toBeVisible();
  });

  test('countersigns with a PIN and a meaning, issues, prints, and revokes', async ({ page }) => {
    await enterAsSupervisor(page, server.url);
    await page.getByText('24-0609').click();
    await expect(page.getByText('56 of 56 final readings in window.')).toBeVisible();
    await expect(page.getByText(/Record checked here: \d+ events/)).toBeVisible();
    await page.getByRole('button', { name: 'Countersign' }).click();
    const send = page.getByRole('button', { name: 'Countersign this record' });
    await page.getByLabel(/saw the joint open/).check();
    await page.getByLabel('Your PIN').fill('000000');
    await send.click();
    await expect(page.getByText('The PIN is not right.')).toBeVisible();
    await page.getByLabel('Your PIN').fill(SUPERVISOR_PIN);
    await send.click();
    await expect(page.getByText('Countersigned.')).toBeVisible();

    await page.getByRole('button', { name: 'Issue the proof' }).click();
    await expect(page.getByText(/^Recorded: 14 of 14 fasteners/)).toBeVisible();
    const proof = page.url();
    const download = page.waitForEvent('download');
    await page.getByRole('button', { name: 'Download the PDF' }).click();
    const file = await (await download).path();
    expect(execFileSync('pdftotext', ['-layout', file, '-']).toString()).toContain('24-0609');
    await page.goto(`${server.url}/office/proofs?q=118090`);
    await page.getByText('OD6-118090').click();
    await expect(page).toHaveURL(proof);
    await page.getByRole('button', { name: 'Revoke this proof' }).click();
    await page.getByLabel(/^Reason/).fill('Wrong engine');
    await page.getByRole('button', { name: 'Revoke for good' }).click();
    await expect(page.getByText(/^Revoked: Wrong engine/)).toBeVisible();
  });

  test('sends back hole by hole, and lists each use of a PIN to its owner', async ({ page }) => {
    await enterAsSupervisor(page, server.url);
    await page.goto(`${server.url}/office/jobs?q=24-0609`);
    await page.getByText('24-0609').click();
    await page.locator('table a').first().click();
    await page.getByRole('button', { name: 'Send back' }).click();
    await page.locator('[data-hole]').nth(2).click();
    await page.getByLabel('What is wrong, in a sentence').fill('Washer looks cocked on the photo');
    await page.getByLabel('Your PIN').fill(SUPERVISOR_PIN);
    await page.getByRole('button', { name: 'Send back one place' }).click();
    await expect(page.getByText('Sent back: the tablets show it.')).toBeVisible();
    await expect(page.getByText(/sent back: “Washer looks cocked/)).toBeVisible();

    await page.getByRole('link', { name: /Your PIN/ }).click();
    const use = page.getByRole('listitem').filter({ hasText: 'A walk sent back' }).filter({ hasText: '24-0609' });
    await use.getByRole('button', { name: 'Not mine' }).click();
    await use.getByRole('button', { name: 'It was not me' }).click();
    await expect(use.getByText('Not mine')).toBeVisible();
    await expect(use.getByRole('button')).toHaveCount(0);
  });

  test('shows each role its own', async ({ page }) => {
    await page.goto(`${server.url}/office`);
    await page.getByRole('button', { name: /Ilse Marchetti-Vane/ }).click();
    await page.waitForURL(/\/office\/jobs/);
    await expect(page.getByRole('link', { name: 'Countersign' })).toHaveCount(0);
    await page.goto(`${server.url}/office/proofs`);
    await expect(page.getByText('Your roles do not allow this.')).toBeVisible();
    await page.getByRole('button', { name: 'Sign out' }).click();
    await page.getByRole('button', { name: /Desmond Achterberg/ }).click();
    await page.getByRole('link', { name: 'Shop' }).click();
    await page.getByRole('button', { name: 'Code for a new tablet' }).click();
    await expect(page.getByText(/Type this on the new tablet, once/)).toBeVisible();
  });
});
