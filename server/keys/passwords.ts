import { hash, verify } from '@node-rs/argon2';

// OWASP's recommendation for argon2id: 19 MiB, two passes, one lane.
const OPTIONS = { memoryCost: 19_456, timeCost: 2, parallelism: 1 };

/** Hashes a password or PIN with argon2id. */
export const hashSecret = (secret: string): Promise<string> => hash(secret, OPTIONS);

let nobody: Promise<string> | undefined;

/** Compares; with no hash it works as long and answers false, so that an unknown name cannot be told by the time. */
export const secretFits = async (stored: string | null, secret: string): Promise<boolean> => {
  nobody ??= hashSecret('nobody has this');
  const fits = await verify(stored ?? (await nobody), secret);
  return stored !== null && fits;
};
