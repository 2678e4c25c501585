import { z } from 'zod';
import type { Deps } from '../../deps';
import type { TabletCaller } from '../../http/callers';
import type { AppError } from '../../http/errors';
import type { ShopTx } from '../../tenancy/withShop';
import { findPerson } from '../people/people.repository';
import { pinError, sealElsewhere, sealStale, sealUnreadable } from './pins.errors';
import { checkPin, openSeal } from './pins.usecases';

const FRESH_MS = 5 * 60_000;

const sealed = z.looseObject({ pin: z.string().max(20), person: z.string(), tablet: z.string(), at: z.iso.datetime() });

/** Checks a PIN online, when somebody signs in on a tablet for the first time. Returns a wrong one, so that it is counted. */
export const checkPinOnline = async (
  deps: Deps,
  tx: ShopTx,
  tablet: TabletCaller,
  request: { person: string; jwe: string },
): Promise<{ person: string; pinVersion: number; at: string } | AppError> => {
  const opened = await openSeal(deps, tx, request.jwe, sealed);
  if (!opened) throw sealUnreadable();
  if (opened.person !== request.person || opened.tablet !== tablet.id) throw sealElsewhere();
  const now = deps.clock.now();
  if (Math.abs(now.getTime() - Date.parse(opened.at)) > FRESH_MS) throw sealStale();
  const refusal = await checkPin(deps, tx, { person: request.person, pin: opened.pin, place: tablet.id });
  if (refusal) return pinError(refusal);
  const person = await findPerson(tx, request.person);
  return { person: request.person, pinVersion: person?.pinVersion ?? 0, at: now.toISOString() };
};
