import { officeClient, OfficeFailure } from '@/api/officeClient';

export { OfficeFailure } from '@/api/officeClient';

let csrf = '';

/** The token that every write of this session carries; told by whoever reads who is signed in. */
export function useCsrf(token: string): void {
  csrf = token;
}

/** The office's one client. */
export const officeApi = officeClient({ fetch: (...call) => window.fetch(...call), csrf: () => csrf });

/** Whatever was thrown, as a failure of a call: a mistake of the program itself shows as such. */
export const failureOf = (error: unknown): OfficeFailure | null =>
  error instanceof OfficeFailure ? error : error ? new OfficeFailure('office.mistake', 0) : null;
