import type { en } from '../en';
import type { SameKeys } from '../sameKeys';
import { base } from './base';
import { cautions } from './cautions';
import { crib } from './crib';
import { errors } from './errors';
import { stand } from './stand';
import { walk } from './walk';

/** Todos los mensajes en español, un archivo por área. */
export const es: SameKeys<typeof en> = { base, cautions, crib, errors, stand, walk };
