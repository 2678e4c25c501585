// Orders of the first quarter that follow no rule of halving; ASME PCC-1 cross pattern, from memory (REF-SEQ-12, 16).
const PUBLISHED_QUARTERS: Readonly<Record<number, readonly number[]>> = { 3: [0, 1, 2], 7: [0, 3, 5, 1, 4, 2, 6] };

const upTo = (count: number): number[] => Array.from({ length: count }, (_, i) => i);

/** 0 … count − 1 so that each falls far from those before: bits reversed, what is beyond `count` left out. */
function halving(count: number): number[] {
  const bits = Math.ceil(Math.log2(Math.max(1, count)));
  const turned = (value: number): number =>
    upTo(bits).reduce((sum, bit) => sum + (Math.floor(value / 2 ** bit) % 2) * 2 ** (bits - 1 - bit), 0);
  return upTo(2 ** bits)
    .map(turned)
    .filter((value) => value < count);
}

/** 0 … count − 1 in strides of nearly half, for an odd count: 0 2 4 1 3. */
function striding(count: number): number[] {
  const stride = Math.max(1, Math.floor(count / 2));
  return upTo(count).map((i) => (i * stride) % count);
}

/**
 * The cross (star) order of `count` bolts on a circle, numbered clockwise from 1 (A1, REF-SEQ-10 to 17, 30, 34): with an
 * even count each is followed by its opposite, and with a multiple of four that pair by the pair across. With an odd
 * count no bolt has an opposite: strides of nearly half a turn. A permutation of 1 … count.
 */
export function star(count: number): number[] {
  if (!Number.isInteger(count) || count < 0) throw new Error('A star needs a whole number of bolts');
  if (count % 2 === 1) return striding(count).map((position) => position + 1);
  const half = count / 2;
  if (count % 4 === 2) return striding(half).flatMap((start) => [start + 1, start + half + 1]);
  const quarter = count / 4;
  const starts = PUBLISHED_QUARTERS[quarter] ?? halving(quarter);
  return starts.flatMap((start) => [0, 2, 1, 3].map((quarters) => start + quarters * quarter + 1));
}
