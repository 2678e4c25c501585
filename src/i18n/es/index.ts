import type { en } from '../en';
import type { SameKeys } from '../sameKeys';
import { base } from './base';
import { cautions } from './cautions';

/** Todos los mensajes en español, un archivo por área. */
export const es: SameKeys<typeof en> = { base, cautions };
