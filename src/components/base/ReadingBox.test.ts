import { describe, expect, it } from 'vitest';
import { mountPart } from './testing/mountPart';
import ReadingBox from './ReadingBox.vue';

const strip = { low: '85', high: '95', target: '90', value: '91' };
const box = (props: Record<string, unknown>) => mountPart(ReadingBox, props);

describe('ReadingBox', () => {
  it('says the verdict in words and by a sign, with the figure as typed', () => {
    const one = box({ fields: [{ id: 'deg', value: '91.0', unit: 'degrees\nturned' }], verdict: 'in', strip });
    expect(one.find('.reading-box__value').text()).toBe('91.0');
    expect(one.find('.reading-box__verdict').text()).toBe('in window');
    expect(one.find('.verdict-sign').exists()).toBe(true);
  });

  it('shows a caret and no figure of its own while it is empty (W5)', () => {
    const one = box({ fields: [{ id: 't', value: '', unit: 'N·m' }], strip: { ...strip, value: '' } });
    expect(one.find('.reading-box__value--empty').exists()).toBe(true);
    expect(one.find('.window-strip__stripe').exists()).toBe(false);
    expect(one.text()).toContain('no figure yet');
  });

  it('gives way to a change of target', () => {
    const one = box({
      fields: [{ id: 't', value: '', unit: 'N·m' }],
      notice: { title: 'New target: 95 N·m', lines: ['Group B from here on.'] },
    });
    expect(one.text()).toContain('New target: 95 N·m');
    expect(one.find('.reading-box').exists()).toBe(false);
  });

  it('holds degrees, end torque and pulls; a tap on one asks for it', async () => {
    const one = box({
      fields: [
        { id: 'deg', value: '91', unit: 'degrees', note: 'this pull', verdict: 'in' },
        { id: 'end', value: '', unit: 'end N·m', note: 'required' },
        { id: 'pulls', value: '', unit: 'pulls' },
      ],
      active: 'end',
    });
    expect(one.findAll('button').map((b) => b.attributes('aria-current'))).toEqual([undefined, 'true', undefined]);
    await one.findAll('button')[2]?.trigger('click');
    expect(one.emitted('field')).toEqual([['pulls']]);
  });

  it('names the strip in words, and holds a reading far beyond it at its end', () => {
    const one = box({
      fields: [{ id: 'deg', value: '250', unit: 'degrees' }],
      verdict: 'over',
      strip: { ...strip, value: '250' },
    });
    expect(one.find('.window-strip').attributes('aria-label')).toBe('Window 85 to 95, reading 250');
    expect(one.find('.window-strip__beyond--right').exists()).toBe(true);
    expect(one.find('.window-strip__stripe').attributes('style')).toContain('98.8%');
  });
});
