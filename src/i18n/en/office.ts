import { officeErrors } from './officeErrors';
import { officeFrame } from './officeFrame';
import { officeJobs } from './officeJobs';

/** Words of the office alone, added when it is opened; `errors` joins those that every page has. */
export const officeWords = { office: { ...officeFrame, ...officeJobs }, errors: officeErrors };
