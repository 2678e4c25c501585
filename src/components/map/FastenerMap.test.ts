import { describe, expect, it } from 'vitest';
import type { HeadState } from '@shared/geometry/heads';
import type { MapSpec } from '@shared/geometry/layout';
import { mountPart } from '../base/testing/mountPart';
import FastenerMap from './FastenerMap.vue';

const spec: MapSpec = {
  holes: [1, 2, 3, 4].map((n) => ({
    id: `h${n}`,
    label: String(n),
    x: (n % 2) * 90,
    y: Math.floor(n / 3) * 80,
    group: 'A',
  })),
  sides: { left: 'front', top: 'intake side' },
  bores: [{ x: 45, y: 40, r: 38, label: 'cyl 1' }],
};
const aHead = (more: Partial<HeadState> = {}): HeadState => ({
  fill: 'todo',
  hasTick: true,
  stripeDeg: 0,
  passDeg: null,
  earlierDeg: 0,
  now: false,
  group: 'A',
  ...more,
});
const heads = {
  h1: aHead({ fill: 'in', stripeDeg: 91, passDeg: 91 }),
  h2: aHead({ now: true, pegs: { lowDeg: 85, highDeg: 95 } }),
  h3: aHead({ tag: 'new', behind: { done: 1, total: 4 } }),
  h4: aHead({ fill: 'over', stripeDeg: 104, passDeg: 104, flag: { kind: 'over', text: '+9°' } }),
};
const order = ['h1', 'h2', 'h3', 'h4'];
const map = (props: object = {}, locale: 'en' | 'es' = 'en') =>
  mountPart(FastenerMap, { spec, heads, order, nowId: 'h2', nextId: 'h3', ...props }, locale);

describe('FastenerMap', () => {
  it('names every head by label and state', () => {
    const names = map({ interactive: true })
      .findAll('[role="button"]')
      .map((b) => b.attributes('aria-label'));
    expect(names).toEqual([
      'Bolt 1, in window, turned 91°',
      'Bolt 2, to do, now',
      'Bolt 3, to do, next, new, 1 of 4 passes caught up',
      'Bolt 4, over, +9°, turned 104°',
    ]);
  });

  it('speaks Spanish and uses the word of the fastener', () => {
    const [first] = map({ interactive: true, noun: 'Tuerca' }, 'es').findAll('[role="button"]');
    expect(first?.attributes('aria-label')).toBe('Tuerca 1, en ventana, girado 91°');
  });

  it('is one picture with one name where it only shows', () => {
    const shown = map();
    expect(shown.findAll('[role="button"]')).toHaveLength(0);
    expect(shown.find('svg').attributes('role')).toBe('img');
    expect(shown.find('svg').attributes('aria-label')).toBe(
      'Map of the joint: 2 done, 2 to do. Now: Bolt 2, to do, now.',
    );
  });

  it('emits the hole that was tapped, also another than the current one, by touch and by key', async () => {
    const tapped = map({ interactive: true });
    await tapped.find('[data-hole="h4"]').trigger('click');
    await tapped.find('[data-hole="h2"]').trigger('keydown', { key: 'Enter' });
    expect(tapped.emitted('select')).toEqual([['h4'], ['h2']]);
  });

  it('makes every touch twin at least 48 px across', () => {
    for (const twin of map({ interactive: true }).findAll('[role="button"]')) {
      expect(Number(twin.attributes('r')) * 2).toBeGreaterThanOrEqual(48);
    }
  });

  it('has one stop for the tab key; arrows walk the order', async () => {
    const walked = map({ interactive: true });
    const stops = () => walked.findAll('[tabindex="0"]').map((s) => s.attributes('data-hole'));
    expect(stops()).toEqual(['h2']);
    await walked.find('[data-hole="h2"]').trigger('keydown', { key: 'ArrowRight' });
    expect(stops()).toEqual(['h3']);
  });

  it('draws one solid arrow, and dots for the rest of the order', () => {
    const drawn = map();
    expect(drawn.findAll('.fastener-map__arrow')).toHaveLength(1);
    expect(drawn.find('.fastener-map__dots').attributes('d')).toMatch(/^M.+L/);
  });

  it('keeps numbers and side words upright when the map is turned', () => {
    for (const quarterTurns of [0, 1, 2, 3]) {
      const turned = map({ quarterTurns });
      expect(turned.findAll('text').every((t) => !t.attributes('transform'))).toBe(true);
      expect(turned.text()).toContain('front');
    }
  });

  it('shows a hole it has no state for as not begun rather than leaving it out', () => {
    const names = map({ interactive: true, heads: {} })
      .findAll('[role="button"]')
      .map((b) => b.attributes('aria-label'));
    expect(names[0]).toBe('Bolt 1, not begun');
    expect(names).toHaveLength(4);
  });
});
