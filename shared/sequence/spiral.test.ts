import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { align, type HolePosition } from './layout';
import { row } from './row';
import { spiral } from './spiral';

/** Two rows, the upper named T0 … from the left, the lower B0 …; 92 mm apart along, 240 mm across. */
const twoRows = (columns: number): HolePosition[] =>
  Array.from({ length: columns }, (_, i) => [
    { id: `T${i}`, x: i * 92, y: 0 },
    { id: `B${i}`, x: i * 92, y: 240 },
  ]).flat();

const turned = (holes: HolePosition[]): HolePosition[] => holes.map(({ id, x, y }) => ({ id, x: -y, y: x }));
const place = fc.integer({ min: -600, max: 600 });
const anyHoles = fc
  .array(fc.tuple(place, place), { maxLength: 40 })
  .map((places) => places.map(([x, y], i): HolePosition => ({ id: String(i), x, y })));

describe('spiral (A1, REF-SEQ-33)', () => {
  it('walks a head of fourteen from the middle pair outward, end by end', () => {
    expect(spiral(twoRows(7)).join(' ')).toBe('T3 B3 B2 T2 T4 B4 B1 T1 T5 B5 B0 T0 T6 B6');
  });

  it('walks a head of eight, which has no middle pair', () => {
    expect(spiral(twoRows(4)).join(' ')).toBe('T1 B1 B2 T2 T0 B0 B3 T3');
  });

  it('gives one row from the middle, left and right in turn', () => {
    expect(spiral(twoRows(5).filter((hole) => hole.id.startsWith('T'))).join(' ')).toBe('T2 T1 T3 T0 T4');
  });

  it('takes a hand-drawn map as it is meant', () => {
    const shaky = twoRows(7).map((hole, i) => ({
      ...hole,
      x: hole.x + ((i * 7) % 5) - 2,
      y: hole.y + ((i * 3) % 5) - 2,
    }));
    expect(spiral(shaky)).toEqual(spiral(twoRows(7)));
  });

  it('follows the longer side of a map that stands upright', () => {
    expect(
      spiral(turned(twoRows(7)).map((hole) => hole))
        .slice(0, 2)
        .sort(),
    ).toEqual(['B3', 'T3']);
  });

  it('is a permutation whatever the map, and never comes inward by more than a ring (REF-SEQ-34)', () => {
    fc.assert(
      fc.property(anyHoles, (holes) => {
        const order = spiral(holes, 10);
        expect([...order].sort()).toEqual(holes.map((hole) => hole.id).sort());
        const aligned = new Map(align(holes).map((hole) => [hole.id, Math.abs(hole.along)]));
        const distances = order.map((id) => aligned.get(id) ?? Number.NaN);
        expect(distances.every((d, i) => i === 0 || d >= Math.max(...distances.slice(0, i)) - 10)).toBe(true);
      }),
    );
  });

  it('is empty without holes', () => expect(spiral([])).toEqual([]));
});

describe('row', () => {
  it('takes one row after the other from the same end', () => {
    expect(row(twoRows(4)).join(' ')).toBe('T0 T1 T2 T3 B0 B1 B2 B3');
    expect(row([])).toEqual([]);
  });

  it('is a permutation whatever the map', () => {
    fc.assert(
      fc.property(anyHoles, (holes) => {
        expect([...row(holes)].sort()).toEqual(holes.map((hole) => hole.id).sort());
      }),
    );
  });
});
