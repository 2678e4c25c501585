import { CSRF_HEADER, type OfficeMe } from '@shared/contracts/officeAuth.contract';
import type { OfficeWalkWhole } from '@shared/contracts/walks.contract';
import { ask, type DemoTablet } from './demoTablet';
import { seedId } from './ids';
import { documentHash } from './insertShop';
import { demoProcedures } from './procedures';
import { person, type SeedShop } from './shops';
import { seededRandom } from './walker/random';
import type { Draft } from './walker/walkBook';
import { openLog, walkOn } from './walker/walkLog';
import { atKind, isAt, type WalkPlan } from './walker/walkOn';

const HOUR_MS = 3_600_000;

/** One walk of the demo: on which joint, by whom, how far, and what is written at the end. */
interface DemoWalk {
  job: string;
  procedure: string;
  technician: string;
  hoursAgo: number;
  plan: WalkPlan;
  last?: Omit<Draft, 'by'>;
}

const release = { type: 'walk.released', data: { to: 'shop' } } as Omit<Draft, 'by'>;
const handOver = { type: 'walk.paused', data: { cause: 'handedOver' } } as Omit<Draft, 'by'>;
const allSigned = atKind('countersign');

/** Finished with a replaced bolt, finished, half walked, waiting for a countersignature, and one to be sent back. */
const demoWalks: readonly DemoWalk[] = [
  {
    job: '24-0598',
    procedure: 'HEAD-D6',
    technician: 'Ilse',
    hoursAgo: 30,
    plan: {
      slips: [
        { kind: 'typedWrong', at: { pass: 'p2', hole: 'h9' }, value: '6.1', reason: 'point in the wrong place' },
        { kind: 'value', at: { pass: 'p3', hole: 'h5' }, value: '104' },
      ],
      settle: (_deviation, { offered }) => (offered.includes('replace') ? 'replace' : undefined),
    },
  },
  { job: '24-0606', procedure: 'FLY-F4', technician: 'Nadia', hoursAgo: 27, plan: {} },
  { job: '24-0609', procedure: 'HEAD-D6', technician: 'Nadia', hoursAgo: 7, plan: { until: allSigned }, last: release },
  { job: '24-0606', procedure: 'MAN-F4', technician: 'Ilse', hoursAgo: 24, plan: { until: allSigned }, last: release },
  {
    job: '24-0613',
    procedure: 'HEAD-D6',
    technician: 'Ilse',
    hoursAgo: 2,
    plan: { until: isAt({ pass: 'p3', hole: 'h7' }) },
    last: handOver,
  },
];

function settingOf(shop: SeedShop, tablet: DemoTablet, walk: DemoWalk, nowMs: number) {
  const job = shop.jobs.find(({ number }) => number === walk.job);
  const joint = job?.joints.find(({ procedure }) => procedure === walk.procedure);
  const procedure = demoProcedures.find(({ code }) => code === walk.procedure);
  if (!job || !joint || !procedure) throw new Error(`no job ${walk.job} with ${walk.procedure} in the demo`);
  const technician = person(walk.technician).id;
  const wrenches = new Map(tablet.catalogue.wrenches.map(({ id, snapshot }) => [id, snapshot]));
  return {
    job: job.id,
    joint: joint.id,
    procedure,
    revision: 1,
    hash: documentHash(procedure),
    tablet: tablet.id,
    boot: seedId(`boot ${walk.job} ${walk.procedure}`),
    known: tablet.catalogue.cursor,
    startMs: nowMs - walk.hoursAgo * HOUR_MS,
    people: Object.fromEntries(shop.people.map(({ id, roles }) => [id, roles])),
    pulls: technician,
    records: technician,
    supervisor: person('Tobias').id,
    wrenches: shop.wrenches.flatMap(({ id }) => wrenches.get(id) ?? []),
  };
}

/** Walks one walk as its technician did, signs it with the tablet's key and sends it. Returns the walk's id. */
async function walkOne(shop: SeedShop, tablet: DemoTablet, walk: DemoWalk, nowMs: number): Promise<string> {
  const id = seedId(`walk ${walk.job} ${walk.procedure}`);
  const jwes = new Map<string, string>();
  const pinOf = (owner: string): string => shop.people.find((one) => one.id === owner)?.pin ?? '';
  const setting = settingOf(shop, tablet, walk, nowMs);
  const log = openLog(setting, {
    shop: shop.id,
    walk: id,
    tablet: tablet.signer,
    crypto: tablet.crypto,
    seal: async (what) => {
      const made = await tablet.seal(what, pinOf(what.person));
      jwes.set(made.seal, made.jwe);
      return made.seal;
    },
  });
  await walkOn(log, { ...walk.plan, random: seededRandom(walk.hoursAgo) });
  if (walk.last) await log.issue({ ...walk.last, by: setting.records } as Draft);
  const seals = log.signed.flatMap(({ hash, text }) =>
    [...jwes].filter(([seal]) => text.includes(seal)).map(([, jwe]) => ({ hash, jwe })),
  );
  await tablet.send(id, log.signed, seals);
  return id;
}

/** What somebody does at the office: signs in, and sends every write with the token against forged requests. */
async function officeOf(url: string, shop: SeedShop, first: string) {
  const { email, password } = person(first);
  const answer = await fetch(`${url}/api/office/sign-in`, {
    method: 'POST',
    headers: { 'content-type': 'application/json' },
    body: JSON.stringify({ email, password, shop: shop.id }),
  });
  if (!answer.ok) throw new Error(`${email} cannot sign in: ${await answer.text()}`);
  const { csrf } = (await answer.json()) as OfficeMe;
  const cookie = answer.headers
    .getSetCookie()
    .map((line) => line.split(';')[0])
    .join('; ');
  return <T>(method: string, path: string, body?: unknown): Promise<T> =>
    ask<T>(`${url}${path}`, method, body, { cookie, [CSRF_HEADER]: csrf });
}

/** Writes the demo's walks through the server: one is sent back at the office, one gets its proof. */
export async function sendDemoWalks(url: string, shop: SeedShop, tablet: DemoTablet, nowMs: number): Promise<void> {
  const ids = new Map<DemoWalk, string>();
  for (const walk of demoWalks) ids.set(walk, await walkOne(shop, tablet, walk, nowMs));
  const idOf = (job: string, procedure: string): string =>
    [...ids].find(([walk]) => walk.job === job && walk.procedure === procedure)?.[1] ?? '';
  const tobias = await officeOf(url, shop, 'Tobias');
  const back = idOf('24-0606', 'MAN-F4');
  const { walk } = await tobias<OfficeWalkWhole>('GET', `/api/walks/${back}`);
  await tobias('POST', `/api/walks/${back}/send-back`, {
    head: walk.head,
    pin: person('Tobias').pin,
    items: [{ hole: 'h3', action: 'look', note: 'Photograph the nut of hole 3 with its washer.' }],
  });
  const perrin = await officeOf(url, shop, 'Perrin');
  await perrin('POST', `/api/walks/${idOf('24-0598', 'HEAD-D6')}/proof`, {});
}
