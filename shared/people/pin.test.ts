import { describe, expect, it } from 'vitest';
import { pinProblem } from './pin';

describe('pinProblem (P4)', () => {
  it.each([
    ['', 'notSixDigits'],
    ['12345', 'notSixDigits'],
    ['1234567', 'notSixDigits'],
    ['12345a', 'notSixDigits'],
    ['١٢٣٤٥٦', 'notSixDigits'],
    ['000000', 'allSame'],
    ['123456', 'run'],
    ['654321', 'run'],
    ['789012', 'run'],
    ['109876', 'run'],
    ['123123', 'repeated'],
    ['121212', 'repeated'],
    ['112233', 'repeated'],
    ['111222', 'repeated'],
    ['123321', 'mirrored'],
    ['147258', 'keypadPath'],
    ['357951', 'keypadPath'],
  ])('refuses %j as %s', (pin, problem) => expect(pinProblem(pin)).toBe(problem));

  it.each(['482913', '190584', '100002', '135790'])('accepts %s', (pin) => expect(pinProblem(pin)).toBeNull());

  it('leaves nearly all PINs to choose from', () => {
    const refused = Array.from({ length: 1_000_000 }, (_, n) => String(n).padStart(6, '0')).filter((pin) =>
      pinProblem(pin),
    );
    expect(refused.length).toBeGreaterThan(1_000);
    expect(refused.length).toBeLessThan(5_000);
  });
});
