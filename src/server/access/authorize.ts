import { ENDPOINTS, type EndpointId } from '../../contract/endpoints.ts';
import { ACCESS, type AccessRow } from '../../contract/roles.ts';
import { ApiError } from '../errors.ts';
import type { Caller } from './caller.ts';

/** The row of the access table for an endpoint. */
export const accessOf = (endpoint: EndpointId): AccessRow => ACCESS[ENDPOINTS[endpoint].access];

/**
 * Whether the caller may use the endpoint (by id) or the page (by its row). Denies by default: nobody 401, role or scope too
 * low 403. Where the endpoint opens a thing, the role that counts is the one held in that thing's workshop: then this checks
 * kind and scope only, and the thing's door checks the role.
 */
export function authorize(endpointOrRow: EndpointId | AccessRow, caller: Caller): void {
  const endpoint = typeof endpointOrRow === 'string' ? endpointOrRow : undefined;
  const row = typeof endpointOrRow === 'string' ? accessOf(endpointOrRow) : endpointOrRow;
  if (row.nobody) return;
  switch (caller.kind) {
    case 'person': {
      if (caller.via === 'token' && (row.scope === 'none' || !caller.scopes.includes(row.scope)))
        throw new ApiError('scope_too_low');
      const opensThing = endpoint !== undefined && 'opens' in ENDPOINTS[endpoint];
      if (!opensThing && row[caller.role] === 'no') throw new ApiError('role_too_low');
      return;
    }
    case 'share':
      if (row.share === 'no') throw new ApiError('not_signed_in');
      if (row.share === 'answer' && !caller.mayAnswer) {
        throw new ApiError('role_too_low', {
          message: 'This link is for looking only; it takes no answers.',
        });
      }
      return;
    case 'nobody':
      throw new ApiError('not_signed_in');
  }
}
