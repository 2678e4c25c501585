import { modifiedZ } from '@shared/statistics/modifiedZ';

/** A seeded generator of numbers from 0 up to 1 (Bob Jenkins's small fast counter, 32 bits): the same on every machine. */
export function seededRandom(seed: number): () => number {
  let [a, b, c, d] = [seed >>> 0, 0x9e3779b9, 0x243f6a88, 1];
  const next = (): number => {
    const sum = (((a + b) | 0) + d) | 0;
    d = (d + 1) | 0;
    a = b ^ (b >>> 9);
    b = (c + (c << 3)) | 0;
    c = (((c << 21) | (c >>> 11)) + sum) | 0;
    return (sum >>> 0) / 2 ** 32;
  };
  for (let i = 0; i < 20; i += 1) next();
  return next;
}

/** Standard normal values by Box and Muller. */
export function seededNormal(seed: number): () => number {
  const random = seededRandom(seed);
  return () => Math.sqrt(-2 * Math.log(1 - random())) * Math.cos(2 * Math.PI * random());
}

/** The largest |M| (J6) of each of `groups` healthy groups of `size` normal values, in rising order. */
export function largestOfHealthy(size: number, groups: number, seed: number): Float64Array {
  const normal = seededNormal(seed);
  const largest = new Float64Array(groups);
  for (let group = 0; group < groups; group += 1) {
    const values = Array.from({ length: size }, normal);
    largest[group] = Math.max(...(modifiedZ(values) ?? [0]).map(Math.abs));
  }
  return largest.sort();
}
