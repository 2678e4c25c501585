import { mount, type VueWrapper } from '@vue/test-utils';
import { Quasar } from 'quasar';
import type { Component } from 'vue';
import { createWords, type Locale } from '@/i18n';
import { allMessages } from '@/i18n/allMessages';

/** A mounted part: its props may be changed by name. */
export type MountedPart = VueWrapper & { setProps: (props: Record<string, unknown>) => Promise<void> };

/** For tests: mounts one part of the interface with its words, on the page, so that focus and keys work. */
export function mountPart(part: Component, props: Record<string, unknown> = {}, locale: Locale = 'en'): MountedPart {
  return mount(part, {
    props,
    attachTo: document.body,
    global: { plugins: [createWords(locale, allMessages), [Quasar, {}]] },
  }) as MountedPart;
}
