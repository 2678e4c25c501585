// @vitest-environment node
import { beforeEach, describe, expect, it } from 'vitest';
import type { CataloguePerson } from '@shared/contracts/catalogue.contract';
import type { Answer } from '@/api/answer';
import type { TabletClient } from '@/api/tabletClient';
import { noteContact } from './catalogue';
import { checkPinForSeal, signInByPin, type PinDeps } from './pin';
import { delayAfter } from './pinDelay';
import { tabletSettings, type Settings } from './settings';
import { failingIndexedDb, type FailingIndexedDb } from './testing/failingIndexedDb';
import { handClock, PERSON, TABLET } from './testing/tabletKit';

const DAY = 86_400_000;
const ann: CataloguePerson = { id: PERSON, name: 'Ann', roles: ['technician'], state: 'active', pinVersion: 1 };

let disk: FailingIndexedDb;
let settings: Settings;
let clock: ReturnType<typeof handClock>;
let answer: Answer<{ person: string; pinVersion: number; at: string }>;
let asked: number;

const client: TabletClient = {
  call: () => {
    asked += 1;
    return Promise.resolve(answer as never);
  },
};
const deps = (more: Partial<PinDeps> = {}): PinDeps => ({
  settings,
  client,
  clock,
  tablet: TABLET,
  bearer: () => Promise.resolve('token'),
  sealer: (payload) => Promise.resolve({ jwe: JSON.stringify(payload), hash: 'f'.repeat(64) }),
  offlineDays: 14,
  // The real count takes a tenth of a second a try; its own test below uses it once.
  iterations: 10,
  ...more,
});
const yes = () =>
  ({
    kind: 'done',
    status: 200,
    value: { person: PERSON, pinVersion: 1, at: new Date(clock.now()).toISOString() },
  }) as const;
const no = { kind: 'refused', refusal: { status: 403, code: 'pin.wrong', message: '', details: {} } } as const;
const nobody = { kind: 'unreachable' } as const;

beforeEach(() => {
  disk = failingIndexedDb();
  settings = tabletSettings({ factory: disk.factory });
  clock = handClock();
  answer = yes();
  asked = 0;
});

const firstSignIn = async () => {
  answer = yes();
  expect(await signInByPin(deps(), ann, '482915')).toEqual({ ok: true, value: 'server' });
  answer = nobody;
};

describe('signing in with a PIN (decision 10)', () => {
  it('asks the server the first time and the tablet from then on', async () => {
    await firstSignIn();
    expect(await signInByPin(deps(), ann, '482915')).toEqual({ ok: true, value: 'here' });
    expect(asked).toBe(1);
  });

  it('says that the first time needs the server, and counts no try when nobody compared anything', async () => {
    answer = nobody;
    for (let i = 0; i < 5; i++) {
      expect(await signInByPin(deps(), ann, '482915')).toEqual({ ok: false, error: { code: 'pin.firstTime' } });
    }
    await firstSignIn();
  });

  it('refuses a wrong PIN with a delay that grows and always ends', async () => {
    await firstSignIn();
    const waits: number[] = [];
    for (let i = 0; i < 12; i++) {
      const refused = await signInByPin(deps(), ann, '000001');
      if (refused.ok) throw new Error('a wrong PIN was taken');
      expect(refused.error.code).toBe('pin.wrong');
      const seconds = Number(refused.error.params?.seconds);
      waits.push(seconds);
      clock.pass(seconds * 1000);
    }
    expect(waits.slice(0, 4)).toEqual([0, 0, 5, 10]);
    expect(Math.max(...waits)).toBe(900);
    expect(await signInByPin(deps(), ann, '482915')).toEqual({ ok: true, value: 'here' });
  });

  it('does not even compare while the delay runs, whether the PIN is right or not', async () => {
    await firstSignIn();
    for (let i = 0; i < 3; i++) await signInByPin(deps(), ann, '000001');
    expect(await signInByPin(deps(), ann, '482915')).toEqual({
      ok: false,
      error: { code: 'pin.wait', params: { seconds: 5 } },
    });
    clock.pass(5000);
    expect((await signInByPin(deps(), ann, '482915')).ok).toBe(true);
  });

  it('has counted the try when the tablet is switched off before the comparison', async () => {
    await firstSignIn();
    for (const tries of [1, 2, 3]) {
      // The fourth operation is the completion of the try's own transaction: the tablet dies right after it.
      await new Promise((settled) => setTimeout(settled, 5));
      disk.failAt(4, 'killBefore');
      await Promise.race([signInByPin(deps(), ann, '000001').catch(() => undefined), disk.death]);
      disk.restart();
      settings = tabletSettings({ factory: disk.factory });
      expect((await settings.get(`tries:${PERSON}`))?.failures).toBe(tries);
    }
    expect(await signInByPin(deps(), ann, '482915')).toMatchObject({ error: { code: 'pin.wait' } });
  });

  it('needs the server again after the shop’s days without contact', async () => {
    await firstSignIn();
    clock.pass(14 * DAY);
    expect((await signInByPin(deps(), ann, '482915')).ok).toBe(true);
    clock.pass(DAY);
    expect(await signInByPin(deps(), ann, '482915')).toEqual({ ok: false, error: { code: 'pin.offlineTooLong' } });
    await noteContact(settings, clock, clock.now());
    expect((await signInByPin(deps(), ann, '482915')).ok).toBe(true);
  });

  it('needs the server when the clock was set back, and is well again once the server was heard', async () => {
    await firstSignIn();
    clock.pass(3 * DAY);
    await signInByPin(deps(), ann, '482915');
    clock.pass(-2 * DAY);
    expect(await signInByPin(deps(), ann, '482915')).toEqual({ ok: false, error: { code: 'pin.clockSetBack' } });
    await noteContact(settings, clock, clock.now());
    expect((await signInByPin(deps(), ann, '482915')).ok).toBe(true);
  });

  it('forgets a PIN that was changed, and people who left', async () => {
    await firstSignIn();
    const changed = { ...ann, pinVersion: 2 };
    expect(await signInByPin(deps(), changed, '482915')).toEqual({ ok: false, error: { code: 'pin.firstTime' } });
    const left = { ...ann, state: 'left' as const };
    expect(await signInByPin(deps(), left, '482915')).toEqual({ ok: false, error: { code: 'pin.personLeft' } });
    const none = { ...ann, pinVersion: 0 };
    expect(await signInByPin(deps(), none, '482915')).toEqual({ ok: false, error: { code: 'pin.notSet' } });
  });

  it('passes on what the server says', async () => {
    answer = no;
    expect(await signInByPin(deps(), ann, '000001')).toMatchObject({ error: { code: 'pin.wrong' } });
    answer = { kind: 'busy', status: 429, code: 'pin.wait', retryAfterMs: null, details: { seconds: 40 } };
    expect(await signInByPin(deps(), ann, '000001')).toEqual({
      ok: false,
      error: { code: 'pin.wait', params: { seconds: 40 } },
    });
  });

  it('keeps neither the PIN nor a key that can be read out', async () => {
    await firstSignIn();
    const key = await settings.get('pinKey');
    expect(key?.extractable).toBe(false);
    const kept = JSON.stringify(await settings.all());
    expect(kept).not.toContain('482915');
  });

  it('stretches with 600,000 rounds where nothing else is asked', async () => {
    answer = yes();
    const { iterations: _none, ...real } = deps();
    expect((await signInByPin(real, ann, '482915')).ok).toBe(true);
    expect((await settings.get(`pin:${PERSON}`))?.iterations).toBe(600_000);
    answer = nobody;
    expect(await signInByPin(real, ann, '482915')).toEqual({ ok: true, value: 'here' });
  });
});

describe('a PIN that is sealed into a walk', () => {
  it('is checked here where it can be, whatever the days and the clock', async () => {
    await firstSignIn();
    clock.pass(40 * DAY);
    expect(await checkPinForSeal(deps(), ann, '482915')).toEqual({ ok: true, value: 'here' });
    clock.pass(-39 * DAY);
    expect(await checkPinForSeal(deps(), ann, '482915')).toEqual({ ok: true, value: 'here' });
    expect(await checkPinForSeal(deps(), ann, '482916')).toMatchObject({ error: { code: 'pin.wrong' } });
  });

  it('of somebody new to this tablet is sealed unchecked while there is no server', async () => {
    answer = nobody;
    expect(await checkPinForSeal(deps(), ann, '482915')).toEqual({ ok: true, value: 'later' });
    expect(await checkPinForSeal(deps({ bearer: () => Promise.resolve(null) }), ann, '1')).toEqual({
      ok: true,
      value: 'later',
    });
  });

  it('of somebody new to this tablet is checked by the server where there is one', async () => {
    answer = no;
    expect(await checkPinForSeal(deps(), ann, '000001')).toMatchObject({ error: { code: 'pin.wrong' } });
    answer = yes();
    expect(await checkPinForSeal(deps(), ann, '482915')).toEqual({ ok: true, value: 'server' });
  });
});

describe('the delay', () => {
  it('doubles from five seconds to a quarter of an hour', () => {
    expect([0, 2, 3, 4, 5, 10, 11, 50].map(delayAfter)).toEqual([
      0, 0, 5000, 10_000, 20_000, 640_000, 900_000, 900_000,
    ]);
  });
});
