import ipaddr from 'ipaddr.js';

/**
 * Ranges that the package calls ordinary or does not know and that lead inward all the same: IPv4-compatible (RFC 4291,
 * 2.5.5.1), site-local (RFC 3879) and the local translation prefix (RFC 8215).
 */
const ALSO_INWARD = ['::/96', 'fec0::/10', '64:ff9b:1::/48'].map((network) => ipaddr.IPv6.parseCIDR(network));

/**
 * Whether a webhook may be sent to this address: an ordinary public one. Loopback, private, link-local, carrier, unspecified,
 * multicast, reserved, and IPv6 forms that carry an IPv4 address (mapped, translated, tunnelled) are not.
 */
export function isPublicAddress(address: string): boolean {
  const bare = address.replace(/^\[|\]$/g, '').split('%')[0] ?? '';
  if (!ipaddr.isValid(bare)) return false;
  const parsed = ipaddr.parse(bare);
  if (parsed.range() !== 'unicast') return false;
  return parsed instanceof ipaddr.IPv4 || !ALSO_INWARD.some((network) => parsed.match(network));
}
