import AxeBuilder from '@axe-core/playwright';
import { expect, test, type Page } from '@playwright/test';
import { startServerProcess, type ServerProcess } from '../tests/support/serverProcess';
import { ACCOUNTS } from './support/office';

interface Named {
  id: string;
}

/** One address for every page of the office, with something on it. */
async function addresses(page: Page, url: string): Promise<string[]> {
  const read = async <T>(path: string): Promise<T> => (await page.request.get(url + path)).json() as Promise<T>;
  const { jobs } = await read<{ jobs: Named[] }>('/api/jobs');
  const { walks } = await read<{ walks: Named[] }>('/api/walks');
  const { proofs } = await read<{ proofs: Named[] }>('/api/proofs');
  const { procedures } = await read<{ procedures: Named[] }>('/api/procedures');
  return [
    ...['jobs', 'jobs/new', 'jobs?q=nothing', 'countersign', 'proofs', 'crib', 'procedures', 'shop', 'pin', 'nowhere'],
    `jobs/${jobs[0]?.id}`,
    `jobs/${jobs[0]?.id}/change`,
    `proofs/${proofs[0]?.id}`,
    ...walks.map(({ id }) => `walks/${id}`),
    ...procedures.map(({ id }) => `procedures/${id}`),
  ];
}

const looks = [
  { theme: 'light', locale: 'en', width: 1440, height: 900 },
  { theme: 'dim', locale: 'es', width: 1024, height: 768 },
] as const;

test.describe('pages of the office', () => {
  let server: ServerProcess;

  test.beforeAll(async () => {
    test.setTimeout(180_000);
    server = await startServerProcess({ seeded: true, pages: true });
  });
  test.afterAll(() => server.close());

  for (const { theme, locale, width, height } of looks) {
    test(`are sound for everybody, ${theme} and in ${locale}`, async ({ page }) => {
      test.setTimeout(240_000);
      await page.setViewportSize({ width, height });
      await page.addInitScript((kept) => window.localStorage.setItem('boltwalk-looks', JSON.stringify(kept)), {
        theme,
        locale,
        hand: 'right',
        torqueUnit: 'asWritten',
      });
      const broken: string[] = [];
      page.on('pageerror', (error) => broken.push(error.message));
      await page.goto(`${server.url}/office/sign-in`);
      await expect(page.getByRole('heading', { level: 1 })).toBeVisible();
      expect((await new AxeBuilder({ page }).analyze()).violations, 'sign-in').toEqual([]);
      await page.request.post(`${server.url}/api/office/sign-in`, { data: ACCOUNTS.admin });
      for (const address of await addresses(page, server.url)) {
        await page.goto(`${server.url}/office/${address}`, { waitUntil: 'networkidle' });
        await expect(page.getByRole('heading', { level: 1 })).toBeVisible();
        expect((await new AxeBuilder({ page }).analyze()).violations, address).toEqual([]);
        const wider = await page.evaluate(() => document.body.scrollWidth - document.documentElement.clientWidth);
        expect(wider, `${address} is wider than the window`).toBeLessThanOrEqual(0);
      }
      expect(broken).toEqual([]);
    });
  }
});
