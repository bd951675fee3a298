import { Algorithm, hash, verify } from '@node-rs/argon2';

// OWASP Password Storage Cheat Sheet: argon2id, 19 MiB, 2 passes, 1 lane.
const cost = {
  algorithm: 2 satisfies Algorithm.Argon2id as Algorithm,
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
