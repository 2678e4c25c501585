import type { z } from 'zod';
import { badRequest } from './errors';

/** Codes of ours travel as the message of a zod issue: dotted words. */
const OWN_CODE = /^[a-z][a-zA-Z]*\.[a-zA-Z]+$/;

/**
 * Reads one part of a request. Throws 400: the code of the field's own rule where it has one (`vin.letters`), else
 * `request.invalid`; `details` name the part, the field and every issue.
 */
export const validate = (schema: z.ZodType, value: unknown, part: 'params' | 'query' | 'body'): unknown => {
  const parsed = schema.safeParse(value);
  if (parsed.success) return parsed.data;
  const issues = parsed.error.issues.slice(0, 10).map((issue) => ({
    field: issue.path.join('.'),
    message: issue.message,
    ...(issue.code === 'custom' && issue.params ? { params: issue.params } : {}),
  }));
  const own = issues.find((issue) => OWN_CODE.test(issue.message));
  const first = own ?? issues[0];
  const field = first?.field ?? '';
  throw badRequest(own?.message ?? 'request.invalid', `The ${part} of the request is not right: ${field}`, {
    part,
    field,
    issues,
    ...(own && 'params' in own ? own.params : {}),
  });
};
