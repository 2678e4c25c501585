import { describe, expect, it } from 'vitest';
import { assertNever } from './assertNever';
import { err, ok, type Result } from './result';

describe('Result', () => {
  it('tells success from refusal by its flag', () => {
    const outcomes: Result<number, { code: string }>[] = [ok(1), err({ code: 'no' })];
    expect(outcomes.map((outcome) => (outcome.ok ? outcome.value : outcome.error.code))).toEqual([1, 'no']);
  });
});

describe('assertNever', () => {
  it('throws and names what slipped in', () => expect(() => assertNever('x' as never)).toThrow('"x"'));
});
