import { describe, expect, it } from 'vitest';
import { isPublicAddress } from './public-address.ts';

describe('isPublicAddress()', () => {
  // Source: the IANA IPv4 and IPv6 special-purpose address registries (RFC 6890 and its updates).
  it.each([
    '127.0.0.1',
    '127.255.255.254',
    '0.0.0.0',
    '10.1.2.3',
    '172.16.0.1',
    '172.31.255.255',
    '192.168.1.1',
    '169.254.169.254',
    '100.64.0.1',
    '224.0.0.1',
    '240.0.0.1',
    '255.255.255.255',
    '192.0.2.7',
    '198.18.0.1',
    '198.51.100.1',
    '203.0.113.9',
    '::1',
    '::',
    '::ffff:127.0.0.1',
    '::ffff:8.8.8.8',
    '::127.0.0.1',
    'fe80::1',
    'fe80::1%eth0',
    'fec0::1',
    'fc00::1',
    'fd12:3456::1',
    'ff02::1',
    '64:ff9b::7f00:1',
    '64:ff9b:1::7f00:1',
    '2002:7f00:1::',
    '2001:0:7f00:1::',
    '2001:db8::1',
    '[::1]',
    'not an address',
    '',
  ])('refuses %s', (address) => {
    expect(isPublicAddress(address)).toBe(false);
  });

  it.each(['8.8.8.8', '172.32.0.1', '100.128.0.1', '2606:4700::1111', '[2606:4700::1111]'])(
    'lets %s through',
    (address) => {
      expect(isPublicAddress(address)).toBe(true);
    },
  );
});
