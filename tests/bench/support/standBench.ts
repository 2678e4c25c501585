import { withShop } from '../../../server/tenancy/withShop';
import { makeProfile, removeProfile, startTabletBrowser, type TabletBrowser } from '../../../e2e/support/tabletBrowser';
import { startRealServer, type RealServer } from '../../integration/support/realServer';
import { stored } from '../../integration/support/stored';
import { enrolmentCode } from '../../integration/support/testTablet';
import { makeJob, makeTestShop, type TestShop } from '../../integration/support/testShop';
import { ensureMigratedTemplate } from '../../support/testDatabase';

/** A real server with the built pages and a tablet's browser on a profile on disk, enrolled and signed in. */
export interface StandBench {
  server: RealServer;
  shop: TestShop;
  profile: string;
  browser: TabletBrowser;
  /** Ends the browser at once and starts it again on the same profile. */
  killBrowser(): Promise<void>;
  close(): Promise<void>;
}

/** A shop with the demo's head and wrenches that are in date whenever this is run. */
const makeShop = async (server: RealServer): Promise<TestShop> => {
  const shop = await makeTestShop(server.deps);
  await stored(server, `update wrenches set snapshot = jsonb_set(snapshot, '{due,date}', 'null') where shop_id = $1`, [
    shop.id,
  ]);
  return shop;
};

/** One more job with a head to walk; the tablet has it at its next contact. */
export const addHead = (bench: Pick<StandBench, 'server' | 'shop'>, number: string) =>
  withShop(bench.server.deps.client, bench.shop.id, (tx) => makeJob(tx, bench.shop.procedure.document.code, number));

const enrol = async ({ page }: TabletBrowser, server: RealServer, shop: TestShop): Promise<void> => {
  const address = `http://localhost:${server.process.port}`;
  await page.goto(`${address}/stand/enrol`);
  await page.getByTestId('enrol-code').fill(await enrolmentCode(server, shop));
  await page.getByTestId('enrol-name').fill('Stand 1');
  await page.getByTestId('enrol-go').click();
  const { technician } = shop.people;
  await page.getByTestId(`person-${technician.id}`).click();
  await page.keyboard.type(technician.pin, { delay: 60 });
  await page.waitForURL('**/stand/jobs');
};

/** Starts everything; close it. */
export const openStand = async (): Promise<StandBench> => {
  await ensureMigratedTemplate();
  const server = await startRealServer({ pages: true });
  const profile = makeProfile();
  const bench: StandBench = {
    server,
    profile,
    shop: await makeShop(server),
    browser: await startTabletBrowser(profile),
    async killBrowser() {
      await bench.browser.kill9();
      bench.browser = await startTabletBrowser(profile);
    },
    async close() {
      await bench.browser.close();
      removeProfile(profile);
      await server.close();
    },
  };
  await enrol(bench.browser, server, bench.shop).catch(async (error: unknown) => {
    await bench.close();
    throw error;
  });
  return bench;
};
