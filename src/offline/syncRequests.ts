import type { putBlob } from '@shared/contracts/blobs.contract';
import type { catalogue, CatalogueAnswer } from '@shared/contracts/catalogue.contract';
import type { Receipt, syncEvents, tabletReport, WalkChain, walkForTablet } from '@shared/contracts/sync.contract';
import type { Answer } from '@/api/answer';
import type { TabletClient } from '@/api/tabletClient';
import type { BlobRow } from './rows';
import type { Batch } from './outbox';

/** What is told to the office of what waits here. */
export interface TabletReport {
  waiting: number;
  refused: number;
  stored: number;
  lost: string[];
  version: string;
}

/** The requests of sync. An answer that is JSON but not of our shape is somebody else's (fault 23). */
export interface SyncRequests {
  sendBatch(token: string, walk: string, batch: Batch): Promise<Answer<Receipt>>;
  sendBlob(token: string, blob: BlobRow): Promise<Answer<unknown>>;
  fetchCatalogue(token: string, since: number, epoch: string): Promise<Answer<CatalogueAnswer>>;
  fetchChain(token: string, walk: string): Promise<Answer<WalkChain>>;
  report(token: string, report: TabletReport): Promise<Answer<unknown>>;
}

function checked<T>(answer: Answer<T>, isOurs: (value: T) => boolean): Answer<T> {
  return answer.kind === 'done' && !isOurs(answer.value) ? { kind: 'notOurs', status: answer.status } : answer;
}

const isReceipt = (walk: string) => (value: Receipt) =>
  value.walk === walk &&
  Number.isInteger(value.next) &&
  typeof value.hash === 'string' &&
  Array.isArray(value.quarantined) &&
  Array.isArray(value.confirmations) &&
  Array.isArray(value.missingBlobs);

const isCatalogue = (value: CatalogueAnswer): boolean =>
  Number.isInteger(value.cursor) &&
  typeof value.epoch === 'string' &&
  typeof value.full === 'boolean' &&
  [value.people, value.wrenches, value.procedures, value.jobs, value.joints, value.walks].every(Array.isArray) &&
  [value.orders, value.confirmations].every(Array.isArray);

const isChain = (value: WalkChain): boolean => Array.isArray(value.events) && Array.isArray(value.keys);

const sending = (client: TabletClient): Pick<SyncRequests, 'sendBatch' | 'sendBlob' | 'report'> => ({
  sendBatch: async (token, walk, body) =>
    checked(
      await client.call<typeof syncEvents>({
        method: 'POST',
        path: '/api/tablet/walks/:walk/events',
        token,
        params: { walk },
        body,
      }),
      isReceipt(walk),
    ),
  sendBlob: async (token, { sha256, bytes }) =>
    checked(
      await client.call<typeof putBlob>({
        method: 'PUT',
        path: '/api/tablet/blobs/:sha256',
        token,
        params: { sha256 },
        body: new Uint8Array(bytes),
      }),
      (value) => value.sha256 === sha256,
    ),
  report: (token, body) =>
    client.call<typeof tabletReport>({ method: 'POST', path: '/api/tablet/report', token, body }),
});

const fetching = (client: TabletClient): Pick<SyncRequests, 'fetchCatalogue' | 'fetchChain'> => ({
  fetchCatalogue: async (token, since, epoch) =>
    checked(
      await client.call<typeof catalogue>({
        method: 'GET',
        path: '/api/tablet/catalogue',
        token,
        query: { since, epoch },
      }),
      isCatalogue,
    ),
  fetchChain: async (token, walk) =>
    checked(
      await client.call<typeof walkForTablet>({
        method: 'GET',
        path: '/api/tablet/walks/:walk',
        token,
        params: { walk },
        query: {},
      }),
      isChain,
    ),
});

/** The requests over a client. */
export const syncRequests = (client: TabletClient): SyncRequests => ({ ...sending(client), ...fetching(client) });
