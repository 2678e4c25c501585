import type { ProcedureDocument } from '@shared/procedure/procedure';
import { flyF4 } from './flyF4';
import { headD6 } from './headD6';
import { hubF4 } from './hubF4';
import { mainD6 } from './mainD6';
import { manF4 } from './manF4';
import { rodD6 } from './rodD6';

/** Every procedure of the demo. Engines and values are invented. */
export const demoProcedures: readonly ProcedureDocument[] = [headD6, mainD6, rodD6, flyF4, manF4, hubF4];
