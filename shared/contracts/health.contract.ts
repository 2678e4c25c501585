import { z } from 'zod';
import { moment } from './common.contract';
import { defineEndpoint } from './defineEndpoint';

/** Whether the server and its database answer; 503 `server.database` when the database does not. */
export const health = defineEndpoint({
  method: 'GET',
  path: '/api/health',
  auth: 'public',
  responses: { 200: z.object({ ok: z.literal(true), now: moment, demo: z.boolean(), version: z.string() }) },
});
