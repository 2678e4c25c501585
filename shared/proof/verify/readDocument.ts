import { err, ok, type Result } from '../../kernel/result';
import { canonicalJson, CanonicalJsonError } from '../../record/canonicalJson';
import type { ProofDocument } from '../proofDocument';

/** Why a text is no document of ours; `field` names the first member that is not as it should be. */
export interface DocumentProblem {
  code: 'notJson' | 'notCanonical' | 'notAProof' | 'unknownVersion' | 'badShape';
  field?: string;
}

type Test = (value: unknown) => boolean;

const isText: Test = (value) => typeof value === 'string';
const isNumber: Test = (value) => typeof value === 'number';
const isObject = (value: unknown): value is Record<string, unknown> =>
  typeof value === 'object' && value !== null && !Array.isArray(value);
const orNull =
  (test: Test): Test =>
  (value) =>
    value === null || test(value);
const listOf =
  (test: Test): Test =>
  (value) =>
    Array.isArray(value) && value.every(test);
const shaped =
  (members: Record<string, Test>): Test =>
  (value) =>
    isObject(value) && Object.entries(members).every(([name, test]) => test(value[name]));

const jwk = shaped({ kty: isText, crv: isText, x: isText, y: isText });
const signedEvent = shaped({ text: isText, hash: isText, sig: isText });
const confirmation = shaped({ seq: isNumber, hash: isText, person: isText, result: isText, at: isText, jws: isText });
const procedureDocument = shaped({
  code: isText,
  source: isObject,
  map: isObject,
  holes: listOf(isObject),
  fasteners: listOf(isObject),
  groups: listOf(isObject),
  parts: listOf(isObject),
  passes: listOf(shaped({ id: isText, order: listOf(isText), stages: listOf(isObject), rework: isObject })),
  steps: listOf(isObject),
});

/** What is looked at before anything is done with a document: enough for the checks; the sheet is compared, not trusted. */
const FIELDS: Readonly<Record<keyof ProofDocument, Test>> = {
  format: isText,
  version: isNumber,
  number: isText,
  issue: isNumber,
  issuedAt: isText,
  language: (value) => value === 'en' || value === 'es',
  timeZone: isText,
  publicUrl: isText,
  note: isText,
  shop: shaped({ id: isText, name: isText, address: isText }),
  job: shaped({ number: isText, engine: shaped({ family: isText, model: isText, serial: isText }) }),
  procedure: shaped({ revision: isNumber, hash: isText, approvedAt: orNull(isText), document: procedureDocument }),
  record: shaped({
    events: listOf(signedEvent),
    received: listOf(isText),
    tablets: listOf(shaped({ id: isText, name: isText, kid: isText, jwk })),
    roles: listOf(shaped({ person: isText, since: isNumber, roles: listOf(isText) })),
    confirmations: listOf(confirmation),
  }),
  side: listOf(isText),
  sheet: shaped({ version: isNumber }),
};

function isCanonical(value: unknown, text: string): boolean {
  try {
    return canonicalJson(value) === text;
  } catch (error) {
    if (error instanceof CanonicalJsonError) return false;
    throw error;
  }
}

/** Reads the text of a document that may come from anybody. Never throws. */
export function readDocument(text: string): Result<ProofDocument, DocumentProblem> {
  let value: unknown;
  try {
    value = JSON.parse(text);
  } catch {
    return err({ code: 'notJson' });
  }
  if (!isObject(value) || value.format !== 'boltwalk.proof') return err({ code: 'notAProof' });
  if (value.version !== 1) return err({ code: 'unknownVersion' });
  // Two texts for one document would be two documents under one signature.
  if (!isCanonical(value, text)) return err({ code: 'notCanonical' });
  const members = value;
  const bad = Object.entries(FIELDS).find(([name, test]) => !test(members[name]));
  return bad ? err({ code: 'badShape', field: bad[0] }) : ok(value as unknown as ProofDocument);
}
