import { describe, expect, it } from 'vitest';
import { addressGroup, addressList, clientAddress } from './address.ts';

const none = addressList([]);
const proxies = addressList(['192.0.2.1', '198.51.100.0/24', '2001:db8::/32']);

describe('clientAddress()', () => {
  it('ignores the forwarded header without trusted proxies', () => {
    expect(clientAddress('203.0.113.5', '10.0.0.1', none)).toBe('203.0.113.5');
  });

  it('takes the last address that is not a trusted proxy’s, whatever a client wrote before it', () => {
    expect(clientAddress('192.0.2.1', '10.9.9.9, 203.0.113.5, 198.51.100.7', proxies)).toBe('203.0.113.5');
    expect(clientAddress('203.0.113.77', '10.9.9.9', proxies)).toBe('203.0.113.77');
  });

  it('stops at what is no address', () => {
    expect(clientAddress('192.0.2.1', 'unknown', proxies)).toBe('192.0.2.1');
    expect(clientAddress('192.0.2.1', undefined, proxies)).toBe('192.0.2.1');
  });

  it('writes a mapped address as the IPv4 address that it is', () => {
    expect(clientAddress('::ffff:192.0.2.1', '203.0.113.5', proxies)).toBe('203.0.113.5');
    expect(clientAddress('2001:db8::1', '2001:4860::9', proxies)).toBe('2001:4860::9');
  });
});

describe('addressGroup()', () => {
  it('counts an IPv6 network of 64 bits as one, and an IPv4 address by itself', () => {
    expect(addressGroup('203.0.113.5')).toBe('203.0.113.5');
    expect(addressGroup('2001:db8:1:2:3:4:5:6')).toBe('2001:db8:1:2::/64');
    expect(addressGroup('2001:0db8:1:2::9')).toBe('2001:db8:1:2::/64');
    expect(addressGroup('::1')).toBe('0:0:0:0::/64');
  });
});
