/** Units a duration is said in. */
export type DurationUnit = 'seconds' | 'minutes' | 'hours' | 'days';

const STEPS: [DurationUnit, number][] = [
  ['days', 86_400],
  ['hours', 3_600],
  ['minutes', 60],
  ['seconds', 1],
];

/**
 * A duration in its one fitting unit, rounded up so that whoever waits as told has waited long enough: 90 s are
 * *2 minutes*. `say` puts unit and number into words.
 */
export function durationWords(seconds: number, say: (unit: DurationUnit, n: number) => string): string {
  const whole = Math.max(1, Math.ceil(seconds));
  const [unit, size] = STEPS.find(([, length]) => whole >= length * 1.5) ?? (['seconds', 1] as const);
  return say(unit, Math.ceil(whole / size));
}
