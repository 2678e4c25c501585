import { walkNames } from './walkNames';
import { walkPrepare } from './walkPrepare';
import { walkPull } from './walkPull';
import { walkReview } from './walkReview';
import { walkSettle } from './walkSettle';

/** All words of a walk. */
export const walk = { ...walkNames, ...walkPull, ...walkPrepare, ...walkSettle, ...walkReview };
