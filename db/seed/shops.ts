import type { WrenchSnapshot } from '@shared/crib/wrench';
import type { Role } from '@shared/people/roles';
import type { Purpose } from '@shared/walk/events';
import { DEMO_ACCOUNTS, DEMO_SHOP } from '../demoAccounts';
import { seedId } from './ids';
import { brindleWrenches, secondShopWrenches } from './wrenches';

/** A joint of a demo job: which procedure, and where on the engine. */
export interface SeedJoint {
  id: string;
  procedure: string;
  bank: string;
  castingNumber: string;
  purpose: Purpose;
}

/** A job of the demo. VINs are invented (they begin with ZZ9, which no maker has) and have a valid check digit. */
export interface SeedJob {
  id: string;
  number: string;
  customer: string;
  family: string;
  model: string;
  serial: string;
  vin: string;
  claim: string;
  odometer: { value: string; unit: 'km' | 'mi' } | null;
  hours: string | null;
  daysAgo: number;
  joints: SeedJoint[];
}

/** Everything a demo shop begins with. */
export interface SeedShop {
  id: string;
  name: string;
  address: string;
  prefix: string;
  timeZone: string;
  people: { id: string; name: string; email: string; password: string; pin: string; roles: Role[] }[];
  wrenches: WrenchSnapshot[];
  jobs: SeedJob[];
}

/** Person of the demo by first name. */
export const person = (first: string): SeedShop['people'][number] => {
  const found = DEMO_ACCOUNTS.find(({ name }) => name.startsWith(`${first} `));
  if (!found) throw new Error(`nobody called ${first} in the demo`);
  return { ...found, roles: [...found.roles] };
};

interface JobLine {
  number: string;
  customer: string;
  engine: 'Ossery D6 3.8' | 'Farrow F4 2.2';
  serial: string;
  vin?: string;
  claim?: string;
  km?: string;
  hours?: string;
  daysAgo: number;
  joints: [procedure: string, bank: string, casting: string][];
}

// prettier-ignore
const brindleJobs: readonly JobLine[] = [
  { number: '24-0613', customer: 'Tallow Reach Haulage', engine: 'Ossery D6 3.8', serial: 'OD6-118204', vin: 'ZZ9KD63X9TB004417', claim: 'WR-88120', km: '84210', daysAgo: 0, joints: [['HEAD-D6', '', 'OD6-HC-4402']] },
  { number: '24-0598', customer: 'Saltmeadow Ferries', engine: 'Ossery D6 3.8', serial: 'OD6-117733', vin: 'ZZ9KD63X4TB003921', claim: 'WR-87944', km: '121870', daysAgo: 12, joints: [['HEAD-D6', '', 'OD6-HC-4377'], ['MAIN-D6', '', 'OD6-BL-2210']] },
  { number: '24-0606', customer: 'Orchard Vale Council', engine: 'Farrow F4 2.2', serial: 'FF4-020931', km: '56340', daysAgo: 6, joints: [['FLY-F4', '', 'F4-FW-118'], ['MAN-F4', '', 'F4-EM-077']] },
  { number: '24-0609', customer: 'Harrow & Pell Plant Hire', engine: 'Ossery D6 3.8', serial: 'OD6-118090', claim: 'WR-88063', hours: '4120', daysAgo: 4, joints: [['HEAD-D6', '', 'OD6-HC-4398'], ['ROD-D6', '', 'OD6-BL-2244']] },
  { number: '24-0611', customer: 'Fenwick Dairies', engine: 'Farrow F4 2.2', serial: 'FF4-021077', vin: 'ZZ9FF42X4TC000318', km: '23015', daysAgo: 2, joints: [['HUB-F4', 'front left', ''], ['FLY-F4', '', 'F4-FW-121']] },
  { number: '24-0615', customer: 'Brightwater Pumps', engine: 'Ossery D6 3.8', serial: 'OD6-118251', hours: '910', daysAgo: 0, joints: [['HEAD-D6', '', 'OD6-HC-4410'], ['MAIN-D6', '', 'OD6-BL-2251']] },
];

// prettier-ignore
const secondJobs: readonly JobLine[] = [
  { number: '24-0613', customer: 'Kestrel Lane Taxis', engine: 'Farrow F4 2.2', serial: 'FF4-019002', km: '98100', daysAgo: 1, joints: [['FLY-F4', '', 'F4-FW-090']] },
];

function jobOf(shop: string, line: JobLine): SeedJob {
  const id = seedId(`${shop} job ${line.number}`);
  return {
    id,
    number: line.number,
    customer: line.customer,
    family: line.engine.split(' ')[0] ?? '',
    model: line.engine.split(' ').slice(1).join(' '),
    serial: line.serial,
    vin: line.vin ?? '',
    claim: line.claim ?? '',
    odometer: line.km === undefined ? null : { value: line.km, unit: 'km' },
    hours: line.hours ?? null,
    daysAgo: line.daysAgo,
    joints: line.joints.map(([procedure, bank, castingNumber]) => ({
      id: seedId(`${id} ${procedure}`),
      procedure,
      bank,
      castingNumber,
      purpose: 'finalAssembly',
    })),
  };
}

const secondPeople = [
  { name: 'Corin Ashdale', pin: '620839', roles: ['technician', 'supervisor', 'admin'] as Role[] },
  { name: 'Wilhelmina Tock', pin: '371846', roles: ['technician', 'clerk'] as Role[] },
].map((one) => {
  const first = one.name.split(' ')[0]?.toLowerCase() ?? '';
  const id = seedId(`harrowgate ${first}`);
  return { ...one, id, email: `${first}@harrowgate.example`, password: `${first}-shows-the-demo` };
});

/** Brindle Lane Engine Works, whose doors the demo opens. */
export const brindleLane = (todayMs: number): SeedShop => ({
  id: DEMO_SHOP,
  name: 'Brindle Lane Engine Works',
  address: 'Unit 6, Saltmeadow Yard',
  prefix: 'BL',
  timeZone: 'Europe/London',
  people: DEMO_ACCOUNTS.map((account) => ({ ...account, roles: [...account.roles] })),
  wrenches: brindleWrenches(todayMs, (tag) => seedId(`brindle ${tag}`)),
  jobs: brindleJobs.map((line) => jobOf('brindle', line)),
});

/** A second shop: what one shop never sees of another is shown by there being another. */
export const secondShop = (todayMs: number): SeedShop => ({
  id: seedId('harrowgate'),
  name: 'Harrowgate Motor Rebuilders',
  address: '14 Tannery Row',
  prefix: 'HM',
  timeZone: 'Europe/Madrid',
  people: secondPeople,
  wrenches: secondShopWrenches(todayMs, (tag) => seedId(`harrowgate ${tag}`)),
  jobs: secondJobs.map((line) => jobOf('harrowgate', line)),
});
