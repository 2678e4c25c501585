/** Why a PIN is refused: not six digits, or one of the kinds that are guessed first (P4). */
export type PinProblem = 'notSixDigits' | 'allSame' | 'run' | 'repeated' | 'mirrored' | 'keypadPath';

const PATHS = ['147258', '258369', '147369', '741852', '852963', '963852', '159357', '159753', '789456', '456123'];

const reversed = (text: string): string => Array.from(text).reverse().join('');

function isRun(pin: string): boolean {
  const digits = Array.from(pin, Number);
  const steps = digits.slice(1).map((digit, i) => (digit - (digits[i] ?? 0) + 10) % 10);
  return steps.every((step) => step === 1) || steps.every((step) => step === 9);
}

/**
 * The first thing wrong with a PIN, or null. Refused (P4): all digits the same; a run up or down, also over 9 to 0; halves
 * or pairs that repeat (123123, 121212, 112233); the second half mirroring the first (123321); a straight path on the
 * keypad. Dates are let through: a tenth of all PINs would go, and whose birthday it might be is not known here.
 */
export function pinProblem(pin: string): PinProblem | null {
  if (!/^[0-9]{6}$/.test(pin)) return 'notSixDigits';
  if (/^(\d)\1{5}$/.test(pin)) return 'allSame';
  if (isRun(pin)) return 'run';
  if (/^(\d{3})\1$|^(\d{2})\2\2$|^(\d)\3(\d)\4(\d)\5$|^(\d)\6\6(\d)\7\7$/.test(pin)) return 'repeated';
  if (pin.slice(0, 3) === reversed(pin.slice(3))) return 'mirrored';
  return PATHS.includes(pin) || PATHS.includes(reversed(pin)) ? 'keypadPath' : null;
}
