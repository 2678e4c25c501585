// 49 CFR 565.15(c), tables III to V.
const LETTERS: Readonly<Record<string, number>> = {
  ...{ A: 1, B: 2, C: 3, D: 4, E: 5, F: 6, G: 7, H: 8 },
  ...{ J: 1, K: 2, L: 3, M: 4, N: 5, P: 7, R: 9 },
  ...{ S: 2, T: 3, U: 4, V: 5, W: 6, X: 7, Y: 8, Z: 9 },
};
const WEIGHTS = [8, 7, 6, 5, 4, 3, 2, 10, 0, 9, 8, 7, 6, 5, 4, 3, 2];

/**
 * The character that position 9 of a North American VIN must hold: the weighted sum modulo 11, with 10 written X.
 * Null unless given 17 capital letters and digits without I, O and Q.
 */
export function vinCheckDigit(vin: string): string | null {
  if (!/^[A-HJ-NPR-Z0-9]{17}$/.test(vin)) return null;
  const sum = WEIGHTS.reduce((total, weight, i) => {
    const character = vin.charAt(i);
    return total + weight * (LETTERS[character] ?? Number(character));
  }, 0);
  return sum % 11 === 10 ? 'X' : String(sum % 11);
}
