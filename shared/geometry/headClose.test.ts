import { describe, expect, it } from 'vitest';
import { closeGeometry } from './headClose';
import type { HeadState } from './heads';

const turned = (deg: number, more: Partial<HeadState> = {}): HeadState => ({
  fill: 'over',
  hasTick: true,
  stripeDeg: deg,
  passDeg: deg,
  earlierDeg: 0,
  now: false,
  group: 'A',
  pegs: { lowDeg: 85, highDeg: 95 },
  ...more,
});

describe('closeGeometry', () => {
  it('fills what was turned beyond the window and nothing else', () => {
    expect(closeGeometry(turned(104), '5').beyond).not.toBe('');
    expect(closeGeometry(turned(90), '5').beyond).toBe('');
    expect(closeGeometry(turned(79), '5').beyond).toBe('');
  });

  it('dashes what is missing to the window', () => {
    expect(closeGeometry(turned(79), '5').missing).not.toBe('');
    expect(closeGeometry(turned(104), '5').missing).toBe('');
  });

  it('mirrors the turn for counter-clockwise, not the flag', () => {
    const flag = { kind: 'over', text: '+9°' } as const;
    const right = closeGeometry(turned(104, { flag }), '5');
    const left = closeGeometry(turned(104, { ccw: true, flag }), '5');
    expect(left.stripe!.angle).toBe(-right.stripe!.angle);
    expect(left.flag!.x).toBe(right.flag!.x);
  });

  it('hangs the pennant above for over, below for under', () => {
    expect(closeGeometry(turned(104, { flag: { kind: 'over', text: '+9°' } }), '5').flag!.y).toBeLessThan(0);
    expect(closeGeometry(turned(79, { flag: { kind: 'under', text: '−6°' } }), '5').flag!.y).toBeGreaterThan(0);
  });

  it('draws an empty hole crossed, without a stripe', () => {
    const g = closeGeometry(turned(0, { fill: 'none', stripeDeg: null, passDeg: null }), '5');
    expect(g).toMatchObject({ gone: true, stripe: null });
  });
});
