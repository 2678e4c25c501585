import { officeErrors } from './officeErrors';
import { officeFrame } from './officeFrame';
import { officeJobs } from './officeJobs';
import { officeProofs } from './officeProofs';
import { officeWalk } from './officeWalk';

/** Words of the office alone, added when it is opened. */
export const officeWords = {
  office: { ...officeFrame, ...officeJobs, ...officeWalk, ...officeProofs, errors: officeErrors },
};
