import { randomUUID } from 'node:crypto';
import { sha256Hex } from '../../../server/deps';

/** Identifiers of one shop that addresses are filled with. */
export interface Rows {
  job: string;
  procedure: string;
  walk: string;
  person: string;
  tablet: string;
  proof: string;
  pinUse: string;
  blob: string;
  shop: string;
  token: string;
  head: string;
}

/** Which row each address with a parameter names. */
const rowOf: Record<string, keyof Rows> = {
  '/api/jobs/:id': 'job',
  '/api/jobs/:id/joints': 'job',
  '/api/procedures/:id': 'procedure',
  '/api/people/:id/leave': 'person',
  '/api/tablets/:id/revoke': 'tablet',
  '/api/walks/:id': 'walk',
  '/api/walks/:id/countersign': 'walk',
  '/api/walks/:id/send-back': 'walk',
  '/api/walks/:id/void': 'walk',
  '/api/walks/:id/orders': 'walk',
  '/api/walks/:id/branch': 'walk',
  '/api/walks/:id/quarantine': 'walk',
  '/api/walks/:id/proof': 'walk',
  '/api/proofs/:id': 'proof',
  '/api/proofs/:id/pdf': 'proof',
  '/api/proofs/:id/revoke': 'proof',
  '/api/pin-uses/:id/own': 'pinUse',
  '/api/pin-uses/:id/disown': 'pinUse',
  '/api/blobs/:sha256': 'blob',
  '/api/tablet/walks/:walk/events': 'walk',
  '/api/tablet/walks/:walk': 'walk',
  '/api/tablet/walks/:walk/take-over': 'walk',
  '/api/tablet/blobs/:sha256': 'blob',
  '/api/public/proofs/:token': 'token',
  '/api/public/jwks/:shop': 'shop',
};

/** An address filled with the rows of a shop. Throws for one that nobody has put into the table. */
export const filled = (path: string, rows: Rows): string => {
  if (!path.includes(':')) return path;
  const row = rowOf[path];
  if (!row) throw new Error(`${path}: say in tests/integration/support/requests.ts which row it names`);
  return path.replace(/:\w+/, rows[row]);
};

/** A body that has its shape but changes nothing it should not: wrong PINs, unknown codes, a batch that is no batch. */
export const bodyFor = (name: string, rows: Rows): unknown => {
  const reason = 'for the matrix of rights';
  const bodies: Record<string, unknown> = {
    'POST /api/office/sign-in': { email: 'nobody@nowhere.example', password: 'x' },
    'POST /api/office/sign-out': undefined,
    'POST /api/tablets/enrolment-codes': {},
    'POST /api/tablets/:id/revoke': { reason },
    'POST /api/jobs': { number: `M-${randomUUID().slice(0, 8)}` },
    'PATCH /api/jobs/:id': { customer: 'Changed by the matrix' },
    'POST /api/jobs/:id/joints': { procedure: 'HEAD-D6' },
    'POST /api/people/:id/leave': { reason },
    'POST /api/people/me/pin': { password: 'not this one', pin: '583920' },
    'POST /api/walks/:id/countersign': { head: rows.head, pin: '000000', meaning: 'checkedRecord' },
    'POST /api/walks/:id/send-back': {
      head: rows.head,
      pin: '000000',
      items: [{ hole: 'h1', action: 'look', note: reason }],
    },
    'POST /api/walks/:id/void': { head: rows.head, pin: '000000', reason },
    'POST /api/walks/:id/orders': { pin: '000000', kind: 'stop', reason },
    'POST /api/walks/:id/branch': { pin: '000000', branch: 1, reason },
    'POST /api/walks/:id/quarantine': { hash: '0'.repeat(64), reason },
    'POST /api/walks/:id/proof': {},
    'POST /api/proofs/:id/revoke': { reason },
    'POST /api/tablet/walks/:walk/take-over': { forced: false, person: rows.person },
    'POST /api/tablet/pin-check': { person: rows.person, jwe: 'e30..AAAA.BBBB.CCCC' },
    'POST /api/tablet/report': { waiting: 0, refused: 0, stored: 0, version: '1' },
    'PUT /api/tablet/blobs/:sha256': new TextEncoder().encode('a photo'),
    'POST /api/tablet/walks/:walk/events': {
      branch: 0,
      events: [{ text: '{}', hash: sha256Hex('{}'), sig: 'x' }],
      seals: [],
    },
  };
  return bodies[name];
};
