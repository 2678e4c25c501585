import type { CataloguePerson } from '@shared/contracts/catalogue.contract';
import type { pinCheck } from '@shared/contracts/sync.contract';
import { err, ok, type Result } from '@shared/kernel/result';
import type { TabletClient } from '@/api/tabletClient';
import { noteContact } from './catalogue';
import { delayAfter, waitLeft } from './pinDelay';
import { makeVerifier, PIN_ITERATIONS, pinMatches } from './pinVerifier';
import type { Sealer } from './seal';
import type { Settings } from './settings';
import type { PinVerifier } from './settingValues';
import { isoOf, type TabletClock } from './tabletClock';

/** What PIN checks need. */
export interface PinDeps {
  settings: Settings;
  client: TabletClient;
  clock: TabletClock;
  tablet: string;
  /** A bearer, or null when the server cannot be had now. */
  bearer: () => Promise<string | null>;
  sealer: Sealer | null;
  /** Days for which a person may sign in without the server. */
  offlineDays: number;
  iterations?: number;
}

/** Why a PIN did not open anything; translated as `errors.<code>`. */
export interface PinRefusal {
  code:
    | 'pin.wrong'
    | 'pin.wait'
    | 'pin.notSet'
    | 'pin.personLeft'
    | 'pin.firstTime'
    | 'pin.offlineTooLong'
    | 'pin.clockSetBack'
    | (string & {});
  params?: Record<string, unknown>;
}

/** How a PIN was checked: here, by the server, or not yet (it will be when it is sent). */
export type PinProof = 'here' | 'server' | 'later';

const DAY_MS = 86_400_000;
const CLOCK_TOLERANCE_MS = 5 * 60_000;

type Need = 'pin.firstTime' | 'pin.offlineTooLong' | 'pin.clockSetBack';

function refusalBefore(person: CataloguePerson): PinRefusal | null {
  if (person.state === 'left') return { code: 'pin.personLeft' };
  return person.pinVersion === 0 ? { code: 'pin.notSet' } : null;
}

async function currentVerifier({ settings }: PinDeps, person: CataloguePerson): Promise<PinVerifier | null> {
  const verifier = await settings.get(`pin:${person.id}`);
  return verifier?.pinVersion === person.pinVersion ? verifier : null;
}

/** Why the server is needed for a sign-in, or null (decision 10). Notes the latest time seen. */
async function needOfServer(deps: PinDeps, verifier: PinVerifier | null): Promise<Need | null> {
  const now = deps.clock.now();
  let latest = now;
  const record = await deps.settings.update('clock', (old) => {
    latest = old?.latestSeen ?? now;
    return {
      lastContact: old?.lastContact ?? 0,
      latestSeen: Math.max(latest, now),
      serverOffset: old?.serverOffset ?? 0,
    };
  });
  if (!verifier) return 'pin.firstTime';
  if (now < latest - CLOCK_TOLERANCE_MS) return 'pin.clockSetBack';
  return now - record.lastContact > deps.offlineDays * DAY_MS ? 'pin.offlineTooLong' : null;
}

/** Counts a try before anything is compared: a tablet switched off in between has still counted it. */
async function countTry({ settings, clock }: PinDeps, person: string): Promise<PinRefusal | null> {
  const now = clock.now();
  let wait = 0;
  await settings.update(`tries:${person}`, (tries) => {
    wait = waitLeft(tries, now);
    if (wait > 0) return { failures: tries?.failures ?? 0, lastAt: Math.min(tries?.lastAt ?? now, now) };
    return { failures: (tries?.failures ?? 0) + 1, lastAt: now };
  });
  return wait > 0 ? { code: 'pin.wait', params: { seconds: Math.ceil(wait / 1000) } } : null;
}

const forgetTries = ({ settings }: PinDeps, person: string): Promise<void> => settings.remove(`tries:${person}`);

async function wrong({ settings }: PinDeps, person: string): Promise<PinRefusal> {
  const failures = (await settings.get(`tries:${person}`))?.failures ?? 1;
  return { code: 'pin.wrong', params: { seconds: Math.ceil(delayAfter(failures) / 1000) } };
}

async function checkHere(
  deps: PinDeps,
  person: CataloguePerson,
  verifier: PinVerifier,
  pin: string,
): Promise<Result<PinProof, PinRefusal>> {
  if (!(await pinMatches(deps.settings, verifier, pin))) return err(await wrong(deps, person.id));
  await forgetTries(deps, person.id);
  return ok('here');
}

async function askServer(deps: PinDeps, person: CataloguePerson, pin: string) {
  const token = await deps.bearer();
  if (token === null || !deps.sealer) return null;
  const offset = (await deps.settings.get('clock'))?.serverOffset ?? 0;
  const at = isoOf(deps.clock.now() + offset);
  const { jwe } = await deps.sealer({ pin, person: person.id, tablet: deps.tablet, at });
  return deps.client.call<typeof pinCheck>({
    method: 'POST',
    path: '/api/tablet/pin-check',
    token,
    body: { person: person.id, jwe },
  });
}

async function checkThere(
  deps: PinDeps,
  person: CataloguePerson,
  need: Need,
  pin: string,
): Promise<Result<PinProof, PinRefusal>> {
  const answer = await askServer(deps, person, pin);
  if (answer?.kind === 'refused') {
    if (answer.refusal.code === 'pin.wrong') return err(await wrong(deps, person.id));
    return err({ code: answer.refusal.code, params: answer.refusal.details });
  }
  // 429 as an answer about this person, not about the server.
  if (answer?.kind === 'busy' && answer.code === 'pin.wait') {
    return err({ code: answer.code, ...(answer.details ? { params: answer.details } : {}) });
  }
  // Nothing was compared, here or there: the try does not count against the person.
  await forgetLastTry(deps, person.id);
  if (answer?.kind !== 'done') return err({ code: need });
  const iterations = deps.iterations ?? PIN_ITERATIONS;
  const { pinVersion } = answer.value;
  const verifier = await makeVerifier(deps.settings, { person: person.id, pin, pinVersion, iterations });
  await deps.settings.set(`pin:${person.id}`, verifier);
  await forgetTries(deps, person.id);
  await noteContact(deps.settings, deps.clock, Date.parse(answer.value.at));
  return ok('server');
}

const forgetLastTry = ({ settings }: PinDeps, person: string) =>
  settings.update(`tries:${person}`, (tries) => ({
    failures: Math.max(0, (tries?.failures ?? 0) - 1),
    lastAt: tries?.lastAt ?? 0,
  }));

/**
 * Signs a person in: on the tablet where the server has checked this PIN here before, not too long ago, and the clock has
 * not been set back; else by the server. Without either the refusal says what the server is needed for.
 */
export async function signInByPin(
  deps: PinDeps,
  person: CataloguePerson,
  pin: string,
): Promise<Result<PinProof, PinRefusal>> {
  const before = refusalBefore(person) ?? (await countTry(deps, person.id));
  if (before) return err(before);
  const verifier = await currentVerifier(deps, person);
  const need = await needOfServer(deps, verifier);
  return verifier && !need
    ? checkHere(deps, person, verifier, pin)
    : checkThere(deps, person, need ?? 'pin.firstTime', pin);
}

/**
 * Checks a PIN that is to be sealed into a walk under way. Such a walk is never stopped: a PIN this tablet can judge must
 * be right, one it cannot judge is sealed unchecked and judged by the server when it is sent (decision 6).
 */
export async function checkPinForSeal(
  deps: PinDeps,
  person: CataloguePerson,
  pin: string,
): Promise<Result<PinProof, PinRefusal>> {
  const before = refusalBefore(person) ?? (await countTry(deps, person.id));
  if (before) return err(before);
  const verifier = await currentVerifier(deps, person);
  if (verifier) return checkHere(deps, person, verifier, pin);
  const asked = await checkThere(deps, person, 'pin.firstTime', pin);
  return !asked.ok && asked.error.code === 'pin.firstTime' ? ok('later') : asked;
}
