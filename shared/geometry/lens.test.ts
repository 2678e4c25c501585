import { describe, expect, it } from 'vitest';
import { NOW_RING } from './heads';
import { layoutMap, type MapSpec } from './layout';
import { lensOf } from './lens';

/** Two rings of thirty-two holes. */
const flange: MapSpec = {
  outline: 'round',
  sides: {},
  holes: Array.from({ length: 64 }, (_, i) => {
    const outer = i >= 32;
    const a = ((i % 32) * 11.25 + (outer ? 5.625 : 0)) * (Math.PI / 180);
    const r = outer ? 286 : 244;
    return { id: `h${i}`, label: String(i + 1), x: r * Math.sin(a), y: -r * Math.cos(a), group: outer ? 'B' : 'A' };
  }),
};
const layout = layoutMap(flange, { width: 712, height: 640 });

describe('lensOf', () => {
  it('covers no head', () => {
    const lens = lensOf(layout, 'h40')!;
    for (const h of layout.holes) {
      const dx = Math.max(lens.x - h.x, 0, h.x - lens.x - lens.width);
      const dy = Math.max(lens.y - h.y, 0, h.y - lens.y - lens.height);
      expect(Math.hypot(dx, dy)).toBeGreaterThan(layout.radius);
    }
  });

  it('shows the current hole and neighbours true to direction, none touching its ring', () => {
    const lens = lensOf(layout, 'h40')!;
    const [now, ...others] = lens.holes;
    const place = (id: string) => layout.holes.find((h) => h.hole.id === id)!;
    expect(now?.hole.id).toBe('h40');
    expect(others.length).toBeGreaterThanOrEqual(2);
    for (const o of others) {
      const shown = Math.atan2(o.y - now!.y, o.x - now!.x);
      const real = Math.atan2(place(o.hole.id).y - place('h40').y, place(o.hole.id).x - place('h40').x);
      expect(shown).toBeCloseTo(real, 6);
      expect(Math.hypot(o.x - now!.x, o.y - now!.y)).toBeGreaterThan(lens.radius * (NOW_RING + 1));
    }
  });

  it('is not wanted where heads are large enough, or nothing is current', () => {
    const four = { ...flange, holes: flange.holes.filter((_, i) => i < 32 && i % 8 === 0) };
    expect(lensOf(layoutMap(four, { width: 712, height: 640 }), 'h0')).toBeNull();
    expect(lensOf(layout, null)).toBeNull();
  });
});
