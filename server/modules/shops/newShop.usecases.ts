import { randomInt } from 'node:crypto';
import type { Deps } from '../../deps';
import { makeShopKey } from '../../keys/makeShopKey';
import { hashSecret } from '../../keys/passwords';
import { withShop } from '../../tenancy/withShop';
import { writeAudit } from '../audit/audit.repository';
import { shopsForEmail } from '../officeAuth/officeAuth.repository';
import { insertShopKey } from '../shopKeys/shopKeys.repository';
import type { NewShop } from './newShop';
import { insertPerson, insertShop } from './newShop.repository';
import { findShop } from './shops.repository';

// Without I, L, O, U and 0, 1: it is read from a screen and typed once.
const LETTERS = 'ABCDEFGHJKMNPQRSTVWXYZ23456789';
const GROUPS = 5;
const GROUP = 4;

/** A password nobody chose: 20 of 30 letters, 98 bits. */
const makePassword = (): string => {
  const group = () => Array.from({ length: GROUP }, () => LETTERS[randomInt(LETTERS.length)]).join('');
  return Array.from({ length: GROUPS }, group).join('-');
};

/** The shop of that name in which this address signs in already, or null: a command that is typed twice makes one shop. */
const sameShop = async (deps: Deps, wanted: NewShop): Promise<string | null> => {
  for (const { shop } of await shopsForEmail(deps.client, wanted.email)) {
    const known = await withShop(deps.client, shop, findShop);
    if (known?.name === wanted.name) return known.id;
  }
  return null;
};

/**
 * Makes a shop with its two keys, the default settings and its first admin, all of it or nothing. Answers the password
 * that was made for the admin, which is stored only as a hash; or `exists` where that admin has a shop of that name.
 */
export const createShop = async (
  deps: Deps,
  wanted: NewShop,
): Promise<{ kind: 'made'; shop: string; password: string } | { kind: 'exists'; shop: string }> => {
  const known = await sameShop(deps, wanted);
  if (known !== null) return { kind: 'exists', shop: known };
  const [shop, person, password] = [deps.ids.uuid(), deps.ids.uuid(), makePassword()];
  const passwordHash = await hashSecret(password);
  await withShop(deps.client, shop, async (tx) => {
    const { name, prefix, timeZone, admin, email } = wanted;
    await insertShop(tx, { name, prefix, timeZone });
    await insertShopKey(tx, deps.config, await makeShopKey('signing', deps.crypto));
    await insertShopKey(tx, deps.config, await makeShopKey('sealing', deps.crypto));
    await insertPerson(tx, { id: person, name: admin, email, passwordHash, roles: ['admin'] });
    await writeAudit(deps, tx, { person: null, action: 'shop.created', subject: shop, details: { admin: person } });
  });
  return { kind: 'made', shop, password };
};
