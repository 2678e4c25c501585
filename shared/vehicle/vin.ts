import { vinCheckDigit } from './vinCheckDigit';

/** Something odd in a VIN; positions count from 1, as people count them. Only `checkDigit` leaves the VIN usable (D3). */
export type VinProblem =
  | { code: 'length'; length: number }
  | { code: 'letterIOQ'; at: number; character: string; meant: string }
  | { code: 'character'; at: number; character: string }
  | { code: 'checkDigit'; found: string; expected: string };

/** The VIN as it is kept, and all that is odd in it. */
export interface CheckedVin {
  vin: string;
  problems: VinProblem[];
}

const MEANT: Readonly<Record<string, string>> = { I: '1', O: '0', Q: '0' };

/** Capital letters, without spaces, hyphens, dots and the asterisks that some plates put at both ends. */
export function normalizeVin(text: string): string {
  return text.toUpperCase().replace(/[\s\u00ad.*‐-―-]/g, '');
}

function characterProblems(vin: string): VinProblem[] {
  return Array.from(vin).flatMap((character, i): VinProblem[] => {
    const meant = MEANT[character];
    if (meant) return [{ code: 'letterIOQ', at: i + 1, character, meant }];
    return /[A-Z0-9]/.test(character) ? [] : [{ code: 'character', at: i + 1, character }];
  });
}

/**
 * Checks a typed VIN: 17 characters, letters I, O and Q (never in a VIN: the digit that is meant is named), foreign
 * characters, check digit. The check digit is mandatory in North America only, so it warns and never blocks (D3,
 * REF-VIN-11): {@link vinBlocks}.
 */
export function checkVin(text: string): CheckedVin {
  const vin = normalizeVin(text);
  const problems: VinProblem[] = characterProblems(vin);
  const { length } = Array.from(vin);
  if (length !== 17) problems.unshift({ code: 'length', length });
  const expected = vinCheckDigit(vin);
  const found = vin.charAt(8);
  if (expected !== null && expected !== found) problems.push({ code: 'checkDigit', found, expected });
  return { vin, problems };
}

/** True when the problem makes it no VIN at all; false for a mere warning. */
export function vinBlocks(problem: VinProblem): boolean {
  return problem.code !== 'checkDigit';
}

/** The form by which a VIN is searched: I read as 1, O and Q as 0, so that a misread letter still finds the engine. */
export function vinSearchKey(text: string): string {
  return Array.from(normalizeVin(text), (character) => MEANT[character] ?? character).join('');
}
