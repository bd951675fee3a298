import { beforeEach, expect, test, vi } from 'vitest';
import { checkPassword, hashPassword } from '@/server/auth/passwords';

const checked = vi.hoisted(() => [] as string[]);
vi.mock(import('@node-rs/argon2'), async (original) => {
  const real = await original();
  const verify: typeof real.verify = (hash, ...rest) => {
    checked.push(String(hash));
    return real.verify(hash, ...rest);
  };
  return { ...real, verify };
});
beforeEach(() => {
  checked.length = 0;
});

// OWASP Password Storage Cheat Sheet: argon2id with 19 MiB, two passes, one lane.
const COST = /^\$argon2id\$v=19\$m=19456,t=2,p=1\$/;

test('a password is kept by argon2id at the cost OWASP advises, never twice alike', async () => {
  const [one, two] = await Promise.all([hashPassword('a password'), hashPassword('a password')]);
  expect(one).toMatch(COST);
  expect(one).not.toBe(two);
  expect(await checkPassword(one, 'a password')).toBe(true);
  expect(await checkPassword(one, 'A password')).toBe(false);
});

test('without an account the same work is done on a decoy of the same cost, and the answer is no', async () => {
  expect(await checkPassword(null, 'no account has this password')).toBe(false);
  expect(checked).toEqual([expect.stringMatching(COST)]);
});

test('a hash that cannot be read is no password', async () => {
  expect(await checkPassword('none that fits', 'anything')).toBe(false);
  expect(await checkPassword('', '')).toBe(false);
});
