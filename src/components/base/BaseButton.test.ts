import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { mountPart } from './testing/mountPart';
import BaseButton from './BaseButton.vue';

beforeEach(() => void vi.useFakeTimers());
afterEach(() => void vi.useRealTimers());

describe('BaseButton', () => {
  it('counts two taps within 700 ms once (W10)', async () => {
    const button = mountPart(BaseButton, { label: 'Record 91°' });
    await button.trigger('click');
    vi.advanceTimersByTime(699);
    await button.trigger('click');
    expect(button.emitted('press')).toHaveLength(1);
    vi.advanceTimersByTime(1);
    await button.trigger('click');
    expect(button.emitted('press')).toHaveLength(2);
  });

  it('is inert while it waits, says so, and keeps its words', async () => {
    const button = mountPart(BaseButton, { label: 'Type the torque you read', kind: 'waiting' });
    await button.trigger('click');
    expect(button.emitted('press')).toBeUndefined();
    expect(button.attributes('aria-disabled')).toBe('true');
    expect(button.text()).toBe('Type the torque you read');
  });

  it('does not send a form twice: a submit within the guard is held back', () => {
    const button = mountPart(BaseButton, { label: 'Save', type: 'submit' });
    const again = (): boolean =>
      (button.element as Element).dispatchEvent(new MouseEvent('click', { cancelable: true, bubbles: true }));
    expect(again()).toBe(true);
    expect(again()).toBe(false);
  });
});
