import { MutationCache, QueryCache, QueryClient } from '@tanstack/vue-query';
import { OfficeFailure } from './officeApi';
import { keys } from './keys';

const sessionOver = (error: unknown): boolean => error instanceof OfficeFailure && error.status === 401;

/** Tried again only where nobody answered or the server was ill: a refusal stays one. */
const mayPass = (error: unknown): boolean =>
  error instanceof OfficeFailure && (error.code === 'office.unreachable' || error.status >= 500);

/** A session that ends while somebody works shows the sign-in; what they typed stays in its draft (fault 24). */
function noticeEnd(error: unknown): void {
  if (sessionOver(error)) officeCache.setQueryData(keys.me, null);
}

/** What the office has read of the server. A cache of its own, so that the stand never loads it. */
export const officeCache: QueryClient = new QueryClient({
  queryCache: new QueryCache({ onError: noticeEnd }),
  mutationCache: new MutationCache({ onError: noticeEnd }),
  defaultOptions: {
    queries: {
      staleTime: 10_000,
      retry: (failures, error) => failures < 2 && mayPass(error),
      retryDelay: (failures) => Math.min(4_000, 500 * 2 ** failures),
      networkMode: 'always',
    },
    mutations: { retry: false, networkMode: 'always' },
  },
});
officeCache.mount();
