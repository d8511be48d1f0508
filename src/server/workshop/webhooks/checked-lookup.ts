import { type LookupAddress, type LookupAllOptions, lookup } from 'node:dns';
import type { LookupFunction } from 'node:net';
import { isPublicAddress } from './public-address.ts';

/** The address points inward, or nowhere. */
export class AddressRefused extends Error {
  override readonly name = 'AddressRefused';
}

export type Resolve = (
  host: string,
  options: LookupAllOptions,
  done: (error: NodeJS.ErrnoException | null, addresses: LookupAddress[]) => void,
) => void;

/**
 * The look-up that a socket makes when it connects: refuses a name when any of its addresses points inward. There is no other
 * look-up afterwards, so a name that changes its answer gains nothing.
 */
export const checkedLookup =
  (resolve: Resolve = lookup): LookupFunction =>
  (host, options, done) => {
    resolve(host, { ...options, all: true }, (error, addresses) => {
      const [first] = addresses ?? [];
      if (error !== null) return done(error, '', 0);
      if (first === undefined || !addresses.every(({ address }) => isPublicAddress(address)))
        return done(new AddressRefused(`${host} points inward`), '', 0);
      if (options.all) return done(null, addresses);
      return done(null, first.address, first.family);
    });
  };
