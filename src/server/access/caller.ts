import type { Role, Scope } from '../../contract/roles.ts';
import { ApiError } from '../errors.ts';

/** Who is asking. Roles are looked up anew for every request, so a change takes effect at once. */
export type Caller = PersonCaller | ShareCaller | { readonly kind: 'nobody' };

export interface PersonCaller {
  readonly kind: 'person';
  readonly personId: string;
  readonly name: string;
  /** The current workshop of a session, or the only workshop of a token. */
  readonly workshopId: string;
  /** The role held in that workshop. */
  readonly role: Role;
  readonly via: 'session' | 'token';
  readonly sessionId?: string;
  readonly tokenId?: string;
  /** Empty for sessions, which are not limited by scope. */
  readonly scopes: readonly Scope[];
}

/** The holder of a share link that has neither ended nor been withdrawn. */
export interface ShareCaller {
  readonly kind: 'share';
  readonly linkId: string;
  readonly captureId: string;
  readonly mayAnswer: boolean;
  readonly question: string;
  readonly sharedBy: string;
  readonly expiresAt: Date;
}

export const NOBODY: Caller = { kind: 'nobody' };

/** The person, where an endpoint is for people only. */
export function personOf(caller: Caller): PersonCaller {
  if (caller.kind !== 'person') throw new ApiError('not_signed_in');
  return caller;
}

/** The link's holder, where an endpoint is for those only. */
export function shareOf(caller: Caller): ShareCaller {
  if (caller.kind !== 'share') throw new ApiError('not_found');
  return caller;
}
