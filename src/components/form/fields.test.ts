import { describe, expect, it } from 'vitest';
import { mountPart } from '../base/testing/mountPart';
import FieldArea from './FieldArea.vue';
import FieldDate from './FieldDate.vue';
import FieldNumber from './FieldNumber.vue';
import FieldSelect from './FieldSelect.vue';
import FieldText from './FieldText.vue';

const fields = { FieldArea, FieldDate, FieldNumber, FieldText };

describe.each(Object.entries(fields))('%s', (_, field) => {
  it('ties its label to the field and shows what is wrong', async () => {
    const one = mountPart(field, { label: 'Engine serial', modelValue: '', help: 'As stamped' });
    const input = one.find('input, textarea');
    expect(one.find('label').attributes('for')).toBe(input.attributes('id'));
    expect(one.text()).toContain('As stamped');
    await one.setProps({ violation: 'Write the serial as stamped.' });
    expect(one.text()).toContain('Write the serial as stamped.');
  });
});

describe('FieldNumber', () => {
  it('keeps a figure as it is typed, right or wrong', async () => {
    const one = mountPart(FieldNumber, { label: 'Odometer', modelValue: '' });
    for (const text of ['30.0', '1O.5', '10,5']) {
      await one.find('input').setValue(text);
      expect(one.emitted('update:modelValue')?.at(-1)).toEqual([text]);
    }
  });
});

describe('FieldSelect', () => {
  it('shows the label of what is picked, and asks where nothing is', async () => {
    const options = [{ value: 'd6', label: 'Ossery D6' }];
    const one = mountPart(FieldSelect, { label: 'Engine', modelValue: 'd6', options });
    expect(one.text()).toContain('Ossery D6');
    await one.setProps({ modelValue: null });
    expect(one.text()).toContain('Pick one');
  });
});
