import { base } from './base';
import { cautions } from './cautions';
import { crib } from './crib';
import { errors } from './errors';
import { stand } from './stand';
import { walk } from './walk';

/** All English messages, one area a file. A new area is added here and in ../es/index.ts. */
export const en = { base, cautions, crib, errors, stand, walk };
