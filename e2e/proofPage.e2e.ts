import { AxeBuilder } from '@axe-core/playwright';
import { expect, request, test, type APIRequestContext, type Page } from '@playwright/test';
import pg from 'pg';
import type { ProofWhole } from '@shared/contracts/proofs.contract';
import type { OfficeWalk } from '@shared/contracts/walks.contract';
import { judgePdf } from '../tests/support/pdfTools';
import { startServerProcess, type ServerProcess } from '../tests/support/serverProcess';

/** The demo's clerk, as its first page shows the account. */
const CLERK = { email: 'perrin@brindle-lane.example', password: 'perrin-shows-the-demo' };

/** A proof of the demo, seen by somebody who only has its link. */
test.describe('the page behind the QR code', () => {
  let server: ServerProcess;
  let clerk: APIRequestContext;
  let proof: ProofWhole;

  test.beforeAll(async () => {
    test.setTimeout(180_000);
    server = await startServerProcess({ seeded: true, pages: true });
    clerk = await request.newContext({ baseURL: server.url });
    const { csrf } = (await (await clerk.post('/api/office/sign-in', { data: CLERK })).json()) as { csrf: string };
    const list = (await (await clerk.get('/api/walks')).json()) as { walks: OfficeWalk[] };
    const finished = list.walks.find(({ state, purpose }) => state === 'finished' && purpose === 'finalAssembly');
    const headers = { 'x-boltwalk-csrf': csrf };
    const issued = await clerk.post(`/api/walks/${finished?.id ?? ''}/proof`, { data: {}, headers });
    expect(issued.status(), await issued.text()).toBe(201);
    proof = (await issued.json()) as ProofWhole;
  });
  test.afterAll(async () => {
    await clerk.dispose();
    await server.close();
  });

  const open = async (page: Page): Promise<void> => {
    const failed: string[] = [];
    page.on('pageerror', (error) => failed.push(error.message));
    page.on('console', (line) => void (line.type() === 'error' && failed.push(line.text())));
    await page.goto(`${server.url}/p/${proof.publicUrl.split('/p/')[1] ?? ''}`);
    await expect(page.getByTestId('proof-verdict').locator('h1')).toBeVisible();
    await expect(page.locator('.waiting')).toHaveCount(0);
    expect(failed).toEqual([]);
  };

  test('says that the proof holds, in light and dim, with nothing for axe to find', async ({ page }) => {
    for (const colorScheme of ['light', 'dark'] as const) {
      await page.emulateMedia({ colorScheme });
      await open(page);
      await expect(page.getByTestId('proof-verdict')).toContainText('This proof holds.');
      await expect(page.getByTestId('proof-verdict')).toContainText(/readings? judged again/);
      expect((await new AxeBuilder({ page }).analyze()).violations).toEqual([]);
    }
  });

  test('checks the file that is attached to the PDF, names and all, and sends it nowhere', async ({ page }) => {
    const pdf = await clerk.get(`/api/proofs/${proof.id}/pdf?size=letter`);
    const [file] = (await judgePdf(await pdf.body())).attachments;
    await open(page);
    await expect(page.getByTestId('proof-sheet')).toContainText('technician 1');
    const posted: string[] = [];
    page.on('request', (request) => void (request.method() !== 'GET' && posted.push(request.url())));
    const buffer = Buffer.from(file?.text ?? '');
    await page.setInputFiles('input[type=file]', { name: 'proof.json', mimeType: 'application/json', buffer });
    await expect(page.getByTestId('proof-verdict')).toContainText('This file holds as it was issued.');
    await expect(page.getByTestId('proof-sheet')).not.toContainText('technician 1');
    expect(posted).toEqual([]);
  });

  test('names the event of which one character was changed in the database', async ({ page }) => {
    const client = new pg.Client({ connectionString: server.database.superUrl });
    await client.connect();
    await client.query(`begin; alter table walk_events disable trigger insert_only;
      update walk_events set bytes = set_byte(bytes, 40, get_byte(bytes, 40) # 1) where walk_id = '${proof.walk}' and seq = 7;
      alter table walk_events enable trigger insert_only; commit`);
    await client.end();
    await open(page);
    await expect(page.getByTestId('proof-verdict')).toContainText('Broken at event 7');
  });
});
