const SERIES_UNTIL = 2.5;

/** Kummer's series of erf, every term positive, so that nothing cancels. */
function erfSeries(x: number): number {
  let term = x;
  let sum = x;
  for (let n = 1; term > sum * 1e-17; n += 1) {
    term *= (2 * x * x) / (2 * n + 1);
    sum += term;
  }
  return (2 / Math.sqrt(Math.PI)) * Math.exp(-x * x) * sum;
}

/** The continued fraction of erfc, taken from the tail; 60 levels are enough from 2.5 upwards. */
function erfcFraction(x: number): number {
  let tail = x;
  for (let k = 60; k >= 1; k -= 1) tail = x + k / 2 / tail;
  return Math.exp(-x * x) / (Math.sqrt(Math.PI) * tail);
}

/** The complementary error function, good to about 1e-14 relative. */
export function erfc(x: number): number {
  if (x < 0) return 2 - erfc(-x);
  if (x === 0) return 1;
  return x < SERIES_UNTIL ? 1 - erfSeries(x) : erfcFraction(x);
}

/** Φ(z), the chance that a standard normal value is at most z; absolute error below 1e-12. For display and review only. */
export function normalCdf(z: number): number {
  return erfc(-z / Math.SQRT2) / 2;
}
