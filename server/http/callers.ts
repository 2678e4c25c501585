import type { Role } from '@shared/people/roles';
import type { PublicJwk } from '@shared/record/crypto';

/** Somebody signed in at the office. */
export interface OfficeCaller {
  shop: string;
  person: { id: string; name: string; email: string; roles: Role[] };
  session: { id: string; csrf: string };
}

/** An enrolled tablet: the device, never the person who holds it (decision 9). */
export interface TabletCaller {
  shop: string;
  id: string;
  name: string;
  kid: string;
  publicJwk: PublicJwk;
}

/** What a handler may know of the connection. */
export interface Visit {
  ip: string;
  userAgent: string;
}
