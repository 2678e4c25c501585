import { z } from 'zod';
import { text } from '@shared/contracts/common.contract';

const isTimeZone = (name: string): boolean => {
  try {
    new Intl.DateTimeFormat('en', { timeZone: name });
    return name === 'UTC' || /^[A-Z][A-Za-z_]+\//.test(name);
  } catch {
    return false;
  }
};

/** What a new shop is made of; each message is a sentence for whoever types the command. */
export const newShop = z.object({
  name: text(120).describe("The shop's name: 1 to 120 characters."),
  prefix: z
    .string()
    .regex(/^[A-Z]{2,4}$/)
    .describe('The prefix begins every proof number (BL-2026-00001): 2 to 4 capital letters A to Z.'),
  timeZone: z.string().refine(isTimeZone).describe('The time zone by its IANA name, such as Europe/London or UTC.'),
  admin: text(120).describe("The admin's name: 1 to 120 characters."),
  email: z.email().max(200).describe('The e-mail address with which the admin signs in, such as ada@example.com.'),
});
/** What a new shop is made of. */
export type NewShop = z.output<typeof newShop>;
