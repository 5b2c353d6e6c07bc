import { hash, verify } from '@node-rs/argon2';

/** Argon2id with the parameters of the OWASP password storage cheat sheet (19 MiB, 2 passes), from memory. */
const options = {
  // Argon2id; the package's name for it is a const enum, which isolated modules cannot read.
  algorithm: 2,
  memoryCost: 19_456,
  timeCost: 2,
  parallelism: 1,
};

export const hashPassword = (password: string): Promise<string> => hash(password, options);

let decoy: Promise<string> | null = null;

/** With no account the same work is done on a decoy, so that the time tells nothing. */
export async function passwordMatches(hashed: string | null, password: string): Promise<boolean> {
  decoy ??= hashPassword('a decoy that nobody signs in with');
  const right = await verify(hashed ?? (await decoy), password);
  return hashed !== null && right;
}
