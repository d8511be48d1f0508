import { id } from '../../contract/areas/common.ts';
import type { EndpointId } from '../../contract/endpoints.ts';
import type { Grant, Role } from '../../contract/roles.ts';
import { ApiError } from '../errors.ts';
import { accessOf, authorize } from './authorize.ts';
import { type Caller, type PersonCaller, personOf, type ShareCaller } from './caller.ts';

export interface OpenOptions {
  /** Hidden ones too, while they can still be brought back. */
  readonly deleted?: boolean;
}

/** What a door finds: the thing, the caller's role in its workshop, and who made it (for grants of `own`). */
export interface Found<T> {
  readonly thing: T;
  readonly role: Role;
  readonly madeBy: string | null;
  /** Whether it is set for the caller, as the door's query holds it (for grants of `set`). */
  readonly setFor?: boolean;
}

/** How one kind of thing is looked up, with membership in the query's WHERE. */
export interface Door<T> {
  /** Rows, none when it is not there for this person. */
  find(person: PersonCaller, thingId: string, options: OpenOptions): PromiseLike<readonly Found<T>[]>;
  /** For the holder of a share link; without it a link opens nothing of this kind. */
  findShared?(link: ShareCaller, thingId: string): PromiseLike<readonly T[]>;
}

export type Opener<T> = (
  caller: Caller,
  endpoint: EndpointId,
  thingId: string,
  options?: OpenOptions,
) => Promise<T>;

const notThere = () => new ApiError('not_found');

/** Role too low in the right workshop is 403; `own` also needs the caller to be the maker, `set` that or a set that holds it. */
function grantOrThrow(grant: Grant, isOwn: boolean, isSet: boolean): void {
  if (grant === 'yes' || (grant === 'own' && isOwn) || (grant === 'set' && (isOwn || isSet))) return;
  throw new ApiError('role_too_low');
}

/** Opens a thing for an endpoint, or says 401, 403 or 404. */
export const openThrough =
  <T>(door: Door<T>): Opener<T> =>
  async (caller, endpoint, thingId, options = {}) => {
    authorize(endpoint, caller);
    // What cannot be an id names nothing; it does not reach the database.
    if (!id.safeParse(thingId).success) throw notThere();
    if (caller.kind === 'share') {
      const [shared] = (await door.findShared?.(caller, thingId)) ?? [];
      if (shared === undefined) throw notThere();
      return shared;
    }
    const person = personOf(caller);
    const [found] = await door.find(person, thingId, options);
    if (found === undefined) throw notThere();
    grantOrThrow(accessOf(endpoint)[found.role], found.madeBy === person.personId, found.setFor === true);
    return found.thing;
  };
