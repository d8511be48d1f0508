import type { APIRoute } from 'astro';
import { ApiError } from '../../server/errors.ts';
import { refuse } from '../../server/http/respond.ts';

/** Addresses under /api that no endpoint has: the API's error shape, for every method. */
export const ALL: APIRoute = () => refuse(new ApiError('not_found'));
