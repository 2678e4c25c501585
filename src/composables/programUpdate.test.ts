import { createPinia, setActivePinia } from 'pinia';
import { beforeEach, describe, expect, it, vi } from 'vitest';
import { useUpdateStore } from '@/stores/useUpdateStore';
import { programUpdate } from './programUpdate';
import { useUpdate } from './useUpdate';

class FakeWorker extends EventTarget {
  state = 'installing';
  readonly said: unknown[] = [];
  postMessage(message: unknown): void {
    this.said.push(message);
  }
  become(state: string): void {
    this.state = state;
    this.dispatchEvent(new Event('statechange'));
  }
}
class FakeRegistration extends EventTarget {
  waiting: FakeWorker | null = null;
  installing: FakeWorker | null = null;
  readonly update = () => Promise.resolve();
}
class FakeContainer extends EventTarget {
  controller: object | null = {};
  readonly registration = new FakeRegistration();
  readonly register = () => Promise.resolve(this.registration);
}

const found = (container: FakeContainer): FakeWorker => {
  const worker = new FakeWorker();
  container.registration.installing = worker;
  container.registration.dispatchEvent(new Event('updatefound'));
  return worker;
};

let container: FakeContainer;
let reload: ReturnType<typeof vi.fn<() => void>>;
const watch = () => programUpdate.watch({ workers: container as unknown as ServiceWorkerContainer, reload });

beforeEach(() => {
  setActivePinia(createPinia());
  container = new FakeContainer();
  reload = vi.fn<() => void>();
});

describe('a new version of the program (fault 14)', () => {
  it('is offered when it is loaded, but not while a walk is open', async () => {
    await watch();
    const { offered, accept } = useUpdate();
    useUpdateStore().openWalks = 1;
    const worker = found(container);
    worker.become('installed');
    expect(offered.value).toBe(false);
    accept();
    expect(worker.said).toEqual([]);
    useUpdateStore().openWalks = 0;
    expect(offered.value).toBe(true);
  });

  it('loads the page again only after somebody has asked for it', async () => {
    await watch();
    const worker = found(container);
    worker.become('installed');
    container.dispatchEvent(new Event('controllerchange'));
    expect(reload).not.toHaveBeenCalled();
    useUpdate().accept();
    expect(worker.said).toEqual([{ type: 'start' }]);
    container.dispatchEvent(new Event('controllerchange'));
    expect(reload).toHaveBeenCalledOnce();
  });

  it('that waited already when the page was opened is offered too', async () => {
    container.registration.waiting = new FakeWorker();
    await watch();
    expect(useUpdate().offered.value).toBe(true);
  });

  it('is none when it is the first one', async () => {
    container.controller = null;
    await watch();
    found(container).become('installed');
    expect(useUpdate().offered.value).toBe(false);
  });
});
