import type { z } from 'zod';
import type { Violation, Violations } from './useForm';

/** A code of ours travels in the message: `vin.letters`. */
const OWN_CODE = /^[a-z][A-Za-z]*\.[a-zA-Z]+$/;

type Issue = z.core.$ZodIssue;

function violationOf(issue: Issue): Violation {
  if (OWN_CODE.test(issue.message)) return { code: issue.message };
  switch (issue.code) {
    case 'too_small':
      return { code: 'required' };
    case 'too_big':
      return { code: 'tooLong', params: { most: Number(issue.maximum) } };
    case 'invalid_format':
      return { code: issue.format === 'email' ? 'email' : 'format' };
    default:
      return { code: 'format' };
  }
}

/** Everything a schema finds wrong, by field; the first thing of each. */
export function zodViolations(schema: z.ZodType, value: unknown): Violations {
  const result = schema.safeParse(value);
  if (result.success) return {};
  const found: Violations = {};
  for (const issue of result.error.issues) found[issue.path.join('.')] ??= violationOf(issue);
  return found;
}
