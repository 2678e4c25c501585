import { expect, it } from 'vitest';
import { durationWords } from './durationWords';

it.each([
  [0, '1 seconds'],
  [7.2, '8 seconds'],
  [89, '89 seconds'],
  [90, '2 minutes'],
  [900, '15 minutes'],
  [7_201, '3 hours'],
  [172_800, '2 days'],
])('says %d s as %s', (seconds, words) => {
  expect(durationWords(seconds, (unit, n) => `${n} ${unit}`)).toBe(words);
});
