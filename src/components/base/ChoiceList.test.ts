import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { mountPart, type MountedPart } from './testing/mountPart';
import ChoiceList from './ChoiceList.vue';

const choices = [
  { id: 'replace', title: 'Put in a new bolt', consequence: 'Bolt 5 alone:', steps: ['30 N·m', '60 N·m'] },
  { id: 'accept', title: 'Ask a supervisor', consequence: 'PIN and a reason.' },
];
let list: MountedPart;

function open(): void {
  list = mountPart(ChoiceList, {
    choices,
    modelValue: null,
    notOffered: 'Pull again: past its window.',
    'onUpdate:modelValue': (id: string | null) => void list.setProps({ modelValue: id }),
  });
}
const press = async (key: string, target: EventTarget = window): Promise<void> => {
  target.dispatchEvent(new KeyboardEvent('keydown', { key, bubbles: true, cancelable: true }));
  await list.vm.$nextTick();
};
const chosen = (): string[] => list.findAll('[aria-pressed="true"] b').map((b) => b.text());

beforeEach(() => {
  vi.useFakeTimers();
  open();
});
afterEach(() => {
  list.unmount();
  vi.useRealTimers();
});

describe('ChoiceList', () => {
  it('preselects nothing, says every consequence and what is not offered', () => {
    expect(chosen()).toEqual([]);
    expect(list.text()).toContain('PIN and a reason.');
    expect(list.text()).toContain('60 N·m');
    expect(list.text()).toContain('Not offered. Pull again: past its window.');
  });

  it('confirms by digit and, 700 ms later, Enter', async () => {
    vi.advanceTimersByTime(1000);
    await press('2');
    expect(chosen()).toEqual(['Ask a supervisor']);
    vi.advanceTimersByTime(700);
    await press('Enter');
    expect(list.emitted('confirm')).toEqual([['accept']]);
  });

  it('is not chosen by a keyed wrench: its burst leaves nothing selected', async () => {
    vi.advanceTimersByTime(3000);
    for (const key of ['1', '0', '4', 'Enter']) {
      await press(key);
      vi.advanceTimersByTime(12);
    }
    expect(list.emitted('confirm')).toBeUndefined();
    expect(chosen()).toEqual([]);
    vi.advanceTimersByTime(2000);
    await press('Enter');
    expect(list.emitted('confirm')).toBeUndefined();
  });

  it('does not confirm by Enter on a focused choice that was not selected', async () => {
    vi.advanceTimersByTime(2000);
    const first = list.find('button').element;
    await press('Enter', first);
    expect(list.emitted('confirm')).toBeUndefined();
    expect(chosen()).toEqual([]);
  });

  it('selects by a tap; the next tap selects the other', async () => {
    const [first, second] = list.findAll('button');
    await first?.trigger('click');
    expect(chosen()).toEqual(['Put in a new bolt']);
    await second?.trigger('click');
    expect(chosen()).toEqual(['Ask a supervisor']);
  });

  it('leaves digits to a field that has the focus', async () => {
    const field = document.createElement('input');
    document.body.append(field);
    vi.advanceTimersByTime(1000);
    await press('1', field);
    expect(chosen()).toEqual([]);
    field.remove();
  });

  it('stops listening when it is gone', async () => {
    list.unmount();
    vi.advanceTimersByTime(1000);
    window.dispatchEvent(new KeyboardEvent('keydown', { key: '1' }));
    await Promise.resolve();
    expect(list.emitted('update:modelValue')).toBeUndefined();
    open();
  });
});
