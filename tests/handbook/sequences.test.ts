import { describe, expect, it } from 'vitest';
import { reverse } from '@shared/sequence/reverse';
import { spiral } from '@shared/sequence/spiral';
import { star } from '@shared/sequence/star';
import { provenance, referenceFile, type ReferenceRow } from './reference';

const { sequences } = referenceFile<{ sequences: (ReferenceRow & { n: number; order: number[] })[] }>('sequences');
const handbook = sequences.find((row) => row.id === 'REF-SEQ-01');
const crossPatterns = sequences.filter((row) => row.id !== 'REF-SEQ-01');

/** REF-SEQ-34 (derived): a permutation, each odd step followed by its opposite. */
function expectCross(order: readonly number[], count: number): void {
  expect([...order].sort((a, b) => a - b)).toEqual(Array.from({ length: count }, (_, i) => i + 1));
  for (let i = 0; i < count; i += 2) {
    expect(Math.abs((order[i] ?? 0) - (order[i + 1] ?? 0))).toBe(count / 2);
  }
}

describe('cross (star) orders', () => {
  it('the sheet holds rows for 4, 8, 12, 16, 28 and 32 bolts', () => {
    expect(crossPatterns.map((row) => row.n)).toEqual([4, 8, 12, 16, 28, 32]);
  });

  it.each(crossPatterns.map((row) => [`${row.n} bolts, ${provenance(row)}`, row] as const))('%s', (_source, row) => {
    expect(star(row.n)).toEqual(row.order);
    expectCross(row.order, row.n);
  });

  it(`16 bolts, ${handbook ? provenance(handbook) : 'missing'}: the same as ours up to the tenth, then 4-12 and 6-14 swapped`, () => {
    if (!handbook) throw new Error('The reference sheet has no REF-SEQ-01');
    expectCross(handbook.order, 16);
    const ours = star(16);
    expect(ours.slice(0, 10)).toEqual(handbook.order.slice(0, 10));
    expect(ours.slice(10, 14)).toEqual([6, 14, 4, 12]);
    expect(handbook.order.slice(10, 14)).toEqual([4, 12, 6, 14]);
    expect(ours.slice(14)).toEqual(handbook.order.slice(14));
  });
});

describe('rectangular heads: REF-SEQ-33 (memory, confidence 0.9), no published number table found', () => {
  const head = [0, 1].flatMap((line) =>
    Array.from({ length: 7 }, (_, i) => ({ id: `${line}${i}`, x: i * 92, y: line * 240 })),
  );
  const ring = (id: string) => Math.abs(Number(id[1]) - 3);

  it('starts at the centre pair, works outward ring by ring, both ends in turn', () => {
    const order = spiral(head);
    expect(order.slice(0, 2).map(ring)).toEqual([0, 0]);
    expect(order.map(ring)).toEqual([...order].map(ring).sort());
    for (let i = 2; i < 14; i += 4) {
      const ends = order.slice(i, i + 4).map((id) => Math.sign(Number(id[1]) - 3));
      expect(ends).toEqual([-1, -1, 1, 1]);
    }
  });

  it('REF-SEQ-34 (derived): the distance from the centroid never falls by more than one ring', () => {
    const distances = spiral(head).map(ring);
    distances.forEach((distance, i) => {
      expect(distance).toBeGreaterThanOrEqual(Math.max(0, ...distances.slice(0, i)) - 1);
    });
  });

  it('loosens in the reverse order', () => {
    expect(reverse(spiral(head)).slice(-2)).toEqual(spiral(head).slice(0, 2).reverse());
  });
});
