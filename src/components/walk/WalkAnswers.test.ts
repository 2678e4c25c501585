import { mount } from '@vue/test-utils';
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import WalkAnswers from './WalkAnswers.vue';

let now = 0;
const answers = [
  { id: 'yes', title: 'Yes' },
  { id: 'no', title: 'No' },
  { id: 'never', title: 'Never', off: true },
];

beforeEach(() => {
  now = 50_000;
  vi.spyOn(performance, 'now').mockImplementation(() => now);
});
afterEach(() => vi.restoreAllMocks());

const open = () => mount(WalkAnswers, { props: { answers }, attachTo: document.body });
function press(key: string, after: number): void {
  now += after;
  window.dispatchEvent(new KeyboardEvent('keydown', { key, cancelable: true }));
}
async function tap(screen: ReturnType<typeof open>, id: string, after: number): Promise<void> {
  now += after;
  await screen.find(`[data-testid="choice-${id}"]`).trigger('click');
}

describe('answers', () => {
  it('are given by one tap', async () => {
    const screen = open();
    await tap(screen, 'no', 500);
    expect(screen.emitted('answer')).toEqual([['no']]);
    screen.unmount();
  });
  it('are not given by the tap that opened them', async () => {
    const screen = open();
    await tap(screen, 'no', 100);
    expect(screen.emitted('answer')).toBeUndefined();
    screen.unmount();
  });
  it('want a digit and then, 700 ms later, Enter', () => {
    const screen = open();
    press('2', 900);
    press('Enter', 400);
    expect(screen.emitted('answer')).toBeUndefined();
    press('2', 900);
    press('Enter', 800);
    expect(screen.emitted('answer')).toEqual([['no']]);
    screen.unmount();
  });
  it('are not given by a burst of a wrench acting as keyboard', () => {
    const screen = open();
    press('1', 900);
    press('0', 8);
    press('4', 8);
    press('Enter', 8);
    press('Enter', 2000);
    expect(screen.emitted('answer')).toBeUndefined();
    screen.unmount();
  });
  it('are not given where they are off', async () => {
    const screen = open();
    await tap(screen, 'never', 500);
    press('3', 900);
    press('Enter', 900);
    expect(screen.emitted('answer')).toBeUndefined();
    screen.unmount();
  });
});
