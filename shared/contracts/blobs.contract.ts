import { z } from 'zod';
import { sha256 } from './common.contract';
import { defineEndpoint } from './defineEndpoint';

/** Largest photo or file (decision 15). */
export const MOST_BLOB_BYTES = 2 * 1024 * 1024;

/**
 * Stores a photo or file under its own hash; repeating it changes nothing. Errors: `blob.wrongHash` 400 (the bytes do not
 * match the address), `blob.tooLarge` 413, `blob.empty` 400.
 */
export const putBlob = defineEndpoint({
  method: 'PUT',
  path: '/api/tablet/blobs/:sha256',
  auth: 'tablet',
  params: z.object({ sha256 }),
  body: { kind: 'binary', contentType: 'application/octet-stream' },
  limit: MOST_BLOB_BYTES,
  tooLarge: 'blob.tooLarge',
  responses: { 200: z.object({ sha256, bytes: z.number().int() }) },
});

/** The bytes of a photo or file. Errors: `blob.unknown` 404. */
export const getBlob = defineEndpoint({
  method: 'GET',
  path: '/api/blobs/:sha256',
  auth: 'office',
  right: 'see',
  params: z.object({ sha256 }),
  responses: { 200: { kind: 'binary', contentType: 'application/octet-stream' } },
});
