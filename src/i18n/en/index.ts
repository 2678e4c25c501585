import { base } from './base';
import { cautions } from './cautions';

/** All English messages, one area a file. A new area is added here and in ../es/index.ts. */
export const en = { base, cautions };
