import { en } from './en';
import { es } from './es';
import type { Messages } from './index';

/** Every word in every language at once, for tests and the gallery; the program itself loads one language. */
export const allMessages = { en, es } as unknown as Messages;
