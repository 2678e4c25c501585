/**
 * Prints the table of shared/judge/siblingLimits.ts: for each group size the |M| that the largest of 1 % of healthy groups
 * passes (J6). Seeded, so the same table comes out every time; takes some minutes.
 * Run: node --import tsx tests/drill/siblingLimits.ts [groups]
 */
import { largestOfHealthy } from './healthyGroups';

const SIZES = [...Array.from({ length: 25 }, (_, i) => i + 8), 34, 36, 38, 40, 44, 48, 52, 56, 60, 64, 80, 96, 128];
const groups = Number(process.argv[2] ?? 400_000);

for (const size of SIZES) {
  const limit = largestOfHealthy(size, groups, 6_000 + size)[Math.ceil(groups * 0.99) - 1] ?? Number.NaN;
  process.stdout.write(`  [${size}, ${limit.toFixed(2)}],\n`);
}
