import { describe, expect, it } from 'vitest';
import { mountPart } from './testing/mountPart';
import PinPad from './PinPad.vue';

const type = (text: string): void => {
  for (const key of text) window.dispatchEvent(new KeyboardEvent('keydown', { key, cancelable: true }));
};

describe('PinPad', () => {
  it('gives the PIN once after six digits and forgets it', async () => {
    const pad = mountPart(PinPad);
    type('482615');
    await pad.vm.$nextTick();
    expect(pad.emitted('complete')).toEqual([['482615']]);
    expect(pad.findAll('.pin-pad__dot--full')).toHaveLength(0);
    pad.unmount();
  });

  it('never writes a digit into the page', async () => {
    const pad = mountPart(PinPad);
    type('998');
    await pad.vm.$nextTick();
    expect(pad.findAll('.pin-pad__dot--full')).toHaveLength(3);
    expect(pad.find('.pin-pad__dots').text()).toBe('');
    expect(pad.text()).toContain('3 of six digits entered');
    pad.unmount();
  });

  it('takes back with delete and takes nothing while disabled', async () => {
    const pad = mountPart(PinPad);
    type('12');
    window.dispatchEvent(new KeyboardEvent('keydown', { key: 'Backspace', cancelable: true }));
    await pad.setProps({ disabled: true });
    type('3456');
    await pad.vm.$nextTick();
    expect(pad.findAll('.pin-pad__dot--full')).toHaveLength(1);
    pad.unmount();
  });
});
