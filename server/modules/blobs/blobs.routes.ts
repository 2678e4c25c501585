import type { Router } from 'express';
import * as contract from '@shared/contracts/blobs.contract';
import type { Deps } from '../../deps';
import { officeRoute, tabletRoute } from '../../http/route';
import { keepBlob, readBlob } from './blobs.usecases';

/** Adds the addresses of photos and files. */
export const blobRoutes = (router: Router, deps: Deps): void => {
  tabletRoute(router, deps, contract.putBlob, ({ tx, caller, params, body }) =>
    // A request without a body leaves an empty object behind, not bytes.
    keepBlob(deps, tx, caller, params.sha256, body instanceof Uint8Array ? body : new Uint8Array()),
  );
  officeRoute(router, deps, contract.getBlob, async ({ tx, params, setHeader }) => {
    const bytes = await readBlob(deps, tx, params.sha256);
    // Whatever the bytes are, a browser shows them as a download and never as a page of ours.
    setHeader('Content-Disposition', `attachment; filename="${params.sha256.slice(0, 12)}"`);
    return bytes;
  });
};
