import { badRequest, conflict, forbidden, gone, notFound, unauthorised } from '../../http/errors';

export const unknownCode = () => notFound('enrolment.unknownCode', 'There is no such enrolment code.');
export const codeUsed = () =>
  conflict('enrolment.codeUsed', 'This enrolment code was used already: ask for a new one.');
export const codeExpired = () => gone('enrolment.codeExpired', 'This enrolment code has run out: ask for a new one.');
export const badProof = () =>
  badRequest('enrolment.badProof', 'The tablet did not prove that it holds the key it gave.');
export const keyTaken = () => conflict('enrolment.keyTaken', 'This key belongs to an enrolled tablet already.');
export const unknownTablet = () => notFound('tablet.unknown', 'There is no such tablet.');
export const tabletRevoked = () => forbidden('tablet.revoked', 'This tablet was revoked: it may send nothing more.');
export const alreadyRevoked = () => conflict('tablet.alreadyRevoked', 'This tablet was revoked before.');
export const challengeExpired = () => gone('challenge.expired', 'The challenge has run out: ask for a new one.');
export const badSignature = () =>
  unauthorised('challenge.badSignature', 'The challenge was not signed by this tablet.');
