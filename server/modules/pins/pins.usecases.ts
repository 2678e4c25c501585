import { compactDecrypt } from 'jose';
import type { z } from 'zod';
import type { Deps } from '../../deps';
import { growingWait } from '../../http/growingWait';
import { secretFits } from '../../keys/passwords';
import type { ShopTx } from '../../tenancy/withShop';
import { findPerson, findPin } from '../people/people.repository';
import type { PinRefusal } from './pins.errors';
import { lockPinFailures, savePinFailures } from './pins.repository';

/** A PIN and what it was given for. */
export interface PinAttempt {
  person: string;
  pin: string;
  /** Tablet's id or `office`: the wait grows for each place apart. */
  place: string;
  /** Version in force when it was typed; absent: the one in force now. */
  version?: number;
  /** A seal of an event: the person may have left after it was made; whether before, the caller has judged. */
  mayHaveLeft?: boolean;
}

/**
 * Compares a PIN and counts wrong ones in a row. Answers null when it fits. Never throws on a wrong one, so that the count
 * is committed and a batch that carries it is stored all the same.
 */
export const checkPin = async (deps: Deps, tx: ShopTx, attempt: PinAttempt): Promise<PinRefusal | null> => {
  const person = await findPerson(tx, attempt.person);
  if (!person) return { code: 'pin.personUnknown' };
  if (person.state === 'left' && !attempt.mayHaveLeft) return { code: 'pin.personLeft' };
  const pin = await findPin(tx, attempt.person, attempt.version);
  if (!pin) return { code: 'pin.notSet' };
  const now = deps.clock.now().getTime();
  const failures = await lockPinFailures(tx, attempt.person, attempt.place);
  const seconds = Math.ceil((failures.waitUntil.getTime() - now) / 1000);
  if (seconds > 0) return { code: 'pin.wait', seconds };
  if (await secretFits(pin.hash, attempt.pin)) {
    if (failures.count > 0)
      await savePinFailures(tx, attempt.person, attempt.place, { count: 0, waitUntil: new Date(0) });
    return null;
  }
  const count = failures.count + 1;
  const waitUntil = new Date(now + growingWait(count) * 1000);
  await savePinFailures(tx, attempt.person, attempt.place, { count, waitUntil });
  return { code: 'pin.wrong' };
};

const isJoseError = (error: unknown): boolean =>
  error instanceof Error && 'code' in error && typeof error.code === 'string' && error.code.startsWith('ERR_J');

const decrypt = async (deps: Deps, tx: ShopTx, jwe: string): Promise<string | null> => {
  const { sealOpeners } = await deps.keyring(tx);
  try {
    const { plaintext } = await compactDecrypt(
      jwe,
      (header) => {
        const key = header.kid === undefined ? [...sealOpeners.values()].at(-1) : sealOpeners.get(header.kid);
        if (!key) throw new UnknownSealKey();
        return key;
      },
      { keyManagementAlgorithms: ['ECDH-ES'], contentEncryptionAlgorithms: ['A256GCM'] },
    );
    return new TextDecoder().decode(plaintext);
  } catch (error) {
    // Whatever is wrong with it, a seal that does not open is the sender's: a point off the curve is a TypeError.
    if (isJoseError(error) || error instanceof UnknownSealKey || error instanceof TypeError) return null;
    if (error instanceof Error && error.name === 'DataError') return null;
    throw error;
  }
};

class UnknownSealKey extends Error {}

const parseJson = (text: string): unknown => {
  try {
    return JSON.parse(text) as unknown;
  } catch {
    return null;
  }
};

/** Opens a sealed PIN; null when it cannot be opened or does not hold what it should. */
export const openSeal = async <T>(deps: Deps, tx: ShopTx, jwe: string, shape: z.ZodType<T>): Promise<T | null> => {
  const text = await decrypt(deps, tx, jwe);
  const parsed = text === null ? null : shape.safeParse(parseJson(text));
  return parsed?.success ? parsed.data : null;
};
