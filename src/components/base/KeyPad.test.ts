import { describe, expect, it } from 'vitest';
import { mountPart } from './testing/mountPart';
import KeyPad from './KeyPad.vue';

describe('KeyPad', () => {
  it('emits digits, point and delete, the same digit twice as well', async () => {
    const pad = mountPart(KeyPad);
    const key = (text: string) => pad.findAll('button').find((b) => b.text() === text);
    await key('8')?.trigger('click');
    await key('8')?.trigger('click');
    await pad.find('[aria-label="Decimal point"]').trigger('click');
    await key('0')?.trigger('click');
    await pad.find('[aria-label="Delete last digit"]').trigger('click');
    expect(pad.emitted('digit')).toEqual([['8'], ['8'], ['0']]);
    expect(pad.emitted('point')).toHaveLength(1);
    expect(pad.emitted('delete')).toHaveLength(1);
  });

  it('has no point where none is wanted, and names its keys in Spanish', () => {
    const pad = mountPart(KeyPad, { point: false }, 'es');
    expect(pad.findAll('button')).toHaveLength(11);
    expect(pad.find('[aria-label="Borrar la última cifra"]').exists()).toBe(true);
  });
});
