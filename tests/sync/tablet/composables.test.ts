// @vitest-environment happy-dom
import { createPinia, setActivePinia } from 'pinia';
import { effectScope, nextTick } from 'vue';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { startTablet, stopTablet } from '@/composables/tabletRuntime';
import { useSyncStatus } from '@/composables/useSyncStatus';
import { useTablet } from '@/composables/useTablet';
import { useTabletContents } from '@/composables/useTabletContents';
import { useWalk } from '@/composables/useWalk';
import { useWalkStart } from '@/composables/useWalkStart';
import { useTabletStore } from '@/stores/useTabletStore';
import { useUpdateStore } from '@/stores/useUpdateStore';
import { demoProcedures } from '../../support/walker';
import { FakeShop, JOINT, PINS, SUPERVISOR, TECH } from './fakeShop';
import { realWorld, wideWrench, type RealWorld } from './realTablet';

/* The tablet as pages see it: stores and composables over the real storage, rules and engine. */

const head = demoProcedures.find(({ holes }) => holes.length === 14);
if (!head) throw new Error('the demo has no head of fourteen bolts');

let shop: FakeShop;
let real: RealWorld;
let scope: ReturnType<typeof effectScope>;
const inScope = <T>(use: () => T): T => scope.run(use) as T;

beforeEach(async () => {
  setActivePinia(createPinia());
  scope = effectScope();
  shop = await FakeShop.open(head, [wideWrench]);
  real = realWorld(shop);
  await startTablet('test', real.world);
});
afterEach(() => {
  scope.stop();
  stopTablet();
});

const enrolled = async () => {
  const tablet = inScope(useTablet);
  expect(await tablet.enrol(` ${shop.code} `, 'Stand 1')).toBeNull();
  expect(await tablet.signIn(TECH, PINS[TECH] ?? '')).toBeNull();
  return tablet;
};

const begunWalk = async (): Promise<string> => {
  const begun = await inScope(useWalkStart).begin({
    joint: JOINT,
    purpose: 'finalAssembly',
    pulls: TECH,
    records: TECH,
  });
  if (!('walk' in begun)) throw new Error(begun.refusal.code);
  return begun.walk;
};

describe('the tablet of a page', () => {
  it('is enrolled, shows its people, and signs them in and out', async () => {
    const tablet = inScope(useTablet);
    expect(tablet.ready.value).toBe(true);
    expect(tablet.enrolled.value).toBe(false);
    expect(await tablet.enrol('WRONG', 'Stand 1')).toMatchObject({ code: 'enrolment.unknownCode' });
    await enrolled();
    expect(tablet.enrolled.value).toBe(true);
    expect(tablet.tablet.value?.name).toBe('Stand 1');
    expect(tablet.people.value.map(({ name }) => name)).toEqual(['Sol', 'Tess']);
    expect(tablet.person.value).toMatchObject({ id: TECH, name: 'Tess', roles: ['technician'] });
    expect(await tablet.signIn(SUPERVISOR, '000001')).toMatchObject({ code: 'pin.wrong' });
    expect(tablet.person.value?.id).toBe(TECH);
    await tablet.signOut();
    expect(tablet.person.value).toBeNull();
  });

  it('opens a walk, acts on it, and shows each saved event at once', async () => {
    await enrolled();
    const id = await begunWalk();
    const { open, walk } = inScope(() => useWalk(id, { leave: () => undefined }));
    expect(open.value.kind).toBe('loading');
    await vi.waitFor(() => expect(open.value.kind).toBe('ready'));
    const access = walk.value;
    if (!access) throw new Error('no walk');
    expect(access.person).toMatchObject({ id: TECH });
    expect(access.job?.number).toBe('J-1');
    expect(access.wrenches.map((one) => one.snapshot.tag)).toEqual(['W-03']);
    expect(access.view.instruction.kind).toBe('parts');
    const gasket = head.parts[0]?.id ?? '';
    const taken = { part: gasket, partNumber: 'G-1', batch: 'B-1', count: 1 };
    expect(await access.act({ type: 'part.taken', data: taken })).toBeNull();
    expect(access.state.parts).toHaveLength(1);
    const refused = await access.act({ type: 'note.added', data: { text: 'x', hole: 'h99' } });
    expect(refused).toMatchObject({ code: 'unknownHole' });
    expect(useUpdateStore().openWalks).toBe(1);
    scope.stop();
    await vi.waitFor(() => expect(useUpdateStore().openWalks).toBe(0));
  });

  it('takes the second of two quick taps for a stale one (decision 11)', async () => {
    await enrolled();
    const id = await begunWalk();
    const { open, walk } = inScope(() => useWalk(id, { leave: () => undefined }));
    await vi.waitFor(() => expect(open.value.kind).toBe('ready'));
    const tap = () => walk.value?.act({ type: 'note.added', data: { text: 'x', hole: null } });
    const answers = await Promise.all([tap(), tap()]);
    expect(answers).toEqual([null, { code: 'staleHead' }]);
  });

  it('says that a walk is not on this tablet', async () => {
    await enrolled();
    const { open, walk } = inScope(() => useWalk(SUPERVISOR, { leave: () => undefined }));
    await vi.waitFor(() => expect(open.value.kind).toBe('notFound'));
    expect(walk.value).toBeNull();
  });

  it('checks a PIN before it is sealed', async () => {
    await enrolled();
    const id = await begunWalk();
    const { open, walk } = inScope(() => useWalk(id, { leave: () => undefined }));
    await vi.waitFor(() => expect(open.value.kind).toBe('ready'));
    expect(await walk.value?.checkPin(TECH, PINS[TECH] ?? '')).toBeNull();
    expect(await walk.value?.checkPin(TECH, '000001')).toMatchObject({ code: 'pin.wrong' });
    real.network.online = false;
    shop.expireTokens();
    real.network.fateOf = () => 'notReached';
    // Somebody new to this tablet may sign offline: the PIN is judged when it is sent.
    expect(await walk.value?.checkPin(SUPERVISOR, '111222')).toBeNull();
  });

  it('counts what waits and sends it at a press', async () => {
    await enrolled();
    real.network.fateOf = (path) => (path.endsWith('/events') ? 'portalPage' : 'fine');
    const sync = inScope(useSyncStatus);
    const contents = inScope(useTabletContents);
    await begunWalk();
    await vi.waitFor(() => expect(sync.phase.value).toBe('portal'));
    expect(sync).toMatchObject({ waiting: { value: 1 }, code: { value: 'server.notOurs' } });
    await vi.waitFor(() =>
      expect(contents.walks.value).toMatchObject([{ waiting: 1, job: expect.any(String) as string }]),
    );
    real.network.fateOf = () => 'fine';
    await sync.retry();
    expect(sync.waiting.value).toBe(0);
    await vi.waitFor(() => expect(contents.walks.value).toMatchObject([{ waiting: 0 }]));
    const file = await contents.exportFile();
    expect(file.name).toMatch(/^boltwalk-tablet-.*\.json$/);
    expect(JSON.parse(await file.text())).toMatchObject({ format: 'boltwalk-tablet', unreadable: [] });
  });

  it('tells that the storage failed and is well again (fault 19)', async () => {
    await enrolled();
    const { trouble, retryStorage } = inScope(useTablet);
    stopTablet();
    const broken = realWorld(shop);
    const open = broken.world.factory.open.bind(broken.world.factory);
    let ill = true;
    broken.world.factory = {
      open: (name: string, version?: number) => {
        if (ill) throw new DOMException('no storage', 'UnknownError');
        return open(name, version);
      },
    } as IDBFactory;
    await startTablet('test', broken.world);
    expect(trouble.value.code).toBe('storage.broken');
    ill = false;
    await retryStorage();
    await nextTick();
    expect(trouble.value.code).toBeNull();
    expect(useTabletStore().enrolled).toBe(false);
  });
});
