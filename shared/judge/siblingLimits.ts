// Made by tests/drill/siblingLimits.ts (400,000 healthy groups of each size, seeded): [size of group, limit of |M|].
const LIMITS: readonly (readonly [number, number])[] = [
  [8, 7.99],
  [9, 8.21],
  [10, 6.91],
  [11, 7.05],
  [12, 6.31],
  [13, 6.44],
  [14, 5.89],
  [15, 5.94],
  [16, 5.58],
  [17, 5.67],
  [18, 5.39],
  [19, 5.43],
  [20, 5.22],
  [21, 5.27],
  [22, 5.1],
  [23, 5.13],
  [24, 4.99],
  [25, 5.04],
  [26, 4.92],
  [27, 4.94],
  [28, 4.86],
  [29, 4.87],
  [30, 4.78],
  [31, 4.8],
  [32, 4.73],
  [34, 4.68],
  [36, 4.64],
  [38, 4.63],
  [40, 4.59],
  [44, 4.52],
  [48, 4.49],
  [52, 4.46],
  [56, 4.43],
  [60, 4.41],
  [64, 4.38],
  [80, 4.34],
  [96, 4.32],
  [128, 4.28],
];

/** The smallest group that is looked at (J6): in fewer, the median says too little. */
export const LEAST_SIBLINGS = 8;

/**
 * The |M| beyond which a reading stands apart from its group of `size` (J6): 1 % of healthy groups hold such a reading.
 * Between the sizes of the table it is interpolated; above the last, the last limit stands. Null under eight.
 */
export function siblingLimit(size: number): number | null {
  if (size < LEAST_SIBLINGS) return null;
  const above = LIMITS.find(([listed]) => listed >= size);
  const below = LIMITS.findLast(([listed]) => listed <= size);
  if (!above || !below || above[0] === below[0]) return (below ?? above)?.[1] ?? null;
  return below[1] + ((above[1] - below[1]) * (size - below[0])) / (above[0] - below[0]);
}
