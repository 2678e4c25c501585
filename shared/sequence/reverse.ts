/** The order backwards: how a joint is loosened where the procedure names no order of its own (R6, REF-SEQ-33). */
export function reverse<T>(order: readonly T[]): T[] {
  return [...order].reverse();
}
