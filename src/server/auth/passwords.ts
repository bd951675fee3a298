import { hash, verify } from '@node-rs/argon2';

// argon2id (the library's default) at the cost of the OWASP Password Storage Cheat Sheet: 19 MiB, 2 passes, 1 lane.
const cost = {
  memoryCost: 19456,
  timeCost: 2,
  parallelism: 1,
};

export const hashPassword = (password: string): Promise<string> => hash(password, cost);

let decoy: Promise<string> | undefined;

/** Checks a password; without an account the same work is done, so that the time tells nothing. */
export async function checkPassword(stored: string | null, password: string): Promise<boolean> {
  decoy ??= hashPassword('no account has this password');
  try {
    const right = await verify(stored ?? (await decoy), password);
    return right && stored !== null;
  } catch {
    return false;
  }
}
