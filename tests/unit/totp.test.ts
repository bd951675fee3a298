import { expect, test } from 'vitest';
import { newTotpSecret, stepOfCode, totpAddress } from '@/server/auth/totp';

// RFC 6238 appendix B, SHA-1: the ASCII secret 12345678901234567890, here in base 32. The codes there have eight
// digits; a code of six is its last six, as both are the same number modulo a power of ten (RFC 4226 §5.3).
const SECRET = 'GEZDGNBVGY3TQOJQGEZDGNBVGY3TQOJQ';
test.each([
  [59, '94287082', 1],
  [1111111109, '07081804', 0x23523ec],
  [1111111111, '14050471', 0x23523ed],
  [1234567890, '89005924', 0x273ef07],
  [2000000000, '69279037', 0x3f940aa],
  [20000000000, '65353130', 0x27bc86aa],
])('at %i s the code of RFC 6238 is of its step', (seconds, code, step) => {
  expect(stepOfCode(SECRET, code.slice(2), new Date(seconds * 1000))).toBe(step);
});

const at = (seconds: number) => new Date(seconds * 1000);

test('a code one step early or late is taken as of its own step, two steps is not', () => {
  expect(stepOfCode(SECRET, '287082', at(59 + 30))).toBe(1);
  expect(stepOfCode(SECRET, '287082', at(59 - 30))).toBe(1);
  expect(stepOfCode(SECRET, '287082', at(59 + 60))).toBeNull();
});

test('a wrong code is of no step', () => {
  expect(stepOfCode(SECRET, '287083', at(59))).toBeNull();
});

test('a new secret has 160 bits and is not given twice', () => {
  const secrets = new Set(Array.from({ length: 50 }, newTotpSecret));
  expect(secrets.size).toBe(50);
  for (const secret of secrets) expect(secret).toMatch(/^[A-Z2-7]{32}$/);
});

test('the address an app scans names shop, person and secret', () => {
  const address = new URL(totpAddress(SECRET, 'Harrow Lane Instruments', 'ida@shop.example'));
  expect(address.protocol).toBe('otpauth:');
  expect(address.searchParams.get('secret')).toBe(SECRET);
  expect(address.searchParams.get('issuer')).toBe('Harrow Lane Instruments');
  expect(decodeURIComponent(address.pathname)).toContain('ida@shop.example');
});
