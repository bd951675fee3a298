import { expect, test } from 'vitest';
import { addressBlock, slowness } from '@/server/auth/guessing';

test('ten wrong tries cost no time; then answers come ever later, up to five seconds', () => {
  const waits = Array.from({ length: 300 }, (_, n) => slowness(n));
  expect(waits.slice(0, 11)).toEqual(Array(11).fill(0));
  expect([slowness(20), slowness(30), slowness(40)]).toEqual([200, 400, 800]);
  expect(waits.toSorted((a, b) => a - b)).toEqual(waits);
  expect(slowness(1e9)).toBe(5000);
});

// RFC 4291 2.2: "::" stands for groups of zeros, once; 2.5.5.2: an IPv4 address in an IPv6 one.
test.each([
  ['192.0.2.7', '192.0.2.7'],
  ['::ffff:192.0.2.7', '192.0.2.7'],
  ['2001:db8:1:2:3:4:5:6', '2001:db8:1:2::/64'],
  ['2001:0DB8:0001:0002::9', '2001:db8:1:2::/64'],
  ['2001:db8::9', '2001:db8:0:0::/64'],
  ['::1', '0:0:0:0::/64'],
  ['fe80::1%eth0', 'fe80:0:0:0::/64'],
  ['unknown', 'unknown'],
  ['forged', 'forged'],
])('%s is counted as %s', (address, block) => {
  expect(addressBlock(address)).toBe(block);
});
