import type { Cookie } from 'lucia';
import { endSession } from './lucia.ts';

/** Ends the session that the browser's cookie names; gives the cookie that clears it. */
export const signOut = (cookieHeader: string | undefined): Promise<Cookie> => endSession(cookieHeader);
