import type { CataloguePerson } from '@shared/contracts/catalogue.contract';
import type { PersonRow } from '@shared/contracts/people.contract';
import { pinProblem } from '@shared/people/pin';
import { hasRight } from '@shared/people/roles';
import type { Deps } from '../../deps';
import type { OfficeCaller } from '../../http/callers';
import { badRequest, conflict, notFound, type AppError } from '../../http/errors';
import { hashSecret } from '../../keys/passwords';
import type { ShopTx } from '../../tenancy/withShop';
import { writeAudit } from '../audit/audit.repository';
import { endSessionsOf } from '../officeAuth/officeAuth.repository';
import { checkPassword } from '../officeAuth/officeAuth.usecases';
import { findPerson, insertPin, markPersonLeft, peopleSince, type PersonRecord } from './people.repository';

/** A stored person as tablets know them. */
export const toCataloguePerson = ({ id, name, roles, state, pinVersion }: PersonRecord): CataloguePerson => ({
  id,
  name,
  roles,
  state,
  pinVersion,
});

const toPersonRow = (caller: OfficeCaller, row: PersonRecord): PersonRow => ({
  id: row.id,
  name: row.name,
  roles: row.roles,
  state: row.state,
  hasPin: row.pinVersion > 0,
  email: hasRight(caller.person.roles, 'administer') ? row.email : null,
});

/** Everybody of the shop, those who left too. */
export const listPeople = async (tx: ShopTx, caller: OfficeCaller): Promise<PersonRow[]> =>
  (await peopleSince(tx, 0)).map((row) => toPersonRow(caller, row));

/** Marks somebody as gone: signed out at once, told to every tablet, kept in the records. */
export const markLeft = async (
  deps: Deps,
  tx: ShopTx,
  caller: OfficeCaller,
  id: string,
  reason: string,
): Promise<PersonRow> => {
  const person = await findPerson(tx, id);
  if (!person) throw notFound('person.unknown', 'There is no such person.');
  if (person.state === 'left') throw conflict('person.leftAlready', 'This person has left already.');
  if (id === caller.person.id) throw conflict('person.yourself', 'You cannot take yourself off the shop.');
  const at = deps.clock.now();
  await markPersonLeft(tx, id, at);
  await endSessionsOf(tx, id, at);
  await writeAudit(deps, tx, { person: caller.person.id, action: 'person.left', subject: id, details: { reason } });
  return toPersonRow(caller, { ...person, state: 'left' });
};

/** Sets the caller's own PIN, after the password (P4). Returns a wrong password, so that it is counted. */
export const setOwnPin = async (
  deps: Deps,
  tx: ShopTx,
  caller: OfficeCaller,
  request: { password: string; pin: string },
): Promise<{ pinVersion: number } | AppError> => {
  const problem = pinProblem(request.pin);
  if (problem) throw badRequest('pin.trivial', 'This PIN is guessed too easily.', { problem });
  const person = await findPerson(tx, caller.person.id);
  if (!person) throw notFound('person.unknown', 'There is no such person.');
  const refusal = await checkPassword(deps, tx, person, request.password);
  if (refusal) return refusal;
  const pinVersion = await insertPin(tx, person.id, await hashSecret(request.pin), deps.clock.now());
  await writeAudit(deps, tx, { person: person.id, action: 'pin.set' });
  return { pinVersion };
};
