import { officeCrib } from './officeCrib';
import { officeErrors } from './officeErrors';
import { officeFrame } from './officeFrame';
import { officeJobs } from './officeJobs';
import { officeProcedures } from './officeProcedures';
import { officeProofs } from './officeProofs';
import { officeShop } from './officeShop';
import { officeWalk } from './officeWalk';

const pages = { ...officeJobs, ...officeWalk, ...officeProofs, ...officeCrib, ...officeProcedures, ...officeShop };

/** Words of the office alone, added when it is opened. */
export const officeWords = { office: { ...officeFrame, ...pages, errors: officeErrors } };
