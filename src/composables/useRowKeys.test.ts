import { mount } from '@vue/test-utils';
import { afterEach, describe, expect, it } from 'vitest';
import { defineComponent, h, ref } from 'vue';
import { rowAfter, useRowKeys } from './useRowKeys';

const List = defineComponent({
  setup() {
    const list = ref<HTMLElement | null>(null);
    useRowKeys(list);
    return () =>
      h('div', [
        h('input', { 'data-find': '' }),
        h(
          'table',
          { ref: list },
          [1, 2, 3].map((n) => h('a', { href: `#${n}`, 'data-row': '', id: `row${n}` })),
        ),
      ]);
  },
});

const press = (key: string, more: KeyboardEventInit = {}): KeyboardEvent => {
  const event = new KeyboardEvent('keydown', { key, bubbles: true, cancelable: true, ...more });
  (document.activeElement ?? document.body).dispatchEvent(event);
  return event;
};

describe('useRowKeys', () => {
  let page: ReturnType<typeof mount> | null = null;
  afterEach(() => page?.unmount());
  const open = () => (page = mount(List, { attachTo: document.body }));

  it('walks from row to row and stops at both ends', () => {
    open();
    press('ArrowDown');
    expect(document.activeElement?.id).toBe('row1');
    press('ArrowDown');
    press('ArrowDown');
    press('ArrowDown');
    expect(document.activeElement?.id).toBe('row3');
    press('Home');
    press('ArrowUp');
    expect(document.activeElement?.id).toBe('row1');
  });

  it('puts the cursor into the search by a slash, and leaves keys in a field alone', () => {
    open();
    expect(press('/').defaultPrevented).toBe(true);
    expect(document.activeElement?.tagName).toBe('INPUT');
    expect(press('/').defaultPrevented).toBe(false);
    expect(press('ArrowDown').defaultPrevented).toBe(false);
  });

  it('leaves the keys of the browser alone', () => {
    open();
    expect(press('ArrowDown', { ctrlKey: true }).defaultPrevented).toBe(false);
    expect(press('a').defaultPrevented).toBe(false);
  });
});

describe('rowAfter', () => {
  it('goes nowhere in an empty list', () => expect(rowAfter(-1, 'ArrowDown', 0)).toBeNull());
});
