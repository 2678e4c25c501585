import { mount, type VueWrapper } from '@vue/test-utils';
import { defineComponent, h, nextTick, type Component } from 'vue';
import { provideTray } from '@/composables/standTray';
import { provideWalk, type WalkAccess } from '@/composables/walkAccess';
import { createWords } from '@/i18n';
import { allMessages } from '@/i18n/allMessages';

/** Mounts one screen of a walk as the stand does. */
export function mountInWalk(walk: WalkAccess, part: Component, props: Record<string, unknown> = {}): VueWrapper {
  const holder = defineComponent({
    setup: () => {
      provideWalk(walk);
      provideTray({ waiting: 0, refused: 0, open: () => undefined });
      return () => h(part, props);
    },
  });
  return mount(holder, { attachTo: document.body, global: { plugins: [createWords('en', allMessages)] } });
}

/** Lets promises and painting settle. */
export async function settled(): Promise<void> {
  for (let turn = 0; turn < 4; turn += 1) {
    await Promise.resolve();
    await nextTick();
  }
}
