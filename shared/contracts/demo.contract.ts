import { z } from 'zod';
import { id, publicJwk, role } from './common.contract';
import { defineEndpoint } from './defineEndpoint';
import { enrolledTablet } from './tablets.contract';

/** The two doors of the demo. Outside the demo these addresses do not exist (404 `route.unknown`). */
export const doors = defineEndpoint({
  method: 'GET',
  path: '/api/demo/doors',
  auth: 'public',
  responses: {
    200: z.object({
      shop: z.object({ id, name: z.string() }),
      accounts: z.array(
        z.object({
          id,
          name: z.string(),
          roles: z.array(role),
          email: z.string().nullable(),
          password: z.string().nullable(),
          pin: z.string().nullable(),
        }),
      ),
      /** The half-walked head that the stand's door opens, if there is one. */
      walk: id.nullable(),
    }),
  },
});
/** Enrols this browser as a demo tablet at a tap. */
export const demoTablet = defineEndpoint({
  method: 'POST',
  path: '/api/demo/tablet',
  auth: 'public',
  body: z.object({ publicJwk }),
  responses: { 201: enrolledTablet },
});
